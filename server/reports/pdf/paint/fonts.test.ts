import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { describe, expect, it } from "vitest";
import { legibleLine, legibleText } from "../layout/legible-text.ts";
import { fontFor } from "./fonts.ts";
import { unpackWoff } from "./unpack-woff.ts";

const file = readFileSync(
  createRequire(import.meta.url).resolve(
    "@fontsource/ibm-plex-mono/files/ibm-plex-mono-latin-400-normal.woff",
  ),
);

describe("unpackWoff", () => {
  const font = unpackWoff(file);
  const tables = Array.from({ length: font.readUInt16BE(4) }, (_, index) => {
    const entry = 12 + index * 16;
    return {
      tag: font.toString("latin1", entry, entry + 4),
      checksum: font.readUInt32BE(entry + 4),
      offset: font.readUInt32BE(entry + 8),
      length: font.readUInt32BE(entry + 12),
    };
  });

  it("gives tables that agree with the checksums their maker put on them", () => {
    // OpenType specification, "Calculating checksums": the sum of a table's 32-bit words; of head without its adjustment.
    const checked = tables.filter(({ tag }) => tag !== "head");
    expect(checked.length).toBeGreaterThan(8);
    for (const { checksum, offset, length } of checked) {
      let sum = 0;
      for (let at = offset; at < offset + length; at += 4) sum = (sum + font.readUInt32BE(at)) >>> 0;
      expect(sum).toBe(checksum);
    }
  });

  it("is as long as the WOFF header says the plain font is", () => {
    // WOFF File Format 1.0, section 3: totalSfntSize at 16.
    expect(font.length).toBe(file.readUInt32BE(16));
  });

  it("refuses what is no WOFF", () => {
    expect(() => unpackWoff(Buffer.from("wOF2 and what follows"))).toThrow(RangeError);
  });
});

describe("the type", () => {
  it.each([
    ["A", "latin"],
    ["\u00b5", "latin"],
    ["\u2212", "latin"],
    ["Ł", "latin-ext"],
    ["Ж", "cyrillic"],
  ])("finds %s in the file that has it", (character, script) => {
    expect(fontFor(character)).toBe(script);
  });

  it.each(["Ω", "山", "ע", "😀"])("has no %s, which is then written as a code point", (character) => {
    expect(fontFor(character)).toBeNull();
    expect(legibleLine(`a${character}b`)).toMatch(/^a\[U\+[0-9A-F]{4,5}\]b$/);
  });

  it("keeps the ends of lines and writes everything else that acts as its code point", () => {
    expect(legibleText("one\r\ntwo\tthree\u2028four\u202e")).toBe("one\ntwo three\nfour[U+202E]");
    expect(legibleLine("one\n\ntwo")).toBe("one two");
  });

  it("writes an accent that no letter takes up as its code point, so that a character is a column", () => {
    expect(legibleLine("e\u0301 A\u0334")).toBe("é A[U+0334]");
  });
});
