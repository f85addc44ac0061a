import { along, decompose, dot, lengthOf, narrow, wholeSpace } from "./least-squares-in-order.ts";
import type { RigidFit } from "./rigid-fit.ts";

/** What the stations see of the changes at load-bearing places, once the jacks are set to the best. */
export interface ShimSight {
  /** Weighted station deviations that a choice of shims can still be told by: rows over the amounts. */
  readonly rows: readonly (readonly number[])[];
  /**
   * Farthest that `row`·y can lie from the best while the cost is at most 1 above it; Infinity when the stations do not
   * determine it. For an excess of r: √r times as far.
   */
  extent(row: readonly number[]): number;
}

/** A direction that the stations see by less than this share of what they see best is one they do not determine. */
const rankTolerance = 1e-10;

/** `pullRows` are the rows R of the cost ‖R·amounts − t‖². */
export function shimSightOf(
  pullRows: readonly (readonly number[])[],
  fit: RigidFit,
  size: number,
): ShimSight {
  const byJack = fit.open.map((direction) => pullRows.map((row) => dot(row, direction)));
  const seen = narrow(wholeSpace(pullRows.length), { rows: byJack, targets: byJack.map(() => 0) }).free;
  const rows = seen.map((direction) => along(new Array<number>(size).fill(0), pullRows, direction));
  const { singular, right } = decompose(rows, size);
  const scale = Math.hypot(...pullRows.map(lengthOf));
  const known = [...right.keys()].filter((k) => (singular[k] ?? 0) > rankTolerance * scale);
  return {
    rows,
    extent(row) {
      const parts = known.map((k) => dot(row, right[k] ?? []));
      const unseen = Math.sqrt(Math.max(0, dot(row, row) - dot(parts, parts)));
      if (unseen > 1e-7 * lengthOf(row)) return Infinity;
      return Math.hypot(...parts.map((part, at) => part / (singular[known[at] ?? 0] ?? 1)));
    },
  };
}
