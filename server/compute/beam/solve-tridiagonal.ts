import { ComputeError } from "../compute-error.ts";

/** A pivot under this share of its own diagonal entry holds rounding errors only. */
const pivotMin = 1e-13;

/**
 * Solves a symmetric positive definite tridiagonal system by L·D·Lᵀ (G. H. Golub, C. F. Van Loan, Matrix Computations,
 * section 4.3.6). `diagonal` and `rightSide` hold n entries, `beside` the n − 1 next to the diagonal. Linear in n; no
 * pivoting is needed for a positive definite matrix, and the scale of the unknowns does not matter.
 * @throws ComputeError rank_deficient when a pivot is not positive beside its diagonal entry
 */
export function solveTridiagonal(
  diagonal: readonly number[],
  beside: readonly number[],
  rightSide: readonly number[],
): number[] {
  const pivots: number[] = [];
  const solution: number[] = [];
  for (const [row, entry] of diagonal.entries()) {
    const ratio = row === 0 ? 0 : beside[row - 1]! / pivots[row - 1]!;
    const pivot = row === 0 ? entry : entry - ratio * beside[row - 1]!;
    if (!(entry > 0 && pivot > pivotMin * entry)) {
      throw new ComputeError("rank_deficient", "The equations of the beam do not determine its moments.");
    }
    pivots.push(pivot);
    solution.push(row === 0 ? rightSide[row]! : rightSide[row]! - ratio * solution[row - 1]!);
  }
  for (let row = diagonal.length - 1; row >= 0; row--) {
    const right = row === diagonal.length - 1 ? 0 : beside[row]! * solution[row + 1]!;
    solution[row] = (solution[row]! - right) / pivots[row]!;
  }
  return solution;
}
