import { worstVarianceMm2, type PlaneCovariance } from "../plane.ts";
import { radialFactor } from "../statistics/radial-factor.ts";
import { studentFactor } from "../statistics/student-t.ts";

/** Expanded uncertainty of a plane vector: each plane by itself, and in the worst direction. */
export interface ExpandedUncertainty {
  readonly hMm: number;
  readonly vMm: number;
  readonly radialMm: number;
  /** Two-sided Student factor, of hMm and vMm. */
  readonly k: number;
  /** Two-dimensional factor √(2·F(level; 2, dof)), of radialMm. */
  readonly kRadial: number;
  /** Null: infinite. */
  readonly dof: number | null;
}

/**
 * Expands a standard covariance (mm²) to `level`: U = t·u in each plane, and k₂·√λ for the length of the vector, λ the
 * larger eigenvalue. The one-dimensional factor on a length would promise 95 % and keep 85 %.
 * @throws ComputeError result_overflow — dof so small that a factor cannot be held
 */
export function expandUncertainty(
  covariance: PlaneCovariance,
  dof: number | null,
  level: number,
): ExpandedUncertainty {
  const k = studentFactor(level, dof);
  const kRadial = radialFactor(level, dof);
  return {
    hMm: k * Math.sqrt(covariance.hhMm2),
    vMm: k * Math.sqrt(covariance.vvMm2),
    radialMm: kRadial * Math.sqrt(worstVarianceMm2(covariance)),
    k,
    kRadial,
    dof,
  };
}
