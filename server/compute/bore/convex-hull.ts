/**
 * Corners of the convex hull of points, counter-clockwise, by A. M. Andrew's monotone chain (Inf. Process. Lett. 9
 * (1979) 216): points along an edge are no corners. Returns indices; O(n log n) for the sorting.
 */
export function convexHull(x: ArrayLike<number>, y: ArrayLike<number>): number[] {
  const order = Array.from({ length: x.length }, (_, i) => i).sort((i, j) => x[i]! - x[j]! || y[i]! - y[j]!);
  const turn = (o: number, a: number, b: number) =>
    (x[a]! - x[o]!) * (y[b]! - y[o]!) - (y[a]! - y[o]!) * (x[b]! - x[o]!);
  const chain = (indices: readonly number[]) => {
    const corners: number[] = [];
    for (const index of indices) {
      while (corners.length > 1 && turn(corners.at(-2)!, corners.at(-1)!, index) <= 0) corners.pop();
      corners.push(index);
    }
    corners.pop();
    return corners;
  };
  return [...chain(order), ...chain(order.reverse())];
}

/** Half-planes nx·x + ny·y ≤ reach of a convex region, normals of length 1. */
export interface HalfPlanes {
  readonly nx: Float64Array;
  readonly ny: Float64Array;
  readonly reach: Float64Array;
}

/** The half-planes whose common part is the convex hull. */
export function hullEdges(x: ArrayLike<number>, y: ArrayLike<number>): HalfPlanes {
  const corners = convexHull(x, y);
  const count = corners.length;
  const [nx, ny, reach] = [new Float64Array(count), new Float64Array(count), new Float64Array(count)];
  for (let k = 0; k < count; k++) {
    const from = corners[k]!;
    const to = corners[(k + 1) % count]!;
    const length = Math.hypot(x[to]! - x[from]!, y[to]! - y[from]!);
    nx[k] = (y[to]! - y[from]!) / length;
    ny[k] = (x[from]! - x[to]!) / length;
    reach[k] = nx[k]! * x[from]! + ny[k]! * y[from]!;
  }
  return { nx, ny, reach };
}
