import { LuDecomposition, Matrix } from "ml-matrix";
import { ComputeError } from "../compute-error.ts";
import { remaindersOf, unknownsOf, type MinimaxProblem } from "./minimax-problem.ts";

/** Share of the size by which distances are rounded off at the end of the path. */
export const smoothingAtEnd = 1e-10;
const shrink = 0.1;
const newtonStepsMost = 100;

/** Points to come near to, as in a minimax problem: here it is the sum of weight × distance that is to be least. */
export type SumProblem = MinimaxProblem;

/**
 * Approaches the x of least Σ weight·distance from x = 0: by Newton's method on Σ weight·√(distance² + ε²), which is
 * smooth and convex, for ε falling from the size of the offsets (1) to 1e-10. At the end the sum is within
 * 1e-10·Σ weight of the least. O(points) a step, some fifty steps.
 * @throws ComputeError rank_deficient
 */
export function followSmoothedSums(problem: SumProblem): number[] {
  let x = new Array<number>(unknownsOf(problem)).fill(0);
  for (let smoothing = 1; smoothing >= smoothingAtEnd * 0.99; smoothing *= shrink) {
    x = minimiseSum(problem, x, smoothing);
  }
  return x;
}

/**
 * x of least Σ weight·√(distance² + smoothing²), by Newton's method from a point near it. Without smoothing no point
 * may be passed through.
 * @throws ComputeError rank_deficient — the sum is flat: every x of a whole range is as good
 */
export function minimiseSum(problem: SumProblem, start: readonly number[], smoothing: number): number[] {
  let x = [...start];
  for (let round = 0; round < newtonStepsMost; round += 1) {
    const { value, gradient, hessian } = expandSum(problem, x, smoothing);
    const lu = new LuDecomposition(hessian);
    if (lu.isSingular()) break;
    const step = lu.solve(Matrix.columnVector(gradient)).getColumn(0);
    const fall = step.reduce((sum, part, a) => sum + part * gradient[a]!, 0);
    if (!Number.isFinite(fall)) break;
    // Below this the sum shows no fall any more, but the whole step is right to its square.
    const settled = fall <= 1e-13 * value;
    let share = 1;
    const trial = () => x.map((old, a) => old - share * step[a]!);
    while (!settled && share > 1e-9 && sumAt(problem, trial(), smoothing) > value - 0.1 * share * fall)
      share /= 2;
    x = trial();
    if (settled) return refine(problem, x, smoothing);
    if (share <= 1e-9) return x;
  }
  throw severalAxes();
}

/** What is refused where the sum is flat. */
export function severalAxes(): ComputeError {
  return new ComputeError(
    "rank_deficient",
    "Several axes have the same least sum of radial distances, and nothing tells them apart.",
    { at: ["axis", "through"] },
  );
}

/** Whole Newton steps while they still make the gradient shorter. */
function refine(problem: SumProblem, start: number[], smoothing: number): number[] {
  let x = start;
  let length = Infinity;
  for (let round = 0; round < 4; round += 1) {
    const { gradient, hessian } = expandSum(problem, x, smoothing);
    const now = Math.hypot(...gradient);
    const lu = new LuDecomposition(hessian);
    if (!(now < length / 2) || lu.isSingular()) break;
    length = now;
    const step = lu.solve(Matrix.columnVector(gradient)).getColumn(0);
    x = x.map((old, a) => old - step[a]!);
  }
  return x;
}

function sumAt(problem: SumProblem, x: readonly number[], smoothing: number): number {
  const remainders = remaindersOf(problem, x);
  return problem.weights.reduce((sum, weight, j) => sum + weight * distanceAt(remainders, j, smoothing), 0);
}

function distanceAt(remainders: readonly Float64Array[], j: number, smoothing: number): number {
  let square = smoothing * smoothing;
  for (const plane of remainders) square += plane[j]! * plane[j]!;
  return Math.sqrt(square);
}

/** Σ weight·√(distance² + smoothing²) at x, with its gradient and second derivatives. */
export function expandSum(problem: SumProblem, x: readonly number[], smoothing: number) {
  const { design, weights } = problem;
  const size = x.length;
  const remainders = remaindersOf(problem, x);
  const gradient = new Array<number>(size).fill(0);
  const hessian = Matrix.zeros(size, size);
  let value = 0;
  for (let j = 0; j < weights.length; j += 1) {
    const distance = distanceAt(remainders, j, smoothing);
    value += weights[j]! * distance;
    const pull = weights[j]! / distance;
    for (let a = 0; a < size; a += 1) {
      const plane = Math.floor(a / design.length);
      const along = remainders[plane]![j]! / distance;
      const own = design[a % design.length]![j]!;
      gradient[a]! -= weights[j]! * along * own;
      for (let b = 0; b < size; b += 1) {
        const other = Math.floor(b / design.length);
        const across = (other === plane ? 1 : 0) - (along * remainders[other]![j]!) / distance;
        hessian.set(a, b, hessian.get(a, b) + pull * across * own * design[b % design.length]![j]!);
      }
    }
  }
  return { value, gradient, hessian };
}
