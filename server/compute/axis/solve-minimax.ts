import { LuDecomposition, Matrix } from "ml-matrix";
import { ComputeError } from "../compute-error.ts";
import { followCentralPath, type Centre } from "./central-path.ts";
import { contactEquations } from "./contact-equations.ts";
import { settleContacts, type Caution } from "./minimax-contacts.ts";
import { problemAt, remaindersOf, squaresOf, unknownsOf, type MinimaxProblem } from "./minimax-problem.ts";

export interface MinimaxOptimum {
  readonly kind: "optimum";
  readonly x: readonly number[];
  /** The largest weight × distance. */
  readonly largest: number;
  /** The points at that distance that hold it there. */
  readonly places: readonly number[];
  /** One for each of them and each plane: Σ multiplier × design = 0 and Σ |multiplier|/weight = 1. */
  readonly multipliers: readonly (readonly number[])[];
  /** sensitivities[c][b][a]: of unknown a to the offset of contact c in plane b, the contacts held. */
  readonly sensitivities: readonly (readonly (readonly number[])[])[];
}

export type MinimaxAnswer =
  | MinimaxOptimum
  /** All points can be met, as far as their numbers tell. */
  | { readonly kind: "straight" }
  /** The contacts leave x open: they share one row of the design, that of `place`. */
  | { readonly kind: "open"; readonly place: number }
  /** The contacts did not come to rest. */
  | { readonly kind: "unsettled" };

/**
 * x that makes the largest weight × distance least: exactly, by its contacts. The central path leads near the optimum;
 * there the contacts are settled by Newton's method. With the contacts held fixed, x is a differentiable function of
 * their offsets: its sensitivities come from the same equations.
 *
 * `negligible` is the radius below which the points count as met.
 * @throws ComputeError not_converged
 */
export function solveMinimax(
  problem: MinimaxProblem,
  negligible: number,
  caution: Caution = cautions[0]!,
): MinimaxAnswer {
  const start = startOf(problem);
  const offsets = remaindersOf(problem, start);
  const size = Math.sqrt(Math.max(...squaresOf(problem, offsets)));
  if (!(size > negligible)) return { kind: "straight" };
  const scaled = { ...problem, offsets: offsets.map((plane) => plane.map((offset) => offset / size)) };
  const contacts = settleContacts(scaled, approach(scaled), caution);
  if (contacts === null) return { kind: "unsettled" };
  if ("openAt" in contacts) return { kind: "open", place: contacts.openAt };
  const { x, places, strengths } = contacts;
  const remainders = remaindersOf(scaled, x);
  const radius = Math.sqrt(Math.max(...squaresOf(scaled, remainders)));
  const least = Math.min(...problem.weights);
  const inverse = inverseOf(contactEquations(scaled, contacts));
  const unknowns = unknownsOf(problem);
  const sensitivity = (c: number, plane: number) => {
    const j = places[c]!;
    const caused = new Array<number>(unknowns + 1 + places.length).fill(0);
    for (const [i, column] of problem.design.entries()) {
      caused[plane * problem.design.length + i] = strengths[c]! * problem.weights[j]! * column[j]!;
    }
    caused[unknowns + 1 + c] = 2 * problem.weights[j]! * remainders[plane]![j]!;
    return inverse.mmul(Matrix.columnVector(caused)).getColumn(0).slice(0, unknowns);
  };
  return {
    kind: "optimum",
    x: x.map((value, a) => start[a]! + size * value),
    largest: radius * size,
    places,
    multipliers: places.map((j, c) =>
      remainders.map((plane) => (strengths[c]! * least * problem.weights[j]! * plane[j]!) / radius),
    ),
    sensitivities: places.map((_, c) => problem.offsets.map((__, plane) => sensitivity(c, plane))),
  };
}

/** Ways to tell contacts apart that are tried in turn; the first serves but where stations nearly touch, or nearly align. */
export const cautions: readonly Caution[] = [
  { strengthMin: 1e-4, dependentWithin: 1e-4 },
  { strengthMin: 1e-6, dependentWithin: 1e-6 },
  { strengthMin: 1e-4, dependentWithin: 1e-2 },
  { strengthMin: 1e-6, dependentWithin: 1e-3 },
  { strengthMin: 1e-8, dependentWithin: 1e-8 },
];

/** Points that the path is followed with at first, and that join at a time. */
const pathPoints = 40;
/** How far, as a share of the squared radius, a point must stand out to join: the settling of contacts sees to less. */
const standsOutBy = 1e-6;

/** The end of the central path of the points that matter: those farthest out, and those that then stand out. */
function approach(problem: MinimaxProblem): Centre {
  const count = problem.weights.length;
  const outermost = (squares: Float64Array) =>
    [...squares.keys()].sort((a, b) => squares[b]! - squares[a]!).slice(0, pathPoints);
  const chosen = new Set(outermost(squaresOf(problem, problem.offsets)));
  for (;;) {
    const places = [...chosen];
    const { x, shares } = followCentralPath(problemAt(problem, places));
    const squares = squaresOf(problem, remaindersOf(problem, x));
    const radius2 = Math.max(...places.map((j) => squares[j]!));
    const outside = outermost(squares).filter((j) => squares[j]! > radius2 * (1 + standsOutBy));
    if (outside.length === 0) {
      const all = new Float64Array(count);
      for (const [c, j] of places.entries()) all[j] = shares[c]!;
      return { x, shares: all };
    }
    for (const j of outside) chosen.add(j);
  }
}

/**
 * Least squares weighted by weight²: never worse than √points times the optimum. Offsets of a line (two design columns)
 * come as such already.
 */
function startOf({ design, offsets, weights }: MinimaxProblem): number[] {
  const [column] = design;
  if (!column || design.length > 1) return design.flatMap(() => offsets.map(() => 0));
  const sum = (values: Float64Array) =>
    weights.reduce((total, weight, j) => total + weight * weight * column[j]! * values[j]!, 0);
  return offsets.map((offset) => sum(offset) / sum(column));
}

function inverseOf(matrix: Matrix): Matrix {
  const lu = new LuDecomposition(matrix);
  if (lu.isSingular()) {
    throw new ComputeError("not_converged", "The reference stations hold the zone too weakly to settle it.");
  }
  return lu.solve(Matrix.eye(matrix.rows));
}
