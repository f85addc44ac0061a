import { dot, lengthOf, minimiseInOrder, type LeastSquares } from "./least-squares-in-order.ts";
import { stackLimits, travelLimits, type PlacedLimit } from "./move-limits.ts";
import type { LimitPlace } from "./move-plan.ts";
import { solveMinimaxProgram, type MinimaxTerm } from "./minimax-program.ts";
import { objectiveOf, type MoveObjective } from "./move-objective.ts";
import {
  planes as bothPlanes,
  type MoveAim,
  type MoveComponent,
  type MoveStation,
  type Plane,
} from "./move-problem.ts";
import { solveQuadraticProgram } from "./quadratic-program.ts";
import { modeAt, modesOf, type Mode } from "./rigid-freedom.ts";
import { pullOf, termsOf } from "./station-pull.ts";
import type { Place } from "./support-places.ts";

/** A limit that holds the ideal move back, and what the stations ask for there. */
export interface Hindrance {
  readonly limit: LimitPlace;
  /** The limit on the amounts: row·amounts ≤ most. */
  readonly row: readonly number[];
  readonly most: number;
  /** What one millimetre more there would be worth, in what is made least. */
  readonly worth: number;
  readonly limitMm: number;
  readonly wantedMm: number;
}

/** The best rigid move of one component in planes that must be solved together. */
export interface IdealMove {
  readonly planes: readonly Plane[];
  readonly modes: readonly Mode[];
  readonly objective: MoveObjective;
  readonly leastMovement: LeastSquares;
  readonly amounts: readonly number[];
  /** The same with neither travel nor stacks in the way; blocked directions stay blocked. */
  readonly unhindered: readonly number[];
  readonly cost: number;
  /** The costliest first. */
  readonly hindrances: readonly Hindrance[];
  /** False where the stations leave a way of moving open: the supports are then moved least. */
  readonly determined: boolean;
}

export type IdealAnswer =
  | { readonly possible: true; readonly move: IdealMove }
  | { readonly possible: false; readonly conflict: readonly LimitPlace[] };

/**
 * h and v apart, unless a stack answers to both (a pad at an oblique angle) or the largest deviation is made least: that
 * is one number for both.
 */
export function planesTogether(places: readonly Place[], aim: MoveAim): (readonly Plane[])[] {
  if (aim === "minimax") return [bothPlanes];
  const oblique = places.some(
    ({ direction }) => Math.abs(direction.h) > 1e-12 && Math.abs(direction.v) > 1e-12,
  );
  return oblique ? [bothPlanes] : bothPlanes.map((plane) => [plane]);
}

/** Places whose change answers to a move in `planes`. */
export function placesIn(places: readonly Place[], planes: readonly Plane[]): Place[] {
  return places.filter(({ direction }) => planes.some((plane) => Math.abs(direction[plane]) > 1e-12));
}

/**
 * The move of a rigid part that minimises Σ w·(dᵢ + δ(zᵢ))², or the largest |dᵢ + δ(zᵢ)|/T and then that sum, within the
 * travel of its supports, the thickness of its stacks and its blocked directions. Of moves that serve the stations
 * alike, the one that moves the supports least, Σ δ². A convex program, solved exactly.
 * @throws ComputeError not_converged
 */
