import { incompleteBeta } from "./incomplete-beta.ts";
import { requireDof } from "./probability.ts";

/**
 * P(F > value) for Fisher's F with the two degrees of freedom (any positive numbers): I_y(d₂/2, d₁/2) with
 * y = d₂/(d₂ + d₁·value) (Abramowitz & Stegun 26.6.2). Infinity is allowed as a value: 0.
 * @throws ComputeError not_converged — degrees of freedom beyond some 1e8
 */
export function fUpperTail(value: number, numeratorDof: number, denominatorDof: number): number {
  requireDof(numeratorDof);
  requireDof(denominatorDof);
  if (!(value >= 0)) throw new RangeError(`A ratio of variances is not negative; ${value} is.`);
  const scaled = numeratorDof * value;
  if (scaled === Infinity) return 0;
  const total = denominatorDof + scaled;
  return incompleteBeta(denominatorDof / 2, numeratorDof / 2, denominatorDof / total, scaled / total);
}

/**
 * P(|T| > |t|) for Student's t: that of F with 1 and `dof` degrees of freedom above t².
 * @throws ComputeError not_converged — degrees of freedom beyond some 1e8
 */
export function studentTwoTails(t: number, dof: number): number {
  return fUpperTail(t * t, 1, dof);
}
