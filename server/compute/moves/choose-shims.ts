import { assertFinite } from "../compute-error.ts";
import { ChoiceFrontier } from "./choice-frontier.ts";
import { lengthOf } from "./least-squares-in-order.ts";
import { loadPlacesOf } from "./load-places.ts";
import { misfitGuards } from "./misfit-guards.ts";
import { realiseChoice } from "./realise-choice.ts";
import { searchChoices } from "./search-choices.ts";
import type { SearchBudget } from "./search-budget.ts";
import { changesWithin, sameThicknessMm, type ShimChange } from "./shim-changes.ts";
import { groupOptions, groupPlaces, type GroupOption, type LoadPlace } from "./shim-groups.ts";
import { shimSightOf } from "./shim-sight.ts";
import type { ShimChoice, ShimTask } from "./shim-task.ts";
import { costOf } from "./station-pull.ts";

/** While nothing is found the search goes four times as far each time, this often. */
const widenings = 3;

/**
 * Chooses real shims for all stacks of a task together. Answers every choice that no other beats in cost, pieces
 * handled and total change at once, among those of about the least cost; none when no choice keeps the travel, the
 * stacks' limits and the misfit. `elsewhere` is the cost of the component's other planes.
 *
 * How optimality is known. The realised move y is the rigid least squares fit of the changes at load-bearing places;
 * what they leave open is set by jack to the best. With ŷ the best move imaginable, cost(y) − cost(ŷ) is ‖R(y − ŷ)‖² and
 * what limits add that hold ŷ back (load-places.ts), never less than 0 where they are kept. So a choice better than one
 * already found lies in an ellipsoid about ŷ. Every choice in it is visited or excluded by searchChoices, and the
 * ellipsoid is widened until it reaches to the best found. Where the stations do not determine a place's change (all at
 * one z, on supports at several), no ellipsoid bounds it: that stack is taken to a neighbour of its ideal change. When not
 * even standing still is permitted, the search ends about 64 steps from ŷ.
 * @throws ComputeError too_many_choices, not_converged, result_overflow
 */
export function chooseShims(task: ShimTask, elsewhere: number, budget: SearchBudget): readonly ShimChoice[] {
  const sight = shimSightOf(task.pull.rows, task.fit, task.size);
  const { places, mostPushes } = loadPlacesOf(task, sight);
  const groups = groupPlaces(places);
  const guards = misfitGuards(
    groups.flatMap(([first]) => (first ? [first.row] : [])),
    task.size,
    task.maximumMisfitMm,
  );
  const frontier = new ChoiceFrontier(elsewhere);
  const placesInTurn = groups.flatMap((group) => group.map(({ place }) => place));
  const turnOf = task.loaded.map(({ place }) => placesInTurn.indexOf(place));
  const visit = (chosen: readonly { readonly changes: readonly ShimChange[] }[]) => {
    const inTurn = chosen.flatMap(({ changes }) => changes);
    const choice = realiseChoice(
      task,
      turnOf.flatMap((turn) => inTurn[turn] ?? []),
      budget,
    );
    if (choice) frontier.add(choice);
  };

  const still = groups.map((group) => ({
    changes: group.flatMap(({ place }) =>
      changesWithin(place.stack, task.incrementMm, 0, 0, budget).slice(0, 1),
    ),
  }));
  if (still.every(({ changes }, g) => changes.length === groups[g]?.length)) visit(still);

  const floor = assertFinite(costOf(task.pull, task.bestImaginable), "The cost of the best move");
  let radius = aboutOneStep(groups.flat(), task.incrementMm);
  for (let widened = 0; frontier.found || widened <= widenings; widened++) {
    const open = groups.map((group, g) => ({
      options: groupOptions(group, task.incrementMm, reachMm(group, radius, task), budget),
      columns: group.map(({ column }) => column),
      allowed: (before: readonly GroupOption[]) => {
        const allowed = guards[g]?.(before.map(({ firstMm }) => firstMm));
        return (option: GroupOption) => allowed?.(option.firstMm) ?? true;
      },
    }));
    const bound = () => Math.min(radius, frontier.ceiling - floor);
    searchChoices(open, sight.rows.length, mostPushes, bound, visit, budget);
    if (frontier.ceiling - floor <= radius) break;
    radius = Math.min(16 * radius, frontier.ceiling - floor);
  }
  return frontier.choices;
}

/** Cost of every stack being a step off, and of rounding where the stations see none of them. */
function aboutOneStep(places: readonly LoadPlace[], incrementMm: number): number {
  return 1e-12 + places.reduce((sum, { column }) => sum + lengthOf(column) * incrementMm, 0) ** 2;
}

/** How far from the change wanted a group's changes may lie while the cost is within `radius` of the best. */
function reachMm(group: readonly LoadPlace[], radius: number, task: ShimTask): number {
  const extent = Math.max(...group.map((place) => place.extent));
  if (extent === Infinity) return task.incrementMm - 2 * sameThicknessMm;
  const ownSay = group.reduce((sum, { leverage }) => sum + leverage, 0);
  const misfitMm = ownSay > 1 - 1e-9 ? 0 : task.maximumMisfitMm;
  return Math.sqrt(radius) * extent + misfitMm;
}
