import jstat from "jstat";
import { describe, expect, it } from "vitest";
import { radialFactor } from "./radial-factor.ts";

const relative = (got: number, wanted: number) => Math.abs(got / wanted - 1);

describe("radialFactor", () => {
  it("is √(2·F) with F(0.95; 2, n) as the tables print it", () => {
    // Upper 5 % points of F(2, n), n = 1, 2, 3: atozmath.com, distribution tables; n = 10: studylib.net, F-ratio table
    const table = [
      [1, 199.5, 5e-5],
      [2, 19, 5e-5],
      [3, 9.5521, 5e-5],
      [10, 4.1, 5e-3],
    ] as const;
    for (const [dof, f, half] of table) {
      expect(Math.abs(radialFactor(0.95, dof) ** 2 / 2 - f)).toBeLessThan(half * 1.001);
    }
  });

  it("is √(−2·ln 0.05) = 2.4477 at infinite degrees of freedom, and runs into it", () => {
    expect(relative(radialFactor(0.95, null), Math.sqrt(2 * Math.log(20)))).toBeLessThan(1e-15);
    expect(Math.abs(radialFactor(0.95, null) - 2.4477)).toBeLessThan(5e-5);
    // k₂² = L + L²/(2n) + …, L = −2·ln(1 − level)
    const limit = radialFactor(0.95, null) ** 2;
    for (const dof of [1e6, 1e9, 1e15]) {
      expect(relative(radialFactor(0.95, dof) ** 2, limit + limit ** 2 / (2 * dof))).toBeLessThan(1e-11);
    }
  });

  it("keeps its promise: F's own cumulative distribution gives the level back", () => {
    // P(F < f) = 1 − (1 + 2f/n)^(−n/2) for two degrees of freedom over n
    for (const dof of [0.7, 1, 4.5, 21, 300]) {
      for (const level of [0.51, 0.95, 0.9999]) {
        const f = radialFactor(level, dof) ** 2 / 2;
        expect(Math.abs(1 - (1 + (2 * f) / dof) ** (-dof / 2) - level)).toBeLessThan(1e-12);
      }
    }
  });

  it("agrees with a general statistics library within that library's own error", () => {
    for (const dof of [3, 12, 60]) {
      expect(relative(radialFactor(0.95, dof) ** 2 / 2, jstat.centralF.inv(0.95, 2, dof))).toBeLessThan(1e-6);
    }
  });

  it("refuses what has no factor", () => {
    expect(() => radialFactor(0.95, 1e-3)).toThrow(expect.objectContaining({ code: "result_overflow" }));
    expect(() => radialFactor(1, 5)).toThrow(RangeError);
    expect(() => radialFactor(0.95, 0)).toThrow(RangeError);
  });
});
