import { describe, expect, it } from "vitest";
import { readDecimal } from "./read-decimal.ts";

describe("readDecimal", () => {
  it.each([
    ["0.12", 0.12],
    ["0,12", 0.12],
    ["-0,005", -0.005],
    ["\u22120.3", -0.3],
    ["+1", 1],
    [",5", 0.5],
    [" 12 ", 12],
    ["1e-3", 0.001],
  ])("reads %j as %d", (text, value) => {
    expect(readDecimal(text)).toBe(value);
  });

  it("reads nothing as nothing, never as zero", () => {
    expect(readDecimal("")).toBeNull();
    expect(readDecimal("  ")).toBeNull();
  });

  it.each(["1.234,5", "1,234.5", "1 234", "12mm", "abc", "-", "0x10", "1,2,3", "Infinity"])(
    "takes %j for no number",
    (text) => {
      expect(readDecimal(text)).toBeNaN();
    },
  );
});
