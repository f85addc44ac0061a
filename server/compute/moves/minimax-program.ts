import { ComputeError } from "../compute-error.ts";
import { dot, lengthOf, type LeastSquares } from "./least-squares-in-order.ts";
import { solveQuadraticProgram, type Limit } from "./quadratic-program.ts";

/** What one station asks: ‖rows·x − targets‖ small. One row (h or v apart, a tilt) or two (a round tolerance). */
export type MinimaxTerm = LeastSquares;

export type MinimaxAnswer =
  | {
      readonly feasible: true;
      readonly point: readonly number[];
      /** The largest of the terms. */
      readonly largest: number;
      /** Share of each term in holding it up, 0 to 1; they sum to 1, or are all 0 where every term is 0. */
      readonly weights: readonly number[];
      /** Limits that hold it up as well: what 1 more of each would be worth, its row as sent. */
      readonly binding: readonly { readonly limit: number; readonly worth: number }[];
      /** Proved: no x has a largest term below this. */
      readonly floor: number;
    }
  | { readonly feasible: false; readonly conflict: readonly number[] };

const roundsMost = 60;
/** The largest term may exceed the proved floor by this share: rounding of programs solved exactly. */
const provedWithin = 1e-9;
/** Terms below this are met: tolerances, not millimetres. */
const metBelow = 1e-11;
/** Tangents to one term that lie nearer to each other than this (radians) do the same: the newer stands. */
const sameTangent = 0.02;
/** Terms that get a tangent in one round. */
const tangentsAtOnce = 6;

interface Tangent {
  readonly term: number;
  readonly direction: readonly number[];
}

/**
 * The x within all limits whose largest term is least; among those, `after` in order (together they determine x).
 *
 * In the unknowns x and ρ it is min ρ² with ‖rᵢ(x)‖ ≤ ρ: linear for terms of one row, round cones for two. Tangents
 * u·rᵢ(x) ≤ ρ stand for the cones, each round made at the point of the round before, and beside ρ² stands the curvature of
 * the cones that hold, Σ μᵢ/‖rᵢ‖·‖(I − uuᵀ)·Aᵢ·step‖², so that the rounds converge as Newton's method does (sequential
 * quadratic programming; J. Nocedal and S. Wright, Numerical Optimization, 2nd ed. 2006, chapter 18, from memory). Every
 * round is a quadratic program solved exactly. Its end is proved by duality in another way: with the multipliers as
 * weights λ, Σ λᵢ = 1, no x has a largest term below √(min Σ λᵢ·‖rᵢ‖²), which the last least squares problem gives.
 * @throws ComputeError not_converged
 */
export function solveMinimaxProgram(
  size: number,
  terms: readonly MinimaxTerm[],
  after: readonly LeastSquares[],
  limits: readonly Limit[],
): MinimaxAnswer {
  const start = solveQuadraticProgram(size, after, limits);
  if (!start.feasible) return start;
  const largestAt = (x: readonly number[]) =>
    Math.max(0, ...terms.map((term) => lengthOf(remainderOf(term, x))));
  let point = start.point;
  if (largestAt(point) <= metBelow)
    return { feasible: true, point, largest: 0, weights: terms.map(() => 0), binding: [], floor: 0 };

  const wide = limits.map(({ row, most }) => ({ row: [...row, 0], most }));
  const widened = after.map(({ rows, targets }) => ({ rows: rows.map((row) => [...row, 0]), targets }));
  const rho: LeastSquares = { rows: [[...point.map(() => 0), 1]], targets: [0] };
  let tangents: Tangent[] = [];
  let strengths = new Map<number, number>();
  for (let round = 0; round < roundsMost; round++) {
    tangents = withTangentsAt(terms, tangents, point, new Set(strengths.keys()));
    const cuts = tangents.map((tangent) => cutOf(terms, tangent));
    const curved = curvatureOf(terms, point, strengths);
    const first = { rows: [...rho.rows, ...curved.rows], targets: [...rho.targets, ...curved.targets] };
    const best = solveQuadraticProgram(size + 1, [first, ...widened], [...wide, ...cuts]);
    if (!best.feasible) break;
    const next = best.point.slice(0, size);
    strengths = strengthsOf(best.binding, wide.length, tangents, cuts);
    const binding = best.binding.flatMap(({ limit, multiplier }) =>
      limit < wide.length ? [{ limit, half: multiplier / lengthOf(wide[limit]?.row ?? []) }] : [],
    );
    const stepped = lengthOf(next.map((value, k) => value - (point[k] ?? 0)));
    point = next;
    const largest = largestAt(point);
    const rhoReached = best.point[size] ?? 0;
    const settled = largest - rhoReached <= 1e-12 * Math.max(largest, metBelow);
    if (!settled && !(stepped === 0)) continue;
    const total = [...strengths.values()].reduce((sum, value) => sum + value, 0);
    const weights = terms.map((_, k) => (strengths.get(k) ?? 0) / (total > 0 ? total : 1));
    const floor = floorOf(size, terms, weights, after, limits);
    if (largest - floor > provedWithin * (1 + largest)) continue;
    // Half the gradient of ρ² is ρ: a multiplier of it, halved, is worth 1/ρ of itself in ρ.
    const worths = binding.map(({ limit, half }) => ({ limit, worth: total > 0 ? half / total : 0 }));
    return { feasible: true, point, largest, weights, binding: worths, floor };
  }
  throw new ComputeError("not_converged", "The move of the least largest deviation could not be settled.");
}

