import { compensatedSum } from "../statistics/compensated-sum.ts";

/** Readings in one plane, their mean taken off. */
export interface Series {
  readonly meanMm: number;
  /** reading − mean, in the order read, mm. */
  readonly deviationsMm: Float64Array;
  /** The largest reading without its sign, mm: what rounding is judged by. */
  readonly largestMm: number;
}

/**
 * The mean of readings and what each lies off it. The mean is found twice, the second time from the deviations of the
 * first, so that both keep their digits however far the readings lie from 0 (Chan, Golub and LeVeque, The American
 * Statistician 37 (1983) 242).
 */
export function seriesOf(readingsMm: ArrayLike<number>): Series {
  const count = readingsMm.length;
  const firstMm = compensatedSum(readingsMm) / count;
  const deviationsMm = Float64Array.from(readingsMm, (reading) => reading - firstMm);
  const restMm = compensatedSum(deviationsMm) / count;
  for (let i = 0; i < count; i += 1) deviationsMm[i] = deviationsMm[i]! - restMm;
  let largestMm = 0;
  for (let i = 0; i < count; i += 1) largestMm = Math.max(largestMm, Math.abs(readingsMm[i]!));
  return { meanMm: firstMm + restMm, deviationsMm, largestMm };
}

/** Σ aᵢ·bᵢ, carried to twice the working precision between the products. */
export function sumOfProducts(a: Float64Array, b: Float64Array): number {
  return compensatedSum(a.map((value, i) => value * b[i]!));
}

/** Units in the last place that a number loses on its way from a reading to a deviation. */
const roundingUnits = 4;

/** Whether a sum of squares of `count` deviations is no more than the rounding of readings of that size leaves. */
export function isRounding(sumOfSquaresMm2: number, count: number, largestMm: number): boolean {
  return sumOfSquaresMm2 <= count * (roundingUnits * Number.EPSILON * largestMm) ** 2;
}
