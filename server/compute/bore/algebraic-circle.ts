import type { LocalFrame } from "./local-frame.ts";

const stepsMax = 50;

/**
 * Taubin's circle through weighted points: minimises Σ w(|p − c|² − R²)² ÷ Σ w·4|p − c|² by Newton's method on the
 * characteristic polynomial (G. Taubin, IEEE Trans. PAMI 13 (1991) 1115; N. Chernov, Circular and Linear Regression
 * (2010), section 5.10). Only a start: it is nearly free of the bias of the linear fit on short arcs, but not the
 * orthogonal answer. Returns the centre in the frame; not finite where the points show no curvature at all.
 */
export function fitAlgebraicCircle({ count, x, y, weight }: LocalFrame): {
  readonly a: number;
  readonly b: number;
} {
  let sum = 0;
  let meanX = 0;
  let meanY = 0;
  for (let i = 0; i < count; i++) {
    const w = weight[i]!;
    sum += w;
    meanX += w * x[i]!;
    meanY += w * y[i]!;
  }
  meanX /= sum;
  meanY /= sum;
  let xx = 0;
  let xy = 0;
  let yy = 0;
  let xs = 0;
  let ys = 0;
  let ss = 0;
  for (let i = 0; i < count; i++) {
    const w = weight[i]! / sum;
    const px = x[i]! - meanX;
    const py = y[i]! - meanY;
    const square = px * px + py * py;
    xx += w * px * px;
    xy += w * px * py;
    yy += w * py * py;
    xs += w * px * square;
    ys += w * py * square;
    ss += w * square * square;
  }
  const { a, b } = taubinCentre(xx, xy, yy, xs, ys, ss);
  return { a: meanX + a, b: meanY + b };
}

/**
 * Taubin's centre about the points' own mean, from their mean products: x², xy, y², and with s = x² + y² those of x·s,
 * y·s and s·s. Not finite where they show no curvature.
 */
export function taubinCentre(
  xx: number,
  xy: number,
  yy: number,
  xs: number,
  ys: number,
  ss: number,
): { readonly a: number; readonly b: number } {
  const s = xx + yy;
  const determinant = xx * yy - xy * xy;
  const variance = ss - s * s;
  const a3 = 4 * s;
  const a2 = -3 * s * s - ss;
  const a1 = variance * s + 4 * determinant * s - xs * xs - ys * ys;
  const a0 = xs * (xs * yy - ys * xy) + ys * (ys * xx - xs * xy) - variance * determinant;
  let root = 0;
  let value = a0;
  for (let step = 0; step < stepsMax; step++) {
    const slope = a1 + root * (2 * a2 + 3 * a3 * root);
    const next = root - value / slope;
    if (next === root || !Number.isFinite(next)) break;
    const nextValue = a0 + next * (a1 + next * (a2 + next * a3));
    if (Math.abs(nextValue) >= Math.abs(value)) break;
    root = next;
    value = nextValue;
  }
  const divisor = 2 * (root * root - root * s + determinant);
  return {
    a: (xs * (yy - root) - ys * xy) / divisor,
    b: (ys * (xx - root) - xs * xy) / divisor,
  };
}
