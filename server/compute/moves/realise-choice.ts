import { along, dot, type LeastSquares } from "./least-squares-in-order.ts";
import { excessOver, solveQuadraticProgram } from "./quadratic-program.ts";
import type { RigidFit } from "./rigid-fit.ts";
import type { SearchBudget } from "./search-budget.ts";
import { changesWithin, sameThicknessMm, type ShimChange } from "./shim-changes.ts";
import type { ChosenStack, PlaceRow, ShimChoice, ShimTask } from "./shim-task.ts";
import { costOf } from "./station-pull.ts";

/**
 * The rigid move that `changes` make (one per load-bearing place of the task, in its order), with what the upper pads
 * then need. Null when the travel, a stack's limits or the misfit forbid it.
 * @throws ComputeError too_many_choices, not_converged
 */
export function realiseChoice(
  task: ShimTask,
  fit: RigidFit,
  changes: readonly ShimChange[],
  budget: SearchBudget,
): ShimChoice | null {
  const fitted = along(
    new Array<number>(task.size).fill(0),
    fit.columns,
    changes.map(({ changeMm }) => changeMm),
  );
  const amounts = fit.open.length === 0 ? fitted : setByJack(task, fit, fitted);
  if (!amounts || task.travel.some((limit) => excessOver(limit, amounts) > 0)) return null;

  const stacks: ChosenStack[] = [];
  for (const [k, { place, row }] of task.loaded.entries()) {
    const change = changes[k];
    if (change) stacks.push({ place, change, misfitMm: change.changeMm - dot(row, amounts) });
  }
  for (const follower of task.following) {
    const stack = follow(follower, amounts, task, budget);
    if (!stack) return null;
    stacks.push(stack);
  }
  if (stacks.some(({ misfitMm }) => Math.abs(misfitMm) > task.maximumMisfitMm + sameThicknessMm)) return null;
  return {
    amounts,
    cost: costOf(task.pull, amounts),
    handled: stacks.reduce((sum, { change }) => sum + change.handled, 0),
    totalMm: stacks.reduce((sum, { change }) => sum + Math.abs(change.changeMm), 0),
    stacks,
  };
}

/** What the places leave open is set to the best, within the travel, once their shims are in. */
function setByJack(task: ShimTask, fit: RigidFit, fitted: readonly number[]): readonly number[] | null {
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

/** The change of an upper pad nearest to the realised move; of equally near ones the fewest pieces, then the thinner. */
function follow(
  { place, row }: PlaceRow,
  amounts: readonly number[],
  task: ShimTask,
  budget: SearchBudget,
): ChosenStack | null {
  const needMm = dot(row, amounts);
  const reachMm = Math.min(task.maximumMisfitMm, task.incrementMm) + sameThicknessMm;
  const near = changesWithin(place.stack, task.incrementMm, needMm - reachMm, needMm + reachMm, budget)
    .map((change) => ({ place, change, misfitMm: change.changeMm - needMm }))
    .sort(
      (a, b) =>
        Math.round((Math.abs(a.misfitMm) - Math.abs(b.misfitMm)) / sameThicknessMm) ||
        a.change.handled - b.change.handled ||
        a.change.changeMm - b.change.changeMm,
    );
  return near[0] ?? null;
}
