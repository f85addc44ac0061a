import jstat from "jstat";
import { describe, expect, it } from "vitest";
import { chiSquareCumulative, chiSquareQuantile } from "./chi-square.ts";

const relative = (got: number, wanted: number) => Math.abs(got / wanted - 1);

/** [dof, probability, quantile]: root of the regularised incomplete gamma function, mpmath 1.3.0 at 40 digits. */
const quantiles = [
  [0.7, 0.001, 3.860163955064893e-9],
  [0.7, 0.5, 0.21473897172368653],
  [0.7, 0.999, 9.678126727421997],
  [1, 0.001, 1.5707971492624898e-6],
  [1, 0.5, 0.4549364231195728],
  [1, 0.999, 10.827566170662733],
  [7, 0.001, 0.5984937523753759],
  [7, 0.95, 14.067140449340169],
  [30, 0.05, 18.492660981953467],
  [30, 0.999, 59.70306430442993],
  [100, 0.001, 61.91793920693662],
  [100, 0.95, 124.34211340400408],
  [1998, 0.05, 1895.1717327629372],
  [1998, 0.5, 1997.333372893505],
  [1998, 0.999, 2199.0584565631502],
] as const;

/**
 * NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.6.7.4, three decimals: the lower table as read,
 * the upper one (0.95, 0.99) from memory and found again in a five-decimal table of an examination paper.
 */
const nistTable = [
  { dof: 1, lower: [0.016, 0.004, 0.001], upper: [3.841, 6.635] },
  { dof: 2, lower: [0.211, 0.103, 0.051], upper: [5.991, 9.21] },
  { dof: 10, lower: [4.865, 3.94, 3.247], upper: [18.307, 23.209] },
  { dof: 100, lower: [82.358, 77.929, 74.222], upper: [124.342, 135.807] },
];

describe("chiSquareQuantile", () => {
  it.each(quantiles)(
    "with %d degrees of freedom at %d is within 1e-10 of the exact root",
    (dof, p, wanted) => {
      expect(relative(chiSquareQuantile(p, dof), wanted)).toBeLessThan(1e-10);
    },
  );

  it("prints the values of the published table", () => {
    for (const { dof, lower, upper } of nistTable) {
      [0.1, 0.05, 0.025].forEach((p, i) =>
        expect(Math.abs(chiSquareQuantile(p, dof) - lower[i]!)).toBeLessThan(0.0005),
      );
      [0.95, 0.99].forEach((p, i) =>
        expect(Math.abs(chiSquareQuantile(p, dof) - upper[i]!)).toBeLessThan(0.0005001),
      );
    }
  });

  it("is −2·ln(1 − p) for two degrees of freedom", () => {
    for (const p of [1e-9, 0.1, 0.5, 0.95, 0.999999]) {
      expect(relative(chiSquareQuantile(p, 2), -2 * Math.log1p(-p))).toBeLessThan(1e-13);
    }
  });

  it("agrees with a general statistics library within that library's own error", () => {
    for (const dof of [1, 3, 12, 60]) {
      for (const p of [0.05, 0.5, 0.95, 0.99]) {
        expect(relative(chiSquareQuantile(p, dof), jstat.chisquare.inv(p, dof))).toBeLessThan(1e-6);
      }
    }
  });

  it("refuses a probability that has no quantile", () => {
    for (const p of [0, 1, -0.1, Number.NaN]) expect(() => chiSquareQuantile(p, 2)).toThrow(RangeError);
    for (const dof of [0, -1, Infinity]) expect(() => chiSquareQuantile(0.5, dof)).toThrow(RangeError);
    expect(() => chiSquareQuantile(1e-300, 0.5)).toThrow(
      expect.objectContaining({ code: "result_overflow" }),
    );
  });
});

describe("chiSquareCumulative", () => {
  it("undoes the quantile", () => {
    for (const dof of [0.3, 1, 2, 9.5, 40, 700, 1e5]) {
      for (const p of [1e-6, 0.01, 0.3, 0.6, 0.95, 0.9999]) {
        expect(relative(chiSquareCumulative(chiSquareQuantile(p, dof), dof), p)).toBeLessThan(1e-11);
      }
    }
  });

  it("is 0 at 0, 1 at infinity, and rises between", () => {
    expect(chiSquareCumulative(0, 3)).toBe(0);
    expect(chiSquareCumulative(Infinity, 3)).toBe(1);
    const values = Array.from({ length: 200 }, (_, index) => chiSquareCumulative(index / 10, 3));
    expect(values.every((value, index) => index === 0 || value > values[index - 1]!)).toBe(true);
    expect(() => chiSquareCumulative(-1, 3)).toThrow(RangeError);
  });
});
