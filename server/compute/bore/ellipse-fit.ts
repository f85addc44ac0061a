import { ComputeError } from "../compute-error.ts";
import { fitAlgebraicCircle } from "./algebraic-circle.ts";
import { factorCholesky, invertCholesky, solveCholesky } from "./cholesky.ts";
import {
  ellipseParameters,
  ellipseWorkFor,
  evaluateEllipse,
  shapeOf,
  type EllipseParameters,
  type EllipseWork,
} from "./ellipse-model.ts";
import type { LocalFrame } from "./local-frame.ts";

const size = ellipseParameters;
const iterationsMax = 100;
/** Ellipses rounder than this have one optimum: it need not be sought from a second start. */
const round = 0.8;
const dampingFirst = 1e-3;
const dampingMax = 1e12;
const rankTolerance = 1e-13;
/** Steps this long, relative to the points' extent, are left to Gauss and Newton; shorter ones see the bending too. */
const shortStep = 0.05;
/** Step of the differences that give the second derivative: it drives the iteration and is in no answer. */
const differenceStep = 1e-5;
const settledChange = 1e-13;
const settledStep = 1e-6;
const roundingShare = 1e-13;
const residualRounding = 4 * Number.EPSILON;
/** An ellipse flatter, or larger beside the points, is none that the points show. */
const flattest = 1e-4;
const largest = 1e4;

/** The ellipse at its best, in the frame of its readings. */
export interface EllipseFit {
  readonly theta: EllipseParameters;
  /** Σ w·d². */
  readonly objective: number;
  readonly weightSum: number;
  /** (JᵀWJ)⁻¹, full. */
  readonly cofactors: Float64Array;
  readonly iterations: number;
}

/**
 * Geometric ellipse: minimises Σ w·d², d the orthogonal distances (W. Gander, G. H. Golub, R. Strebel, BIT 34 (1994)
 * 558, there with a foot-point angle of every point as unknown; here the feet are found exactly and five parameters are
 * left). Levenberg and Marquardt from the algebraic circle and, unless what it finds is nearly round, from the ellipse of
 * the points' second moments; near the end by Newton's steps. The better end is the answer. `near` is a start
 * known to be close, where there is one. Linear in the number of points.
 * @throws ComputeError rank_deficient, not_converged
 */
export function fitEllipse(frame: LocalFrame, near: EllipseParameters | null, member: string): EllipseFit {
  const best = descendFrom(frame, near) ?? bestOf(frame);
  if (best === null) {
    throw new ComputeError("not_converged", "No ellipse that the readings show was found.", { at: [member] });
  }
  const work = ellipseWorkFor(frame.count);
  evaluateEllipse(frame, best.theta, work);
  const factor = new Float64Array(size * size);
  if (!factorCholesky(work.gauss, size, factor, rankTolerance)) {
    throw new ComputeError("rank_deficient", "The readings and their weights do not determine an ellipse.", {
      at: [member],
    });
  }
  const weightSum = frame.weight.reduce((sum, w) => sum + w, 0);
  return { ...best, weightSum, cofactors: invertCholesky(factor, size) };
}

type Descent = Pick<EllipseFit, "theta" | "objective" | "iterations">;

function bestOf(frame: LocalFrame): Descent | null {
  const first = descendFrom(frame, circleStart(frame));
  if (first !== null) {
    const { major, minor } = shapeOf(first.theta);
    if (minor >= round * major) return first;
  }
  const second = descendFrom(frame, momentStart(frame));
  return first === null || (second !== null && second.objective < first.objective) ? second : first;
}

function descendFrom(frame: LocalFrame, start: EllipseParameters | null): Descent | null {
  return start === null ? null : descendEllipse(frame, start);
}

