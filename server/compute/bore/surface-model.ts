import { columns } from "./columns.ts";
import type { LocalFrame } from "./local-frame.ts";

/**
 * The surface whose section at z is a circle of radius R + z·tangent about c + z·slope.
 * `free` says what is fitted beside centre and size: nothing, the taper, or the two slopes of the centre line.
 */
export interface SurfaceModel {
  readonly tangent: number;
  readonly free: "nothing" | "taper" | "tilt";
}

/** Unknowns with the radius left out: it is the mean distance and is eliminated. */
export function unknownsOf({ free }: SurfaceModel): number {
  return { nothing: 2, taper: 3, tilt: 4 }[free];
}

/** Number of parameters of the model: its unknowns and the radius. */
export function parametersOf(model: SurfaceModel): number {
  return unknownsOf(model) + 1;
}

/** All that the iteration writes to, made once per fit. Columns have a number per point. */
export interface Workspace {
  /** Distance from the axis − distance of the frame's origin from it − what the taper adds; then the residual. */
  readonly residual: Float64Array;
  /** w·r ÷ distance: how much the bending of the distance counts. */
  readonly curvature: Float64Array;
  /** −∂r/∂θ of each unknown, less its weighted mean. */
  readonly slopes: readonly Float64Array[];
  /** The factors of ∇²r = n·nᵀ ÷ distance, n across the direction; a taper is linear and bends nothing. */
  readonly bends: readonly Float64Array[];
  /** The means subtracted from `slopes`. */
  readonly meanSlopes: Float64Array;
  /** ĴᵀWr, downhill. */
  readonly gradient: Float64Array;
  /** ĴᵀWĴ, the Gauss–Newton matrix. Lower triangles, row by row. */
  readonly gauss: Float64Array;
  /** The full second derivative: gauss + Σ w·r·∇²r. */
  readonly hessian: Float64Array;
}

/** A workspace for `count` points: of one number each, and of a few numbers a parameter. */
export function workspaceFor(count: number, model: SurfaceModel): Workspace {
  const unknowns = unknownsOf(model);
  const bending = model.free === "tilt" ? 4 : 2;
  const [residual, curvature, ...others] = columns(count, 2 + unknowns + bending) as [
    Float64Array,
    Float64Array,
  ];
  return {
    residual,
    curvature,
    slopes: others.slice(0, unknowns),
    bends: others.slice(unknowns),
    meanSlopes: new Float64Array(unknowns),
    gradient: new Float64Array(unknowns),
    gauss: new Float64Array(unknowns * unknowns),
    hessian: new Float64Array(unknowns * unknowns),
  };
}

export interface Evaluation {
  /** Σ w·r². */
  readonly objective: number;
  /** Distance of the frame's origin from the axis + this is the radius at the frame's z. */
  readonly meanExcess: number;
  readonly weightSum: number;
}

/**
 * Residuals r = |p − c − z·s| − z·t − R at θ = (c, then t or s), R at its best for that θ, with gradient and both
 * second derivatives of the reduced problem (variable projection): every column is freed of its weighted mean, so
 * that eliminating R costs no conditioning. Distances by |q| − |c| = (|p|² − 2p·c)/(|q| + |c|), which keeps its
 * digits however far off the centre of a thin arc lies. Plain loops over columns; linear in the number of points.
 */
export function evaluateSurface(
  frame: LocalFrame,
  model: SurfaceModel,
  theta: Float64Array,
  work: Workspace,
): Evaluation {
  const { weight } = frame;
  const { residual, slopes, bends, meanSlopes, gradient, gauss, hessian, curvature } = work;
  measureDistances(frame, model, theta, work);
  const weightSum = sumOf(weight);
  const meanExcess = centreColumn(residual, weight, weightSum);
  for (let i = 0; i < residual.length; i++) curvature[i]! *= weight[i]! * residual[i]!;
  for (let j = 0; j < slopes.length; j++) meanSlopes[j] = centreColumn(slopes[j]!, weight, weightSum);
  const size = slopes.length;
  for (let j = 0; j < size; j++) {
    gradient[j] = weightedProduct(weight, slopes[j]!, residual);
    for (let k = 0; k <= j; k++) {
      const product = weightedProduct(weight, slopes[j]!, slopes[k]!);
      const bent = j < bends.length ? weightedProduct(curvature, bends[j]!, bends[k]!) : 0;
      gauss[j * size + k] = product;
      hessian[j * size + k] = product + bent;
    }
  }
  return { objective: weightedProduct(weight, residual, residual), meanExcess, weightSum };
}

/** Fills excess, 1/distance and the raw columns of slopes and bends. */
function measureDistances(
  { count, x, y, z }: LocalFrame,
  { tangent, free }: SurfaceModel,
  theta: Float64Array,
  { residual, curvature, slopes, bends }: Workspace,
): void {
  const a = theta[0]!;
  const b = theta[1]!;
  const opening = free === "taper" ? theta[2]! : tangent;
  const leanX = free === "tilt" ? theta[2]! : 0;
  const leanY = free === "tilt" ? theta[3]! : 0;
  const originDistance = Math.sqrt(a * a + b * b);
  const [slopeX, slopeY] = slopes as [Float64Array, Float64Array];
  const [bendX, bendY] = bends as [Float64Array, Float64Array];
  for (let i = 0; i < count; i++) {
    const zi = z === null ? 0 : z[i]!;
    const px = x[i]! - leanX * zi;
    const py = y[i]! - leanY * zi;
    const qx = px - a;
    const qy = py - b;
    const distance = Math.sqrt(qx * qx + qy * qy);
    const both = distance + originDistance;
    // A point on the axis itself has no direction and pulls nowhere.
    const inverse = distance > 0 ? 1 / distance : 0;
    residual[i] = (both > 0 ? (px * (px - 2 * a) + py * (py - 2 * b)) / both : 0) - opening * zi;
    curvature[i] = inverse;
    slopeX[i] = qx * inverse;
    slopeY[i] = qy * inverse;
    bendX[i] = -qy * inverse;
    bendY[i] = qx * inverse;
  }
  if (z === null || free === "nothing") return;
  if (free === "taper") slopes[2]!.set(z);
  else for (const set of [slopes, bends]) for (const k of [0, 1]) multiply(set[k]!, z, set[k + 2]!);
}

function multiply(one: Float64Array, other: Float64Array, product: Float64Array): void {
  for (let i = 0; i < product.length; i++) product[i] = one[i]! * other[i]!;
}

function sumOf(column: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < column.length; i++) sum += column[i]!;
  return sum;
}

/** Subtracts the weighted mean in place and returns it. */
function centreColumn(column: Float64Array, weight: Float64Array, weightSum: number): number {
  let sum = 0;
  for (let i = 0; i < column.length; i++) sum += weight[i]! * column[i]!;
  const mean = sum / weightSum;
  for (let i = 0; i < column.length; i++) column[i]! -= mean;
  return mean;
}

function weightedProduct(weight: Float64Array, one: Float64Array, other: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < weight.length; i++) sum += weight[i]! * one[i]! * other[i]!;
  return sum;
}
