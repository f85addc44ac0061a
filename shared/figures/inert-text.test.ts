import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { inertText } from "./inert-text.ts";

describe("inertText", () => {
  it.each([
    ["\u202egnp.exe", "[U+202E]gnp.exe"],
    ["a\u0000b\u001fc", "a[U+0000]b[U+001F]c"],
    ["\u2066x\u2069", "[U+2066]x[U+2069]"],
    ["\ud800 alone", "[U+D800] alone"],
    ["zero\u200bwidth\ufeff", "zero[U+200B]width[U+FEFF]"],
    ["line\u2028end", "line[U+2028]end"],
    ["\ue000", "[U+E000]"],
  ])("writes what would act instead of being read as its code point: %j", (text, shown) => {
    expect(inertText(text)).toBe(shown);
  });

  it("leaves letters of every script, composed", () => {
    expect(inertText("Łódź Жук Ω 山田 עברית 😀")).toBe("Łódź Жук Ω 山田 עברית 😀");
    expect(inertText("Jose\u0301")).toBe("José");
  });

  it("lets no control, bidirectional control or half of a pair through, whatever the text", () => {
    fc.assert(
      fc.property(fc.string({ unit: "binary" }), (text) => {
        // The classes of the Unicode Character Database: controls, formats, surrogates, private use.
        expect(
          /[\p{Cc}\p{Cs}\p{Co}]|[\u202a-\u202e\u2066-\u2069\u200e\u200f\u061c]/u.test(inertText(text)),
        ).toBe(false);
      }),
    );
  });
});
