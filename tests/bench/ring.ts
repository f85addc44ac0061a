import { seededRandom } from "../support/seeded-random.ts";

export interface WallPoint {
  readonly h: number;
  readonly v: number;
}

/** Points round a bore of 400 mm, off centre, with scatter of a few micrometres. */
export function ring(count: number, seed = 1): WallPoint[] {
  const random = seededRandom(seed);
  return Array.from({ length: count }, (_, k) => {
    const angle = (2 * Math.PI * k) / count;
    const radius = 200 + 0.01 * (random.uniform() - 0.5);
    return { h: 0.1 + radius * Math.sin(angle), v: -0.2 + radius * Math.cos(angle) };
  });
}

/** The same points in no order. */
export function shuffled(points: readonly WallPoint[], seed = 2): WallPoint[] {
  const random = seededRandom(seed);
  return points
    .map((point) => ({ point, key: random.uniform() }))
    .sort((one, other) => one.key - other.key)
    .map(({ point }) => point);
}