/** rows·x − targets. */
export function remainderOf({ rows, targets }: MinimaxTerm, x: readonly number[]): number[] {
  return rows.map((row, i) => dot(row, x) - (targets[i] ?? 0));
}

/** Σ weightᵢ·‖rᵢ‖² as one least squares problem. */
export function weightedTerms(terms: readonly MinimaxTerm[], weights: readonly number[]): LeastSquares {
  const rows: number[][] = [];
  const targets: number[] = [];
  for (const [k, term] of terms.entries()) {
    const factor = Math.sqrt(weights[k] ?? 0);
    if (factor === 0) continue;
    for (const [i, row] of term.rows.entries()) {
      rows.push(row.map((value) => factor * value));
      targets.push(factor * (term.targets[i] ?? 0));
    }
  }
  return { rows, targets };
}

function floorOf(
  size: number,
  terms: readonly MinimaxTerm[],
  weights: readonly number[],
  after: readonly LeastSquares[],
  limits: readonly Limit[],
): number {
  const weighted = weightedTerms(terms, weights);
  const least = solveQuadraticProgram(size, [weighted, ...after], limits);
  return least.feasible ? lengthOf(remainderOf(weighted, least.point)) : 0;
}

/** Tangents at x to the terms that hold and to those that stand out most; older ones stay where they differ. */
function withTangentsAt(
  terms: readonly MinimaxTerm[],
  tangents: readonly Tangent[],
  x: readonly number[],
  holding: ReadonlySet<number>,
): Tangent[] {
  const reached = terms.map((term) => lengthOf(remainderOf(term, x)));
  const outermost = [...terms.keys()]
    .sort((a, b) => (reached[b] ?? 0) - (reached[a] ?? 0))
    .slice(0, tangentsAtOnce);
  const made = [...new Set([...outermost, ...holding])].flatMap((term): Tangent[] => {
    const remainder = remainderOf(terms[term] ?? { rows: [], targets: [] }, x);
    const length = lengthOf(remainder);
    return length > 0 ? [{ term, direction: remainder.map((value) => value / length) }] : [];
  });
  const kept = tangents.filter(
    (old) => !made.some(({ term, direction }) => term === old.term && angleIsSmall(direction, old.direction)),
  );
  return [...kept, ...made];
}

const angleIsSmall = (a: readonly number[], b: readonly number[]): boolean =>
  lengthOf(a.map((value, k) => value - (b[k] ?? 0))) < sameTangent;

/** u·(A·x − b) − ρ ≤ 0. */
function cutOf(terms: readonly MinimaxTerm[], { term, direction }: Tangent): Limit {
  const { rows, targets } = terms[term] ?? { rows: [], targets: [] };
  const columns = rows[0]?.length ?? 0;
  const row = Array.from({ length: columns }, (_, k) =>
    rows.reduce((sum, each, i) => sum + (direction[i] ?? 0) * (each[k] ?? 0), 0),
  );
  return { row: [...row, -1], most: dot(direction, targets) };
}

/** √(μᵢ/‖rᵢ‖)·(I − uuᵀ)·Aᵢ·(x − point), for the terms that held in the round before. */
function curvatureOf(
  terms: readonly MinimaxTerm[],
  point: readonly number[],
  strengths: ReadonlyMap<number, number>,
): LeastSquares {
  const rows: number[][] = [];
  for (const [k, strength] of strengths) {
    const term = terms[k];
    if (!term || term.rows.length < 2) continue;
    const remainder = remainderOf(term, point);
    const length = lengthOf(remainder);
    if (length === 0) continue;
    const factor = Math.sqrt(strength / length);
    for (const [i, row] of term.rows.entries()) {
      const along = row.map((_, c) =>
        term.rows.reduce((sum, each, l) => sum + ((remainder[l] ?? 0) / length) * (each[c] ?? 0), 0),
      );
      const part = (remainder[i] ?? 0) / length;
      rows.push([...row.map((value, c) => factor * (value - part * (along[c] ?? 0))), 0]);
    }
  }
  return { rows, targets: rows.map((row) => dot(row.slice(0, point.length), point)) };
}

/** Multipliers of the terms, halved as the program gives them, of rows as long as the cuts are. */
function strengthsOf(
  binding: readonly { readonly limit: number; readonly multiplier: number }[],
  before: number,
  tangents: readonly Tangent[],
  cuts: readonly Limit[],
): Map<number, number> {
  const strengths = new Map<number, number>();
  for (const { limit, multiplier } of binding) {
    const tangent = tangents[limit - before];
    const cut = cuts[limit - before];
    if (!tangent || !cut) continue;
    const half = multiplier / lengthOf(cut.row);
    strengths.set(tangent.term, (strengths.get(tangent.term) ?? 0) + half);
  }
  return strengths;
}
