import type { AxisMethod, AxisStation, AxisZone } from "../axis/axis-input.ts";
import type { Axis, LineEvidence } from "../axis/axis-result.ts";
import { deviationsFromAxis } from "../axis/deviations-from-axis.ts";
import type { SelfCase } from "./self-case.ts";

function axisBy(
  method: AxisMethod,
  zone: AxisZone,
  z: readonly number[],
  h: readonly number[],
  v: readonly number[] = h.map(() => 0),
): Axis {
  const stations = z.map((zMm, k): AxisStation => ({
    zMm,
    centre: { hMm: h[k] ?? Number.NaN, vMm: v[k] ?? Number.NaN },
    covariance: null,
    dof: null,
    target: { hMm: 0, vMm: 0 },
    targetUncertainty: { hMm: 0, vMm: 0 },
    tolerance: null,
  }));
  const reference = z.map((_, index) => index);
  return deviationsFromAxis({ method, zone, reference, stations, level: 0.95, rule: "guarded" }).axis;
}

function evidenceOf({ optimum }: Axis): LineEvidence | null {
  if (optimum === null) return null;
  return optimum.zone === "planes" ? optimum.h : optimum.both;
}

const lineOf = (axis: Axis) => {
  const { objectiveMm = Number.NaN, lowerBoundMm = Number.NaN } = evidenceOf(axis) ?? {};
  return { at0: axis.h.at0Mm, slope: axis.h.slope, objective: objectiveMm, bound: lowerBoundMm };
};

const eighths = Array.from({ length: 9 }, (_, k) => k / 8);
const squares = eighths.map((z) => z * z);
const rounding = 1e-12;

const within = (expected: Readonly<Record<string, number>>, tolerance = rounding) =>
  Object.entries(expected).map(([figure, value]) => ({ figure, expected: value, tolerance }));

const telephone = {
  z: [1, 2, 3, 5, 7, 8, 10],
  h: [3, 5, 7, 11, 14, 15, 19],
};
const siegel = {
  z: [-4, -3, -2, -1, 0, 1, 2, 3, 12],
  h: [0, 0, 0, 0, 0, 0, -5, 5, 1],
};

/** Axes by the largest distance and by the sum of distances; `bound` is what the multipliers prove. */
export const optimalAxisCases: readonly SelfCase[] = [
  {
    id: "minimax-line-dasgupta",
    area: "axis-deviation",
    source:
      "Data of S. Dasgupta, C. Papadimitriou, U. Vazirani, Algorithms (2006), exercise 7.8; answers, not in the book, from all triples in exact fractions: 13/7 + 12/7·z, 4/7",
    figures: within({ at0: 13 / 7, slope: 12 / 7, objective: 4 / 7, bound: 4 / 7 }),
    compute: () => lineOf(axisBy("minimum_zone", "planes", telephone.z, telephone.h)),
  },
  {
    id: "minimax-line-parabola",
    area: "axis-deviation",
    source: "Chebyshev: the best straight line to z² on [0, 1] is z − 1/8, off by 1/8 (from memory)",
    figures: within({ at0: -1 / 8, slope: 1, objective: 1 / 8, bound: 1 / 8 }),
    compute: () => lineOf(axisBy("minimum_zone", "planes", eighths, squares)),
  },
  {
    id: "minimax-cylinder-tilted-parabola",
    area: "axis-deviation",
    source:
      "Closed form: Chebyshev's parabola in a plane tilted 3 : 4, where no axis outside the plane lies nearer (from memory)",
    figures: within(
      { at0: -0.6 / 8, slope: 0.6, objective: 1 / 8, bound: 1 / 8, at0V: -0.8 / 8, slopeV: 0.8 },
      1e-9,
    ),
    compute: () => {
      const [h, v] = [squares.map((y) => 0.6 * y), squares.map((y) => 0.8 * y)];
      const axis = axisBy("minimum_zone", "cylinder", eighths, h, v);
      return { ...lineOf(axis), at0V: axis.v.at0Mm, slopeV: axis.v.slope };
    },
  },
  {
    id: "least-absolute-dasgupta",
    area: "axis-deviation",
    source:
      "Data of S. Dasgupta, C. Papadimitriou, U. Vazirani, Algorithms (2006), exercise 7.8; least sum, not in the book, from all pairs in exact fractions: 2",
    figures: within({ objective: 2, bound: 2 }),
    compute: () => lineOf(axisBy("least_absolute", "planes", telephone.z, telephone.h)),
  },
  {
    id: "least-absolute-siegel",
    area: "axis-deviation",
    source:
      "A. Siegel's data (P. Rousseeuw, A. Leroy, Robust Regression and Outlier Detection (1987) 60), as quoted in robustbase (CRAN); the L1 line, not in print, from all pairs: 1/7 + z/14, 74/7",
    figures: within({ at0: 1 / 7, slope: 1 / 14, objective: 74 / 7, bound: 74 / 7 }),
    compute: () => lineOf(axisBy("least_absolute", "planes", siegel.z, siegel.h)),
  },
];
