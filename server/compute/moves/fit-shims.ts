import { hindrancesOf, leastSquaresWithin, limitsOf, placesIn, type IdealMove } from "./ideal-move.ts";
import type { MoveAim, MoveComponent } from "./move-problem.ts";
import { travelLimits } from "./move-limits.ts";
import { rigidFitOf, type RigidFit } from "./rigid-fit.ts";
import { rowAlong } from "./rigid-freedom.ts";
import { sameThicknessMm } from "./shim-changes.ts";
import type { ShimSupply } from "./shim-supply.ts";
import type { ChosenStack, PlaceRow, ShimChoice, ShimTask } from "./shim-task.ts";
import type { Place } from "./support-places.ts";

/** What shims are chosen from, and how far they may leave the rigid move. */
export interface ShimTerms {
  readonly supply: ShimSupply;
  readonly maximumMisfitMm: number;
  readonly aim: MoveAim;
}

/** Chooses for all tasks of a component together: one choice for each, or null when none will do. */
export type ChooseForTasks = (tasks: readonly ShimTask[]) => readonly ShimChoice[] | null;

export interface FittedShims {
  /** Realised amounts, one list per ideal move. */
  readonly amounts: readonly (readonly number[])[];
  readonly stacks: readonly ChosenStack[];
}

/**
 * Real shims for all stacks of a component together; null when none will do.
 * @throws ComputeError too_many_choices, not_converged
 */
export function fitShims(
  component: MoveComponent,
  places: readonly Place[],
  ideals: readonly IdealMove[],
  terms: ShimTerms,
  choose: ChooseForTasks,
): FittedShims | null {
  const tasks: ShimTask[] = [];
  for (const ideal of ideals) {
    const task = shimTaskOf(component, places, ideal, terms);
    if (!task) return null;
    tasks.push(task);
  }
  const best = choose(tasks);
  return (
    best && { amounts: best.map(({ amounts }) => amounts), stacks: best.flatMap(({ stacks }) => stacks) }
  );
}

function shimTaskOf(
  component: MoveComponent,
  places: readonly Place[],
  ideal: IdealMove,
  { supply, maximumMisfitMm, aim }: ShimTerms,
): ShimTask | null {
  const { planes, modes, objective, leastMovement, amounts, cost } = ideal;
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
  const limits = limitsOf(component, places, planes, modes, looserMm);
  const loosened = leastSquaresWithin(modes.length, [objective.bound, leastMovement], limits);
  if (!loosened.feasible) return null;
  return {
    size: modes.length,
    objective,
    leastMovement,
    travel: travelLimits(component.supports, modes, planes),
    loaded,
    following: rows.filter(({ place }) => !place.bearsLoad),
    fit,
    ideal: amounts,
    idealCost: cost,
    bestImaginable: loosened.point,
    hindrances: hindrancesOf(loosened.binding, limits, loosened.point),
    supply,
    prices: [],
    maximumMisfitMm,
    bestIfLong: supply.lines.length > 0 || aim === "minimax",
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
