import { assertFinite } from "../compute-error.ts";
import { judge } from "../conformity/judge.ts";
import type { PlaneVector } from "../plane.ts";
import type { PredictedStation } from "./move-plan.ts";
import type { MoveStation } from "./move-problem.ts";
import type { RigidMove } from "./rigid-freedom.ts";

/**
 * Where a station lies after the move of the part that carries it, from the axis as surveyed, and what that is worth:
 * guarded where its covariance is known (a move adds nothing to it), else the simple verdict.
 * @throws ComputeError tolerance_invalid, result_overflow
 */
export function predictStation(station: MoveStation, move: RigidMove, level: number): PredictedStation {
  const { id, tolerance, covariance, dof } = station;
  const deviation = movedDeviation(station, move);
  const rule = covariance ? "guarded" : "simple";
  const verdict = tolerance && judge({ deviation, covariance, dof, tolerance, level, rule }).verdict;
  return { id, deviation, verdict };
}

/**
 * The station left farthest beyond its tolerance, uncertainty aside, and its |d|/T; null when none is beyond.
 * @throws ComputeError tolerance_invalid, result_overflow
 */
export function worstBeyond(
  stations: readonly MoveStation[],
  move: RigidMove,
  level: number,
): { readonly stationId: string; readonly ratio: number } | null {
  const beyond = stations.flatMap((station) => {
    const { id, tolerance } = station;
    if (!tolerance) return [];
    const deviation = movedDeviation(station, move);
    const { verdict, ratio } = judge({
      deviation,
      covariance: null,
      dof: null,
      tolerance,
      level,
      rule: "simple",
    });
    return verdict === "exceeds"
      ? [{ stationId: id, ratio: assertFinite(ratio, "A share of a tolerance") }]
      : [];
  });
  return beyond.reduce<(typeof beyond)[number] | null>(
    (worst, next) => (next.ratio > (worst?.ratio ?? 0) ? next : worst),
    null,
  );
}

function movedDeviation({ deviation, zMm }: MoveStation, move: RigidMove): PlaneVector {
  const { hMm, vMm } = move(zMm);
  return { hMm: deviation.hMm + hMm, vMm: deviation.vMm + vMm };
}
