import type { ShimMoveRequest, ShimMoveResult } from "../../schemas/shim-moves.ts";
import { allowedBy } from "./plan-elevation-of.ts";
import type { PlanElevationModel, Survey } from "./plan-elevation-model.ts";

/** What of a call for moves is drawn and tabulated. */
export interface MoveCall {
  readonly units: ShimMoveRequest["units"];
  readonly reference?: readonly string[] | undefined;
  readonly stations: readonly Pick<
    ShimMoveRequest["stations"][number],
    "id" | "z" | "deviation" | "tolerance"
  >[];
}

/**
 * Plan and elevation of a call for moves and its result: every station as found, and as the realised moves are
 * predicted to leave it. A call for moves knows deviations, not targets, so zero is each station's own target.
 */
export function planElevationOfMoves(request: MoveCall, result: ShimMoveResult): PlanElevationModel {
  const references = new Set(request.reference ?? []);
  return {
    axialUnit: request.units.axial,
    offsetUnit: request.units.offset,
    axisWords: "target of each station, from the axis as surveyed",
    zero: "target",
    stations: request.stations.map((station) => ({
      id: station.id,
      z: station.z,
      reference: references.has(station.id),
      target: { h: 0, v: 0 },
      allowed: allowedBy(station.tolerance),
    })),
    surveys: [foundOf(request), predictedOf(result)],
  };
}

function foundOf(request: MoveCall): Survey {
  return {
    name: "as found",
    stations: request.stations.map(({ id, deviation: { h, v } }) => ({
      id,
      deviation: { h, v },
      radial: Math.hypot(h, v),
      uncertainty: null,
      verdict: null,
    })),
  };
}

/** Where the realised moves are predicted to leave each station. */
export function predictedOf(result: ShimMoveResult): Survey {
  return {
    name: "as left, predicted",
    stations: result.predicted.map(({ id, deviation, verdict }) => ({
      id,
      deviation: { h: deviation.h, v: deviation.v },
      radial: deviation.radial,
      uncertainty: null,
      verdict,
    })),
  };
}
