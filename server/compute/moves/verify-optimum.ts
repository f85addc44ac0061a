import { dot, lengthOf, narrow, wholeSpace, type LeastSquares } from "./least-squares-in-order.ts";
import { nonnegativeLeastSquares } from "./nonnegative-least-squares.ts";
import type { Limit } from "./quadratic-program.ts";

/** Share of a gradient's own size that may be left over: rounding, with rows up to 1e4 times apart in size. */
const remainderBelow = 1e-9;
/** A limit met this nearly counts as met with equality, relative to the numbers in it. */
const metWithin = 1e-9;
/** Numbers, mm, count as this large at least: at points nearer to 0 nothing is told apart any more. */
const leastScaleMm = 1e-3;

/**
 * Verifies the conditions of Karush, Kuhn and Tucker for least squares problems taken in order, at a point known to
 * meet all limits (rows of length 1): the downhill direction of each problem is a sum, with weights ≥ 0, of the rows of
 * limits met with equality, apart from directions that earlier problems or their binding limits hold already.
 * Returns the limits that bind the first problem, the costliest first; null when a condition fails.
 */
export function verifyOptimum(
  size: number,
  problems: readonly LeastSquares[],
  limits: readonly Limit[],
  point: readonly number[],
): { limit: number; multiplier: number }[] | null {
  let open = [...limits.keys()].filter((j) => isMet(limits[j], point));
  let held = wholeSpace(size);
  let binding: { limit: number; multiplier: number }[] | null = null;
  for (const problem of problems) {
    const downhill = negativeGradient(problem, point);
    const within = (vector: readonly number[]) => held.free.map((direction) => dot(vector, direction));
    const target = within(downhill.direction);
    const negligible = remainderBelow * downhill.scale;
    const { weights, remainder } =
      lengthOf(target) <= negligible
        ? { weights: [], remainder: target }
        : nonnegativeLeastSquares(
            open.map((j) => within(limits[j]?.row ?? [])),
            target,
          );
    if (lengthOf(remainder) > negligible) return null;
    const pushing = open
      .map((limit, k) => ({ limit, multiplier: weights[k] ?? 0 }))
      .filter(({ multiplier }) => multiplier > negligible)
      .sort((a, b) => b.multiplier - a.multiplier);
    binding ??= pushing;
    open = open.filter((j) => !pushing.some(({ limit }) => limit === j));
    held = narrow(held, { rows: pushing.map(({ limit }) => limits[limit]?.row ?? []), targets: [] });
    held = narrow(held, problem);
  }
  return binding ?? [];
}

function isMet(limit: Limit | undefined, point: readonly number[]): boolean {
  if (!limit) return false;
  const scale = Math.max(leastScaleMm, Math.abs(limit.most), lengthOf(point));
  return Math.abs(dot(limit.row, point) - limit.most) <= metWithin * scale;
}

/** −Rᵀ(Rx − t), and the size of the terms it was summed from. */
function negativeGradient({ rows, targets }: LeastSquares, point: readonly number[]) {
  const size = Math.hypot(...rows.map(lengthOf));
  const missing = rows.map((row, i) => (targets[i] ?? 0) - dot(row, point));
  const direction = point.map((_, k) =>
    rows.reduce((sum, row, i) => sum + (row[k] ?? 0) * (missing[i] ?? 0), 0),
  );
  return { direction, scale: size * (size * Math.max(leastScaleMm, lengthOf(point)) + lengthOf(targets)) };
}
