import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { inflateSync } from "node:zlib";
import { describe, expect, it } from "vitest";
import { lettering, onClock, textWidth } from "./shape.ts";

/** A table of a WOFF font: W3C "WOFF File Format 1.0", sections 4 and 5. */
function fontTable(font: Buffer, tag: string): Buffer {
  const count = font.readUInt16BE(12);
  for (let entry = 44; entry < 44 + count * 20; entry += 20) {
    if (font.toString("latin1", entry, entry + 4) !== tag) continue;
    const [offset, packed, plain] = [4, 8, 12].map((at) => font.readUInt32BE(entry + at)) as [
      number,
      number,
      number,
    ];
    const bytes = font.subarray(offset, offset + packed);
    return packed === plain ? bytes : inflateSync(bytes);
  }
  throw new Error(`The font has no table ${tag}.`);
}

describe("the lettering", () => {
  const path = createRequire(import.meta.url).resolve(
    "@fontsource/ibm-plex-mono/files/ibm-plex-mono-latin-400-normal.woff",
  );
  const font = readFileSync(path);
  // OpenType: head.unitsPerEm at 18, OS/2.sCapHeight at 88, hmtx begins with the first glyph's advance.
  const unitsPerEm = fontTable(font, "head").readUInt16BE(18);

  it("has the capitals and the advance of the type that the console ships", () => {
    expect(lettering.capitalPerSize).toBe(fontTable(font, "OS/2").readInt16BE(88) / unitsPerEm);
    const advances = fontTable(font, "hmtx");
    expect(lettering.advancePerSize).toBe(advances.readUInt16BE(0) / unitsPerEm);
    // Every character takes the same room.
    expect(advances.readUInt16BE(4)).toBe(advances.readUInt16BE(0));
  });

  it("takes room in proportion to its length and height", () => {
    // 2.5 mm capitals are type of 2.5/0.698 mm, 0.6 of which is one advance.
    expect(Math.abs(textWidth("brg-1") - (5 * 0.6 * 2.5) / 0.698)).toBeLessThan(1e-12); // mm
    expect(textWidth("brg-1", 5)).toBe(2 * textWidth("brg-1", 2.5));
  });
});

describe("onClock", () => {
  it.each([
    [0, 10, 5],
    [90, 15, 10],
    [180, 10, 15],
    [270, 5, 10],
  ])("goes clockwise from the top: %d degrees", (clockDeg, x, y) => {
    const point = onClock({ x: 10, y: 10 }, 5, clockDeg);
    expect(Math.hypot(point.x - x, point.y - y)).toBeLessThan(1e-12); // mm
  });
});
