import { ComputeError } from "../compute-error.ts";
import { along, decompose, dot, lengthOf, type LeastSquares } from "../moves/least-squares-in-order.ts";
import { remainderOf } from "../moves/minimax-program.ts";
import type { Limit } from "../moves/quadratic-program.ts";
import { nearestWithin } from "./nearest-within.ts";

/** ‖rows·x + from‖ ≤ radiusMm: a station inside a round tolerance. Two rows: h and v. */
export interface RoundLimit {
  readonly rows: readonly [readonly number[], readonly number[]];
  readonly from: readonly [number, number];
  readonly radiusMm: number;
}

/** direction·(rows·x + from) ≤ radiusMm, of the round limit of that index: no point within it is lost. */
export interface Tangent {
  readonly round: number;
  readonly direction: readonly [number, number];
}

export type RoundOptimum =
  | { readonly feasible: true; readonly point: readonly number[] }
  /** Limits and tangents that cannot all be met. */
  | { readonly feasible: false; readonly limits: readonly number[]; readonly tangents: readonly Tangent[] };

const roundsMost = 120;
/** From here on the curvature of the round limits is left out: the rounds then converge in any case, if slowly. */
const curvedRounds = 40;
/** Squares of numbers below it, summed and divided, stay numbers. */
const largest = 1e100;
/** Share of the largest singular value below which a direction is not determined by what is made least. */
const undeterminedBelow = 1e-8;
/** Share of the largest singular value with which such a direction is tied to where it was in the round before. */
const tieShare = 1e-6;
/** Share of what is made least (of 1 where that is less) that the tie may cost. */
const lossMost = 1e-11;
/** A round limit passed by this share of its radius is met: half of what a verdict spares for rounding. */
const passedBy = 5e-13;
/** Tangents to one round limit at a smaller angle (radians) to each other do the same: the newer stands. */
const sameTangent = 1e-3;

/**
 * The x within all limits, round ones too, that minimises `first`, and among those `second`; together they determine x.
 *
 * Each round is a least squares problem within linear limits, solved exactly (nearest-within.ts): round limits stand as
 * tangents at the point of the round before, with the curvature λ/‖r‖·(t·r)² of those that hold, t along the tangent, so
 * that the rounds converge as Newton's method does (sequential quadratic programming; J. Nocedal and S. Wright, Numerical
 * Optimization, 2nd ed. 2006, chapter 18, from memory). Directions that `first` leaves open are tied to where they
 * were (the proximal point method, R. T. Rockafellar, SIAM Journal on Control and Optimization 14 (1976) 877–898, from
 * memory) until they stay; then `second` sets them.
 * @throws ComputeError not_converged, result_overflow
 */
export function solveRoundProgram(
  size: number,
  first: LeastSquares,
  second: LeastSquares,
  limits: readonly Limit[],
  rounds: readonly RoundLimit[],
): RoundOptimum {
  let tangents: readonly Tangent[] = [];
  let curved: LeastSquares = { rows: [], targets: [] };
  let point: readonly number[] = new Array<number>(size).fill(0);
  for (let round = 0; round < roundsMost; round++) {
    const asked = {
      rows: [...first.rows, ...curved.rows],
      targets: [...first.targets, ...curved.targets],
    };
    const cuts = tangents.map((tangent) => cutOf(rounds, tangent));
    const best = leastWithin(size, asked, [...limits, ...cuts], point);
    if (!best.feasible) return conflictOf(best.conflict, limits.length, tangents);
    const step = best.point.map((value, k) => value - point[k]!);
    point = best.point;
    const passed = tangentsAt(rounds, point, passedBy);
    const holding = holdingOf(tangents, best.multipliers.slice(limits.length));
    const turned = [...holding.keys()].some((k) => {
      const { rows, radiusMm } = rounds[k]!;
      return Math.hypot(dot(rows[0], step), dot(rows[1], step)) > 1e-9 * radiusMm;
    });
    if (passed.length === 0 && !turned && best.loss <= lossMost) {
      return finish(size, best, second, [...limits, ...cuts]);
    }
    const renewed = [...passed, ...tangentsOf(rounds, point, [...holding.keys()])];
    tangents = [...tangents.filter((old) => !renewed.some((one) => isNear(one, old))), ...renewed];
    curved = round < curvedRounds ? curvatureOf(rounds, holding, point, size) : { rows: [], targets: [] };
  }
  throw new ComputeError("not_converged", "The moves inside the round tolerances could not be settled.");
}

function finish(
  size: number,
  { point, open }: { readonly point: readonly number[]; readonly open: readonly (readonly number[])[] },
  second: LeastSquares,
  limits: readonly Limit[],
): RoundOptimum {
  if (open.length === 0) return { feasible: true, point };
  const within = {
    rows: second.rows.map((row) => open.map((direction) => dot(row, direction))),
    targets: second.rows.map((row, i) => (second.targets[i] ?? 0) - dot(row, point)),
  };
  const left = limits.flatMap(({ row, most }) => {
    const seen = open.map((direction) => dot(row, direction));
    if (lengthOf(seen) <= 1e-10 * lengthOf(row)) return [];
    // The point is within its limits, to rounding.
    return [{ row: seen, most: Math.max(0, most - dot(row, point)) }];
  });
  const best = leastWithin(
    open.length,
    within,
    left,
    open.map(() => 0),
  );
  if (!best.feasible) throw new ComputeError("not_converged", "The least moves could not be settled.");
  return { feasible: true, point: along(point, open, best.point).slice(0, size) };
}

