import { ComputeError } from "../compute-error.ts";
import { fitAlgebraicCircle } from "./algebraic-circle.ts";
import { factorCholesky, solveCholesky } from "./cholesky.ts";
import type { LocalFrame } from "./local-frame.ts";
import {
  evaluateSurface,
  unknownsOf,
  workspaceFor,
  type Evaluation,
  type SurfaceModel,
  type Workspace,
} from "./surface-model.ts";

const iterationsMax = 200;
/** A column that keeps less than this of its square beside the others is determined by rounding only. */
const rankTolerance = 1e-13;
/** Change of the residuals, as rms and relative to the points' extent, below which only rounding is left to win. */
const settledChange = 1e-13;
/** A last step longer than this, relative to the radius, settles nothing. */
const settledStep = 1e-6;
/** Rounding of the objective as a share of it, and of a residual relative to the points' extent. */
const roundingShare = 1e-13;
const residualRounding = 4 * Number.EPSILON;
/** Centre this far off, relative to the points' extent: no circle fits better than the straight line. */
const lineDistance = 1e8;
const dampingFirst = 1e-3;
const dampingMax = 1e12;

/** The surface at its best, in the frame of its readings. */
export interface SurfaceFit extends Evaluation {
  /** Centre at the frame's own z, then the taper's tangent or the two slopes. */
  readonly theta: Float64Array;
  /** As of the last evaluation, at theta. */
  readonly work: Workspace;
  readonly iterations: number;
}

/**
 * Orthogonal least squares: minimises Σ w(|p − c − z·s| − z·t − R)² by Newton's method with the full second
 * derivative, damped (Levenberg–Marquardt) where that is not positive definite or a step does not descend. The full
 * derivative is what converges quadratically on thin arcs with large residuals, where Gauss–Newton creeps or cycles.
 * Stops when a step changes the residuals, or the objective, by rounding only and no longer shrinks. Linear in the
 * number of points.
 * @throws ComputeError rank_deficient, arc_too_flat, not_converged
 */
export function fitSurface(frame: LocalFrame, model: SurfaceModel, member: string): SurfaceFit {
  const size = unknownsOf(model);
  const work = workspaceFor(frame.count, model);
  const factor = new Float64Array(size * size);
  const damped = new Float64Array(size * size);
  const step = new Float64Array(size);
  const trial = new Float64Array(size);
  const theta = startOf(frame, size);
  let now = evaluateSurface(frame, model, theta, work);
  let damping = 0;
  let lastLength = Infinity;
  for (let iterations = 1; iterations <= iterationsMax && damping <= dampingMax; iterations++) {
    if (!factorCholesky(work.gauss, size, factor, rankTolerance)) throw rankRefusal(model, member);
    for (let k = 0; k < damped.length; k++) damped[k] = work.hessian[k]!;
    for (let k = 0; k < size; k++) damped[k * size + k]! += damping * work.gauss[k * size + k]!;
    if (!factorCholesky(damped, size, factor, rankTolerance)) {
      damping = raised(damping);
      continue;
    }
    solveCholesky(factor, size, work.gradient, step);
    let gain = 0;
    for (let k = 0; k < size; k++) {
      gain += step[k]! * work.gradient[k]!;
      trial[k] = theta[k]! + step[k]!;
    }
    const length = lengthOf(step, frame) / radiusOf(theta, now);
    const settled = damping === 0 && gain <= settledChange * settledChange * now.weightSum;
    const rounding = roundingOf(now);
    // On a thin arc the objective is so flat that its rounding alone makes steps; when they no longer shrink, all is won.
    const unseen = damping === 0 && gain <= rounding;
    const next = evaluateSurface(frame, model, trial, work);
    if (settled || next.objective <= now.objective + rounding) {
      theta.set(trial);
      const shrinks = length <= lastLength / 2 && length > Number.EPSILON;
      if (settled && !shrinks && length > settledStep) break;
      if ((settled || unseen) && !shrinks && length <= settledStep) {
        return { ...next, theta, work, iterations };
      }
      damping = gain <= rounding ? 0 : eased(damping, now.objective - next.objective, gain);
      lastLength = length;
      now = next;
      if (Math.hypot(theta[0]!, theta[1]!) > lineDistance) throw flatRefusal(member);
    } else {
      damping = raised(damping);
      now = evaluateSurface(frame, model, theta, work);
    }
  }
  throw new ComputeError("not_converged", `The fit did not settle in ${iterationsMax} iterations.`, {
    at: [member],
  });
}

/** Taubin's centre; taper and slopes start at none. Kept near enough for the iteration to see a curvature. */
function startOf(frame: LocalFrame, size: number): Float64Array {
  const theta = new Float64Array(size);
  const { a, b } = fitAlgebraicCircle(frame);
  const distance = Math.hypot(a, b);
  const nearer = distance > lineDistance / 10 ? lineDistance / 10 / distance : 1;
  if (!Number.isFinite(distance)) return theta;
  theta[0] = a * nearer;
  theta[1] = b * nearer;
  return theta;
}

/** What Σ w·r² cannot resolve: small residuals of large coordinates are themselves differences of rounded numbers. */
function roundingOf({ objective, weightSum }: Evaluation): number {
  return roundingShare * objective + 2 * residualRounding * Math.sqrt(objective * weightSum);
}

function radiusOf(theta: Float64Array, { meanExcess }: Evaluation): number {
  return Math.hypot(theta[0]!, theta[1]!) + meanExcess;
}

/** The longest part of a step as a movement of the surface: a tilt or taper counts at one frame length. */
function lengthOf(step: Float64Array, { z }: LocalFrame): number {
  let length = Math.hypot(step[0]!, step[1]!);
  if (z === null) return length;
  let reach = 0;
  for (let i = 0; i < z.length; i++) reach = Math.max(reach, Math.abs(z[i]!));
  for (let k = 2; k < step.length; k++) length = Math.max(length, Math.abs(step[k]!) * reach);
  return length;
}

function raised(damping: number): number {
  return Math.max(dampingFirst, damping * 4);
}

/** Less damping where the model foretold the gain well, more where it did not (Marquardt's rule). */
function eased(damping: number, gained: number, foretold: number): number {
  if (damping === 0) return 0;
  if (gained < foretold / 4) return damping * 2;
  return damping < dampingFirst ? 0 : damping / 8;
}

function rankRefusal({ free }: SurfaceModel, member: string): ComputeError {
  const what = {
    nothing: "the centre",
    taper: "the taper apart from the diameter",
    tilt: "the tilt of the bore",
  };
  return new ComputeError(
    "rank_deficient",
    `The readings and their weights do not determine ${what[free]}.`,
    {
      at: [member],
    },
  );
}

function flatRefusal(member: string): ComputeError {
  return new ComputeError("arc_too_flat", "A straight line fits the points as well as any circle does.", {
    at: [member],
  });
}
