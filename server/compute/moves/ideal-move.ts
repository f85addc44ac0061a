import { lengthOf, minimiseInOrder, type LeastSquares } from "./least-squares-in-order.ts";
import { stackLimits, travelLimits } from "./move-limits.ts";
import type { LimitPlace } from "./move-plan.ts";
import { planes as bothPlanes, type MoveComponent, type MoveStation, type Plane } from "./move-problem.ts";
import { solveQuadraticProgram } from "./quadratic-program.ts";
import { modeAt, modesOf, type Mode } from "./rigid-freedom.ts";
import { costOf, pullOf, type Pull } from "./station-pull.ts";
import type { Place } from "./support-places.ts";

/** A limit that holds the ideal move back, and what the stations ask for there. */
export interface Hindrance {
  readonly limit: LimitPlace;
  /** The limit on the amounts: row·amounts ≤ most. */
  readonly row: readonly number[];
  readonly most: number;
  /** What one millimetre more there would be worth, in cost. */
  readonly worth: number;
  readonly limitMm: number;
  readonly wantedMm: number;
}

/** The best rigid move of one component in planes that must be solved together. */
export interface IdealMove {
  readonly planes: readonly Plane[];
  readonly modes: readonly Mode[];
  readonly pull: Pull;
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

/** h and v apart, unless a stack answers to both: a pad at an oblique angle. */
export function planesTogether(places: readonly Place[]): (readonly Plane[])[] {
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
 * The move of a rigid part that minimises Σ w·(dᵢ + δ(zᵢ))² within the travel of its supports, the thickness of its
 * stacks (each loosened by `looserMm` of its place) and its blocked directions. Of moves that serve the stations alike, the one that
 * moves the supports least, Σ δ². A convex quadratic program, solved exactly.
 * @throws ComputeError not_converged
 */
export function idealMoveOf(
  component: MoveComponent,
  stations: readonly MoveStation[],
  places: readonly Place[],
  planes: readonly Plane[],
  looserMm: (place: Place) => number = () => 0,
): IdealAnswer {
  const stationZMm = stations.map(({ zMm }) => zMm);
  const modes = planes.flatMap((plane) => modesOf(component.supports, stationZMm, plane));
  const pull = pullOf(stations, modes, planes, component.tiltTolerance);
  const leastMovement = leastMovementOf(component, modes);
  const limits = [
    ...travelLimits(component.supports, modes, planes),
    ...placesIn(places, planes).flatMap((place) =>
      stackLimits(place, modes).map((limit) => ({ ...limit, most: limit.most + looserMm(place) })),
    ),
  ];
  const best = solveQuadraticProgram(modes.length, [pull, leastMovement], limits);
  if (!best.feasible) {
    return { possible: false, conflict: best.conflict.flatMap((k) => limits[k]?.place ?? []) };
  }
  const unhindered = minimiseInOrder(modes.length, [pull, leastMovement]).point;
  const hindrances = best.binding.flatMap(({ limit: k, multiplier }) => {
    const limit = limits[k];
    if (!limit) return [];
    const sign = limit.place.side === "max" ? 1 : -1;
    const wanted = limit.row.reduce((sum, value, i) => sum + value * (unhindered[i] ?? 0), 0);
    return [
      {
        limit: limit.place,
        row: limit.row,
        most: limit.most,
        // The multiplier is that of half the gradient, for a row of length 1.
        worth: (2 * multiplier) / lengthOf(limit.row),
        limitMm: sign * limit.most,
        wantedMm: sign * wanted,
      },
    ];
  });
  const move: IdealMove = {
    planes,
    modes,
    pull,
    leastMovement,
    amounts: best.point,
    unhindered,
    cost: costOf(pull, best.point),
    hindrances: hindrances.sort((a, b) => b.worth - a.worth),
    determined: minimiseInOrder(modes.length, [pull]).free.length === 0,
  };
  return { possible: true, move };
}

/** Move at every support, as rows: their sum of squares is what "least movement" means. */
function leastMovementOf({ supports }: MoveComponent, modes: readonly Mode[]): LeastSquares {
  const rows = supports.flatMap(({ zMm }) =>
    bothPlanes.map((plane) => modes.map((mode) => (mode.plane === plane ? modeAt(mode, zMm) : 0))),
  );
  return { rows, targets: rows.map(() => 0) };
}
