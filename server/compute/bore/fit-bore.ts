import { ComputeError } from "../compute-error.ts";
import type { BoreFit, SpotFit, WallFit } from "./bore-fit.ts";
import type { BoreInput, RotatingTargetInput, Taper, WallInput } from "./bore-input.ts";
import { describeWall } from "./describe-wall.ts";
import { solveWithoutOutliers, type WallChoice } from "./exclude-outliers.ts";
import { fitRotatingTarget, gatherSpots, spotRefusal, type TargetReadings } from "./fit-rotating-target.ts";
import { requireFiniteFit } from "./require-finite-fit.ts";
import { solvePlainCircle, startPlainCircle, type PlainCircleStart } from "./plain-circle.ts";
import { modelFor, solveWall, type FittableWall, type WallSolution } from "./solve-wall.ts";
import { gatherWall, readingsMember, type WallReadings } from "./wall-readings.ts";

/** Centre and radius. */
const circleParameters = 3;

/** A bore's readings in the downstream view, ready to fit; or everything that can be seen to forbid it. */
export type PreparedBore =
  | { readonly kind: "refused"; readonly refusals: readonly [ComputeError, ...ComputeError[]] }
  | {
      readonly kind: "wall";
      readonly input: WallInput;
      readonly readings: WallReadings;
      readonly fittable: FittableWall;
    }
  | {
      readonly kind: "circle";
      readonly input: WallInput;
      readonly readings: WallReadings;
      readonly start: PlainCircleStart;
    }
  | { readonly kind: "target"; readonly input: RotatingTargetInput; readonly readings: TargetReadings };

/**
 * Centre, size and covariance of one bore by orthogonal least squares, from any form of reading. Covariance
 * (JᵀWJ)⁻¹·F with F as `varianceScale` states, expanded by the two-sided Student factor at `level`. Millimetres in and
 * out; the answer is in the downstream view. Linear in the number of readings but for sorting their clock angles.
 * @throws ComputeError too_few_points, points_coincident, points_collinear, angles_insufficient, combination_invalid,
 * uncertainty_incomplete, radius_not_positive, rank_deficient, arc_too_flat, not_converged, result_overflow
 */
export function fitBore(input: WallInput): WallFit;
export function fitBore(input: RotatingTargetInput): SpotFit;
export function fitBore(input: BoreInput): BoreFit;
export function fitBore(input: BoreInput): BoreFit {
  return fitPreparedBore(prepareBore(input));
}

/** Reduces the readings and lists every refusal that needs no fit, so that a caller is told of all at once. */
export function prepareBore(input: BoreInput): PreparedBore {
  if (input.form === "rotating_target") {
    const { readings, refusals } = gatherSpots(input);
    return refused([...refusals, ...spotRefusal(readings)]) ?? { kind: "target", input, readings };
  }
  const { readings, refusals } = gatherWall(input);
  const start = isPlain(input, readings) ? startPlainCircle(readings) : null;
  if (start !== null) return refused(refusals) ?? { kind: "circle", input, readings, start };
  // A taper without every z is refused already: what else is wrong shows as if there were none.
  const taper = readings.zMm === null ? null : taperOf(input);
  const fittable = modelFor(readings, taper, null, readingsMember[input.form]);
  if (fittable instanceof ComputeError) return { kind: "refused", refusals: [fittable, ...refusals] };
  return refused(refusals) ?? { kind: "wall", input, readings, fittable };
}

/**
 * The fit of `fitBore`, of readings prepared before.
 * @throws ComputeError as `fitBore`
 */
export function fitPreparedBore(prepared: PreparedBore): BoreFit {
  switch (prepared.kind) {
    case "refused":
      throw prepared.refusals[0];
    case "target":
      return requireFiniteFit(fitRotatingTarget(prepared.input, prepared.readings));
    case "circle":
      return requireFiniteFit(fitPlainCircle(prepared.input, prepared.readings, prepared.start));
    case "wall":
      return requireFiniteFit(fitWall(prepared.input, prepared.readings, prepared.fittable));
  }
}

/** One circle for all readings: in one plane, or with a taper known to be none. */
function isPlain(input: WallInput, { hMm, zMm }: WallReadings): boolean {
  if (hMm.length < circleParameters || (input.form !== "wire" && input.outliers !== null)) return false;
  const taper = taperOf(input);
  if (taper !== null) return taper.form === "known" && taper.halfAngleDeg === 0;
  return zMm === null || zMm.every((z) => z === zMm[0]);
}

/** By the quick path where it proves its answer, else by the general one: to rounding they answer alike. */
function fitPlainCircle(input: WallInput, readings: WallReadings, start: PlainCircleStart): WallFit {
  const member = readingsMember[input.form];
  const solution = solvePlainCircle(readings, start);
  if (solution !== null) return describeWall(input, readings, choiceOfAll(solution));
  const fittable = modelFor(readings, taperOf(input), null, member);
  if (fittable instanceof ComputeError) throw fittable;
  return fitWall(input, readings, fittable);
}

function fitWall(input: WallInput, readings: WallReadings, fittable: FittableWall): WallFit {
  const member = readingsMember[input.form];
  if (input.form !== "wire" && input.outliers !== null) {
    return describeWall(
      input,
      readings,
      solveWithoutOutliers(readings, fittable, input.outliers, taperOf(input), member),
    );
  }
  return describeWall(input, readings, choiceOfAll(solveWall(readings, fittable, member)));
}

function choiceOfAll(solution: WallSolution): WallChoice {
  const used = new Array<boolean>(solution.residualsMm.length).fill(true);
  return { solution, used, exclusions: [] };
}

function taperOf(input: WallInput): Taper | null {
  return input.form === "points" ? input.taper : null;
}

function refused(refusals: readonly ComputeError[]): PreparedBore | null {
  const [first, ...others] = refusals;
  return first === undefined ? null : { kind: "refused", refusals: [first, ...others] };
}
