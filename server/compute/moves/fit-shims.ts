import { bestTogether } from "./choice-frontier.ts";
import { chooseShims } from "./choose-shims.ts";
import { idealMoveOf, placesIn, type IdealMove } from "./ideal-move.ts";
import type { MoveComponent, MoveStation } from "./move-problem.ts";
import { travelLimits } from "./move-limits.ts";
import { rigidFitOf, type RigidFit } from "./rigid-fit.ts";
import { rowAlong } from "./rigid-freedom.ts";
import type { SearchBudget } from "./search-budget.ts";
import { sameThicknessMm } from "./shim-changes.ts";
import type { ChosenStack, PlaceRow, ShimChoice, ShimTask } from "./shim-task.ts";
import type { Place } from "./support-places.ts";

export interface ShimSupply {
  readonly incrementMm: number;
  readonly maximumMisfitMm: number;
}

export interface FittedShims {
  /** Realised amounts, one list per ideal move. */
  readonly amounts: readonly (readonly number[])[];
  readonly stacks: readonly ChosenStack[];
}

/**
 * Real shims for all stacks of a component together, by cost, then pieces, then total change; null when none will do.
 * @throws ComputeError too_many_choices, not_converged
 */
export function fitShims(
  component: MoveComponent,
  stations: readonly MoveStation[],
  places: readonly Place[],
  ideals: readonly IdealMove[],
  supply: ShimSupply,
  budget: SearchBudget,
): FittedShims | null {
  const sets: (readonly ShimChoice[])[] = [];
  for (const ideal of ideals) {
    const elsewhere = ideals.reduce((sum, other) => (other === ideal ? sum : sum + other.cost), 0);
    const task = shimTaskOf(component, stations, places, ideal, supply);
    if (!task) return null;
    sets.push(chooseShims(task, elsewhere, budget));
  }
  const best = bestTogether(sets);
  return (
    best && { amounts: best.map(({ amounts }) => amounts), stacks: best.flatMap(({ stacks }) => stacks) }
  );
}

function shimTaskOf(
  component: MoveComponent,
  stations: readonly MoveStation[],
  places: readonly Place[],
  ideal: IdealMove,
  { incrementMm, maximumMisfitMm }: ShimSupply,
): ShimTask | null {
  const { planes, modes, pull, leastMovement, amounts } = ideal;
  const rows = placesIn(places, planes).map((place) => ({
    place,
    row: rowAlong(modes, place.direction, place.zMm),
  }));
  const loaded = rows.filter(({ place }) => place.bearsLoad);
  const fit = rigidFitOf(
    loaded.map(({ row }) => row),
    modes.length,
  );
  const exact = placesWithoutMisfit(loaded, fit);
  const looserMm = (place: Place) => (exact.has(place) ? 0 : maximumMisfitMm);
  const loosened = idealMoveOf(component, stations, places, planes, looserMm);
  if (!loosened.possible) return null;
  return {
    size: modes.length,
    pull,
    leastMovement,
    travel: travelLimits(component.supports, modes, planes),
    loaded,
    following: rows.filter(({ place }) => !place.bearsLoad),
    fit,
    ideal: amounts,
    bestImaginable: loosened.move.amounts,
    hindrances: loosened.move.hindrances,
    incrementMm,
    maximumMisfitMm,
  };
}

/**
 * Places at which the realised move passes the stack's limits by no misfit: alone they set their part of it, or with a
 * twin that has the same limits, of whose changes it is the mean.
 */
function placesWithoutMisfit(loaded: readonly PlaceRow[], { leverage }: RigidFit): Set<Place> {
  const alone = 1 - 1e-9;
  return new Set(
    loaded.flatMap(({ place }, k) => {
      const t = loaded.findIndex(
        (other) => other.place.support === place.support && other.place.name === place.twin,
      );
      const twin = loaded[t]?.place;
      const together = (leverage[k] ?? 0) + (twin && sameLimits(place, twin) ? (leverage[t] ?? 0) : 0);
      return together >= alone ? [place] : [];
    }),
  );
}

/** Whether the stacks of twins may be changed by the same amounts, each told along the move. */
function sameLimits(a: Place, b: Place): boolean {
  const room = ({ stack, direction, offsetMm }: Place): number[] => {
    const standsMm = stack.thicknessMm + offsetMm;
    const [least, most] = [stack.minMm - standsMm, stack.maxMm - standsMm];
    return direction.h + direction.v < 0 ? [-most, -least] : [least, most];
  };
  const other = room(b);
  return room(a).every((mm, k) => mm === other[k] || Math.abs(mm - (other[k] ?? NaN)) <= sameThicknessMm);
}
