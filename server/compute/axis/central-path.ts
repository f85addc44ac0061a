import { LuDecomposition, Matrix } from "ml-matrix";
import { ComputeError } from "../compute-error.ts";
import { remaindersOf, squaresOf, unknownsOf, type MinimaxProblem } from "./minimax-problem.ts";

/** Near the optimum of a minimax problem. */
export interface Centre {
  readonly x: number[];
  /** Share of each point in holding the optimum up; they sum to 1. */
  readonly shares: Float64Array;
}

/**
 * Share of the size by which the end of the path may miss the optimum: where Newton's method on the contacts takes
 * over. Much nearer, second derivatives lose what the contacts leave open.
 */
const gapAtEnd = 1e-8;
/** A path that ends this early for rounding still tells the contacts. */
const gapEnough = 1e-3;
const shrink = 0.1;
const centringsMost = 200;

/**
 * Follows the central path of min t, weight·distance ≤ t at every point: the minimisers of
 * t/ε − Σ log(t² − (weight·distance)²) as ε falls (Boyd and Vandenberghe, Convex Optimization (2004), section 11.3, for
 * second-order cones 11.6). At the minimiser for ε the optimum lies within 2·points·ε of t, and the shares
 * 1/(t² − (weight·distance)²), made to sum to 1, are nearly the multipliers. The starting point x = 0 should be a good
 * one already. O(points) a step, some hundred steps.
 * @throws ComputeError not_converged
 */
export function followCentralPath(problem: MinimaxProblem): Centre {
  const count = problem.weights.length;
  let t = 2 * Math.sqrt(Math.max(...squaresOf(problem, problem.offsets)));
  let [x, shares] = [new Array<number>(unknownsOf(problem)).fill(0), problem.weights.map(() => 1 / count)];
  for (let epsilon = t / count; ; epsilon *= shrink) {
    const { shifted, back } = aboutShares(problem, x, shares);
    const state = centre(shifted, { x: new Array<number>(x.length).fill(0), t }, epsilon);
    const gap = (2 * count * epsilon) / t;
    if (state === null && gap > gapEnough) {
      throw new ComputeError("not_converged", "The smallest zone could not be approached.");
    }
    if (state === null) return { x, shares };
    x = back(state.x);
    t = state.t;
    const inverse = squaresOf(shifted, remaindersOf(shifted, state.x)).map((square) => 1 / (t * t - square));
    const total = inverse.reduce((sum, value) => sum + value, 0);
    shares = inverse.map((value) => value / total);
    if (!(gap > gapAtEnd)) return { x, shares };
  }
}

/**
 * The problem as seen from x, and of two design columns the second (the first is 1) taken from its mean over the
 * shares: when the contacts have it in common, what they hold and what they leave open are then different unknowns,
 * and neither is lost in the rounding of the other. `back` takes a change of x in these terms to x itself.
 */
function aboutShares(problem: MinimaxProblem, x: readonly number[], shares: Float64Array) {
  const [first, second] = problem.design;
  const offsets = remaindersOf(problem, x);
  if (!first || !second) {
    const back = (change: readonly number[]) => x.map((value, a) => value + change[a]!);
    return { shifted: { ...problem, offsets }, back };
  }
  const mean = shares.reduce((sum, share, j) => sum + share * second[j]!, 0);
  const back = (change: readonly number[]) =>
    x.map((value, a) => value + change[a]! - (a % 2 === 0 ? change[a + 1]! * mean : 0));
  return { shifted: { ...problem, offsets, design: [first, second.map((value) => value - mean)] }, back };
}

interface State {
  readonly x: number[];
  readonly t: number;
}

