import { ComputeError } from "../compute-error.ts";
import { factorCholesky, invertCholesky } from "./cholesky.ts";
import type { SurfaceFit } from "./fit-surface.ts";
import type { LocalFrame } from "./local-frame.ts";
import type { SurfaceModel } from "./surface-model.ts";

/** Variances and covariances for F = 1: mm² for lengths. */
export interface Cofactors {
  readonly hh: number;
  readonly hv: number;
  readonly vv: number;
  readonly radius: number;
  /** 0 where the taper is not fitted. */
  readonly tangent: number;
}

/**
 * Inverse of the normal matrix with the radius put back: var R = 1/Σw + J̄ᵀCJ̄, cov(θ, R) = −CJ̄; then moved from the
 * frame's z to z = 0 by R − ζ·t and c − ζ·s.
 * @throws ComputeError rank_deficient
 */
export function cofactorsOf(
  { work, weightSum }: SurfaceFit,
  model: SurfaceModel,
  { scaleMm, unitVarianceMm2 }: LocalFrame,
  toPlane: number,
  member: string,
): Cofactors {
  const unknowns = work.meanSlopes.length;
  const factor = new Float64Array(unknowns * unknowns);
  if (!factorCholesky(work.gauss, unknowns, factor, 0)) {
    throw new ComputeError("rank_deficient", "The readings do not determine the bore.", { at: [member] });
  }
  const inverse = invertCholesky(factor, unknowns);
  const size = unknowns + 1;
  const full = new Float64Array(size * size);
  full[size * size - 1] = 1 / weightSum;
  for (let i = 0; i < unknowns; i++) {
    let withRadius = 0;
    for (let j = 0; j < unknowns; j++) {
      full[i * size + j] = inverse[i * unknowns + j]!;
      withRadius -= inverse[i * unknowns + j]! * work.meanSlopes[j]!;
    }
    full[i * size + unknowns] = withRadius;
    full[unknowns * size + i] = withRadius;
    full[size * size - 1]! -= withRadius * work.meanSlopes[i]!;
  }
  const moved =
    model.free === "taper"
      ? [[3, 2]]
      : model.free === "tilt"
        ? [
            [0, 2],
            [1, 3],
          ]
        : [];
  for (const [row, by] of moved) addMultiple(full, size, row!, by!, -toPlane);
  const at = (row: number, column: number) => full[row * size + column]! * unitVarianceMm2;
  return {
    hh: at(0, 0),
    hv: at(0, 1),
    vv: at(1, 1),
    radius: at(unknowns, unknowns),
    tangent: model.free === "taper" ? at(2, 2) / (scaleMm * scaleMm) : 0,
  };
}

/** Covariance after parameter `row` has `multiple` × parameter `by` added to it. */
function addMultiple(matrix: Float64Array, size: number, row: number, by: number, multiple: number): void {
  for (let k = 0; k < size; k++) matrix[row * size + k]! += multiple * matrix[by * size + k]!;
  for (let k = 0; k < size; k++) matrix[k * size + row]! += multiple * matrix[k * size + by]!;
}
