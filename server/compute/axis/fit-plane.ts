import { lineResidual } from "../linear-algebra/line-residual.ts";
import { fitLine, type Line } from "./fit-line.ts";
import { writeGainsAt, type LineGains } from "./line-gains.ts";

/** The axis in one plane, and how far every station lies from it. */
export interface PlaneFit {
  readonly gains: LineGains;
  readonly line: Line;
  /** observed − axis, one for each station, mm. */
  readonly deviationsMm: Float64Array;
}

export interface PlaneFits {
  readonly h: PlaneFit;
  readonly v: PlaneFit;
}

/**
 * Fits the line of `gains` through the reference stations and measures every station from it. Deviations are taken
 * from the residuals of the rounded line and its remaining error, so that they keep their digits at any z, and are
 * exactly 0 where a line passes through its stations. O(stations × reference stations).
 */
export function fitPlane(
  gains: LineGains,
  reference: readonly number[],
  zMm: readonly number[],
  observedMm: readonly number[],
): PlaneFit {
  const line = fitLine(
    gains,
    reference.map((index) => zMm[index]!),
    reference.map((index) => observedMm[index]!),
  );
  const residuals = zMm.map((z, i) => lineResidual(observedMm[i]!, line.at0Mm, line.slope, z));
  const gainsHere = new Float64Array(reference.length);
  const deviationsMm = Float64Array.from(zMm, (z, i) => {
    writeGainsAt(gains, z, gainsHere);
    let rest = 0;
    for (let j = 0; j < gainsHere.length; j += 1) rest += gainsHere[j]! * residuals[reference[j]!]!;
    return residuals[i]! - rest;
  });
  return { gains, line, deviationsMm };
}
