import { dot, lengthOf } from "./least-squares-in-order.ts";
import { rigidFitOf } from "./rigid-fit.ts";
import { sameThicknessMm } from "./shim-changes.ts";

/** From the changes chosen at the places before it, mm: whether a change may stand at a place. */
export type MisfitGuard = (beforeMm: readonly number[]) => (changeMm: number) => boolean;

/**
 * For each place in turn, whether a change there can still be part of a choice that keeps the misfit everywhere.
 * `rows` give the change that a rigid move asks of each place. Where a place's row is a combination Σ wₖ·rowₖ of those
 * before it, its change less Σ wₖ·changeₖ is the same combination of misfits alone, and so (1 + Σ|wₖ|) times the most
 * misfit at most, whatever the move. Nothing that could be realised is refused.
 */
export function misfitGuards(
  rows: readonly (readonly number[])[],
  size: number,
  maximumMisfitMm: number,
): MisfitGuard[] {
  return rows.map((row, k) => {
    const { columns, open } = rigidFitOf(rows.slice(0, k), size);
    const independent = open.some((direction) => Math.abs(dot(row, direction)) > 1e-9 * lengthOf(row));
    if (independent) return () => () => true;
    const weights = columns.map((column) => dot(row, column));
    const times = 1 + weights.reduce((sum, weight) => sum + Math.abs(weight), 0);
    const mostMm = (maximumMisfitMm + sameThicknessMm) * times;
    return (beforeMm) => {
      const followingMm = dot(weights, beforeMm);
      return (changeMm) => Math.abs(changeMm - followingMm) <= mostMm;
    };
  });
}
