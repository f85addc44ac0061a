import { describe, expect, it } from "vitest";
import { wrapText } from "./wrap-text.ts";

describe("wrapText", () => {
  it("breaks between words, and inside one that is too long", () => {
    expect(wrapText("one two three", 7)).toEqual(["one two", "three"]);
    expect(wrapText("abcdefghij k", 4)).toEqual(["abcd", "efgh", "ij k"]);
    expect(wrapText("a\nb", 4)).toEqual(["a", "b"]);
  });

  it("cuts no character of two code units in half", () => {
    expect(wrapText("\u{1F527}\u{1F527}\u{1F527}", 2)).toEqual(["\u{1F527}\u{1F527}", "\u{1F527}"]);
  });
});
