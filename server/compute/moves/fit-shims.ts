import { bestTogether } from "./choice-frontier.ts";
import { chooseShims } from "./choose-shims.ts";
import { idealMoveOf, placesIn, type IdealMove } from "./ideal-move.ts";
import type { MoveComponent, MoveStation } from "./move-problem.ts";
import { travelLimits } from "./move-limits.ts";
import { rowAlong } from "./rigid-freedom.ts";
import type { SearchBudget } from "./search-budget.ts";
import type { ChosenStack, ShimChoice, ShimTask } from "./shim-task.ts";
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
  const loosened = idealMoveOf(component, stations, places, planes, maximumMisfitMm);
  if (!loosened.possible) return null;
  const rows = placesIn(places, planes).map((place) => ({
    place,
    row: rowAlong(modes, place.direction, place.zMm),
  }));
  return {
    size: modes.length,
    pull,
    leastMovement,
    travel: travelLimits(component.supports, modes, planes),
    loaded: rows.filter(({ place }) => place.bearsLoad),
    following: rows.filter(({ place }) => !place.bearsLoad),
    ideal: amounts,
    bestImaginable: loosened.move.amounts,
    incrementMm,
    maximumMisfitMm,
  };
}
