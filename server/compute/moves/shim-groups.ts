import { along, lengthOf } from "./least-squares-in-order.ts";
import type { SearchBudget } from "./search-budget.ts";
import { changesWithin, sameThicknessMm, type ShimChange } from "./shim-changes.ts";
import type { Place } from "./support-places.ts";

/** A place, the part of the move it answers to, and what its change does to the stations' cost. */
export interface LoadPlace {
  readonly place: Place;
  /** Change of the weighted station deviations for a change of 1 here, the others held. */
  readonly column: readonly number[];
  /** Change wanted here, about which the search is laid. */
  readonly wantedMm: number;
  /** How far from it the move at the place can lie at a cost of 1; Infinity when the stations do not determine it. */
  readonly extent: number;
  /** Share of the place in its own fitted move. */
  readonly leverage: number;
}

/** One way to change the stacks of a group, and what it does to the stations' cost against the change wanted. */
export interface GroupOption {
  readonly changes: readonly ShimChange[];
  readonly effect: readonly number[];
}

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
 * Changes of a group within ±`reachMm` of those wanted, the least costly first. Twins are changed alike: both to
 * thicknesses of which each is the nearest the other stack can have, so that feet keep the roll and keys their fit. On
 * the same increments that is the very same change.
 * @throws ComputeError too_many_choices
 */
export function groupOptions(
  group: readonly LoadPlace[],
  incrementMm: number,
  reachMm: number,
  budget: SearchBudget,
): GroupOption[] {
  const [first, second] = group;
  if (!first) return [];
  const margin = second ? reachMm + incrementMm : reachMm;
  const listOf = ({ place, wantedMm }: LoadPlace) =>
    changesWithin(place.stack, incrementMm, wantedMm - margin, wantedMm + margin, budget);
  const firsts = listOf(first);
  const seconds = second ? listOf(second) : [];
  budget.spend(firsts.length * seconds.length);
  const sets = second ? alike(first, second, firsts, seconds) : firsts.map((change) => [change]);
  const origin = first.column.map(() => 0);
  return sets
    .map((changes) => {
      const errors = group.map(({ wantedMm }, k) => (changes[k]?.changeMm ?? 0) - wantedMm);
      return {
        changes,
        errors,
        effect: along(
          origin,
          group.map(({ column }) => column),
          errors,
        ),
      };
    })
    .filter(({ errors }) => Math.abs(meanAlong(group, errors)) <= reachMm + sameThicknessMm)
    .sort((a, b) => lengthOf(a.effect) - lengthOf(b.effect));
}

/** Pairs of changes of which each is the other's nearest; equally near ones all stand. */
function alike(
  first: LoadPlace,
  second: LoadPlace,
  firsts: readonly ShimChange[],
  seconds: readonly ShimChange[],
): ShimChange[][] {
  const sign = opposed(first, second) ? -1 : 1;
  const gap = (a: ShimChange, b: ShimChange) => Math.abs(a.changeMm - sign * b.changeMm);
  const nearestTo = firsts.map((a) => Math.min(...seconds.map((b) => gap(a, b))));
  const nearestBack = seconds.map((b) => Math.min(...firsts.map((a) => gap(a, b))));
  return firsts.flatMap((a, i) =>
    seconds
      .filter((b, j) => gap(a, b) <= Math.min(nearestTo[i] ?? 0, nearestBack[j] ?? 0) + sameThicknessMm)
      .map((b) => [a, b]),
  );
}

function meanAlong([first, second]: readonly LoadPlace[], errors: readonly number[]): number {
  const [a = 0, b] = errors;
  if (!first || !second || b === undefined) return a;
  return (a + (opposed(first, second) ? -b : b)) / 2;
}

const opposed = (a: LoadPlace, b: LoadPlace): boolean =>
  a.place.direction.h * b.place.direction.h + a.place.direction.v * b.place.direction.v < 0;
