import { along, dot, lengthOf, type LeastSquares } from "./least-squares-in-order.ts";
import { remainderOf, solveMinimaxProgram, weightedTerms, type MinimaxTerm } from "./minimax-program.ts";
import type { MoveAim } from "./move-problem.ts";
import { solveQuadraticProgram, type Limit } from "./quadratic-program.ts";
import { costOf, pullOf, type Pull } from "./station-pull.ts";

/** What a component's move makes least, and what the search for shims knows of it. */
export interface MoveObjective {
  /** Σ(|d|/T)², or the largest |d|/T. */
  valueOf(amounts: readonly number[]): number;
  /** A quadratic that is never above `ceilingOf(valueOf(amounts))`. */
  readonly bound: Pull;
  ceilingOf(value: number): number;
  /** The other way: the value whose ceiling this is. */
  valueAt(ceiling: number): number;
  /** The best of the moves `from` + any amounts of `open`, within the limits; null when none is within. */
  bestAlong(
    from: readonly number[],
    open: readonly (readonly number[])[],
    limits: readonly Limit[],
  ): readonly number[] | null;
}

/** Share of the mean of all terms in the bound of the largest, beside the terms that hold it up: it bounds every direction. */
const meanShare = 0.1;

/**
 * The objective of `aim`. For the largest term, Σ wᵢ·‖rᵢ‖² with Σ wᵢ = 1 is at most its square: with the weights λ that
 * prove the best move (minimax-program.ts) it comes near, and a share of the mean lets it grow in every direction.
 */
export function objectiveOf(
  aim: MoveAim,
  size: number,
  terms: readonly MinimaxTerm[],
  leastMovement: LeastSquares,
  weights: readonly number[],
): MoveObjective {
  const pull = pullOf(terms, size);
  if (aim === "least_squares") {
    return {
      valueOf: (amounts) => costOf(pull, amounts),
      bound: pull,
      ceilingOf: (value) => value,
      valueAt: (ceiling) => ceiling,
      bestAlong: (from, open, limits) => {
        const parts = [pull, leastMovement].map((problem) => partAlong(problem, from, open));
        const best = solveQuadraticProgram(open.length, parts, limitsAlong(limits, from, open));
        return best.feasible ? along(from, open, best.point) : null;
      },
    };
  }
  const known = weights.some((weight) => weight > 0);
  const mixed = terms.map(
    (_, k) => (known ? (1 - meanShare) * (weights[k] ?? 0) : 0) + (known ? meanShare : 1) / terms.length,
  );
  return {
    valueOf: (amounts) => largestOf(terms, amounts),
    bound: pullOf([weightedTerms(terms, mixed)], size),
    ceilingOf: (value) => value * value,
    valueAt: Math.sqrt,
    bestAlong: (from, open, limits) => {
      const parts = [pull, leastMovement].map((problem) => partAlong(problem, from, open));
      const seen = terms.map((term) => partAlong(term, from, open));
      const best = solveMinimaxProgram(open.length, seen, parts, limitsAlong(limits, from, open));
      return best.feasible ? along(from, open, best.point) : null;
    },
  };
}

/** The largest ‖rows·x − targets‖; 0 without terms. */
export function largestOf(terms: readonly MinimaxTerm[], x: readonly number[]): number {
  return terms.reduce((most, term) => Math.max(most, lengthOf(remainderOf(term, x))), 0);
}

/** A problem in the amounts of `open` from a point. */
function partAlong(
  { rows, targets }: LeastSquares,
  from: readonly number[],
  open: readonly (readonly number[])[],
): LeastSquares {
  return {
    rows: rows.map((row) => open.map((direction) => dot(row, direction))),
    targets: rows.map((row, k) => (targets[k] ?? 0) - dot(row, from)),
  };
}

/** Limits in the amounts of `open`; what those do not reach keeps the room that rounding leaves it. */
function limitsAlong(
  limits: readonly Limit[],
  from: readonly number[],
  open: readonly (readonly number[])[],
): Limit[] {
  return limits.flatMap(({ row, most }) => {
    const within = open.map((direction) => dot(row, direction));
    return lengthOf(within) <= 1e-12 * lengthOf(row) ? [] : [{ row: within, most: most - dot(row, from) }];
  });
}
