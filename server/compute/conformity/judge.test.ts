import { describe, expect, it } from "vitest";
import { describeCases, mismatches } from "../../../tests/reference/read-cases.ts";
import { judge, type JudgeInput } from "./judge.ts";
import type { Tolerance } from "./tolerance.ts";

const radial = (halfWidthMm: number): Tolerance => ({ form: "radial", halfWidthMm });
const planes = (h: [number, number], v: [number, number]): Tolerance => ({
  form: "planes",
  h: { minMm: h[0], maxMm: h[1] },
  v: { minMm: v[0], maxMm: v[1] },
});

/** A deviation of (h, v) with standard uncertainty u in each plane. */
const input = (hMm: number, vMm: number, u: number | null, rest: Partial<JudgeInput> = {}): JudgeInput => ({
  deviation: { hMm, vMm },
  covariance: u === null ? null : { hhMm2: u * u, hvMm2: 0, vvMm2: u * u },
  dof: null,
  tolerance: radial(0.05),
  level: 0.95,
  rule: "guarded",
  ...rest,
});

describe("judge", () => {
  it("holds a radial acceptance back by k₂·√λ, and a rejection too", () => {
    const guard = Math.sqrt(-2 * Math.log(0.05)) * 0.004;
    expect(judge(input(0.05 - guard - 1e-9, 0, 0.004)).verdict).toBe("conforms");
    expect(judge(input(0.05 - guard + 1e-9, 0, 0.004)).verdict).toBe("undecided");
    expect(judge(input(0, 0.05 + guard - 1e-9, 0.004)).verdict).toBe("undecided");
    expect(judge(input(0, -0.05 - guard - 1e-9, 0.004)).verdict).toBe("exceeds");
  });

  it("takes the larger eigenvalue of the covariance, whatever its direction", () => {
    const covariance = { hhMm2: 5e-6, hvMm2: 3e-6, vvMm2: 5e-6 };
    const { expandedUncertainty } = judge(input(0, 0, null, { covariance, dof: 8 }));
    // eigenvalues 8e-6 and 2e-6; F(0.95; 2, 8) = 4.459 in every table of F
    expect(Math.abs(expandedUncertainty!.radialMm - Math.sqrt(2 * 4.459 * 8e-6))).toBeLessThan(1e-6);
    // t(0.95, 8) = 2.306, JCGM 100:2008 table G.2
    expect(Math.abs(expandedUncertainty!.hMm - 2.306 * Math.sqrt(5e-6))).toBeLessThan(1e-6);
  });

  it("conforms in h and v when both planes do, and exceeds when either does", () => {
    const tolerance = planes([-0.05, 0.05], [-0.03, 0.03]);
    const verdict = (h: number, v: number) => judge(input(h, v, 0.002, { tolerance })).verdict;
    expect(verdict(0.045, 0.025)).toBe("conforms");
    expect(verdict(0.045, 0.028)).toBe("undecided");
    expect(verdict(0.048, 0.0)).toBe("undecided");
    expect(verdict(0.06, 0.0)).toBe("exceeds");
    expect(verdict(0.048, 0.04)).toBe("exceeds");
    expect(verdict(0, -0.04)).toBe("exceeds");
  });

  it("measures a one-sided range from its middle", () => {
    const tolerance = planes([-0.02, 0.02], [-0.02, 0.08]);
    expect(judge(input(0, 0.07, 0.001, { tolerance })).verdict).toBe("conforms");
    expect(judge(input(0, -0.03, 0.001, { tolerance })).verdict).toBe("exceeds");
    expect(judge(input(0, 0.03, 0.001, { tolerance })).ratio).toBe(0);
    expect(Math.abs(judge(input(0, 0.07, 0.001, { tolerance })).ratio - 0.8)).toBeLessThan(1e-12);
  });

  it("answers the larger share of the tolerance of the two planes", () => {
    const tolerance = planes([-0.1, 0.1], [-0.02, 0.02]);
    expect(Math.abs(judge(input(0.05, -0.015, null, { tolerance })).ratio - 0.75)).toBeLessThan(1e-12);
    expect(Math.abs(judge(input(0.03, 0.04, null)).ratio - 1)).toBeLessThan(1e-12);
  });

  it("cannot decide a guarded verdict without an uncertainty, nor needs one for a simple verdict", () => {
    expect(judge(input(0, 0, null))).toEqual({ verdict: "undecided", ratio: 0, expandedUncertainty: null });
    expect(judge(input(9, 9, null)).verdict).toBe("undecided");
    expect(judge(input(0.049, 0, null, { rule: "simple" })).verdict).toBe("conforms");
    expect(judge(input(0.051, 0, null, { rule: "simple" })).verdict).toBe("exceeds");
    expect(judge(input(0.049, 0, 0.01, { rule: "simple" })).verdict).toBe("conforms");
  });

  it("counts a limit met exactly as met, though the decimals do not add up in binary", () => {
    // 0.1 + 0.2 > 0.3 in floating point
    const tolerance = planes([-0.3, 0.3], [-0.3, 0.3]);
    expect(judge(input(0.1 + 0.2, 0, null, { tolerance, rule: "simple" })).verdict).toBe("conforms");
    const mil = 0.0254;
    const oneSided = planes([-0.3 * mil, -0.1 * mil], [-1, 1]);
    expect(judge(input(-0.1 * mil, 0, null, { tolerance: oneSided, rule: "simple" })).verdict).toBe(
      "conforms",
    );
    expect(judge(input(0.3 + 1e-9, 0, null, { tolerance, rule: "simple" })).verdict).toBe("exceeds");
  });

  it("refuses a tolerance that leaves no room", () => {
    const refusal = (tolerance: Tolerance) => () => judge(input(0, 0, 0.001, { tolerance }));
    const at = (side: string) => ({ code: "tolerance_invalid", details: { at: ["tolerance", side] } });
    expect(refusal(radial(0))).toThrow(expect.objectContaining(at("radial")));
    expect(refusal(radial(Number.NaN))).toThrow(expect.objectContaining(at("radial")));
    expect(refusal(planes([0.1, 0.1], [-1, 1]))).toThrow(expect.objectContaining(at("h")));
    expect(refusal(planes([-1, 1], [0.2, 0.1]))).toThrow(expect.objectContaining(at("v")));
  });

  it("leaves its input as it was", () => {
    const frozen = Object.freeze(input(0.01, 0.02, 0.003, { tolerance: Object.freeze(radial(0.05)) }));
    expect(() => judge(frozen)).not.toThrow();
  });
});

