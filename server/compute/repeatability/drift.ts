import { fUpperTail, studentTwoTails } from "../statistics/f-distribution.ts";
import { isRounding, sumOfProducts, type Series } from "./series.ts";

/** The slope of readings in one plane against time, and whether chance alone makes such a one. */
export interface SlopeTest {
  /** mm per unit of time. */
  readonly slopeMm: number;
  readonly standardErrorMm: number;
  /** slope/standard error; null where the readings lie on their line to rounding. */
  readonly t: number | null;
  /** Probability of a |t| as large without drift; null where nothing at all varies. */
  readonly pValue: number | null;
  readonly significant: boolean;
}

/** h and v together: the same whichever way the cross-section is turned. */
export interface JointDriftTest {
  /** Hotelling's T² of the slope vector. */
  readonly square: number;
  readonly pValue: number;
  readonly significant: boolean;
}

export interface Drift {
  readonly h: SlopeTest;
  readonly v: SlopeTest;
  /** n − 2. */
  readonly dof: number;
  /** Null under four readings, or where the scatter is 0 in some direction. */
  readonly together: JointDriftTest | null;
}

/** Correlation of the residuals nearer to ±1 than this leaves a direction without scatter. */
const correlationRest = 1e-12;

/**
 * Drift of readings over time: the least-squares slope in each plane, tested against 0 with Student's t of n − 2
 * degrees of freedom (Draper & Smith, Applied Regression Analysis, 1.4, from memory), and both slopes together with
 * Hotelling's T² = bᵀS⁻¹b, S the covariance of the slopes with ν = n − 2: F = T²·(ν − 1)/(2·ν) with 2 and ν − 1 degrees
 * of freedom. Significant when the probability is at most 1 − level. Times in any one unit, in any order.
 * Null under three readings, or where all times are equal.
 * @throws ComputeError not_converged
 */
export function testDrift(
  series: { readonly h: Series; readonly v: Series },
  times: Series,
  level: number,
): Drift | null {
  const along = times.deviationsMm;
  const dof = along.length - 2;
  const spread = sumOfProducts(along, along);
  if (dof < 1 || isRounding(spread, along.length, times.largestMm)) return null;
  const alpha = 1 - level;
  const h = fitSlope(series.h, along, spread);
  const v = fitSlope(series.v, along, spread);
  return {
    h: testSlope(h, dof, alpha),
    v: testSlope(v, dof, alpha),
    dof,
    together: testTogether(h, v, dof, alpha),
  };
}

interface FittedSlope {
  readonly slopeMm: number;
  readonly residualsMm: Float64Array;
  /** Σ residual², 0 where rounding alone is left. */
  readonly restMm2: number;
  /** Whether the slope itself is no more than rounding. */
  readonly isFlat: boolean;
  readonly spread: number;
}

function fitSlope({ deviationsMm, largestMm }: Series, along: Float64Array, spread: number): FittedSlope {
  const slopeMm = sumOfProducts(along, deviationsMm) / spread;
  const residualsMm = deviationsMm.map((deviation, i) => deviation - slopeMm * along[i]!);
  const restMm2 = sumOfProducts(residualsMm, residualsMm);
  const count = along.length;
  return {
    slopeMm,
    residualsMm,
    restMm2: isRounding(restMm2, count, largestMm) ? 0 : restMm2,
    isFlat: isRounding(slopeMm * slopeMm * spread, count, largestMm),
    spread,
  };
}

function testSlope({ slopeMm, restMm2, isFlat, spread }: FittedSlope, dof: number, alpha: number): SlopeTest {
  const standardErrorMm = Math.sqrt(restMm2 / dof / spread);
  // Readings exactly on a line that rises leave chance nothing to explain.
  if (restMm2 === 0)
    return { slopeMm, standardErrorMm, t: null, pValue: isFlat ? null : 0, significant: !isFlat };
  const t = slopeMm / standardErrorMm;
  const pValue = studentTwoTails(t, dof);
  return { slopeMm, standardErrorMm, t, pValue, significant: pValue <= alpha };
}

function testTogether(h: FittedSlope, v: FittedSlope, dof: number, alpha: number): JointDriftTest | null {
  const cross = sumOfProducts(h.residualsMm, v.residualsMm);
  const both = h.restMm2 * v.restMm2;
  if (dof < 2 || both === 0 || (cross * cross) / both > 1 - correlationRest) return null;
  const scale = (dof * h.spread) / (both - cross * cross);
  const square =
    scale *
    (h.slopeMm * h.slopeMm * v.restMm2 -
      2 * h.slopeMm * v.slopeMm * cross +
      v.slopeMm * v.slopeMm * h.restMm2);
  const pValue = fUpperTail((Math.max(0, square) * (dof - 1)) / (2 * dof), 2, dof - 1);
  return { square: Math.max(0, square), pValue, significant: pValue <= alpha };
}
