import { assertFinite, ComputeError } from "../compute-error.ts";
import { worstVarianceMm2, type PlaneCovariance, type PlaneVector } from "../plane.ts";
import { hotellingFactor } from "../statistics/hotelling-factor.ts";
import { studentFactor } from "../statistics/student-t.ts";
import { testDrift, type Drift } from "./drift.ts";
import { isRounding, seriesOf, sumOfProducts, type Series } from "./series.ts";

export interface RepeatsInput {
  /** In the order read, mm. */
  readonly readings: readonly PlaneVector[];
  /** One for each reading, in any one unit: what drift is measured against. */
  readonly times: readonly number[];
  /** Coverage probability of expanded uncertainties and of tests, in (0, 1). */
  readonly level: number;
}

/** The reading farthest from the mean, by Grubbs' ratio. */
export interface FarthestReading {
  readonly index: number;
  /** |reading − mean|/s. */
  readonly ratio: number;
  /** The ratio that chance passes with a probability of 1 − level. */
  readonly limit: number;
  readonly standsOut: boolean;
}

/** One value for each plane; null where the readings do not vary there, or are too few. */
export interface PerPlaneOrNull<Value> {
  readonly h: Value | null;
  readonly v: Value | null;
}

export interface Repeats {
  readonly mean: PlaneVector;
  /** Of one reading: standard deviations squared, and their covariance, mm². */
  readonly covariance: PlaneCovariance;
  /** Of the mean, `covariance`/n: Type A. */
  readonly meanCovariance: PlaneCovariance;
  /** n − 1. */
  readonly dof: number;
  /** Of the mean. radialMm and kRadial by Hotelling's factor; null with two readings. */
  readonly expandedUncertainty: {
    readonly hMm: number;
    readonly vMm: number;
    readonly radialMm: number | null;
    readonly k: number;
    readonly kRadial: number | null;
  };
  readonly drift: Drift | null;
  /** Of neighbours in the order read. */
  readonly autocorrelation: PerPlaneOrNull<number>;
  readonly farthest: PerPlaneOrNull<FarthestReading>;
  /** Planes in which all readings are one number to rounding. */
  readonly flat: readonly ("h" | "v")[];
  /** Planes in which the scatter comes near the spacing of the numbers themselves. */
  readonly atNumberResolution: readonly ("h" | "v")[];
}

/** A scatter of fewer spacings of the numbers than this is made of their steps. */
const spacingsMin = 50;

/**
 * Repeated readings of one station: mean, standard deviation (n − 1), Type A uncertainty of the mean s/√n with n − 1
 * degrees of freedom (JCGM 100:2008, 4.2), as vectors; drift by the t test of the slope; autocorrelation of neighbours
 * r₁ = Σ dᵢ·dᵢ₋₁/Σ dᵢ² (NIST/ITL StRD); Grubbs' ratio of the farthest reading with its two-sided limit
 * (n − 1)/√n·√(t²/(n − 2 + t²)), t exceeded with probability (1 − level)/n on both sides together, n − 2 degrees of
 * freedom (NIST/SEMATECH e-Handbook 1.3.5.17.1). O(n).
 * @throws ComputeError too_few_points — fewer than two readings; result_overflow; not_converged
 */
export function describeRepeats({ readings, times, level }: RepeatsInput): Repeats {
  const count = readings.length;
  if (count < 2) {
    throw new ComputeError("too_few_points", "A scatter needs two readings or more.", { at: ["readings"] });
  }
  const h = seriesOf(readings.map(({ hMm }) => hMm));
  const v = seriesOf(readings.map(({ vMm }) => vMm));
  const dof = count - 1;
  const sums = { h: squaresOf(h), v: squaresOf(v) };
  const covariance = {
    hhMm2: sums.h / dof,
    hvMm2: sums.h === 0 || sums.v === 0 ? 0 : sumOfProducts(h.deviationsMm, v.deviationsMm) / dof,
    vvMm2: sums.v / dof,
  };
  for (const value of Object.values(covariance)) assertFinite(value, "A variance of the readings");
  const meanCovariance = {
    hhMm2: covariance.hhMm2 / count,
    hvMm2: covariance.hvMm2 / count,
    vvMm2: covariance.vvMm2 / count,
  };
  const planes = [
    { plane: "h", series: h, sum: sums.h },
    { plane: "v", series: v, sum: sums.v },
  ] as const;
  return {
    mean: { hMm: h.meanMm, vMm: v.meanMm },
    covariance,
    meanCovariance,
    dof,
    expandedUncertainty: expand(meanCovariance, dof, level),
    drift: testDrift({ h, v }, seriesOf(times), level),
    autocorrelation: { h: neighbourCorrelation(h, sums.h), v: neighbourCorrelation(v, sums.v) },
    farthest: { h: farthestOf(h, covariance.hhMm2, level), v: farthestOf(v, covariance.vvMm2, level) },
    flat: planes.filter(({ sum }) => sum === 0).map(({ plane }) => plane),
    atNumberResolution: planes
      .filter(
        ({ sum, series }) =>
          sum > 0 && Math.sqrt(sum / dof) < spacingsMin * Number.EPSILON * series.largestMm,
      )
      .map(({ plane }) => plane),
  };
}

/** Σ (reading − mean)², 0 where rounding alone is left. */
function squaresOf({ deviationsMm, largestMm }: Series): number {
  const sum = sumOfProducts(deviationsMm, deviationsMm);
  return isRounding(sum, deviationsMm.length, largestMm) ? 0 : sum;
}

function expand(covariance: PlaneCovariance, dof: number, level: number): Repeats["expandedUncertainty"] {
  const k = studentFactor(level, dof);
  const kRadial = hotellingFactor(level, dof);
  return {
    hMm: k * Math.sqrt(covariance.hhMm2),
    vMm: k * Math.sqrt(covariance.vvMm2),
    radialMm: kRadial && kRadial * Math.sqrt(worstVarianceMm2(covariance)),
    k,
    kRadial,
  };
}

function neighbourCorrelation({ deviationsMm }: Series, sum: number): number | null {
  if (sum === 0 || deviationsMm.length < 3) return null;
  return sumOfProducts(deviationsMm.slice(1), deviationsMm.slice(0, -1)) / sum;
}

function farthestOf({ deviationsMm }: Series, variance: number, level: number): FarthestReading | null {
  const count = deviationsMm.length;
  if (variance === 0 || count < 3) return null;
  const sizes = Array.from(deviationsMm, Math.abs);
  const largest = sizes.reduce((most, size) => Math.max(most, size), 0);
  const ratio = largest / Math.sqrt(variance);
  const t = studentFactor(1 - (1 - level) / count, count - 2);
  const limit = ((count - 1) / Math.sqrt(count)) * Math.sqrt((t * t) / (count - 2 + t * t));
  return { index: sizes.indexOf(largest), ratio, limit, standsOut: ratio > limit };
}
