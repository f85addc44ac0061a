import { along, decompose, lengthOf } from "./least-squares-in-order.ts";

/** How changes at load-bearing places become the move of the rigid part that rests on them. */
export interface RigidFit {
  /** amounts = Σ changeⱼ·column[j]: the least squares fit of the part to the changes. */
  readonly columns: readonly (readonly number[])[];
  /** Orthonormal directions that the places determine, and those that they leave open: set by jack and locked. */
  readonly determined: readonly (readonly number[])[];
  readonly open: readonly (readonly number[])[];
  /** Share of each place in its own fitted move: 1 where no other place has a say, and its misfit is always 0. */
  readonly leverage: readonly number[];
}

const rankTolerance = 1e-10;

/** Fit of a part with `size` modes to places whose change is rows[j]·amounts. Pseudoinverse by singular values. */
export function rigidFitOf(rows: readonly (readonly number[])[], size: number): RigidFit {
  const { singular, left, right } = decompose(rows, size);
  const scale = Math.hypot(...rows.map(lengthOf));
  const fixed = [...right.keys()].filter((k) => (singular[k] ?? 0) > rankTolerance * scale);
  const determined = fixed.map((k) => right[k] ?? []);
  const origin = new Array<number>(size).fill(0);
  return {
    columns: rows.map((_, j) =>
      along(
        origin,
        determined,
        fixed.map((k) => (left[k]?.[j] ?? 0) / (singular[k] ?? 1)),
      ),
    ),
    determined,
    open: right.filter((_, k) => !fixed.includes(k)),
    leverage: rows.map((_, j) => fixed.reduce((sum, k) => sum + (left[k]?.[j] ?? 0) ** 2, 0)),
  };
}
