import { assertFinite } from "../compute-error.ts";
import { requireDof, requireProbability } from "./probability.ts";

/**
 * Factor k₂ of a radial expanded uncertainty U = k₂·√λ, λ the larger eigenvalue of a 2 × 2 covariance:
 * k₂ = √(2·F(level; 2, dof)), the two-dimensional counterpart of Student's factor. In closed form,
 * F(level; 2, n) = (n/2)·((1 − level)^(−2/n) − 1), and k₂ = √(−2·ln(1 − level)) for infinite dof (null):
 * 2.4477 at 0.95. The one-dimensional factor would promise 95 % and keep 1 − exp(−1.96²/2) = 85 %.
 * @throws ComputeError result_overflow — dof so small that the factor cannot be held
 */
export function radialFactor(level: number, dof: number | null): number {
  requireProbability(level);
  const logOutside = Math.log1p(-level);
  if (dof === null) return Math.sqrt(-2 * logOutside);
  requireDof(dof);
  return assertFinite(Math.sqrt(dof * Math.expm1((-2 / dof) * logOutside)), "The radial coverage factor");
}
