import type { OutlierRule, Taper } from "./bore-input.ts";
import type { Exclusion } from "./bore-fit.ts";
import { modelFor, solveWall, type FittableWall, type WallSolution } from "./solve-wall.ts";
import { parametersOf } from "./surface-model.ts";
import type { WallReadings } from "./wall-readings.ts";

/** Makes the median of |r| the standard deviation of a normal distribution. */
const normalMedianRatio = 1.4826;
/** Readings beyond the parameters that the rule leaves in use. */
const readingsLeftOver = 2;
/** A median below this many number spacings is rounding, not scatter: the rule has nothing to measure by. */
const spacings = 64;

export type WallChoice = Choice<WallSolution>;

/** What the rule must know of a fit. */
export interface JudgedFit {
  /** Of every reading sent, in use or not. */
  readonly residualsMm: readonly number[];
  readonly radiusMm: number;
  readonly spacingMm: number;
}

/** A least-squares fit of all readings but those put aside. */
export interface Choice<Fit> {
  readonly solution: Fit;
  readonly used: readonly boolean[];
  readonly exclusions: readonly Exclusion[];
}

/**
 * While the largest |r|/u passes threshold × 1.4826 × the median of |r|/u (about zero) of the readings in use, puts
 * that one reading aside (the first of equals) and fits again. Stops at a median of 0, at two readings more than
 * parameters, or when half are out. One fit per reading put aside.
 */
export function excludeOutliers<Fit extends JudgedFit>(
  readings: WallReadings,
  { threshold }: OutlierRule,
  parameters: number,
  first: Fit,
  solveAt: (indices: Int32Array, before: Fit) => Fit,
): Choice<Fit> {
  const n = readings.hMm.length;
  const used = new Array<boolean>(n).fill(true);
  const exclusions: Exclusion[] = [];
  let solution = first;
  while (n - exclusions.length > parameters + readingsLeftOver && 2 * exclusions.length < n) {
    const standardised = Float64Array.from(
      solution.residualsMm,
      (residual, i) => Math.abs(residual) / (readings.uMm?.[i] ?? 1),
    );
    const median = medianOf(standardised.filter((_, i) => used[i]!));
    if (median <= (spacings * (solution.spacingMm + solution.radiusMm * Number.EPSILON)) / largestU(readings))
      break;
    let worst = -1;
    for (let i = 0; i < n; i++)
      if (used[i]! && (worst < 0 || standardised[i]! > standardised[worst]!)) worst = i;
    const ratio = standardised[worst]! / (normalMedianRatio * median);
    if (ratio <= threshold) break;
    used[worst] = false;
    exclusions.push({ index: worst, ratio });
    solution = solveAt(indicesOf(used), solution);
  }
  return { solution, used, exclusions };
}

/**
 * The rule for circles, cones and tilted cylinders.
 * @throws ComputeError what `solveWall` refuses
 */
export function solveWithoutOutliers(
  readings: WallReadings,
  first: FittableWall,
  rule: OutlierRule,
  taper: Taper | null,
  member: string,
): WallChoice {
  const solution = solveWall(readings, first, member);
  return excludeOutliers(readings, rule, parametersOf(solution.model), solution, (indices) => {
    const fittable = modelFor(readings, taper, indices, member);
    if (fittable instanceof Error) throw fittable;
    return solveWall(readings, fittable, member);
  });
}

/** The indices of the readings in use. */
export function indicesOf(used: readonly boolean[]): Int32Array {
  return Int32Array.from(used.flatMap((inUse, index) => (inUse ? [index] : [])));
}

function largestU({ uMm }: WallReadings): number {
  return uMm === null ? 1 : uMm.reduce((top, u) => Math.max(top, u), 0);
}

/** The middle value, or the mean of the two in the middle. Reorders `values`. */
function medianOf(values: Float64Array): number {
  values.sort();
  const middle = values.length >> 1;
  return values.length % 2 === 1 ? values[middle]! : (values[middle - 1]! + values[middle]!) / 2;
}
