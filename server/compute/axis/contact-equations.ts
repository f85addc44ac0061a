import { LuDecomposition, Matrix } from "ml-matrix";
import { remaindersOf, squaresOf, unknownsOf, type MinimaxProblem } from "./minimax-problem.ts";

const newtonStepsMost = 40;

/**
 * The points that hold a minimax optimum up, each with its strength: Σ strength·weight·remainder × design = 0 and
 * Σ strength·(least weight/weight) = 1. In these terms all equations keep their size, whatever the weights.
 */
export interface Contacts {
  readonly x: number[];
  readonly places: readonly number[];
  readonly strengths: readonly number[];
}

/** The conditions' columns: weight × remainder × design, and least weight ÷ weight for the sum of strengths. */
export function columnsOf(problem: MinimaxProblem, x: readonly number[], places: readonly number[]): Matrix {
  const { design, weights } = problem;
  const remainders = remaindersOf(problem, x);
  const least = Math.min(...weights);
  return new Matrix(
    places.map((j) => [
      ...remainders.flatMap((plane) => design.map((one) => weights[j]! * plane[j]! * one[j]!)),
      least / weights[j]!,
    ]),
  ).transpose();
}

/**
 * The equations of Karush, Kuhn and Tucker at x, for changes of x, of the squared radius × least weight, and of the
 * strengths: stationarity, the sum of strengths, and for each contact its square less the squared radius, ÷ weight.
 */
export function contactEquations(problem: MinimaxProblem, { x, places, strengths }: Contacts): Matrix {
  const { design, weights } = problem;
  const size = unknownsOf(problem);
  const equations = Matrix.zeros(size + 1 + places.length, size + 1 + places.length);
  const columns = columnsOf(problem, x, places);
  for (const [c, j] of places.entries()) {
    for (let a = 0; a < size; a += 1) {
      const from = a - (a % design.length);
      equations.set(a, size + 1 + c, -columns.get(a, c));
      equations.set(size + 1 + c, a, 2 * columns.get(a, c));
      for (let i = 0; i < design.length; i += 1) {
        const curve = strengths[c]! * weights[j]! * design[a % design.length]![j]! * design[i]![j]!;
        equations.set(a, from + i, equations.get(a, from + i) + curve);
      }
    }
    equations.set(size, size + 1 + c, columns.get(size, c));
    equations.set(size + 1 + c, size, columns.get(size, c));
  }
  return equations;
}

/**
 * Meets the equations by Newton's method, from contacts and an x near theirs; null when they are singular, or not met
 * from here.
 */
export function meetContacts(problem: MinimaxProblem, start: Contacts): Contacts | null {
  const size = unknownsOf(problem);
  let contacts = start;
  for (let round = 0; round < newtonStepsMost; round += 1) {
    const { x, places, strengths } = contacts;
    const equations = contactEquations(problem, contacts);
    const lu = new LuDecomposition(equations);
    if (lu.isSingular()) break;
    const squares = squaresOf(problem, remaindersOf(problem, x));
    const mean = places.reduce((sum, j) => sum + squares[j]! / places.length, 0);
    const sumOver = (row: number) =>
      strengths.reduce((sum, strength, c) => sum + strength * equations.get(row, size + 1 + c), 0);
    const missing = [
      ...x.map((_, a) => -sumOver(a)),
      1 - sumOver(size),
      ...places.map((j) => (squares[j]! - mean) / problem.weights[j]!),
    ];
    const step = lu.solve(Matrix.columnVector(missing)).getColumn(0);
    contacts = {
      x: x.map((value, a) => value + step[a]!),
      places,
      strengths: strengths.map((strength, c) => strength + step[size + 1 + c]!),
    };
    const moved = Math.hypot(...step.slice(0, size));
    if (!Number.isFinite(moved)) break;
    // The last step is as long as rounding: what is left is its square.
    if (moved <= 1e-9 * Math.max(Math.sqrt(mean), Math.hypot(...x))) return contacts;
  }
  return null;
}