/** Null where the iteration leaves what can be called an ellipse of the points, or does not settle. */
function descendEllipse(frame: LocalFrame, start: EllipseParameters): Descent | null {
  const work = ellipseWorkFor(frame.count);
  const spare = ellipseWorkFor(frame.count);
  const matrix = new Float64Array(size * size);
  const factor = new Float64Array(size * size);
  const step = new Float64Array(size);
  const weightSum = frame.weight.reduce((sum, w) => sum + w, 0);
  let theta = start;
  let objective = evaluateEllipse(frame, theta, work);
  let damping = 0;
  let lastLength = Infinity;
  let newton = false;
  for (let iterations = 1; iterations <= iterationsMax && damping <= dampingMax; iterations++) {
    matrix.set(work.gauss);
    let solvable = newton && damping === 0 && secondDerivative(frame, theta, spare, matrix);
    if (solvable) solvable = factorCholesky(matrix, size, factor, rankTolerance);
    if (!solvable) {
      matrix.set(work.gauss);
      for (let k = 0; k < size; k++) matrix[k * size + k]! *= 1 + damping;
      if (!factorCholesky(matrix, size, factor, rankTolerance)) {
        damping = Math.max(dampingFirst, damping * 4);
        continue;
      }
    }
    solveCholesky(factor, size, work.gradient, step);
    const next = theta.map((value, k) => value + step[k]!);
    const length = Math.hypot(...step);
    const gain = step.reduce((sum, value, k) => sum + value * work.gradient[k]!, 0);
    const rounding = roundingShare * objective + 2 * residualRounding * Math.sqrt(objective * weightSum);
    const settled = damping === 0 && gain <= Math.max(settledChange ** 2 * weightSum, rounding);
    const nextObjective = isEllipse(next) ? evaluateEllipse(frame, next, spare) : Infinity;
    if (nextObjective <= objective + rounding) {
      const shrinks = length <= lastLength / 2 && length > Number.EPSILON;
      theta = next;
      if (settled && !shrinks && length <= settledStep)
        return { theta, objective: nextObjective, iterations };
      lastLength = length;
      damping = gain <= rounding || objective - nextObjective > gain / 2 ? damping / 8 : damping;
      if (damping < dampingFirst) damping = 0;
      objective = evaluateEllipse(frame, theta, work);
      newton = length <= shortStep;
    } else if (settled && length <= settledStep) {
      // Only rounding is left to win: the place reached is the answer.
      return { theta, objective, iterations };
    } else {
      damping = Math.max(dampingFirst, damping * 4);
    }
  }
  return null;
}

/** JᵀWJ + Σ w·d·∇²d by central differences of the gradient, symmetrised; whether it is usable is for the factor to say. */
function secondDerivative(
  frame: LocalFrame,
  theta: EllipseParameters,
  work: EllipseWork,
  into: Float64Array,
): boolean {
  const raw = new Float64Array(size * size);
  for (let k = 0; k < size; k++) {
    for (const sign of [1, -1]) {
      const moved = theta.slice();
      moved[k]! += sign * differenceStep;
      if (!isEllipse(moved)) return false;
      evaluateEllipse(frame, moved, work);
      for (let j = 0; j < size; j++) raw[j * size + k]! -= (sign * work.gradient[j]!) / (2 * differenceStep);
    }
  }
  for (let j = 0; j < size; j++)
    for (let k = 0; k < size; k++) into[j * size + k] = (raw[j * size + k]! + raw[k * size + j]!) / 2;
  return true;
}

function isEllipse(theta: EllipseParameters): boolean {
  const { major, minor } = shapeOf(theta);
  return minor > flattest * major && major < largest;
}

function circleStart(frame: LocalFrame): EllipseParameters | null {
  const { a, b } = fitAlgebraicCircle(frame);
  let sum = 0;
  for (let i = 0; i < frame.count; i++) sum += Math.hypot(frame.x[i]! - a, frame.y[i]! - b);
  const radius = sum / frame.count;
  const theta = Float64Array.of(a, b, radius, 0, radius);
  return Number.isFinite(radius) && isEllipse(theta) ? theta : null;
}

/** S = √(2·second moments): exact for points evenly round an ellipse. The frame's origin is the centroid. */
function momentStart({ count, x, y }: LocalFrame): EllipseParameters | null {
  let [xx, xy, yy] = [0, 0, 0];
  for (let i = 0; i < count; i++) {
    xx += (2 * x[i]! * x[i]!) / count;
    xy += (2 * x[i]! * y[i]!) / count;
    yy += (2 * y[i]! * y[i]!) / count;
  }
  // √M of a symmetric 2 × 2 matrix is (M + √det·I) ÷ √(trace + 2·√det).
  const root = Math.sqrt(Math.max(0, xx * yy - xy * xy));
  const divisor = Math.sqrt(xx + yy + 2 * root);
  const theta = Float64Array.of(0, 0, (xx + root) / divisor, xy / divisor, (yy + root) / divisor);
  return isEllipse(theta) ? theta : null;
}
