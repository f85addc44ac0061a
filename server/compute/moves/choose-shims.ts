import { assertFinite } from "../compute-error.ts";
import { ChoiceFrontier } from "./choice-frontier.ts";
import { lengthOf } from "./least-squares-in-order.ts";
import { loadPlacesOf } from "./load-places.ts";
import { misfitGuards } from "./misfit-guards.ts";
import { realiseChoice } from "./realise-choice.ts";
import { searchChoices } from "./search-choices.ts";
import type { SearchBudget } from "./search-budget.ts";
import { piecesOf, sameThicknessMm, type ShimChange } from "./shim-changes.ts";
import { groupOptions, groupPlaces, type GroupOption, type LoadPlace } from "./shim-groups.ts";
import { shimSightOf } from "./shim-sight.ts";
import type { ShimSupply } from "./shim-supply.ts";
import type { PlaceRow, ShimTask, ShimChoice } from "./shim-task.ts";
import { costOf } from "./station-pull.ts";

/** Choices of real shims for a task. */
export interface ShimOffer {
  /** Those that no other beats in cost, pieces handled, total change and counted lines of the stock at once. */
  readonly choices: readonly ShimChoice[];
  /** Whether none that is better was passed over: false when the trials ran out before. */
  readonly proved: boolean;
  /** No choice costs less. */
  readonly floor: number;
}

/** While nothing is found the search goes four times as far each time, this often; with pieces of set sizes, farther. */
const widenings = 3;
const wideningsFromStock = 14;

/**
 * Chooses real shims for all stacks of a task together. Answers every choice that no other beats in cost, pieces
 * handled and total change at once, among those of about the least cost (with what its pieces are priced at), or up to
 * `dearer` above it; none when no choice
 * keeps the travel, the stacks' limits, the misfit and the counted lines of the stock. `elsewhere` is the cost of the
 * component's other planes.
 *
 * How optimality is known. The realised move y is the rigid least squares fit of the changes at load-bearing places;
 * what they leave open is set by jack to the best. With ŷ the best move imaginable, bound(y) − bound(ŷ) is ‖R(y − ŷ)‖² and
 * what limits add that hold ŷ back (load-places.ts), never less than 0 where they are kept; the bound is the cost itself,
 * or for the largest deviation a quadratic below its square (move-objective.ts). So a choice better than one already
 * found lies in an ellipsoid about ŷ. Every choice in it is visited or excluded by searchChoices, and the ellipsoid is
 * widened until it reaches to the best found. Where the stations do not determine a place's change (all at one z, on
 * supports at several), no ellipsoid bounds it: that stack is taken to a neighbour of its ideal change. When not even
 * standing still is permitted, the search ends about 64 steps from ŷ, or with stock beyond all that its pieces could do.
 * @throws ComputeError too_many_choices, not_converged, result_overflow
 */
export function chooseShims(task: ShimTask, elsewhere: number, budget: SearchBudget, dearer = 0): ShimOffer {
  const { supply, objective } = task;
  const sight = shimSightOf(objective.bound.rows, task.fit, task.size);
  const { places, mostPushes } = loadPlacesOf(task, sight);
  const groups = groupPlaces(places);
  const guards = misfitGuards(
    groups.flatMap(([first]) => (first ? [first.row] : [])),
    task.size,
    task.maximumMisfitMm,
  );
  const frontier = new ChoiceFrontier(elsewhere, dearer, supply.counted, task.prices);
  const placesInTurn = groups.flatMap((group) => group.map(({ place }) => place));
  const turnOf = task.loaded.map(({ place }) => placesInTurn.indexOf(place));
  const visit = (chosen: readonly { readonly changes: readonly ShimChange[] }[]) => {
    const inTurn = chosen.flatMap(({ changes }) => changes);
    const choice = realiseChoice(
      task,
      turnOf.flatMap((turn) => inTurn[turn] ?? []),
      budget,
    );
    if (supply.lines.length > 0) budget.spend(20 + frontier.choices.length / 4);
    if (choice) frontier.add(choice);
  };

  const still = groups.map((group) => ({
    changes: group.flatMap(({ place }) =>
      supply.changesWithin(place.stack, 0, 0, budget).flatMap(({ ways }) => ways.slice(0, 1)),
    ),
  }));
  if (still.every(({ changes }, g) => changes.length === groups[g]?.length)) visit(still);

  const floor = assertFinite(costOf(objective.bound, task.bestImaginable), "The cost of the best move");
  const backMost = mostGivenBack(task);
  const roomLeft = () => objective.ceilingOf(frontier.ceiling) - floor + backMost.loaded + backMost.following;
  const most = [...mostPushes, ...mostTaken(task)];
  const search = () => {
    let radius = aboutOneStep(groups.flat(), supply);
    const farthest = supply.lines.length > 0 ? wideningsFromStock : widenings;
    for (let widened = 0; frontier.found || widened <= farthest; widened++) {
      const reaches = groups.map((group) => reachMm(group, radius, task, budget));
      const open = groups.map((group, g) => ({
        options: groupOptions(group, task, reaches[g] ?? 0, budget),
        columns: group.map(({ column }) => column),
        allowed: (before: readonly GroupOption[]) => {
          const allowed = guards[g]?.(before.map(({ firstMm }) => firstMm));
          return (option: GroupOption) => allowed?.(option.firstMm) ?? true;
        },
      }));
      const bound = () => Math.min(radius, roomLeft()) - backMost.loaded;
      searchChoices(open, sight.rows.length, most, bound, visit, budget);
      if (roomLeft() <= radius) break;
      if (!frontier.found && groups.every((group, g) => beyondAll(group, reaches[g] ?? 0, supply))) break;
      radius = Math.min(16 * radius, roomLeft());
    }
  };
  const proved = task.bestIfLong ? budget.lasts(search, () => frontier.found) : (search(), true);
  return { choices: frontier.choices, proved, floor: objective.valueAt(floor) };
}

