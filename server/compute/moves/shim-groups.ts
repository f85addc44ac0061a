import { along, dot, lengthOf } from "./least-squares-in-order.ts";
import type { SearchBudget } from "./search-budget.ts";
import type { SearchOption } from "./search-choices.ts";
import { sameThicknessMm, type ShimChange } from "./shim-changes.ts";
import { everyWayOf } from "./ways-together.ts";
import type { ChangeWays, ShimSupply } from "./shim-supply.ts";
import type { ShimTask } from "./shim-task.ts";
import type { Place } from "./support-places.ts";

/** A place, the part of the move it answers to, and what its change does to the stations' cost. */
export interface LoadPlace {
  readonly place: Place;
  /** Change that a rigid move asks here, from its amounts. */
  readonly row: readonly number[];
  /** Change of the weighted station deviations for a change of 1 here, the others held. */
  readonly column: readonly number[];
  /** Change that the best move imaginable asks here: effect and rise are counted from it. */
  readonly wantedMm: number;
  /** Change about which the search is laid. */
  readonly centreMm: number;
  /** How far from it the move at the place can lie at a cost of 1; Infinity when the stations do not determine it. */
  readonly extent: number;
  /** Share of the place in its own fitted move. */
  readonly leverage: number;
  /** Cost, and push against each travel limit, for a change of 1 here. */
  readonly risePerMm: number;
  readonly pushesPerMm: readonly number[];
}

/** One way to change the stacks of a group, and what it does to the stations' cost against the change wanted. */
export interface GroupOption extends SearchOption {
  readonly changes: readonly ShimChange[];
  readonly price: number;
  /** What the change at its first place asks of the move. */
  readonly firstMm: number;
}

/** The part of a change that the move has to follow: all but what a roll asks of the place. */
export const moveShareMm = ({ offsetMm }: Place, changeMm: number): number => changeMm - offsetMm;

/** Places changed together: a foot or key with its twin, or a place by itself. */
export function groupPlaces(places: readonly LoadPlace[]): LoadPlace[][] {
  return places.flatMap((each) => {
    const twin = places.find(
      ({ place }) => place.support === each.place.support && place.name === each.place.twin,
    );
    if (!twin) return [[each]];
    return places.indexOf(twin) > places.indexOf(each) ? [[each, twin]] : [];
  });
}

/**
 * Changes of a group within ±`reachMm` of its centre, the least costly first. Twins are changed alike: both to
 * thicknesses of which each is the nearest the other stack can have, so that feet keep the roll (or lose what was
 * measured of it) and keys their fit. On the same increments that is the very same change. Of places that no permitted move asks anything of, one option stands:
 * that which handles fewest pieces, then changes least.
 * @throws ComputeError too_many_choices
 */
export function groupOptions(
  group: readonly LoadPlace[],
  { supply, maximumMisfitMm, prices }: ShimTask,
  reachMm: number,
  budget: SearchBudget,
): GroupOption[] {
  const [first, second] = group;
  if (!first) return [];
  // Twins farther apart than twice the misfit are of no use; of the others each must see all that could be nearer.
  const apartMm = supply.lines.length === 0 ? supply.stepMm : 3 * maximumMisfitMm + supply.stepMm;
  const margin = second ? reachMm + apartMm : reachMm;
  const listOf = ({ place, centreMm }: LoadPlace) => {
    const aboutMm = centreMm + place.offsetMm;
    return supply.changesWithin(place.stack, aboutMm - margin, aboutMm + margin, budget);
  };
  const firsts = listOf(first);
  const sets = second ? alike(first, second, firsts, listOf(second)) : firsts.map((change) => [change]);
  const near = sets
    .filter((changes) => {
      const errors = sharesOf(group, changes).map((mm, k) => mm - (group[k]?.centreMm ?? 0));
      return Math.abs(meanAlong(group, errors)) <= reachMm + sameThicknessMm;
    })
    .flatMap((changes) => everyWayOf(changes, supply, budget));
  budget.spend(near.length);
  if (supply.counted.length === 0 && group.every(({ row }) => lengthOf(row) === 0))
    return leastHandled(near).map((set) => optionOf(group, set, supply, prices));
  return near
    .map((changes) => optionOf(group, changes, supply, prices))
    .map((option) => ({ option, cost: dot(option.effect, option.effect) + option.rise + option.price }))
    .sort((a, b) => a.cost - b.cost)
    .map(({ option }) => option);
}

