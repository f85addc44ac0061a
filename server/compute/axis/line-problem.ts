import { fitPlane } from "./fit-plane.ts";
import { leastSquaresGains, type LineGains } from "./line-gains.ts";

/** The reference stations as a problem of lines without units, in one plane or in both at once. */
export interface LineProblem {
  /** z of each reference station from the middle of their span, in half spans: −1 to 1. */
  readonly along: Float64Array;
  /** Observed less a weighted least-squares line, in units of `sizeMm`; one array for each plane. */
  readonly offsets: readonly Float64Array[];
  /** Multiply each station's distance; the largest is 1. */
  readonly weights: Float64Array;
  /** Whether the stations lie on a straight line as far as their numbers can tell: then the offsets are 0. */
  readonly straight: boolean;
  /** What two of its numbers must differ by to be told apart, in units of `sizeMm`. */
  readonly resolution: number;
  readonly middleMm: number;
  readonly halfSpanMm: number;
  /** The largest weighted offset. */
  readonly sizeMm: number;
}

/** One plane's observations at the reference stations. */
export interface PlaneObservations {
  readonly observedMm: readonly number[];
  /** Size of the numbers that each was the difference of. */
  readonly magnitudesMm: readonly number[];
}

/** The line of a least sum or zone, as a linear function of what was observed, and the proof that none is better. */
export interface LineOptimum {
  /** gains[a][b]: of the line in plane a, of the observations in plane b. With the contact stations held fixed. */
  readonly gains: readonly (readonly LineGains[])[];
  /**
   * One number for each plane and reference station, orthogonal to every straight line. Of a zone they are 0 but at
   * contacts; of a sum they are weight × direction of the distance, and at contacts no longer than the weight.
   */
  readonly multipliers: readonly Float64Array[];
  /** Places of the reference stations that set the line. */
  readonly setBy: readonly number[];
  readonly unique: boolean;
}

/** Shares of the size below which a distance counts as none. */
const relativeResolution = 1e-11;

/**
 * Brings reference stations into the form that the optimal lines are sought in. Offsets are residuals of twice the
 * working precision, so that a survey far from z = 0, or of large equal offsets, loses nothing. O(stations).
 * @throws ComputeError rank_deficient
 */
export function lineProblem(
  zMm: readonly number[],
  planes: readonly PlaneObservations[],
  weights: readonly number[],
): LineProblem {
  const heaviest = Math.max(...weights);
  const relative = Float64Array.from(weights, (weight) => weight / heaviest);
  const gains = leastSquaresGains(
    zMm,
    [...relative].map((weight) => 1 / weight ** 2),
  );
  const all = zMm.map((_, index) => index);
  const residuals = planes.map(({ observedMm }) => fitPlane(gains, all, zMm, observedMm).deviationsMm);
  const largest = (of: (plane: number, j: number) => number) =>
    all.reduce(
      (most, j) => Math.max(most, relative[j]! * Math.hypot(...planes.map((_, d) => Math.abs(of(d, j))))),
      0,
    );
  const sizeMm = largest((plane, j) => residuals[plane]![j]!);
  const noiseMm = 4 * Number.EPSILON * largest((plane, j) => planes[plane]!.magnitudesMm[j]!);
  const straight = sizeMm <= noiseMm;
  const low = Math.min(...zMm);
  const high = Math.max(...zMm);
  const middleMm = low + (high - low) / 2;
  const halfSpanMm = (high - low) / 2;
  return {
    along: Float64Array.from(zMm, (z) => (z - middleMm) / halfSpanMm),
    offsets: residuals.map((plane) => plane.map((residual) => (straight ? 0 : residual / sizeMm))),
    weights: relative,
    straight,
    resolution: straight ? relativeResolution : Math.max(relativeResolution, noiseMm / sizeMm),
    middleMm,
    halfSpanMm,
    sizeMm,
  };
}

/** What one reference station's observation does to a line. */
export interface GainPart {
  readonly place: number;
  readonly share: number;
  /** Per half span. */
  readonly moment: number;
}

/** Gains that are 0 but at some stations: shares at the z of `centreAlong`, moments per half span. */
export function gainsOfParts(
  { along, middleMm, halfSpanMm }: LineProblem,
  centreAlong: number,
  parts: readonly GainPart[],
): LineGains {
  const shares = new Float64Array(along.length);
  const moments = new Float64Array(along.length);
  for (const { place, share, moment } of parts) {
    shares[place]! += share;
    moments[place]! += moment;
  }
  return { centreMm: middleMm + centreAlong * halfSpanMm, shares, moments, spread: halfSpanMm };
}

/** The line through two of the stations: its gains at either are exactly 1 and 0, in each of the planes. */
export function gainsOfPair(
  { along, offsets }: LineProblem,
  zMm: readonly number[],
  first: number,
  second: number,
): LineGains[][] {
  const shares = new Float64Array(along.length);
  const moments = new Float64Array(along.length);
  shares[first] = 1;
  moments[first] = -1;
  moments[second] = 1;
  const own = { centreMm: zMm[first]!, shares, moments, spread: zMm[second]! - zMm[first]! };
  const none = { ...own, shares: new Float64Array(along.length), moments: new Float64Array(along.length) };
  return offsets.map((_, a) => offsets.map((__, b) => (a === b ? own : none)));
}
