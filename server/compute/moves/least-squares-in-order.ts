import { Matrix, SVD } from "ml-matrix";
import { assertFinite } from "../compute-error.ts";

/** Minimise ‖rows·x − targets‖. */
export interface LeastSquares {
  readonly rows: readonly (readonly number[])[];
  readonly targets: readonly number[];
}

/** All that is as good so far: `point`, and any step along the orthonormal `free` directions from it. */
export interface Minimisers {
  readonly point: readonly number[];
  readonly free: readonly (readonly number[])[];
}

/** A direction that changes a problem by less than this share of the problem's own size is not determined by it. */
const rankTolerance = 1e-10;

/** Σ aᵢ·bᵢ over the places of `a`. */
export const dot = (a: readonly number[], b: readonly number[]): number =>
  a.reduce((sum, value, k) => sum + value * (b[k] ?? 0), 0);

/** √Σ aᵢ². */
export const lengthOf = (a: readonly number[]): number => Math.hypot(...a);

/** `point` + Σ amounts[k]·directions[k]. */
export function along(
  point: readonly number[],
  directions: readonly (readonly number[])[],
  amounts: readonly number[],
): number[] {
  return point.map(
    (value, i) => value + directions.reduce((sum, d, k) => sum + (d[i] ?? 0) * (amounts[k] ?? 0), 0),
  );
}

/** Every point of the space, from its origin. */
export function wholeSpace(size: number): Minimisers {
  return {
    point: new Array<number>(size).fill(0),
    free: Array.from({ length: size }, (_, i) => Array.from({ length: size }, (_, k) => (i === k ? 1 : 0))),
  };
}

/**
 * Singular value decomposition with as many right vectors as columns, also for fewer rows than columns.
 * @throws ComputeError result_overflow when an entry is not finite: the decomposition would not end
 */
export function decompose(rows: readonly (readonly number[])[], columns: number) {
  if (columns === 0) return { singular: [], left: [], right: [] };
  const padded = new Matrix(Math.max(rows.length, columns), columns);
  rows.forEach((row, i) =>
    row.forEach((value, k) => padded.set(i, k, assertFinite(value, "An entry of a least squares problem"))),
  );
  const svd = new SVD(padded);
  const { leftSingularVectors: left, rightSingularVectors: right } = svd;
  return { singular: svd.diagonal, left: left.transpose().to2DArray(), right: right.transpose().to2DArray() };
}

/**
 * Among `start` the points that minimise ‖rows·x − targets‖: the nearest to `start.point`, and what stays free.
 * Singular value decomposition in the free directions; directions below the rank tolerance stay free.
 */
export function narrow(start: Minimisers, { rows, targets }: LeastSquares): Minimisers {
  const size = Math.hypot(...rows.map(lengthOf));
  if (start.free.length === 0 || size === 0) return start;
  const { singular, left, right } = decompose(
    rows.map((row) => start.free.map((direction) => dot(row, direction))),
    start.free.length,
  );
  const missing = rows.map((row, i) => (targets[i] ?? 0) - dot(row, start.point));
  const turned = right.map((turn) => along(new Array<number>(start.point.length).fill(0), start.free, turn));
  const fixed = singular.map((value) => value > rankTolerance * size);
  const amounts = singular.map((value, k) => (fixed[k] ? dot(missing, left[k] ?? []) / value : 0));
  return { point: along(start.point, turned, amounts), free: turned.filter((_, k) => !fixed[k]) };
}

/**
 * Minimises the first problem; among its minimisers the second; and so on. What none of them determines stays at 0.
 * `size` is the number of unknowns.
 */
export function minimiseInOrder(size: number, problems: readonly LeastSquares[]): Minimisers {
  return problems.reduce(narrow, wholeSpace(size));
}
