import { describe, expect, it } from "vitest";
import { coverageRanks, numericalTolerance } from "./coverage-interval.ts";

describe("coverageRanks", () => {
  it("takes q = pM values between the ends, with as many left out on either side", () => {
    // JCGM 101:2008, 7.7.2: q = 950 000 of 10⁶, r = (M − q)/2 = 25 000
    expect(coverageRanks(1_000_000, 0.95)).toEqual({ low: 25_000, high: 975_000 });
    expect(coverageRanks(1_000, 0.95)).toEqual({ low: 25, high: 975 });
    expect(coverageRanks(10_000, 0.99)).toEqual({ low: 50, high: 9_950 });
  });

  it("rounds as 7.7.1 and 7.7.2 do where pM or (M − q)/2 is no whole number", () => {
    // q = integer part of 951.95 + 1/2 = 952; r = integer part of (1002 − 952 + 1)/2 = 25
    expect(coverageRanks(1_002, 0.95)).toEqual({ low: 25, high: 977 });
    // q = integer part of 950.95 + 1/2 = 951; r = integer part of (1001 − 951 + 1)/2 = 25
    expect(coverageRanks(1_001, 0.95)).toEqual({ low: 25, high: 976 });
    // q = integer part of 958.55 + 1/2 = 959; r = 50/2 = 25
    expect(coverageRanks(1_009, 0.95)).toEqual({ low: 25, high: 984 });
  });

  it("is null where no value would lie outside", () => {
    expect(coverageRanks(10, 0.99)).toBeNull();
    expect(coverageRanks(0, 0.95)).toBeNull();
    expect(coverageRanks(1, 0.6)).toBeNull();
  });
});

describe("numericalTolerance", () => {
  it.each([
    // Examples of JCGM 101:2008, 7.9.2, from memory: 35·10⁻⁵ g, 4·10⁻⁴ g and 2·10⁰ K
    [0.000_35, 2, 0.000_005],
    [0.000_35, 1, 0.000_05],
    [2, 1, 0.5],
    // Those of 9.2.2, 9.2.4 and 9.3.2: u = 2.0, 10.1 and 0.054
    [2, 2, 0.05],
    [10.1, 2, 0.5],
    [0.0539, 1, 0.005],
  ])("of %d with %d digits is %d", (standard, digits, tolerance) => {
    expect(numericalTolerance(standard, digits, 1)).toEqual({ tolerance, digits });
  });

  it("keeps the digits of an uncertainty that would round up to one place more", () => {
    expect(numericalTolerance(9.96, 1, 1).tolerance).toBe(0.5);
    expect(numericalTolerance(0.099_9, 2, 1).tolerance).toBe(0.000_5);
  });

  it("takes two digits of an uncertainty that begins with 1, else one, where none are asked for", () => {
    expect(numericalTolerance(0.0132, null, 1)).toEqual({ tolerance: 0.000_5, digits: 2 });
    expect(numericalTolerance(0.0232, null, 1)).toEqual({ tolerance: 0.005, digits: 1 });
    for (let u = 1e-7; u < 1e7; u *= 1.037) {
      const share = numericalTolerance(u, null, 1).tolerance / u;
      expect(share).toBeGreaterThan(0.025 - 1e-12);
      expect(share).toBeLessThan(0.25 + 1e-12);
    }
  });

  it("counts digits in the unit that it is given", () => {
    // 0.0132 mm is 0.52 mil: one digit, 0.05 mil
    expect(numericalTolerance(0.0132, null, 0.0254)).toEqual({ tolerance: 0.05 * 0.0254, digits: 1 });
  });

  it("is 0 where there is no uncertainty", () => {
    expect(numericalTolerance(0, null, 1).tolerance).toBe(0);
  });
});
