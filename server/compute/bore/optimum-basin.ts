import type { CentreProblem } from "./centre-problem.ts";
import { farBends, farCurvature, type Chart, type Measures } from "./centre-charts.ts";
import { convexHull } from "./convex-hull.ts";
import type { Rivals } from "./descend-centre.ts";

/** A local optimum and how far round it, in its chart's coordinates, there is no other. */
export interface Optimum {
  readonly chart: Chart;
  readonly x: number;
  readonly y: number;
  readonly value: number;
  readonly basin: number;
}

/** Rivals within this of the extreme carry the optimum; that much the proof is short of exact. */
const carriesWithin = 1e-12;
/** Contacts of each kind looked at: with fewer the basin is only smaller. */
const contactsMax = 16;

/**
 * The optimum at (x, y) with its basin. Every slope s = ∇(gᵢ − gⱼ) of a pair of contacts rises the criterion; if 0 lies
 * inside their hull, at a distance κ from its edge, the criterion grows at least as κ|δ| − ρ|δ|²/2, ρ bounding how
 * concave it is: 1/r for the inner distances r in the near chart, twice the second derivatives of g in the far one.
 * Another optimum within |δ| < κ/ρ would contradict both growths. `measures` are those at (x, y).
 */
export function optimumAt(
  problem: CentreProblem,
  rivals: Rivals,
  chart: Chart,
  x: number,
  y: number,
  value: number,
  measures: Measures,
): Optimum {
  const sharpness = sharpnessOf(rivals, measures);
  let basin: number;
  if (chart === "near") {
    // ρ = 1/(r − basin) holds as far as the basin reaches.
    const r = nearestOf(problem, x, y);
    basin = (sharpness * r) / (1 + sharpness);
  } else {
    const { xx, xy, yy } = farBends(farCurvature);
    basin = sharpness / (2 * Math.max(xx + xy, xy + yy));
  }
  return { chart, x, y, value, basin };
}

/** Distance of 0 from the edge of the hull of all ∇(gᵢ − gⱼ) of contacts; 0 where it does not lie inside. */
function sharpnessOf({ outer, inner }: Rivals, { value, slopeX, slopeY }: Measures): number {
  const tops = contactsOf(outer, value, 1);
  const bottoms = contactsOf(inner, value, -1);
  const pairs = tops.flatMap((i) =>
    bottoms.map((j) => [slopeX[i]! - slopeX[j]!, slopeY[i]! - slopeY[j]!] as const),
  );
  const x = pairs.map(([first]) => first);
  const y = pairs.map(([, second]) => second);
  const corners = convexHull(x, y);
  if (corners.length < 3) return 0;
  let least = Infinity;
  for (const [k, from] of corners.entries()) {
    const to = corners[(k + 1) % corners.length]!;
    const length = Math.hypot(x[to]! - x[from]!, y[to]! - y[from]!);
    least = Math.min(least, (x[from]! * y[to]! - y[from]! * x[to]!) / length);
  }
  return Math.max(0, least);
}

/** Up to `contactsMax` of the rivals at the largest (sign 1) or smallest (−1) value, spread over their list. */
function contactsOf(indices: Int32Array, value: Float64Array, sign: 1 | -1): number[] {
  let extreme = -Infinity;
  for (const i of indices) extreme = Math.max(extreme, sign * value[i]!);
  const all = [...indices.filter((i) => sign * value[i]! >= extreme - carriesWithin)];
  const stride = Math.ceil(all.length / contactsMax);
  return all.filter((_, k) => k % stride === 0);
}

function nearestOf({ count, x, y }: CentreProblem, a: number, b: number): number {
  let least = Infinity;
  for (let i = 0; i < count; i++) least = Math.min(least, (x[i]! - a) ** 2 + (y[i]! - b) ** 2);
  return Math.sqrt(least);
}
