import { ComputeError } from "../compute-error.ts";
import type { PlaneVector } from "../plane.ts";
import { arcCoverage } from "./arc-coverage.ts";
import type { WallFit } from "./bore-fit.ts";
import type { PointsInput, TurnedGaugeInput, WallInput } from "./bore-input.ts";
import type { CircleMethod, LimitingMethod } from "./circle-method.ts";
import { describeEllipse } from "./describe-ellipse.ts";
import { describeLimiting } from "./describe-limiting.ts";
import { ellipseParameters } from "./ellipse-model.ts";
import { excludeOutliers, indicesOf, solveWithoutOutliers } from "./exclude-outliers.ts";
import { solveLimitingCircle } from "./limiting-circle.ts";
import { localFrameOf, spreadRefusal, type LocalFrame } from "./local-frame.ts";
import { requireFiniteFit } from "./require-finite-fit.ts";
import { solveEllipse } from "./solve-ellipse.ts";
import { modelFor, solveWall, type FittableWall } from "./solve-wall.ts";
import { gatherWall, readingsMember, type WallReadings } from "./wall-readings.ts";

/** Forms of reading that give enough of a wall for a criterion other than least squares. */
export type CriterionInput = PointsInput | TurnedGaugeInput;
export type CriterionMethod = Exclude<CircleMethod, "least_squares">;

/** A bore ready for its criterion; or everything that can be seen to forbid it. */
export type PreparedCriterion =
  | { readonly kind: "refused"; readonly refusals: readonly [ComputeError, ...ComputeError[]] }
  | {
      readonly kind: "criterion";
      readonly method: CriterionMethod;
      readonly input: CriterionInput;
      readonly readings: WallReadings;
      readonly fittable: FittableWall;
    };

/**
 * Centre and size of one bore by a limiting criterion or as an ellipse, with all that `prepareCriterion` refuses.
 * Millimetres in and out; the answer is in the downstream view. Limiting circles are exact and the best of all; they
 * take no weights: stated uncertainties give their covariance only, and where a tie is one.
 * @throws ComputeError too_few_points, points_coincident, points_collinear, combination_invalid, uncertainty_incomplete,
 * radius_not_positive, rank_deficient, arc_too_flat, no_inscribed_circle, coverage_insufficient, not_converged,
 * result_overflow
 */
export function fitByCriterion(input: CriterionInput, method: CriterionMethod): WallFit {
  return fitPreparedCriterion(prepareCriterion(input, method));
}

/** Reduces the readings and lists every refusal that needs no search. */
export function prepareCriterion(input: CriterionInput, method: CriterionMethod): PreparedCriterion {
  const gathered = gatherWall(input);
  const member = readingsMember[input.form];
  const refusals = [...gathered.refusals, ...taperRefusals(input, method, gathered.readings)];
  // What else is wrong shows as if a taper that cannot be taken were none.
  const taken = taperOf(input, method);
  const readings = taken === null ? { ...gathered.readings, zMm: null } : gathered.readings;
  const taper = readings.zMm === null ? null : taken;
  const fittable = modelFor(readings, taper, null, member);
  const first = fittable instanceof ComputeError ? fittable : tooFewForEllipse(method, readings, member);
  if (first !== null) return { kind: "refused", refusals: [first, ...refusals] };
  const [refusal, ...others] = refusals;
  if (refusal !== undefined) return { kind: "refused", refusals: [refusal, ...others] };
  return { kind: "criterion", method, input, readings, fittable: fittable as FittableWall };
}

/**
 * The fit of `fitByCriterion`, of readings prepared before.
 * @throws ComputeError as `fitByCriterion`
 */
export function fitPreparedCriterion(prepared: PreparedCriterion): WallFit {
  if (prepared.kind === "refused") throw prepared.refusals[0];
  const { method, input, readings, fittable } = prepared;
  return requireFiniteFit(
    method === "ellipse" ? fitOval(input, readings) : fitLimiting(method, input, readings, fittable),
  );
}