type Least =
  | {
      readonly feasible: true;
      readonly point: readonly number[];
      readonly multipliers: readonly number[];
      /** Orthonormal: directions that the problem leaves open. */
      readonly open: readonly (readonly number[])[];
      /** What the tie of the open directions can have cost, as a share of what is made least (of 1 where that is less). */
      readonly loss: number;
    }
  | { readonly feasible: false; readonly conflict: readonly number[] };

/** Least squares within limits; what it leaves open is tied to `centre`. In x = x₀ + W·y it asks for the least ‖y‖. */
function leastWithin(
  size: number,
  { rows, targets }: LeastSquares,
  limits: readonly Limit[],
  centre: readonly number[],
): Least {
  if (rows.some((row) => row.some((value) => !(Math.abs(value) < largest))))
    throw new ComputeError(
      "result_overflow",
      "What the stations ask is too large for a number when squared.",
    );
  const { singular, left, right } = decompose(rows, size);
  const strongest = Math.max(0, ...singular);
  const tie = strongest > 0 ? tieShare * strongest : 1;
  const isOpen = singular.map((value) => !(value > undeterminedBelow * strongest));
  const start = along(
    new Array<number>(size).fill(0),
    right,
    singular.map((value, k) => (isOpen[k] ? dot(right[k]!, centre) : dot(targets, left[k] ?? []) / value)),
  );
  const scaled = right.map((direction, k) =>
    direction.map((value) => value / (isOpen[k] ? tie : singular[k]!)),
  );
  const seen = limits.map(({ row, most }) => ({
    row: scaled.map((direction) => dot(row, direction)),
    most: most - dot(row, start),
  }));
  const slackOf = (j: number) => {
    const { row, most } = limits[j]!;
    return 2e-14 * row.reduce((sum, value, k) => sum + Math.abs(value * start[k]!), Math.abs(most));
  };
  const nearest = nearestWithin(size, seen, slackOf);
  if (!nearest.feasible) return nearest;
  const point = along(start, scaled, nearest.point);
  const open = right.filter((_, k) => isOpen[k]);
  const moved = point.map((value, k) => value - centre[k]!);
  const tied = lengthOf(open.map((direction) => dot(direction, moved)));
  const value = lengthOf(remainderOf({ rows, targets }, point)) ** 2;
  const loss = (tie ** 2 * tied * Math.max(1, lengthOf(point))) / Math.max(1, value);
  return { feasible: true, point, multipliers: nearest.multipliers, open, loss };
}

/** A tangent as a limit on x. */
export function cutOf(rounds: readonly RoundLimit[], { round, direction }: Tangent): Limit {
  const { rows, from, radiusMm } = rounds[round]!;
  return {
    row: rows[0].map((value, k) => direction[0] * value + direction[1] * rows[1][k]!),
    most: radiusMm - direction[0] * from[0] - direction[1] * from[1],
  };
}

/** Tangents at x to the round limits that it passes by more than `share` of their radius. */
export function tangentsAt(rounds: readonly RoundLimit[], x: readonly number[], share: number): Tangent[] {
  const passed = [...rounds.keys()].filter((k) => {
    const { radiusMm } = rounds[k]!;
    return Math.hypot(...remainderAt(rounds[k]!, x)) > radiusMm * (1 + share);
  });
  return tangentsOf(rounds, x, passed);
}

function tangentsOf(rounds: readonly RoundLimit[], x: readonly number[], which: readonly number[]) {
  return which.flatMap((round): Tangent[] => {
    const [h, v] = remainderAt(rounds[round]!, x);
    const length = Math.hypot(h, v);
    return length > 0 ? [{ round, direction: [h / length, v / length] }] : [];
  });
}

const remainderAt = ({ rows, from }: RoundLimit, x: readonly number[]): readonly [number, number] => [
  from[0] + dot(rows[0], x),
  from[1] + dot(rows[1], x),
];

const isNear = (a: Tangent, b: Tangent): boolean =>
  a.round === b.round &&
  Math.hypot(a.direction[0] - b.direction[0], a.direction[1] - b.direction[1]) < sameTangent;

/** The multiplier of each round limit that holds, of all its tangents together. */
function holdingOf(tangents: readonly Tangent[], multipliers: readonly number[]): Map<number, number> {
  const holding = new Map<number, number>();
  tangents.forEach(({ round }, k) => {
    const multiplier = multipliers[k] ?? 0;
    if (multiplier > 0) holding.set(round, (holding.get(round) ?? 0) + multiplier);
  });
  return holding;
}

function curvatureOf(
  rounds: readonly RoundLimit[],
  holding: ReadonlyMap<number, number>,
  point: readonly number[],
  size: number,
): LeastSquares {
  const rows = [...holding].flatMap(([k, multiplier]) => {
    const round = rounds[k]!;
    const [h, v] = remainderAt(round, point);
    const length = Math.hypot(h, v);
    if (length === 0) return [];
    const factor = Math.sqrt(multiplier / length) / length;
    return [Array.from({ length: size }, (_, c) => factor * (h * round.rows[1][c]! - v * round.rows[0][c]!))];
  });
  return { rows, targets: rows.map((row) => dot(row, point)) };
}

function conflictOf(
  conflict: readonly number[],
  limitCount: number,
  tangents: readonly Tangent[],
): RoundOptimum {
  return {
    feasible: false,
    limits: conflict.filter((k) => k < limitCount),
    tangents: conflict.flatMap((k) => tangents[k - limitCount] ?? []),
  };
}
