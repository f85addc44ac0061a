import { ComputeError } from "../compute-error.ts";
import {
  dot,
  lengthOf,
  minimiseInOrder,
  narrow,
  wholeSpace,
  type LeastSquares,
  type Minimisers,
} from "./least-squares-in-order.ts";
import { verifyOptimum } from "./verify-optimum.ts";

/** row·x ≤ most. */
export interface Limit {
  readonly row: readonly number[];
  readonly most: number;
}

export type Optimum =
  | {
      readonly feasible: true;
      readonly point: readonly number[];
      /** Limits that hold the first problem back, with their multipliers (rows of length 1), the costliest first. */
      readonly binding: readonly { readonly limit: number; readonly multiplier: number }[];
    }
  /** Limits that cannot all be met. */
  | { readonly feasible: false; readonly conflict: readonly number[] };

/** Shortest part of a limit's row outside the limits already met that still lets it be met as well. */
const dependentBelow = 1e-10;

/**
 * The x within all limits that minimises the first problem; among those the second; and so on. Exact: the optimum is
 * that of the problems in order with some limits met as equations, and the right limits are found by the incremental
 * method for problems of few unknowns (R. Seidel, Small-dimensional linear programming and convex hulls made easy,
 * Discrete & Computational Geometry 6 (1991) 423–434, from memory): a limit that the optimum of the others breaks is
 * met as an equation. Limits come in most broken first, so only a few ever do. Before answering, the conditions of
 * Karush, Kuhn and Tucker are verified by another algorithm.
 *
 * Problems must together determine x. `size`, the number of unknowns, is meant to be 8 at most: the work grows as its
 * factorial.
 * @throws ComputeError not_converged
 */
export function solveQuadraticProgram(
  size: number,
  problems: readonly LeastSquares[],
  limits: readonly Limit[],
): Optimum {
  const unit = limits.map(toUnitRow);
  const considered: number[] = [];
  let best: Found = { point: minimiseInOrder(size, problems).point };
  for (;;) {
    const broken = mostBroken(unit, best.point, considered);
    if (broken === null) break;
    considered.push(broken);
    const next = optimumWithin(size, problems, unit, considered, []);
    if ("conflict" in next) return { feasible: false, conflict: next.conflict };
    best = next;
  }
  const binding = verifyOptimum(size, problems, unit, best.point);
  if (binding === null)
    throw new ComputeError("not_converged", "The best move could not be proved to be the best.");
  return { feasible: true, point: best.point, binding };
}

/** How far `limit` is broken at `point`; 0 when it is met to rounding. */
export function excessOver({ row, most }: Limit, point: readonly number[]): number {
  const excess = dot(row, point) - most;
  return excess > 1e-11 * Math.max(1e-3, Math.abs(most), lengthOf(point)) ? excess : 0;
}

interface Found {
  readonly point: readonly number[];
}

/** Optimum with the limits of `tight` met as equations and those of `considered` as limits. */
function optimumWithin(
  size: number,
  problems: readonly LeastSquares[],
  limits: readonly Limit[],
  considered: readonly number[],
  tight: readonly number[],
): Found | { readonly conflict: readonly number[] } {
  const equations = tight.flatMap((j) => limits[j] ?? []);
  const met: Minimisers = narrow(wholeSpace(size), {
    rows: equations.map(({ row }) => row),
    targets: equations.map(({ most }) => most),
  });
  let best: Found = { point: problems.reduce(narrow, met).point };
  for (const [k, j] of considered.entries()) {
    const limit = limits[j];
    if (!limit || excessOver(limit, best.point) === 0) continue;
    const reach = lengthOf(met.free.map((direction) => dot(limit.row, direction)));
    if (reach <= dependentBelow) return { conflict: [j, ...tight] };
    const next = optimumWithin(size, problems, limits, considered.slice(0, k), [...tight, j]);
    if ("conflict" in next) return next;
    best = next;
  }
  return best;
}

function mostBroken(
  limits: readonly Limit[],
  point: readonly number[],
  except: readonly number[],
): number | null {
  let worst: { index: number; excess: number } | null = null;
  for (const [index, limit] of limits.entries()) {
    const excess = except.includes(index) ? 0 : excessOver(limit, point);
    if (excess > (worst?.excess ?? 0)) worst = { index, excess };
  }
  return worst?.index ?? null;
}

/** A limit on nothing (a row of zeros) keeps its row: it is met or not, whatever x is. */
function toUnitRow({ row, most }: Limit): Limit {
  const length = lengthOf(row);
  return length === 0 ? { row, most } : { row: row.map((value) => value / length), most: most / length };
}
