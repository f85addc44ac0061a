import { lineResidual } from "../linear-algebra/line-residual.ts";
import { coefficientGains, type LineGains } from "./line-gains.ts";

/** y = at0Mm + slope·z in one plane. */
export interface Line {
  readonly at0Mm: number;
  readonly slope: number;
}

/** The first pass finds the line, the second its rounding error, the third what the second left on long spans. */
const passes = 3;

/**
 * The line that `gains` makes of the observations, refined on residuals of twice the working precision, so that
 * at0 and slope are right to their last bits however far z = 0 lies from the stations.
 */
export function fitLine(gains: LineGains, zMm: readonly number[], observedMm: readonly number[]): Line {
  const coefficients = coefficientGains(gains);
  let at0Mm = 0;
  let slope = 0;
  for (let pass = 0; pass < passes; pass += 1) {
    let at0Correction = 0;
    let slopeCorrection = 0;
    for (let j = 0; j < zMm.length; j += 1) {
      const residual = lineResidual(observedMm[j]!, at0Mm, slope, zMm[j]!);
      at0Correction += coefficients.at0[j]! * residual;
      slopeCorrection += coefficients.slope[j]! * residual;
    }
    at0Mm += at0Correction;
    slope += slopeCorrection;
  }
  return { at0Mm, slope };
}