function optionOf(
  group: readonly LoadPlace[],
  changes: readonly ShimChange[],
  supply: ShimSupply,
  prices: readonly number[],
): GroupOption {
  const amounts = sharesOf(group, changes);
  const counted = supply.countedOf(changes);
  const errors = group.map(({ wantedMm }, k) => (amounts[k] ?? 0) - wantedMm);
  const sum = (columns: readonly (readonly number[])[], by: readonly number[]) =>
    along(columns[0]?.map(() => 0) ?? [], columns, by);
  return {
    changes,
    firstMm: amounts[0] ?? 0,
    effect: sum(
      group.map(({ column }) => column),
      errors,
    ),
    rise: dot(
      errors,
      group.map(({ risePerMm }) => risePerMm),
    ),
    pushes: [
      ...sum(
        group.map(({ pushesPerMm }) => pushesPerMm),
        amounts,
      ),
      ...counted,
    ],
    price: dot(counted, prices),
  };
}

const sharesOf = (group: readonly LoadPlace[], changes: readonly { changeMm: number }[]): number[] =>
  group.map(({ place }, k) => moveShareMm(place, changes[k]?.changeMm ?? 0));

function leastHandled(sets: readonly (readonly ShimChange[])[]): (readonly ShimChange[])[] {
  const sumOf = (set: readonly ShimChange[], of: (change: ShimChange) => number) =>
    set.reduce((sum, change) => sum + of(change), 0);
  return [...sets]
    .sort(
      (a, b) =>
        sumOf(a, ({ handled }) => handled) - sumOf(b, ({ handled }) => handled) ||
        sumOf(a, ({ changeMm }) => Math.abs(changeMm)) - sumOf(b, ({ changeMm }) => Math.abs(changeMm)),
    )
    .slice(0, 1);
}

interface Turned {
  readonly change: ChangeWays;
  /** Its share in the move, as the first of the twins would say it. */
  readonly mm: number;
}

/** Pairs of changes of which each is the other's nearest; equally near ones all stand. */
function alike(
  first: LoadPlace,
  second: LoadPlace,
  firsts: readonly ChangeWays[],
  seconds: readonly ChangeWays[],
): ChangeWays[][] {
  const sign = opposed(first, second) ? -1 : 1;
  const turned = (changes: readonly ChangeWays[], { place }: LoadPlace, by: number): Turned[] =>
    changes
      .map((change) => ({ change, mm: by * moveShareMm(place, change.changeMm) }))
      .sort((a, b) => a.mm - b.mm);
  const ones = turned(firsts, first, 1);
  const others = turned(seconds, second, sign);
  return ones.flatMap((one) =>
    nearestOf(others, one.mm)
      .filter((other) => nearestOf(ones, other.mm).includes(one))
      .map((other) => [one.change, other.change]),
  );
}

/** Those of a list in order that are nearest to `mm`: two when they lie equally far on either side. */
function nearestOf(inOrder: readonly Turned[], mm: number): readonly Turned[] {
  let [low, high] = [0, inOrder.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((inOrder[middle]?.mm ?? Infinity) < mm) low = middle + 1;
    else high = middle;
  }
  const around = inOrder.slice(Math.max(0, low - 1), low + 1);
  const least = Math.min(...around.map((each) => Math.abs(each.mm - mm)));
  return around.filter((each) => Math.abs(each.mm - mm) <= least + sameThicknessMm);
}

function meanAlong([first, second]: readonly LoadPlace[], errors: readonly number[]): number {
  const [a = 0, b] = errors;
  if (!first || !second || b === undefined) return a;
  return (a + (opposed(first, second) ? -b : b)) / 2;
}

const opposed = (a: LoadPlace, b: LoadPlace): boolean =>
  a.place.direction.h * b.place.direction.h + a.place.direction.v * b.place.direction.v < 0;
