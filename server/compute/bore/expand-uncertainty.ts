import type { PlaneCovariance } from "../plane.ts";
import { rememberPairs } from "../statistics/remember-pairs.ts";
import { studentFactor } from "../statistics/student-t.ts";
import type { ExpandedUncertainty } from "./bore-fit.ts";
import type { VarianceScale } from "./variance-scale.ts";

const factorOf = rememberPairs(studentFactor);

/** Half-widths at `level` from standard uncertainties, by the two-sided Student factor; null where none are known. */
export function expandUncertainty(
  covariance: PlaneCovariance | null,
  diameterVarianceMm2: number | null,
  scale: VarianceScale | null,
  level: number,
): ExpandedUncertainty | null {
  if (covariance === null || scale === null) return null;
  const factor = factorOf(level, scale.dof);
  return {
    hMm: factor * Math.sqrt(covariance.hhMm2),
    vMm: factor * Math.sqrt(covariance.vvMm2),
    diameterMm: diameterVarianceMm2 === null ? null : factor * Math.sqrt(diameterVarianceMm2),
    factor,
    dof: scale.dof,
    level,
  };
}
