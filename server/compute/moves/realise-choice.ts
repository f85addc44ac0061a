import { along, dot } from "./least-squares-in-order.ts";
import { excessOver } from "./quadratic-program.ts";
import type { SearchBudget } from "./search-budget.ts";
import { sameThicknessMm, type ShimChange } from "./shim-changes.ts";
import { moveShareMm } from "./shim-groups.ts";
import type { ShimSupply } from "./shim-supply.ts";
import type { ChosenStack, PlaceRow, ShimChoice, ShimTask } from "./shim-task.ts";

/**
 * The rigid move that `changes` make (one per load-bearing place of the task, in its order), with what the upper pads
 * then need. Null when the travel, a stack's limits, the misfit or the counted lines of the stock forbid it.
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
    const stack = follow(follower, amounts, stacks, task, budget);
    if (!stack) return null;
    stacks.push(stack);
  }
  if (stacks.some(({ misfitMm }) => Math.abs(misfitMm) > mostMm)) return null;
  const made = stacks.map(({ change }) => change);
  const net = task.supply.netOf(made);
  if (task.supply.counted.some((line) => task.supply.overdrawn(net).includes(line))) return null;
  return {
    amounts,
    taken: task.supply.takenBy(made),
    net,
    cost: task.objective.valueOf(amounts),
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
  budget.spend(budget.trialsPerProgram + task.travel.length);
  return task.objective.bestAlong(fitted, task.fit.open, task.travel);
}

/**
 * The change of an upper pad nearest to the realised move for which there are pieces left; of equally near ones the
 * fewest pieces, then the thinner. It lies within a step of the shims, unless the stack's own limits keep it farther off.
 */
function follow(
  { place, row }: PlaceRow,
  amounts: readonly number[],
  before: readonly ChosenStack[],
  task: ShimTask,
  budget: SearchBudget,
): ChosenStack | null {
  const needMm = dot(row, amounts);
  const { supply } = task;
  for (let mm = supply.stepMm; ; mm *= widerEachTime) {
    const reachMm = Math.min(mm, task.maximumMisfitMm) + sameThicknessMm;
    const near = supply
      .changesWithin(place.stack, needMm - reachMm, needMm + reachMm, budget)
      .flatMap(({ ways }) => ways)
      .map((change) => ({ place, change, misfitMm: change.changeMm - needMm }))
      .sort(
        (a, b) =>
          Math.round((Math.abs(a.misfitMm) - Math.abs(b.misfitMm)) / sameThicknessMm) ||
          a.change.handled - b.change.handled ||
          a.change.changeMm - b.change.changeMm,
      );
    const fits =
      supply.counted.length === 0 ? near[0] : near.find((each) => leaves([...before, each], supply));
    if (fits ?? mm >= task.maximumMisfitMm) return fits ?? null;
  }
}

/** How much wider a search about the change wanted becomes while it finds nothing. */
const widerEachTime = 8;

/** Whether the changes leave no counted line overdrawn. */
function leaves(stacks: readonly ChosenStack[], supply: ShimSupply): boolean {
  const over = supply.overdrawn(supply.netOf(stacks.map(({ change }) => change)));
  return supply.counted.every((line) => !over.includes(line));
}
