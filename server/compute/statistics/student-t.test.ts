import jstat from "jstat";
import { describe, expect, it } from "vitest";
import { describeCases, mismatches } from "../../../tests/reference/read-cases.ts";
import { studentFactor } from "./student-t.ts";

const relative = (got: number, wanted: number) => Math.abs(got / wanted - 1);

/** [dof, level, factor]: root of the regularised incomplete beta function, mpmath 1.3.0 at 40 digits. */
const factors = [
  [0.7, 0.6, 1.7588267314034591],
  [0.7, 0.95, 36.611415031588685],
  [0.7, 0.9973, 2368.9393411778833],
  [1.3, 0.6, 1.2162502631131098],
  [1.3, 0.95, 7.5005293255620336],
  [1.3, 0.9973, 71.38336348566062],
  [3.5, 0.6, 0.956758833932311],
  [3.5, 0.95, 2.94008863798273],
  [3.5, 0.9973, 7.602863863322863],
  [12.25, 0.6, 0.8719560202909472],
  [12.25, 0.95, 2.1738913883920636],
  [12.25, 0.9973, 3.745430497185176],
  [150.5, 0.6, 0.8440160689578434],
  [150.5, 0.95, 1.9758519492008912],
  [150.5, 0.9973, 3.0505802954977086],
  [2500, 0.6, 0.841765033566948],
  [2500, 0.95, 1.9609133447955673],
  [2500, 0.9973, 3.002979690122009],
] as const;

const levels = [0.51, 0.6827, 0.9, 0.95, 0.99, 0.9973, 0.999999];

interface FactorCase {
  readonly p: number[];
  readonly nu: number[];
}

describe("studentFactor", () => {
  it.each(factors)("at dof %d and level %d is within 1e-10 of the exact root", (dof, level, wanted) => {
    expect(relative(studentFactor(level, dof), wanted)).toBeLessThan(1e-10);
  });

  it.each(levels)("equals the closed forms of 1, 2 and 4 degrees of freedom at level %d", (level) => {
    expect(relative(studentFactor(level, 1), Math.tan((Math.PI * level) / 2))).toBeLessThan(1e-9);
    const outside = (1 - level) * (1 + level);
    expect(relative(studentFactor(level, 2), level * Math.sqrt(2 / outside))).toBeLessThan(1e-10);
    // W. T. Shaw, J. Computational Finance 9 (2006) 37: t = 2·√(cos(arccos(√a)/3)/√a − 1), a = 1 − level²
    const root = Math.sqrt(outside);
    const four = 2 * Math.sqrt(Math.cos(Math.acos(root) / 3) / root - 1);
    expect(relative(studentFactor(level, 4), four)).toBeLessThan(1e-10);
  });

  it("is the normal factor at infinite degrees of freedom", () => {
    // Φ⁻¹(0.975) and Φ⁻¹(0.995): Abramowitz & Stegun table 26.5, continued with mpmath
    expect(Math.abs(studentFactor(0.95, null) - 1.959963984540054)).toBeLessThan(1e-13);
    expect(Math.abs(studentFactor(0.99, null) - 2.5758293035489004)).toBeLessThan(1e-13);
  });

  it("runs into the normal factor as (t³ + t)/(4·dof), the first term of its expansion", () => {
    // Abramowitz & Stegun 26.7.5
    const t = studentFactor(0.95, null);
    for (const dof of [1e5, 1e7, 1e9, 1e12, 1e300]) {
      const expansion = t + (t ** 3 + t) / (4 * dof);
      expect(Math.abs(studentFactor(0.95, dof) - expansion)).toBeLessThan(1e-13 + 10 / dof / dof);
    }
  });

  it("falls with the degrees of freedom, across every change of expansion", () => {
    for (const level of levels) {
      const dofs = Array.from({ length: 400 }, (_, index) => 0.7 * 1.06 ** index);
      const values = dofs.map((dof) => studentFactor(level, dof));
      expect(values.every((value, index) => index === 0 || value < values[index - 1]!)).toBe(true);
    }
  });

  it("agrees with a general statistics library within that library's own error", () => {
    for (const dof of [1.5, 3, 8, 30, 200]) {
      for (const level of [0.6827, 0.95, 0.99]) {
        const other = jstat.studentt.inv((1 + level) / 2, dof);
        expect(relative(studentFactor(level, dof), other)).toBeLessThan(1e-6);
      }
    }
  });

  it("answers at the ends of its range, or refuses by code", () => {
    expect(studentFactor(Number.EPSILON / 2, 5)).toBeGreaterThan(0);
    expect(studentFactor(1 - Number.EPSILON / 2, null)).toBeGreaterThan(8);
    expect(() => studentFactor(0.999, 1e-3)).toThrow(expect.objectContaining({ code: "result_overflow" }));
    for (const level of [0, 1, -0.5, 2, Number.NaN])
      expect(() => studentFactor(level, 5)).toThrow(RangeError);
    for (const dof of [0, -1, Infinity, Number.NaN])
      expect(() => studentFactor(0.9, dof)).toThrow(RangeError);
  });
});

describeCases<FactorCase, { t: number[][] }>(
  "studentFactor against the coverage-factor references",
  ["coverage-factor"],
  (reference) => {
    const { p, nu } = reference.input;
    const t = nu.map((dof) => p.map((level) => studentFactor(level, dof)));
    expect(mismatches(reference, { t })).toEqual([]);
    if (reference.id === "t-factor-real-dof") {
      const worst = Math.max(
        ...t.flatMap((row, i) => row.map((got, j) => relative(got, reference.expected.t[i]![j]!))),
      );
      expect(worst).toBeLessThan(1e-10);
    }
  },
);
