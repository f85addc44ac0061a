import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  convertLength,
  decimalsFor,
  writeFactor,
  writeNumber,
  writeSigned,
  writeTick,
} from "./write-number.ts";

describe("a number", () => {
  it.each([
    [1.25, 3, "1.250", "+1.250"],
    [-1.25, 3, "\u22121.250", "\u22121.250"],
    [0, 2, "0.00", "0.00"],
    [-0.004, 2, "0.00", "0.00"],
    [0.004, 2, "0.00", "0.00"],
  ])("%d with %d decimals", (value, decimals, plain, signed) => {
    expect(writeNumber(value, decimals)).toBe(plain);
    expect(writeSigned(value, decimals)).toBe(signed);
  });

  it("has one sign or none, and as many decimals as asked for", () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e6, max: 1e6, noNaN: true }),
        fc.integer({ min: 1, max: 9 }),
        (value, decimals) => {
          expect(writeSigned(value, decimals)).toMatch(new RegExp(`^[+\u2212]?\\d+\\.\\d{${decimals}}$`));
        },
      ),
    );
  });
});

describe("the decimals of a column", () => {
  it.each([
    [[0.31, 0.02], 4, 4],
    [[0.000031], 4, 7],
    [[1200, 3], 1, 1],
    [[0, null, undefined], 4, 4],
    [[], 2, 2],
  ])("show three figures of the largest of %j, and never fewer than %d", (values, least, decimals) => {
    expect(decimalsFor(values, least)).toBe(decimals);
  });
});

describe("a scale", () => {
  it.each([
    [0.2, 0.05, "0.20"],
    [-5, 5, "\u22125"],
    [1500, 500, "1500"],
  ])("writes %d at steps of %d as %s", (value, step, text) => {
    expect(writeTick(value, step)).toBe(text);
  });

  it.each([
    [2941.2, "2\u00a0900"],
    [1.26, "1.3"],
    [12_345_678, "12\u00a0000\u00a0000"],
    [2e9, "2e+9"],
    [0.012, "1e-2"],
  ])("is exaggerated %d times: %s", (factor, text) => {
    expect(writeFactor(factor)).toBe(text);
  });
});

describe("a length in another unit", () => {
  it("is the same length", () => {
    // International yard and pound agreement of 1959: 1 in = 25.4 mm, so 1 mil = 25.4 um.
    expect(Math.abs(convertLength(2, "mil", "um") - 50.8)).toBeLessThan(1e-12); // um
    expect(convertLength(0.1, "mm", "mm")).toBe(0.1);
  });
});
