import { assertFinite } from "../compute-error.ts";
import { requireDof, requireProbability } from "./probability.ts";

/**
 * Factor k of the confidence ellipse of a plane vector whose covariance was estimated as a whole, shape and size, from
 * repeats with `dof` degrees of freedom: Hotelling's T² (Annals of Mathematical Statistics 2 (1931) 360),
 * k² = 2·ν/(ν − 1)·F(level; 2, ν − 1), which for two dimensions is ν·((1 − level)^(−2/(ν − 1)) − 1). Where the shape is
 * known beforehand and the size alone was estimated, `radialFactor` serves, and is smaller. Null at one degree of
 * freedom or less: such a covariance bounds nothing.
 * @throws ComputeError result_overflow — dof so near 1 that the factor cannot be held
 */
export function hotellingFactor(level: number, dof: number): number | null {
  requireProbability(level);
  requireDof(dof);
  if (dof <= 1) return null;
  const square = dof * Math.expm1((-2 / (dof - 1)) * Math.log1p(-level));
  return assertFinite(Math.sqrt(square), "Hotelling's factor");
}

/**
 * P(T² > square) of the same: that of F = T²·(ν − 1)/(2·ν) with 2 and ν − 1 degrees of freedom, in closed form
 * (1 + T²/ν)^(−(ν − 1)/2). Null at one degree of freedom or less.
 */
export function hotellingUpperTail(square: number, dof: number): number | null {
  requireDof(dof);
  if (dof <= 1) return null;
  return Math.exp((-(dof - 1) / 2) * Math.log1p(square / dof));
}
