import jstat from "jstat";
import { describe, expect, it } from "vitest";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import { chiSquareQuantile } from "./chi-square.ts";
import { fUpperTail, studentTwoTails } from "./f-distribution.ts";
import { hotellingFactor, hotellingUpperTail } from "./hotelling-factor.ts";
import { radialFactor } from "./radial-factor.ts";
import { studentFactor } from "./student-t.ts";

const relative = (got: number, wanted: number) => Math.abs(got / wanted - 1);
const dofs = [1, 2, 3, 7, 18, 60, 1001, 5e4];

/** [numerator, denominator, 5 % point]: NIST/SEMATECH e-Handbook of Statistical Methods 1.3.6.7.3, from memory. */
const fivePerCent = [
  [1, 10, 4.965],
  [2, 18, 3.555],
  [3, 20, 3.098],
  [5, 10, 3.326],
  [10, 10, 2.978],
  [9, 60, 2.04],
] as const;

describe("fUpperTail", () => {
  it.each(fivePerCent)("is 5 %% at the tabled point of %d and %d degrees of freedom", (n, d, point) => {
    // The table has three decimals: what half of its last one changes.
    expect(fUpperTail(point - 0.0006, n, d)).toBeGreaterThan(0.05);
    expect(fUpperTail(point + 0.0006, n, d)).toBeLessThan(0.05);
  });

  it("has the closed forms of two numerator and of two denominator degrees of freedom", () => {
    for (const dof of dofs) {
      for (const f of [1e-6, 0.3, 1, 2.5, 40, 1e4]) {
        const upper = Math.exp((-dof / 2) * Math.log1p((2 * f) / dof));
        expect(Math.abs(fUpperTail(f, 2, dof) - upper)).toBeLessThanOrEqual(1e-11 * upper);
        const lower = Math.exp((-dof / 2) * Math.log1p(2 / (dof * f)));
        expect(Math.abs(1 - fUpperTail(f, dof, 2) - lower)).toBeLessThan(1e-13);
      }
    }
  });

  it("agrees with a general statistics library within that library's own error", () => {
    for (const n of [1, 4, 9, 33]) {
      for (const d of [2, 5, 18, 120]) {
        for (const f of [0.05, 0.8, 1.3, 3, 12]) {
          expect(Math.abs(fUpperTail(f, n, d) - (1 - jstat.centralF.cdf(f, n, d)))).toBeLessThan(1e-7);
        }
      }
    }
  });

  it("changes to 1 less itself when the ratio is turned over, and runs from 1 to 0", () => {
    for (const n of dofs) {
      for (const d of dofs) {
        for (const f of [0.2, 0.97, 1.1, 6]) {
          expect(Math.abs(fUpperTail(f, n, d) + fUpperTail(1 / f, d, n) - 1)).toBeLessThan(1e-11);
        }
        expect(fUpperTail(0, n, d)).toBe(1);
        expect(fUpperTail(Infinity, n, d)).toBe(0);
        expect(fUpperTail(1e300, n, d)).toBeGreaterThanOrEqual(0);
      }
    }
  });

  it("refuses what is no ratio of variances and what are no degrees of freedom", () => {
    for (const value of [-1, Number.NaN]) expect(() => fUpperTail(value, 2, 2)).toThrow(RangeError);
    for (const dof of [0, -1, Infinity, Number.NaN]) {
      expect(() => fUpperTail(1, dof, 2)).toThrow(RangeError);
      expect(() => fUpperTail(1, 2, dof)).toThrow(RangeError);
    }
  });
});

describe("studentTwoTails", () => {
  it("undoes the Student factor", () => {
    for (const dof of [0.7, 1, 2, 5.5, 20, 300, 1e5]) {
      for (const level of [0.51, 0.9, 0.95, 0.999]) {
        expect(relative(studentTwoTails(studentFactor(level, dof), dof), 1 - level)).toBeLessThan(1e-10);
        expect(studentTwoTails(-2, dof)).toBe(studentTwoTails(2, dof));
      }
    }
  });
});

describe("hotellingFactor", () => {
  it("is √(2ν/(ν − 1)·F(level; 2, ν − 1)) of a general statistics library", () => {
    for (const dof of [2, 3, 9, 30, 200]) {
      for (const level of [0.6, 0.95, 0.99]) {
        const f = jstat.centralF.inv(level, 2, dof - 1);
        expect(relative(hotellingFactor(level, dof)!, Math.sqrt(((2 * dof) / (dof - 1)) * f))).toBeLessThan(
          1e-6,
        );
      }
    }
  });

  it("is larger than the factor for a covariance of known shape, and both run into that of chi-square", () => {
    for (const dof of [1.5, 2, 5, 40]) {
      expect(hotellingFactor(0.95, dof)!).toBeGreaterThan(radialFactor(0.95, dof));
    }
    expect(Math.abs(hotellingFactor(0.95, 1e9)! - Math.sqrt(chiSquareQuantile(0.95, 2)))).toBeLessThan(1e-8);
  });

  it("bounds nothing with one degree of freedom", () => {
    expect(hotellingFactor(0.95, 1)).toBeNull();
    expect(hotellingUpperTail(3, 0.5)).toBeNull();
    expect(() => hotellingFactor(0.95, 0)).toThrow(RangeError);
  });

  it("is passed by T² as often as it says, in drawings with a fixed seed", () => {
    const random = seededRandom(11);
    const n = 6;
    const draws = 20_000;
    let passed = 0;
    for (let draw = 0; draw < draws; draw += 1) {
      const points = Array.from({ length: n }, () => {
        const a = random.normal();
        return [a, 0.6 * a + 2 * random.normal()] as const;
      });
      const mean = [0, 1].map((k) => points.reduce((sum, p) => sum + p[k]!, 0) / n);
      const s = (i: 0 | 1, j: 0 | 1) =>
        points.reduce((sum, p) => sum + (p[i] - mean[i]!) * (p[j] - mean[j]!), 0) / (n - 1) / n;
      const [hh, hv, vv] = [s(0, 0), s(0, 1), s(1, 1)];
      const square =
        (mean[0]! ** 2 * vv - 2 * mean[0]! * mean[1]! * hv + mean[1]! ** 2 * hh) / (hh * vv - hv * hv);
      if (square > hotellingFactor(0.95, n - 1)! ** 2) passed += 1;
      expect(hotellingUpperTail(square, n - 1)! < 0.05).toBe(square > hotellingFactor(0.95, n - 1)! ** 2);
    }
    // Three standard errors of a share of 0.05.
    expect(Math.abs(passed / draws - 0.05)).toBeLessThan(3 * Math.sqrt((0.05 * 0.95) / draws));
  });
});
