import { ComputeError } from "../compute-error.ts";
import { along, dot, lengthOf, minimiseInOrder } from "./least-squares-in-order.ts";

/**
 * Weights λ ≥ 0 that minimise ‖Σ λⱼ·columnⱼ − target‖: the nearest point of the columns' cone.
 * Active set by C. L. Lawson and R. J. Hanson, Solving Least Squares Problems (1974), chapter 23, algorithm NNLS.
 * @throws ComputeError not_converged
 */
export function nonnegativeLeastSquares(
  columns: readonly (readonly number[])[],
  target: readonly number[],
): { readonly weights: readonly number[]; readonly remainder: readonly number[] } {
  const negligible = 1e-13 * lengthOf(target) * Math.max(0, ...columns.map(lengthOf));
  let weights = columns.map(() => 0);
  const inUse = new Set<number>();
  for (let round = 0; round <= 10 * columns.length + 10; round++) {
    const remainder = along(
      target,
      columns,
      weights.map((weight) => -weight),
    );
    const entering = columns
      .map((column, j) => ({ j, gain: inUse.has(j) ? 0 : dot(column, remainder) }))
      .reduce((best, next) => (next.gain > best.gain ? next : best), { j: -1, gain: negligible });
    if (entering.j < 0) return { weights, remainder };
    inUse.add(entering.j);
    weights = settle(columns, target, weights, inUse);
  }
  throw new ComputeError("not_converged", "The search for nonnegative multipliers did not end.");
}

/** Least squares on the columns in use; on the way there, those that would turn negative leave, one at least a round. */
function settle(
  columns: readonly (readonly number[])[],
  target: readonly number[],
  start: readonly number[],
  inUse: Set<number>,
): number[] {
  let weights = [...start];
  for (;;) {
    const used = [...inUse];
    const rows = target.map((_, i) => used.map((j) => columns[j]?.[i] ?? 0));
    const { point } = minimiseInOrder(used.length, [{ rows, targets: target }]);
    const wanted = columns.map((_, j) => (inUse.has(j) ? (point[used.indexOf(j)] ?? 0) : 0));
    const leaving = used
      .filter((j) => (wanted[j] ?? 0) <= 0)
      .map((j) => ({ j, share: shareToZero(weights[j] ?? 0, wanted[j] ?? 0) }));
    if (leaving.length === 0) return wanted;
    const share = Math.min(...leaving.map((each) => each.share));
    weights = weights.map((weight, j) => weight + share * ((wanted[j] ?? 0) - weight));
    for (const each of leaving.filter((other) => other.share <= share)) {
      weights[each.j] = 0;
      inUse.delete(each.j);
    }
  }
}

/** Share of the way from a weight ≥ 0 to one ≤ 0 at which it is 0. */
const shareToZero = (from: number, to: number): number => (from <= 0 ? 0 : from / (from - to));
