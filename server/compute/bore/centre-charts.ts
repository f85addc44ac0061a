import type { CentreProblem, Place } from "./centre-problem.ts";

/**
 * Two ways to name a centre. `near`: its coordinates. `far`: direction θ and curvature κ = 1/|c|, in which centres far
 * away, and at κ = 0 the straight strip, are as near as any: g is then |p − c| − |c|, which keeps its digits.
 */
export type Chart = "near" | "far";

/** Centres up to this distance are searched in the near chart, from a little less on in the far one. */
export const nearReach = 4;
export const farCurvature = 1.1 / nearReach;

/** g, its slopes in the chart's coordinates and the distance, of each point; one place more for a constant 0. */
export interface Measures {
  readonly value: Float64Array;
  readonly slopeX: Float64Array;
  readonly slopeY: Float64Array;
  readonly distance: Float64Array;
}

/** Room for the measures of `count` points. */
export function measuresFor(count: number): Measures {
  const column = () => new Float64Array(count + 1);
  return { value: column(), slopeX: column(), slopeY: column(), distance: column() };
}

/** Fills the measures of the points at `indices` for the centre (x, y) of the chart. Linear. */
export function measure(
  problem: CentreProblem,
  chart: Chart,
  x: number,
  y: number,
  indices: Int32Array,
  into: Measures,
): void {
  if (chart === "near") measureNear(problem, x, y, indices, into);
  else measureFar(problem, x, y, indices, into);
}

function measureNear(
  { count, x, y, added }: CentreProblem,
  a: number,
  b: number,
  indices: Int32Array,
  { value, slopeX, slopeY, distance }: Measures,
): void {
  for (let k = 0; k < indices.length; k++) {
    const i = indices[k]!;
    if (i === count) continue;
    const dx = a - x[i]!;
    const dy = b - y[i]!;
    const d = Math.sqrt(dx * dx + dy * dy);
    // At a point itself every slope up to 1 is a subgradient; 0 is one.
    const inverse = d > 0 ? 1 / d : 0;
    distance[i] = d;
    value[i] = added === null ? d : d - added[i]!;
    slopeX[i] = dx * inverse;
    slopeY[i] = dy * inverse;
  }
}

function measureFar(
  { count, x, y, added }: CentreProblem,
  theta: number,
  curvature: number,
  indices: Int32Array,
  { value, slopeX, slopeY }: Measures,
): void {
  const cos = Math.cos(theta);
  const sin = Math.sin(theta);
  for (let k = 0; k < indices.length; k++) {
    const i = indices[k]!;
    if (i === count) continue;
    const px = x[i]!;
    const py = y[i]!;
    const along = px * cos + py * sin;
    const across = py * cos - px * sin;
    const square = px * px + py * py;
    const nx = curvature * px - cos;
    const ny = curvature * py - sin;
    // |p − c| ÷ |c|
    const ratio = Math.sqrt(nx * nx + ny * ny);
    const numerator = curvature * square - 2 * along;
    const both = ratio + 1;
    const ratioSlope = (curvature * square - along) / ratio;
    const g = numerator / both;
    value[i] = added === null ? g : g - added[i]!;
    slopeX[i] = -across / ratio;
    slopeY[i] = (square * both - numerator * ratioSlope) / (both * both);
  }
}

/**
 * Bounds of the second derivatives of g in the far chart up to curvature κ, all |p| ≤ 1. With N = |κp − u| ≥ 1 − κ:
 * g_θθ = p·u/N − κ(p·u⊥)²/N³, g_θκ = (p·u⊥)·N_κ/N² with |N_κ| ≤ 1, and g_κκ = ∫₀¹ x²·N‴(κx) dx with |N‴| ≤ 3/N⁴.
 */
export function farBends(curvature: number): {
  readonly xx: number;
  readonly xy: number;
  readonly yy: number;
} {
  const n = 1 - curvature;
  return { xx: 1 / n + curvature / n ** 3, xy: 1 / n ** 2, yy: 1 / n ** 4 };
}

/** The place of the plane that a chart's coordinates name; not finite at curvature 0. */
export function placeOf(chart: Chart, x: number, y: number): Place {
  return chart === "near" ? { x, y } : { x: Math.cos(x) / y, y: Math.sin(x) / y };
}
