const stepsMax = 100;
/** Heights over the major axis that numbers hold with fewer digits are none. */
const onAxis = 1e-290;

/**
 * Foot of the perpendicular from (x, y) on the ellipse with semi-axes a ≥ b > 0 along x and y. With z₀ = |x|/a,
 * z₁ = |y|/b and ρ = (a/b)² it lies at (ρx/(s + ρ), y/(s + 1)), s the largest root of (ρz₀/(s + ρ))² + (z₁/(s + 1))² = 1
 * (D. Eberly, Distance from a Point to an Ellipse, an Ellipsoid, or a Hyperellipsoid, Geometric Tools). The left side
 * falls and is convex to the right of −1: Newton's steps from a point left of the root rise to it and never pass it.
 * Writes the foot and returns how far outside of it the point lies: negative inside.
 */
export function footOnEllipse(a: number, b: number, x: number, y: number, foot: Float64Array): number {
  const px = Math.abs(x);
  const py = Math.abs(y);
  footOfPositive(a, b, px, py, foot);
  const dx = px - foot[0]!;
  const dy = py - foot[1]!;
  const away = Math.sqrt(dx * dx + dy * dy);
  if (x < 0) foot[0] = -foot[0]!;
  if (y < 0) foot[1] = -foot[1]!;
  return (px / a) ** 2 + (py / b) ** 2 < 1 ? -away : away;
}

function footOfPositive(a: number, b: number, x: number, y: number, foot: Float64Array): void {
  if (y < onAxis) {
    const reach = a * a - b * b;
    // Within the evolute two feet are equally near: the upper one.
    const share = a * x < reach ? (a * x) / reach : 1;
    foot[0] = a * share;
    foot[1] = b * Math.sqrt(1 - share * share);
    return;
  }
  const ratio = (a / b) ** 2;
  const spread = ratio - 1;
  const z0 = x / a;
  const z1 = y / b;
  // t = s + 1 keeps its digits where s all but reaches −1.
  let t = Math.max(z1, ratio * (z0 - 1) + 1);
  for (let step = 0; step < stepsMax; step++) {
    const n0 = (ratio * z0) / (t + spread);
    const n1 = z1 / t;
    const value = n0 * n0 + n1 * n1 - 1;
    const slope = -2 * ((n0 * n0) / (t + spread) + (n1 * n1) / t);
    const next = t - value / slope;
    if (!(next > t)) break;
    t = next;
  }
  foot[0] = (ratio * x) / (t + spread);
  foot[1] = y / t;
}
