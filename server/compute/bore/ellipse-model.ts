import { footOnEllipse } from "./ellipse-foot.ts";
import type { LocalFrame } from "./local-frame.ts";

/**
 * Parameters of an ellipse: centre x, y and the entries xx, xy, yy of the symmetric S that takes the unit circle to it,
 * p = c + S·w. Unlike axes and angle they say the circle, S = R·I, as smoothly as any ellipse.
 */
export type EllipseParameters = Float64Array;
export const ellipseParameters = 5;

export interface EllipseShape {
  readonly major: number;
  readonly minor: number;
  /** Direction of the major axis, anticlockwise from x. */
  readonly axisRad: number;
}

/** Semi-axes and direction: eigenvalues and eigenvector of S. */
export function shapeOf(theta: EllipseParameters): EllipseShape {
  const [, , xx, xy, yy] = theta as unknown as [number, number, number, number, number];
  const mean = (xx + yy) / 2;
  const half = Math.hypot((xx - yy) / 2, xy);
  return { major: mean + half, minor: mean - half, axisRad: Math.atan2(2 * xy, xx - yy) / 2 };
}

/** What one evaluation leaves: distances, their slopes −∂d/∂θ, gradient and Gauss–Newton matrix. */
export interface EllipseWork {
  readonly distance: Float64Array;
  readonly gradient: Float64Array;
  readonly gauss: Float64Array;
}

/** Room for one evaluation of `count` points. */
export function ellipseWorkFor(count: number): EllipseWork {
  const size = ellipseParameters;
  return {
    distance: new Float64Array(count),
    gradient: new Float64Array(size),
    gauss: new Float64Array(size * size),
  };
}

/**
 * Signed orthogonal distances d and Σ w·d². With foot point c + S·w and outward normal n at it, ∂d/∂θ = −n·∂(c + S·w)/∂θ
 * at fixed w: the foot's own movement is along the ellipse and changes nothing. `gradient` points downhill, JᵀWd with
 * J = −∂d/∂θ; `gauss` is JᵀWJ, full. Linear in the number of points.
 */
export function evaluateEllipse(
  { count, x, y, weight }: LocalFrame,
  theta: EllipseParameters,
  { distance, gradient, gauss }: EllipseWork,
): number {
  const size = ellipseParameters;
  const { major, minor, axisRad } = shapeOf(theta);
  const cos = Math.cos(axisRad);
  const sin = Math.sin(axisRad);
  gradient.fill(0);
  gauss.fill(0);
  let objective = 0;
  const row = new Float64Array(size);
  const foot = new Float64Array(2);
  for (let i = 0; i < count; i++) {
    const dx = x[i]! - theta[0]!;
    const dy = y[i]! - theta[1]!;
    const d = footOnEllipse(major, minor, cos * dx + sin * dy, cos * dy - sin * dx, foot);
    const fx = foot[0]!;
    const fy = foot[1]!;
    const wx = (cos * fx) / major - (sin * fy) / minor;
    const wy = (sin * fx) / major + (cos * fy) / minor;
    const ax = fx / (major * major);
    const ay = fy / (minor * minor);
    const length = Math.sqrt(ax * ax + ay * ay);
    const nx = (cos * ax - sin * ay) / length;
    const ny = (sin * ax + cos * ay) / length;
    row[0] = nx;
    row[1] = ny;
    row[2] = nx * wx;
    row[3] = nx * wy + ny * wx;
    row[4] = ny * wy;
    const w = weight[i]!;
    distance[i] = d;
    objective += w * d * d;
    for (let j = 0; j < size; j++) {
      gradient[j]! += w * row[j]! * d;
      for (let k = 0; k <= j; k++) gauss[j * size + k]! += w * row[j]! * row[k]!;
    }
  }
  for (let j = 0; j < size; j++) for (let k = 0; k < j; k++) gauss[k * size + j] = gauss[j * size + k]!;
  return objective;
}