interface ConformityInput {
  readonly readings?: readonly { readonly y: number; readonly U: number; readonly T_U: number }[];
  readonly u?: number;
  readonly T_U?: number;
  readonly y?: readonly number[];
  readonly upper?: { readonly y: number; readonly u: number; readonly T_U: number };
  readonly lower?: { readonly y: number; readonly u: number; readonly T_L: number };
}

interface ConformityExpected {
  readonly verdict?: readonly string[];
  readonly p_upper?: number;
  readonly p_lower?: number;
}

/**
 * Limits of one plane about a middle far below: only the upper one can be met. The guard is given as an expanded
 * uncertainty U; u = U/k brings judge to that same U.
 */
function oneLimit(y: number, guard: number, upper: number, rule: JudgeInput["rule"]) {
  const level = 0.95;
  const u = guard / 1.959963984540054;
  const tolerance = planes([upper - 100, upper], [-1, 1]);
  return judge({ ...input(y, 0, u), tolerance, level, rule }).verdict;
}

describeCases<ConformityInput, ConformityExpected>(
  "judge against the conformity references",
  ["conformity"],
  (reference) => {
    const { readings, u, T_U, y } = reference.input;
    if (readings) {
      const words = (rule: JudgeInput["rule"]) =>
        readings.map((one) => (oneLimit(one.y, one.U, one.T_U, rule) === "conforms" ? "pass" : "fail"));
      const nonBinary = readings.map((one) => {
        const pass = oneLimit(one.y, one.U, one.T_U, "simple") === "conforms" ? "pass" : "fail";
        return oneLimit(one.y, one.U, one.T_U, "guarded") === "undecided" ? `conditional ${pass}` : pass;
      });
      const got = { simple: words("simple"), guarded: words("guarded"), non_binary: nonBinary };
      expect(mismatches(reference, got)).toEqual([]);
    } else if (y && u !== undefined && T_U !== undefined) {
      const names = { conforms: "conforming", undecided: "neither", exceeds: "nonconforming" };
      const got = y.map((reading) => names[oneLimit(reading, 1.65 * u, T_U, "guarded")]);
      // 10.066 stands exactly on the limit, where the standard has nonconformity proved and the house's rule,
      // |d| − U > T, has not: every other reading must agree.
      expect(got.slice(0, 4)).toEqual(reference.expected.verdict!.slice(0, 4));
      expect(oneLimit(y[4]! + 1e-9, 1.65 * u, T_U, "guarded")).toBe("exceeds");
    } else {
      // The conformance probability Φ((T_U − y)/u) passes p exactly where a normal guard of level 2p − 1 is met.
      const { upper, lower } = reference.input;
      for (const [limit, reading, uncertainty, p] of [
        [upper!.T_U, upper!.y, upper!.u, reference.expected.p_upper!],
        // Mirrored: a lower limit is an upper one of −y.
        [-lower!.T_L, -lower!.y, lower!.u, reference.expected.p_lower!],
      ] as const) {
        const half = reference.tolerance["p_upper"] as { abs: number };
        const verdictAt = (probability: number) => {
          const tolerance = planes([limit - 1e4, limit], [-1, 1]);
          const covariance = { hhMm2: uncertainty ** 2, hvMm2: 0, vvMm2: 1e-12 };
          return judge({ ...input(reading, 0, null), covariance, tolerance, level: 2 * probability - 1 })
            .verdict;
        };
        expect(verdictAt(p - half.abs)).toBe("conforms");
        expect(verdictAt(p + half.abs)).toBe("undecided");
      }
    }
  },
);
