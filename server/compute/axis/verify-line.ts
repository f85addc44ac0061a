import { ComputeError } from "../compute-error.ts";

/** What was to be least: the largest weight × distance of the reference stations, or the sum of them all. */
export type LineAim = "largest" | "sum";

/** A line's deviations at the reference stations, and the multipliers that should prove it best. */
export interface LineClaim {
  readonly aim: LineAim;
  /** Of each reference station, in half spans from the middle. */
  readonly along: Float64Array;
  /** Observed − line, mm, one array for each plane. */
  readonly deviationsMm: readonly Float64Array[];
  /** As sent. */
  readonly weights: readonly number[];
  /** One array for each plane, of any size. */
  readonly multipliers: readonly Float64Array[];
  /** What the objective may be off by for the numbers sent alone, mm. */
  readonly roundingMm: number;
}

export interface LineProof {
  readonly objectiveMm: number;
  /** No line has less. At most the objective. */
  readonly lowerBoundMm: number;
  /** Sized as the bound asks: Σ |multiplier|/weight = 1 for the largest, |multiplier| ≤ weight for the sum. */
  readonly multipliers: readonly Float64Array[];
}

/** Share of the objective by which the bound may stay below it. */
const gapShareMax = 1e-9;
/** Share of their size by which the multipliers may miss being orthogonal to every line. */
const slantShareMax = 1e-9;

/**
 * Proves a line best by duality, from its deviations and multipliers alone. Multipliers with Σ q = 0 and Σ q·z = 0
 * give Σ q·offset the same value for every line, and that value is at most the largest weight × distance when
 * Σ |q|/weight = 1, and at most the sum of weight × distance when |q| ≤ weight (|q| the length over both planes for a
 * cylinder): a lower bound for all lines. O(stations).
 * @throws ComputeError not_converged — the bound stays more than 1e-9 of the objective, and more than rounding, below it
 */
export function verifyLine(claim: LineClaim): LineProof {
  const { aim, along, deviationsMm, weights, roundingMm } = claim;
  const distances = weights.map(
    (weight, j) => weight * Math.hypot(...deviationsMm.map((plane) => plane[j]!)),
  );
  const lengths = weights.map((_, j) => Math.hypot(...claim.multipliers.map((plane) => plane[j]!)));
  const objectiveMm =
    aim === "largest" ? Math.max(...distances) : distances.reduce((sum, distance) => sum + distance, 0);
  const ratios = lengths.map((length, j) => length / weights[j]!);
  const size = aim === "largest" ? ratios.reduce((sum, ratio) => sum + ratio, 0) : Math.max(...ratios);
  const multipliers = claim.multipliers.map((plane) => plane.map((value) => (size > 0 ? value / size : 0)));
  const total = lengths.reduce((sum, length) => sum + length, 0);
  const slant = multipliers.flatMap((plane) => [
    plane.reduce((sum, value) => sum + value, 0),
    plane.reduce((sum, value, j) => sum + value * along[j]!, 0),
  ]);
  const bound = multipliers.reduce(
    (sum, plane, d) => sum + plane.reduce((inner, value, j) => inner + value * deviationsMm[d]![j]!, 0),
    0,
  );
  const straight = Math.hypot(...slant) * size <= slantShareMax * total;
  if (!straight || !(objectiveMm - bound <= gapShareMax * objectiveMm + roundingMm)) {
    throw new ComputeError("not_converged", "The axis found could not be proved to be the best.", {
      at: ["axis", "method"],
    });
  }
  return { objectiveMm, lowerBoundMm: Math.min(objectiveMm, Math.max(0, bound)), multipliers };
}
