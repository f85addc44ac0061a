import { assertFinite } from "../compute-error.ts";
import type { PlaneVector } from "../plane.ts";

/**
 * Change of the refractive index of air with temperature, 1/K, at 20 °C, 1013.25 hPa and 633 nm: from the equation of
 * K. P. Birch, M. J. Downs, Metrologia 31 (1994) 315. It is an eighth less at 40 °C, and in proportion to pressure.
 */
export const indexPerK = -0.93e-6;

/** The air across a line of sight. */
export interface SightAir {
  /** Rise of temperature to the right and upwards, K/mm. */
  readonly gradient: { readonly hKPerMm: number; readonly vKPerMm: number };
  /** How far from the source it reaches, mm. */
  readonly lengthMm: number;
}

/**
 * How far a beam is bent off the straight line in which it leaves its source, `distanceMm` away from it. A ray curves
 * towards the larger index, so away from the warm side, with curvature (dn/dx)/n and n = 1 to three parts in ten
 * thousand: ½·L²·(dn/dT)·(dT/dx) while the gradient lasts, straight on in its last direction after. 1 K/m across 10 m
 * bends it by 0.047 mm. mm in and out.
 * @throws ComputeError result_overflow
 */
export function bendInAir({ gradient, lengthMm }: SightAir, distanceMm: number): PlaneVector {
  const curvedMm = Math.min(lengthMm, distanceMm);
  const leverMm2 = curvedMm * (curvedMm / 2 + (distanceMm - curvedMm));
  return {
    hMm: assertFinite(indexPerK * gradient.hKPerMm * leverMm2, "The bend in h"),
    vMm: assertFinite(indexPerK * gradient.vKPerMm * leverMm2, "The bend in v"),
  };
}