/** Newton's method for one ε, each step shortened until the function falls enough; null when rounding stops it. */
function centre(problem: MinimaxProblem, start: State, epsilon: number): State | null {
  let state = start;
  for (let round = 0; round < centringsMost; round += 1) {
    const { gradient, hessian } = expand(problem, state, epsilon);
    const lu = new LuDecomposition(hessian);
    if (lu.isSingular()) break;
    const step = lu.solve(gradient).getColumn(0);
    const decrement = step.reduce((sum, value, i) => sum + value * gradient.get(i, 0), 0);
    if (!(decrement > 1e-6)) return state;
    const next = descend(problem, state, step, epsilon, decrement);
    if (next === null) return state;
    state = next;
  }
  return null;
}

/** state − share·step, the share halved until it lies inside all cones and low enough; null when none does. */
function descend(
  problem: MinimaxProblem,
  { x, t }: State,
  step: readonly number[],
  epsilon: number,
  decrement: number,
): State | null {
  // Each t² − (weight·distance)² is a parabola in the share: its value, slope and curvature once, then every try is cheap.
  const here = remaindersOf(problem, x);
  const change = remaindersOf(
    { ...problem, offsets: here.map((plane) => new Float64Array(plane.length)) },
    step,
  );
  const dt = step[x.length]!;
  const { weights } = problem;
  const [value, slope, curvature] = [0, 1, 2].map(() => new Float64Array(weights.length)) as [
    Float64Array,
    Float64Array,
    Float64Array,
  ];
  for (let j = 0; j < weights.length; j += 1) {
    let [square, mixed, far] = [0, 0, 0];
    for (const [plane, left] of here.entries()) {
      const moved = -change[plane]![j]!;
      square += left[j]! * left[j]!;
      mixed += left[j]! * moved;
      far += moved * moved;
    }
    const weight = weights[j]! * weights[j]!;
    value[j] = t * t - weight * square;
    slope[j] = -2 * (t * dt + weight * mixed);
    curvature[j] = dt * dt - weight * far;
  }
  for (let share = 1; share > 1e-12; share *= 0.6) {
    if (t - share * dt <= 0) continue;
    let fall = (share * dt) / epsilon;
    for (let j = 0; j < weights.length; j += 1) {
      fall += Math.log1p((share * (slope[j]! + share * curvature[j]!)) / value[j]!);
    }
    if (fall >= 0.1 * share * decrement) {
      return { x: x.map((coordinate, i) => coordinate - share * step[i]!), t: t - share * dt };
    }
  }
  return null;
}

/** Gradient and second derivatives at the state, unknowns x and then t. */
function expand(problem: MinimaxProblem, { x, t }: State, epsilon: number) {
  const { design, weights } = problem;
  const size = x.length;
  const remainders = remaindersOf(problem, x);
  const gradient = new Float64Array(size + 1);
  const hessian = Array.from({ length: size + 1 }, () => new Float64Array(size + 1));
  const rise = new Float64Array(size + 1);
  gradient[size] = 1 / epsilon;
  for (let j = 0; j < weights.length; j += 1) {
    const weight = weights[j]! * weights[j]!;
    let inside = t * t;
    for (const plane of remainders) inside -= weight * plane[j]! * plane[j]!;
    for (let a = 0; a < size; a += 1) {
      const plane = Math.floor(a / design.length);
      rise[a] = 2 * weight * remainders[plane]![j]! * design[a % design.length]![j]!;
    }
    rise[size] = 2 * t;
    for (let a = 0; a <= size; a += 1) {
      gradient[a]! -= rise[a]! / inside;
      for (let b = 0; b <= a; b += 1) hessian[a]![b]! += (rise[a]! / inside) * (rise[b]! / inside);
    }
    for (let a = 0; a < size; a += 1) {
      const from = a - (a % design.length);
      const scaled = (2 * weight * design[a % design.length]![j]!) / inside;
      for (let b = from; b <= a; b += 1) hessian[a]![b]! += scaled * design[b % design.length]![j]!;
    }
    hessian[size]![size]! -= 2 / inside;
  }
  return {
    gradient: Matrix.columnVector(gradient),
    hessian: new Matrix(
      hessian.map((row, a) => [...row].map((entry, b) => (b <= a ? entry : hessian[b]![a]!))),
    ),
  };
}
