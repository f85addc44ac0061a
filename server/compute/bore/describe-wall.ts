import { worstVarianceMm2 } from "../plane.ts";
import { arcCoverage } from "./arc-coverage.ts";
import type { WallFit } from "./bore-fit.ts";
import type { WallInput } from "./bore-input.ts";
import type { WallChoice } from "./exclude-outliers.ts";
import { expandUncertainty } from "./expand-uncertainty.ts";
import {
  warnNominal,
  warnOutliers,
  warnRedundancy,
  warnResolution,
  warnScatter,
  warnWeak,
} from "./fit-warnings.ts";
import { parametersOf } from "./surface-model.ts";
import { varianceScale, type VarianceScale } from "./variance-scale.ts";
import type { WallReadings } from "./wall-readings.ts";

/** States a solved wall with its covariance, its expanded uncertainty, what it was made from, and what to beware of. */
export function describeWall(input: WallInput, readings: WallReadings, choice: WallChoice): WallFit {
  const { solution, used, exclusions } = choice;
  const { centre, radiusMm, cofactors, weightedSquares, residualsMm, model } = solution;
  const stated = readings.uMm !== null;
  const parameters = parametersOf(model);
  const readingsUsed = residualsMm.length - exclusions.length;
  const redundancy = readingsUsed - parameters;
  const scale = varianceScale(weightedSquares, redundancy, stated);
  const sizeKnown = input.form !== "turned_gauge" || input.zero === "nominal";
  const diameterMm = sizeKnown ? 2 * radiusMm : null;
  const { rmsMm, roundnessMm } = scatterOf(residualsMm, used);
  const chiSquare = stated ? weightedSquares : null;
  const unscaled = { hhMm2: cofactors.hh, hvMm2: cofactors.hv, vvMm2: cofactors.vv };
  const dilution = Math.sqrt(worstVarianceMm2(unscaled) / solution.evenRingCofactor);
  const covariance = scale && {
    hhMm2: cofactors.hh * scale.factor,
    hvMm2: cofactors.hv * scale.factor,
    vvMm2: cofactors.vv * scale.factor,
  };
  const diameterVarianceMm2 = sizeKnown && scale ? 4 * cofactors.radius * scale.factor : null;
  const expandedUncertainty = expandUncertainty(covariance, diameterVarianceMm2, scale, input.level);
  return {
    form: input.form,
    centre,
    diameterMm,
    covariance,
    expandedUncertainty,
    roundnessMm,
    residualsMm,
    used,
    exclusions,
    arc: arcCoverage(readings, used, centre),
    taper: taperOf(input, choice, scale, expandedUncertainty?.factor ?? null),
    tilt: model.free === "tilt" ? solution.slope : null,
    statistics: {
      readingsUsed,
      parameters,
      rmsMm,
      chiSquare,
      varianceInflation: stated && scale ? scale.factor : null,
      dilution,
      iterations: solution.iterations,
    },
    warnings: [
      ...warnWeak(dilution, "weak_arc"),
      ...warnRedundancy(redundancy),
      ...warnScatter(chiSquare, redundancy),
      ...warnResolution(solution.spacingMm, rmsMm, radiusMm),
      ...(input.form !== "wire" && input.outliers ? warnOutliers(exclusions.length, used.length) : []),
      ...warnNominal(diameterMm, input.nominalDiameterMm),
    ],
  };
}

/** Root mean square, and peak to valley, of the residuals in use. */
function scatterOf(residualsMm: readonly number[], used: readonly boolean[]) {
  let least = Infinity;
  let most = -Infinity;
  let squares = 0;
  let count = 0;
  for (let i = 0; i < residualsMm.length; i++) {
    if (!used[i]!) continue;
    const residual = residualsMm[i]!;
    least = Math.min(least, residual);
    most = Math.max(most, residual);
    squares += residual * residual;
    count++;
  }
  return { rmsMm: Math.sqrt(squares / count), roundnessMm: most - least };
}

function taperOf(
  input: WallInput,
  { solution }: WallChoice,
  scale: VarianceScale | null,
  factor: number | null,
): WallFit["taper"] {
  if (input.form !== "points" || input.taper === null) return null;
  if (input.taper.form === "known") {
    return { halfAngleDeg: input.taper.halfAngleDeg, expandedUncertaintyDeg: null };
  }
  const { tangent, cofactors } = solution;
  const degPerTangent = 180 / Math.PI / (1 + tangent * tangent);
  return {
    halfAngleDeg: (Math.atan(tangent) * 180) / Math.PI,
    expandedUncertaintyDeg:
      scale && factor !== null ? factor * Math.sqrt(cofactors.tangent * scale.factor) * degPerTangent : null,
  };
}
