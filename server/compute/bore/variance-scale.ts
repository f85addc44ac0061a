/** What (JᵀWJ)⁻¹ is multiplied by, and the degrees of freedom of the result (null: infinite). */
export interface VarianceScale {
  readonly factor: number;
  readonly dof: number | null;
}

/**
 * Scale of the covariance from the weighted sum of squares of `redundancy` = observations − parameters.
 * - Uncertainties stated: F = max(1, q), q = χ²/redundancy: scatter beyond what was stated enlarges it, less does not
 *   shrink it. The degrees of freedom are infinite while q ≤ 1, then redundancy·(q/(q − 1))², which joins without a jump.
 * - Nothing stated: the scatter itself, s² = Σr²/redundancy.
 * - Nothing left over: F = 1 if stated, else null, since nothing says how good the readings are.
 */
export function varianceScale(
  weightedSquares: number,
  redundancy: number,
  stated: boolean,
): VarianceScale | null {
  if (redundancy === 0) return stated ? { factor: 1, dof: null } : null;
  const ratio = weightedSquares / redundancy;
  if (!stated) return { factor: ratio, dof: redundancy };
  if (ratio <= 1) return { factor: 1, dof: null };
  return { factor: ratio, dof: redundancy * (ratio / (ratio - 1)) ** 2 };
}
