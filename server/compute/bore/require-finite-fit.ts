import { assertFinite } from "../compute-error.ts";
import type { BoreFit, WallFit } from "./bore-fit.ts";

/**
 * Returns the fit when every number of it is finite.
 * @throws ComputeError result_overflow
 */
export function requireFiniteFit<Fit extends BoreFit>(fit: Fit): Fit {
  if (!isPlain(fit) || !Number.isFinite(sumOf(fit))) requireFinite(fit, "The fit");
  return fit;
}

/** A fit whose numbers `sumOf` knows: it has neither contacts nor an ellipse. */
function isPlain(fit: BoreFit): fit is WallFit {
  return fit.form !== "rotating_target" && fit.contacts === undefined && fit.ellipse === undefined;
}

/** Of every number of the fit: it is finite only if each is. What it cannot vouch for is looked at one by one. */
function sumOf(fit: WallFit): number {
  const { centre, covariance, expandedUncertainty, statistics, arc } = fit;
  let sum = centre.hMm + centre.vMm + (fit.diameterMm ?? 0) + fit.roundnessMm;
  if (covariance) sum += covariance.hhMm2 + covariance.hvMm2 + covariance.vvMm2;
  if (expandedUncertainty) {
    const { hMm, vMm, diameterMm, factor, dof, level } = expandedUncertainty;
    sum += hMm + vMm + (diameterMm ?? 0) + factor + (dof ?? 0) + level;
  }
  sum += statistics.readingsUsed + statistics.parameters + statistics.rmsMm + (statistics.chiSquare ?? 0);
  sum += (statistics.varianceInflation ?? 0) + statistics.dilution + statistics.iterations;
  sum += arc.coverageDeg + arc.largestGapDeg;
  if (fit.taper) sum += fit.taper.halfAngleDeg + (fit.taper.expandedUncertaintyDeg ?? 0);
  if (fit.tilt) sum += fit.tilt.h + fit.tilt.v;
  for (const { ratio } of fit.exclusions) sum += ratio;
  for (let i = 0; i < fit.residualsMm.length; i++) sum += fit.residualsMm[i]!;
  return sum;
}

function requireFinite(value: unknown, what: string): void {
  if (typeof value === "number") {
    assertFinite(value, what);
  } else if (Array.isArray(value)) {
    for (const inner of value) requireFinite(inner, what);
  } else if (typeof value === "object" && value !== null) {
    for (const [name, inner] of Object.entries(value)) requireFinite(inner, name);
  }
}
