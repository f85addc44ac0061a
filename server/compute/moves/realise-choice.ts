import { along, dot, type LeastSquares } from "./least-squares-in-order.ts";
import { excessOver, solveQuadraticProgram } from "./quadratic-program.ts";
import type { SearchBudget } from "./search-budget.ts";
import { changesWithin, sameThicknessMm, type ShimChange } from "./shim-changes.ts";
import { moveShareMm } from "./shim-groups.ts";
import type { ChosenStack, PlaceRow, ShimChoice, ShimTask } from "./shim-task.ts";
import { costOf } from "./station-pull.ts";

/** What solving one quadratic program is worth, in trials of the search. */
const trialsPerProgram = 100;

/**
 * The rigid move that `changes` make (one per load-bearing place of the task, in its order), with what the upper pads
 * then need. Null when the travel, a stack's limits or the misfit forbid it.
 * @throws ComputeError too_many_choices, not_converged
 */
export function realiseChoice(
  task: ShimTask,
  changes: readonly ShimChange[],
  budget: SearchBudget,
): ShimChoice | null {
  budget.spend(changes.length);
  const { fit } = task;
  const shares = task.loaded.map(({ place }, k) => moveShareMm(place, changes[k]?.changeMm ?? 0));
  const fitted = along(new Array<number>(task.size).fill(0), fit.columns, shares);
  // What is set by jack moves none of these places: their misfit is known before it.
  const misfits = task.loaded.map(({ row }, k) => (shares[k] ?? 0) - dot(row, fitted));
  const mostMm = task.maximumMisfitMm + sameThicknessMm;
  if (misfits.some((misfitMm) => Math.abs(misfitMm) > mostMm)) return null;
  const amounts = fit.open.length === 0 ? fitted : setByJack(task, fitted, budget);
  if (!amounts || task.travel.some((limit) => excessOver(limit, amounts) > 0)) return null;

  const stacks: ChosenStack[] = task.loaded.flatMap(({ place }, k) => {
    const change = changes[k];
    return change ? [{ place, change, misfitMm: misfits[k] ?? 0 }] : [];
  });
  for (const follower of task.following) {
    const stack = follow(follower, amounts, task, budget);
    if (!stack) return null;
    stacks.push(stack);
  }
  if (stacks.some(({ misfitMm }) => Math.abs(misfitMm) > mostMm)) return null;
  return {
    amounts,
    cost: costOf(task.pull, amounts),
    handled: stacks.reduce((sum, { change }) => sum + change.handled, 0),
    totalMm: stacks.reduce((sum, { change }) => sum + Math.abs(change.changeMm), 0),
    stacks,
  };
}

/** What the places leave open is set to the best, within the travel, once their shims are in. */
function setByJack(
  task: ShimTask,
  fitted: readonly number[],
  budget: SearchBudget,
): readonly number[] | null {
  budget.spend(trialsPerProgram + task.travel.length);
  const { fit } = task;
  const byShims: LeastSquares = {
    rows: fit.determined,
    targets: fit.determined.map((direction) => dot(direction, fitted)),
  };
  const best = solveQuadraticProgram(task.size, [byShims, task.pull, task.leastMovement], task.travel);
  if (!best.feasible) return null;
  const broken = fit.determined.some(
    (direction, k) => Math.abs(dot(direction, best.point) - (byShims.targets[k] ?? 0)) > sameThicknessMm,
  );
  return broken ? null : best.point;
}

/**
 * The change of an upper pad nearest to the realised move; of equally near ones the fewest pieces, then the thinner.
 * It lies within an increment, unless the stack's own limits keep it farther off.
 */
function follow(
  { place, row }: PlaceRow,
  amounts: readonly number[],
  task: ShimTask,
  budget: SearchBudget,
): ChosenStack | null {
  const needMm = dot(row, amounts);
  const withinMm = (mm: number) => {
    const reachMm = mm + sameThicknessMm;
    return changesWithin(place.stack, task.incrementMm, needMm - reachMm, needMm + reachMm, budget);
  };
  const close = withinMm(Math.min(task.maximumMisfitMm, task.incrementMm));
  const changes = close.length > 0 ? close : withinMm(task.maximumMisfitMm);
  const near = changes
    .map((change) => ({ place, change, misfitMm: change.changeMm - needMm }))
    .sort(
      (a, b) =>
        Math.round((Math.abs(a.misfitMm) - Math.abs(b.misfitMm)) / sameThicknessMm) ||
        a.change.handled - b.change.handled ||
        a.change.changeMm - b.change.changeMm,
    );
  return near[0] ?? null;
}