/** What pieces given back could be worth at most: a choice may cost so much more than its price tells. */
function mostGivenBack({ supply, prices, loaded, following }: ShimTask): {
  loaded: number;
  following: number;
} {
  if (!supply.reuse || prices.length === 0) return { loaded: 0, following: 0 };
  const worth = (rows: readonly PlaceRow[]) =>
    rows
      .flatMap(({ place }) => piecesOf(place.stack))
      .map((mm) => prices[supply.counted.indexOf(supply.lineOf(mm))] ?? 0)
      .reduce((sum, price) => sum + price, 0);
  return { loaded: worth(loaded), following: worth(following) };
}

/** Pieces of each counted line that the stacks under load may take: the upper pads may give some back. */
function mostTaken({ supply, following }: ShimTask): number[] {
  const given = following.flatMap(({ place }) => piecesOf(place.stack)).map((mm) => supply.lineOf(mm));
  return supply.counted.map((line) => {
    const back = supply.reuse ? given.filter((each) => each === line).length : 0;
    return (supply.available[line] ?? 0) + back;
  });
}

/** Cost of every stack being a step off, and of rounding where the stations see none of them. */
function aboutOneStep(places: readonly LoadPlace[], { stepMm }: ShimSupply): number {
  return 1e-12 + places.reduce((sum, { column }) => sum + lengthOf(column) * stepMm, 0) ** 2;
}

/** Whether changes still farther off would all be thicker than any wanted by more than a piece and the stack itself. */
function beyondAll(group: readonly LoadPlace[], reachedMm: number, { thickestMm }: ShimSupply): boolean {
  return group.every(({ centreMm, place: { stack } }) => {
    const shortMm = Math.max(0, stack.minMm - stack.thicknessMm);
    return reachedMm > Math.abs(centreMm) + stack.thicknessMm + shortMm + thickestMm;
  });
}

/** How far from the change wanted a group's changes may lie while the cost is within `radius` of the best. */
function reachMm(group: readonly LoadPlace[], radius: number, task: ShimTask, budget: SearchBudget): number {
  const extent = Math.max(...group.map((place) => place.extent));
  if (extent === Infinity) return neighbourMm(group, task.supply, budget);
  const ownSay = group.reduce((sum, { leverage }) => sum + leverage, 0);
  const misfitMm = ownSay > 1 - 1e-9 ? 0 : task.maximumMisfitMm;
  return Math.sqrt(radius) * extent + misfitMm;
}

/** How far the nearest changes on both sides of a group's centre lie: a step where shims are cut, else as it comes. */
function neighbourMm([first]: readonly LoadPlace[], supply: ShimSupply, budget: SearchBudget): number {
  if (!first || supply.lines.length === 0) return supply.stepMm - 2 * sameThicknessMm;
  const aboutMm = first.centreMm + first.place.offsetMm;
  const { stack } = first.place;
  const farthestMm =
    Math.abs(aboutMm) + stack.thicknessMm + Math.min(supply.thickestMm, stack.thicknessMm + 1);
  for (let mm = supply.stepMm; ; mm *= 4) {
    const changes = supply.changesWithin(stack, aboutMm - mm, aboutMm + mm, budget);
    const sides = [
      changes.filter(({ changeMm }) => changeMm <= aboutMm),
      changes.filter(({ changeMm }) => changeMm >= aboutMm),
    ].map((side) => Math.min(...side.map(({ changeMm }) => Math.abs(changeMm - aboutMm))));
    if (sides.every(Number.isFinite)) return Math.max(...sides);
    if (mm > farthestMm) return mm;
  }
}
