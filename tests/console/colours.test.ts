import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";

const tokens = readFileSync("console/src/styles/tokens.css", "utf8");

const pairs = [...tokens.matchAll(/--color-(\w+): light-dark\((#[0-9a-f]{6}), (#[0-9a-f]{6})\)/g)];
const themes = (["light", "dark"] as const).map((theme, index) => ({
  theme,
  tones: new Map(pairs.map((pair) => [pair[1] ?? "", pair[2 + index] ?? ""])),
}));

/** Relative luminance of an sRGB colour: WCAG 2.1, "relative luminance". */
function luminance(colour: string): number {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5].map((at) => {
    const part = parseInt(colour.slice(at, at + 2), 16) / 255;
    return part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

/** Contrast ratio of two colours: WCAG 2.1, "contrast ratio". */
function contrast(one: string, other: string): number {
  const [low = 0, high = 0] = [luminance(one), luminance(other)].sort((a, b) => a - b);
  return (high + 0.05) / (low + 0.05);
}

describe.each(themes)("the colours of the $theme theme", ({ tones }) => {
  const tone = (name: string): string => {
    const colour = tones.get(name);
    if (colour === undefined) throw new Error(`There is no tone ${name}.`);
    return colour;
  };

  it("measure black on white as 21 : 1", () => {
    expect(contrast("#000000", "#ffffff")).toBe(21);
  });

  // 4.5 : 1 is success criterion 1.4.3 of WCAG 2.1.
  it.each(["ink", "muted", "signal"])("%s is read on ground, sheet and well", (name) => {
    for (const under of ["ground", "sheet", "well"]) {
      expect(contrast(tone(name), tone(under))).toBeGreaterThanOrEqual(4.5);
    }
  });

  it.each(["ink", "muted", "signal"])("the sheet's tone is read on a button of %s", (name) => {
    expect(contrast(tone("sheet"), tone(name))).toBeGreaterThanOrEqual(4.5);
  });

  // 3 : 1 is success criterion 1.4.11, for the edges of controls.
  it("rule edges a control on the sheet", () => {
    expect(contrast(tone("rule"), tone("sheet"))).toBeGreaterThanOrEqual(3);
  });
});
