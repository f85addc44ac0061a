import { ComputeError } from "../compute-error.ts";

/**
 * A straight line as a linear function of the reference observations: its height at z is Σ λⱼ(z)·yⱼ with
 * λⱼ(z) = shareⱼ + momentⱼ·(z − centre)/spread. The gains depend on z and weights only, never on what was measured,
 * so that they also carry the covariance.
 */
export interface LineGains {
  readonly centreMm: number;
  readonly shares: Float64Array;
  /** mm; moments/spread are the gains of the slope, 1/mm. */
  readonly moments: Float64Array;
  /** mm². For a line through two stations: mm, its moments numbers. */
  readonly spread: number;
}

/** The axis that is not fitted: height 0 everywhere, whatever is measured. */
export const noGains: LineGains = {
  centreMm: 0,
  shares: new Float64Array(0),
  moments: new Float64Array(0),
  spread: 1,
};

/** The line through two stations. Its gains at either are exactly 1 and 0. */
export function twoStationGains(firstZMm: number, secondZMm: number): LineGains {
  return {
    centreMm: firstZMm,
    shares: Float64Array.of(1, 0),
    moments: Float64Array.of(-1, 1),
    spread: secondZMm - firstZMm,
  };
}

/**
 * The weighted least-squares line: weights 1/variance, centred on the weighted mean of z. Weights are taken relative
 * to the heaviest and z from its station, so that a variance many orders below the others costs no digits.
 * @throws ComputeError rank_deficient — the weights lie so far apart that one station alone counts
 */
export function leastSquaresGains(zMm: readonly number[], variancesMm2: readonly number[]): LineGains {
  const least = Math.min(...variancesMm2);
  const baseMm = zMm[variancesMm2.indexOf(least)] ?? 0;
  const weights = Float64Array.from(variancesMm2, (variance) => least / variance);
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const shares = weights.map((weight) => weight / total);
  const offsets = Float64Array.from(zMm, (z) => z - baseMm);
  const centreFromBase = shares.reduce((sum, share, j) => sum + share * offsets[j]!, 0);
  const moments = shares.map((share, j) => share * (offsets[j]! - centreFromBase));
  const spread = moments.reduce((sum, moment, j) => sum + moment * (offsets[j]! - centreFromBase), 0);
  if (!(spread > 0)) {
    throw new ComputeError(
      "rank_deficient",
      "The variances lie so far apart that one reference station alone would set the axis.",
      { at: ["axis", "through"] },
    );
  }
  return { centreMm: baseMm + centreFromBase, shares, moments, spread };
}

/** Writes λⱼ(z) into `into`, one for each reference station. */
export function writeGainsAt(gains: LineGains, zMm: number, into: Float64Array): void {
  const along = (zMm - gains.centreMm) / gains.spread;
  for (let j = 0; j < into.length; j += 1) into[j] = gains.shares[j]! + gains.moments[j]! * along;
}

/** Gains of the height at z = 0 and of the slope (1/mm). */
export function coefficientGains(gains: LineGains): { at0: Float64Array; slope: Float64Array } {
  const at0 = new Float64Array(gains.shares.length);
  writeGainsAt(gains, 0, at0);
  return { at0, slope: gains.moments.map((moment) => moment / gains.spread) };
}