export function idealMoveOf(
  component: MoveComponent,
  stations: readonly MoveStation[],
  places: readonly Place[],
  planes: readonly Plane[],
  aim: MoveAim,
): IdealAnswer {
  const stationZMm = stations.map(({ zMm }) => zMm);
  const modes = planes.flatMap((plane) => modesOf(component.supports, stationZMm, plane));
  const terms = termsOf(stations, modes, planes, component.tiltTolerance);
  const pull = pullOf(terms, modes.length);
  const leastMovement = leastMovementOf(component, modes);
  const limits = limitsOf(component, places, planes, modes);
  const best =
    aim === "minimax"
      ? solveMinimaxProgram(modes.length, terms, [pull, leastMovement], limits)
      : { ...leastSquaresWithin(modes.length, [pull, leastMovement], limits), weights: [] };
  if (!best.feasible) {
    return { possible: false, conflict: best.conflict.flatMap((k) => limits[k]?.place ?? []) };
  }
  const unhindered =
    best.binding.length === 0
      ? best.point
      : (withoutLimits(aim, modes.length, terms, [pull, leastMovement]) ?? best.point);
  const objective = objectiveOf(aim, modes.length, terms, leastMovement, best.weights);
  const move: IdealMove = {
    planes,
    modes,
    objective,
    leastMovement,
    amounts: best.point,
    unhindered,
    cost: objective.valueOf(best.point),
    hindrances: hindrancesOf(best.binding, limits, unhindered),
    determined: minimiseInOrder(modes.length, [pull]).free.length === 0,
  };
  return { possible: true, move };
}

/** Travel and stack limits on the amounts of `modes`, each stack's loosened by `looserMm` of its place. */
export function limitsOf(
  { supports }: MoveComponent,
  places: readonly Place[],
  planes: readonly Plane[],
  modes: readonly Mode[],
  looserMm: (place: Place) => number = () => 0,
): PlacedLimit[] {
  return [
    ...travelLimits(supports, modes, planes),
    ...placesIn(places, planes).flatMap((place) =>
      stackLimits(place, modes).map((limit) => ({ ...limit, most: limit.most + looserMm(place) })),
    ),
  ];
}

interface Binding {
  readonly limit: number;
  readonly worth: number;
}

/**
 * The optimum of problems taken in order within limits, and what a millimetre more of those that bind is worth.
 * @throws ComputeError not_converged
 */
export function leastSquaresWithin(
  size: number,
  problems: readonly LeastSquares[],
  limits: readonly PlacedLimit[],
):
  | { readonly feasible: true; readonly point: readonly number[]; readonly binding: readonly Binding[] }
  | { readonly feasible: false; readonly conflict: readonly number[] } {
  const best = solveQuadraticProgram(size, problems, limits);
  if (!best.feasible) return best;
  const binding = best.binding.map(({ limit, multiplier }) => ({
    limit,
    // The multiplier is that of half the gradient, for a row of length 1.
    worth: (2 * multiplier) / lengthOf(limits[limit]?.row ?? []),
  }));
  return { feasible: true, point: best.point, binding };
}

/** Binding limits as hindrances, the costliest first. */
export function hindrancesOf(
  binding: readonly Binding[],
  limits: readonly PlacedLimit[],
  unhindered: readonly number[],
): Hindrance[] {
  const hindrances = binding.flatMap(({ limit: k, worth }) => {
    const limit = limits[k];
    if (!limit) return [];
    const { row, most, place } = limit;
    const sign = place.side === "max" ? 1 : -1;
    return [{ limit: place, row, most, worth, limitMm: sign * most, wantedMm: sign * dot(row, unhindered) }];
  });
  return hindrances.sort((a, b) => b.worth - a.worth);
}

function withoutLimits(
  aim: MoveAim,
  size: number,
  terms: readonly MinimaxTerm[],
  problems: readonly LeastSquares[],
): readonly number[] | null {
  if (aim === "least_squares") return minimiseInOrder(size, problems).point;
  const best = solveMinimaxProgram(size, terms, problems, []);
  return best.feasible ? best.point : null;
}

/** Move at every support, as rows: their sum of squares is what "least movement" means. */
function leastMovementOf({ supports }: MoveComponent, modes: readonly Mode[]): LeastSquares {
  const rows = supports.flatMap(({ zMm }) =>
    bothPlanes.map((plane) => modes.map((mode) => (mode.plane === plane ? modeAt(mode, zMm) : 0))),
  );
  return { rows, targets: rows.map(() => 0) };
}
