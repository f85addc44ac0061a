import { dot, lengthOf } from "./least-squares-in-order.ts";
import { sameThicknessMm } from "./shim-changes.ts";
import type { LoadPlace } from "./shim-groups.ts";
import type { ShimSight } from "./shim-sight.ts";
import type { ShimTask } from "./shim-task.ts";

/** The load-bearing places of a task as the search sees them, and how far they may push against its travel. */
export interface LoadPlaces {
  readonly places: readonly LoadPlace[];
  readonly mostPushes: readonly number[];
}

/**
 * What a change at each load-bearing place does to the stations' cost and against the travel.
 *
 * With ŷ the best move imaginable and λⱼ the worth of the limits aⱼ·y ≤ bⱼ that hold it back, every move costs
 * cost(ŷ) + Σ λⱼ·(bⱼ − aⱼ·y) + ‖R(y − ŷ)‖² exactly (Karush, Kuhn and Tucker: the gradient at ŷ is −Σ λⱼ·aⱼ), and the
 * middle part is 0 or more where the limits are kept. Limits that a jack has a say in are left out of it.
 */
export function loadPlacesOf(task: ShimTask, sight: ShimSight): LoadPlaces {
  const { fit, hindrances, travel, bestImaginable, ideal } = task;
  const setByShims = ({ row }: { readonly row: readonly number[] }) =>
    fit.open.every((direction) => Math.abs(dot(row, direction)) <= 1e-9 * lengthOf(row));
  const rising = hindrances.filter(setByShims);
  const pushing = travel.filter(setByShims);
  const places = task.loaded.map(({ place, row }, k): LoadPlace => {
    const column = fit.columns[k] ?? [];
    const extent = sight.extent(row);
    return {
      place,
      row,
      column: sight.rows.map((seen) => dot(seen, column)),
      wantedMm: dot(row, bestImaginable),
      centreMm: dot(row, extent < Infinity ? bestImaginable : ideal),
      extent,
      leverage: fit.leverage[k] ?? 1,
      risePerMm: rising.reduce((sum, limit) => sum - limit.worth * dot(limit.row, column), 0),
      pushesPerMm: pushing.map((limit) => dot(limit.row, column)),
    };
  });
  return { places, mostPushes: pushing.map(({ most }) => most + sameThicknessMm) };
}
