import { ComputeError } from "../compute-error.ts";
import type { WallInput } from "./bore-input.ts";
import type { CircleMethod } from "./circle-method.ts";
import { solveLimitingCircle } from "./limiting-circle.ts";
import { localFrameOf, spreadRefusal } from "./local-frame.ts";
import { solvePlainCircle, startPlainCircle } from "./plain-circle.ts";
import { solveEllipse } from "./solve-ellipse.ts";
import { modelFor, solveWall } from "./solve-wall.ts";
import { readingsMember, type WallReadings } from "./wall-readings.ts";

/** Centre and diameter of one trial, mm. */
export interface TrialCentre {
  readonly hMm: number;
  readonly vMm: number;
  readonly diameterMm: number;
}

/** Fits the readings of one trial, which differ from those sent by their errors only. */
export type TrialFit = (readings: WallReadings) => TrialCentre;

/**
 * The fit of a bore's criterion without its description, for readings of which none is put aside any more: the same
 * solvers from the same starts as the bore's own fit, so that readings without errors give the same centre and
 * diameter to rounding. `sent` are the readings in use without errors.
 * @throws ComputeError what the solver of the criterion refuses; the function returned throws as well
 */
export function trialFitOf(input: WallInput, method: CircleMethod, sent: WallReadings): TrialFit {
  const member = readingsMember[input.form];
  if (method === "least_squares") return leastSquaresTrial(input, member, sent);
  if (method === "ellipse") {
    const before = solveEllipse(sent, localFrameOf(sent, null), null, member);
    return (readings) => {
      const { centre, majorMm, minorMm } = solveEllipse(
        readings,
        localFrameOf(readings, null),
        before,
        member,
      );
      return { ...centre, diameterMm: majorMm + minorMm };
    };
  }
  const used = new Array<boolean>(sent.hMm.length).fill(true);
  const tangent = tangentOf(input);
  return (readings) => {
    const frame = localFrameOf(readings, null);
    const refusal = spreadRefusal(frame, member);
    if (refusal !== null) throw refusal;
    // Where a tie lies is of no interest to a trial: the search for one is left out.
    const { centre, radiusMm } = solveLimitingCircle(method, readings, frame, tangent, used, null, member);
    return { ...centre, diameterMm: 2 * radiusMm };
  };
}

function leastSquaresTrial(input: WallInput, member: string, { zMm }: WallReadings): TrialFit {
  const taper = input.form === "points" && zMm !== null ? input.taper : null;
  const straight = taper === null || (taper.form === "known" && taper.halfAngleDeg === 0);
  const plain = straight && (taper !== null || zMm === null || zMm.every((z) => z === zMm[0]));
  return (readings) => {
    const start = plain ? startPlainCircle(readings) : null;
    const quick = start && solvePlainCircle(readings, start);
    if (quick) return { ...quick.centre, diameterMm: 2 * quick.radiusMm };
    const fittable = modelFor(readings, taper, null, member);
    if (fittable instanceof ComputeError) throw fittable;
    const { centre, radiusMm } = solveWall(readings, fittable, member);
    return { ...centre, diameterMm: 2 * radiusMm };
  };
}

/** Of the known taper that a limiting circle may have. */
function tangentOf(input: WallInput): number {
  if (input.form !== "points" || input.taper?.form !== "known") return 0;
  return Math.tan((input.taper.halfAngleDeg * Math.PI) / 180);
}