/** Slips are judged by the least-squares circle: a limiting circle leans on the very readings that are in doubt. */
function fitLimiting(
  method: LimitingMethod,
  input: CriterionInput,
  readings: WallReadings,
  fittable: FittableWall,
): WallFit {
  const member = readingsMember[input.form];
  const taper = taperOf(input, method);
  const round = input.outliers && solveWithoutOutliers(readings, fittable, input.outliers, taper, member);
  const used = round?.used ?? new Array<boolean>(readings.hMm.length).fill(true);
  const exclusions = round?.exclusions ?? [];
  const frame = exclusions.length === 0 ? fittable.frame : localFrameOf(readings, indicesOf(used));
  refuseSpread(frame, member);
  const { uMm } = readings;
  const tieMm = uMm && uMm.reduce((top, u, i) => (used[i]! ? Math.max(top, u) : top), 0);
  const { tangent } = fittable.model;
  const circle = solveLimitingCircle(method, readings, frame, tangent, used, tieMm, member);
  const centre =
    method === "minimum_circumscribed"
      ? (round?.solution.centre ?? roundCentre(readings, { ...fittable, frame }, member))
      : null;
  const ringCoverageDeg = centre && arcCoverage(readings, used, centre).coverageDeg;
  return describeLimiting(input, readings, { method, used, exclusions, ringCoverageDeg }, circle);
}

function fitOval(input: CriterionInput, readings: WallReadings): WallFit {
  const member = readingsMember[input.form];
  const first = solveEllipse(readings, localFrameOf(readings, null), null, member);
  const { solution, used, exclusions } =
    input.outliers === null
      ? { solution: first, used: new Array<boolean>(readings.hMm.length).fill(true), exclusions: [] }
      : excludeOutliers(readings, input.outliers, ellipseParameters, first, (indices, before) =>
          solveEllipse(readings, localFrameOf(readings, indices), before, member),
        );
  return describeEllipse(input, readings, solution, used, exclusions);
}

/** Centre of the least-squares circle; null where the readings are too flat for one. */
function roundCentre(readings: WallReadings, fittable: FittableWall, member: string): PlaneVector | null {
  try {
    return solveWall(readings, fittable, member).centre;
  } catch (error) {
    if (error instanceof ComputeError) return null;
    throw error;
  }
}

/** The taper that the criterion takes: a known one, none for the ellipse. */
function taperOf(input: WallInput, method: CriterionMethod) {
  if (input.form !== "points" || input.taper?.form !== "known" || method === "ellipse") return null;
  return input.taper;
}

function taperRefusals(
  input: CriterionInput,
  method: CriterionMethod,
  readings: WallReadings,
): ComputeError[] {
  if (input.form !== "points") return [];
  const refusal = (detail: string, at: string) =>
    new ComputeError("combination_invalid", detail, { at: [at] });
  if (input.taper !== null && (method === "ellipse" || input.taper.form === "estimate")) {
    const what = method === "ellipse" ? "ellipse takes no taper" : `${method} takes a known taper only`;
    return [refusal(`${what}.`, "taper")];
  }
  if (input.taper !== null || readings.hMm.length === 0 || localFrameOf(readings, null).z === null) return [];
  const detail =
    method === "ellipse"
      ? "ellipse takes points in one plane."
      : "Points at several planes without a taper are a tilted cylinder, which only least_squares fits; for a straight bore square to its planes state a half angle of 0.";
  return [refusal(detail, "points")];
}

function tooFewForEllipse(
  method: CriterionMethod,
  { hMm }: WallReadings,
  member: string,
): ComputeError | null {
  if (method !== "ellipse" || hMm.length >= ellipseParameters) return null;
  const detail = `${hMm.length} readings cannot determine ${ellipseParameters} unknowns.`;
  return new ComputeError("too_few_points", detail, { at: [member] });
}

function refuseSpread(frame: LocalFrame, member: string): void {
  const refusal = spreadRefusal(frame, member);
  if (refusal !== null) throw refusal;
}
