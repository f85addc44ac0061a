import { assertFinite } from "../compute-error.ts";
import type { PlaneCovariance, PlaneVector } from "../plane.ts";
import { radialFactor } from "../statistics/radial-factor.ts";
import { welchSatterthwaite } from "../statistics/welch-satterthwaite.ts";
import { applyCovariance, dot, invertCovariance } from "./survey-change.ts";

/** A change held against what it may be wrong by. */
export interface ChangeTest {
  /** ΔᵀΣ⁻¹Δ. */
  readonly statistic: number;
  /** What the statistic stays under, with the probability of the level, where nothing changed. */
  readonly limit: number;
  /** Effective degrees of freedom; null: infinite. */
  readonly dof: number | null;
  readonly within: boolean;
}

/**
 * What each independent part of the error adds to the variance along a direction, and with which degrees of freedom; null
 * where all parts are known. The arrays may be used again at the next call.
 */
export type VariancesAlong =
  | ((direction: PlaneVector) => {
      readonly variances: ArrayLike<number>;
      readonly dof: ArrayLike<number>;
    })
  | null;

/**
 * Whether a change of the plane vector Δ with covariance Σ can be chance: ΔᵀΣ⁻¹Δ ≤ χ²(level; 2) where Σ is known, and
 * ≤ 2·F(level; 2, ν) where it was estimated with ν degrees of freedom. The degrees of freedom of a covariance are those
 * of its size, its shape being set by where the readings lie: then the statistic is exactly 2·F, the confidence ellipse
 * of the linear model, (β − b)ᵀXᵀX(β − b) ≤ p·s²·F(p, ν) (Draper & Smith, Applied Regression Analysis). It is
 * Hotelling's T² with a known shape; where the shape is estimated as well, his limit 2·ν/(ν − 1)·F(level; 2, ν − 1)
 * would be larger. ν of a sum of independent parts by Welch–Satterthwaite along w = Σ⁻¹Δ, the direction that the
 * statistic is taken in (Yao, Biometrika 52 (1965) 139, from memory). mm, mm².
 * @throws ComputeError result_overflow
 */
export function testChange(
  change: PlaneVector,
  covariance: PlaneCovariance,
  variancesAlong: VariancesAlong,
  level: number,
): ChangeTest {
  const along = applyCovariance(invertCovariance(covariance), change);
  const statistic = changeStatistic(change, covariance);
  const dof = dofAlong(along, variancesAlong);
  const limit = radialFactor(level, dof) ** 2;
  return { statistic, limit, dof, within: statistic <= limit };
}

/**
 * ΔᵀΣ⁻¹Δ alone.
 * @throws ComputeError result_overflow
 */
export function changeStatistic(change: PlaneVector, covariance: PlaneCovariance): number {
  const along = applyCovariance(invertCovariance(covariance), change);
  return assertFinite(Math.max(0, dot(change, along)), "A test of a change");
}

function dofAlong(along: PlaneVector, variancesAlong: VariancesAlong): number | null {
  if (!variancesAlong) return null;
  const size = Math.hypot(along.hMm, along.vMm);
  const of = (hMm: number, vMm: number) => {
    const { variances, dof } = variancesAlong({ hMm, vMm });
    return welchSatterthwaite(variances, dof) ?? Infinity;
  };
  // No change has no direction: the planes stand for it, the more cautious of them.
  const dof = size > 0 ? of(along.hMm / size, along.vMm / size) : Math.min(of(1, 0), of(0, 1));
  return dof === Infinity ? null : dof;
}
