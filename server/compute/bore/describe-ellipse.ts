import { ComputeError } from "../compute-error.ts";
import { worstVarianceMm2 } from "../plane.ts";
import { radialFactor } from "../statistics/radial-factor.ts";
import { arcCoverage } from "./arc-coverage.ts";
import type { EllipseAxes, Exclusion, WallFit } from "./bore-fit.ts";
import type { WallInput } from "./bore-input.ts";
import { ellipseParameters } from "./ellipse-model.ts";
import { expandUncertainty } from "./expand-uncertainty.ts";
import {
  warnNominal,
  warnOutliers,
  warnRedundancy,
  warnResolution,
  warnScatter,
  warnWeak,
} from "./fit-warnings.ts";
import type { EllipseSolution } from "./solve-ellipse.ts";
import { varianceScale, type VarianceScale } from "./variance-scale.ts";
import { readingsMember, type WallReadings } from "./wall-readings.ts";

const coverageMinDeg = 240;
/** Rounding of a coverage that is as large as it must be. */
const coverageSlackDeg = 1e-6;
/** Ovality below this share of the diameter is rounding. */
const ovalityFloor = 1e-12;

/**
 * States a solved ellipse: centre, mean diameter, axes, ovality with its own uncertainty, and the rest as for a circle.
 * Less than 240° of coverage, as seen from that centre, is refused: there the readings hardly tell an oval from another.
 * @throws ComputeError coverage_insufficient
 */
export function describeEllipse(
  input: WallInput,
  readings: WallReadings,
  solution: EllipseSolution,
  used: readonly boolean[],
  exclusions: readonly Exclusion[],
): WallFit {
  const { centre, residualsMm, weightedSquares, cofactors } = solution;
  const stated = readings.uMm !== null;
  const arc = arcCoverage(readings, used, centre);
  if (arc.coverageDeg < coverageMinDeg - coverageSlackDeg) throw tooLittle(arc.coverageDeg, input);
  const readingsUsed = residualsMm.length - exclusions.length;
  const redundancy = readingsUsed - ellipseParameters;
  const scale = varianceScale(weightedSquares, redundancy, stated);
  const sizeKnown = input.form !== "turned_gauge" || input.zero === "nominal";
  const meanDiameterMm = solution.majorMm + solution.minorMm;
  const diameterMm = sizeKnown ? meanDiameterMm : null;
  const { rmsMm, roundnessMm } = scatterOf(residualsMm, used);
  const chiSquare = stated ? weightedSquares : null;
  const dilution = Math.sqrt(worstVarianceMm2(cofactors.centre) / solution.evenRingCofactor);
  const covariance = scale && {
    hhMm2: cofactors.centre.hhMm2 * scale.factor,
    hvMm2: cofactors.centre.hvMm2 * scale.factor,
    vvMm2: cofactors.centre.vvMm2 * scale.factor,
  };
  const diameterVarianceMm2 = sizeKnown && scale ? cofactors.diameterMm2 * scale.factor : null;
  return {
    form: input.form,
    centre,
    diameterMm,
    covariance,
    expandedUncertainty: expandUncertainty(covariance, diameterVarianceMm2, scale, input.level),
    roundnessMm,
    residualsMm,
    used,
    exclusions,
    arc,
    taper: null,
    tilt: null,
    ellipse: axesOf(solution, scale, sizeKnown, input.level),
    statistics: {
      readingsUsed,
      parameters: ellipseParameters,
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
      ...warnResolution(solution.spacingMm, rmsMm, meanDiameterMm / 2),
      ...(input.form !== "wire" && input.outliers ? warnOutliers(exclusions.length, used.length) : []),
      ...warnNominal(diameterMm, input.nominalDiameterMm),
    ],
  };
}

/**
 * The ovality is the length of a vector in the plane (2·(direction of the major axis)), so that its expanded
 * uncertainty takes the two-dimensional factor: a round bore then has no direction as often as the level promises.
 */
function axesOf(
  { majorMm, minorMm, ovalityMm, majorClockDeg, cofactors }: EllipseSolution,
  scale: VarianceScale | null,
  sizeKnown: boolean,
  level: number,
): EllipseAxes {
  const ovalityExpandedMm =
    scale && radialFactor(level, scale.dof) * Math.sqrt(worstVarianceMm2(cofactors.ovality) * scale.factor);
  const least = Math.max(ovalityExpandedMm ?? 0, ovalityFloor * (majorMm + minorMm));
  return {
    majorMm: sizeKnown ? 2 * majorMm : null,
    minorMm: sizeKnown ? 2 * minorMm : null,
    ovalityMm,
    ovalityExpandedMm,
    majorClockDeg: ovalityMm > least ? majorClockDeg : null,
  };
}

/** Root mean square, and peak to valley, of the residuals in use. */
function scatterOf(residualsMm: readonly number[], used: readonly boolean[]) {
  let [least, most, squares, count] = [Infinity, -Infinity, 0, 0];
  for (const [i, residual] of residualsMm.entries()) {
    if (!used[i]!) continue;
    least = Math.min(least, residual);
    most = Math.max(most, residual);
    squares += residual * residual;
    count++;
  }
  return { rmsMm: Math.sqrt(squares / count), roundnessMm: most - least };
}

function tooLittle(coverageDeg: number, { form }: WallInput): ComputeError {
  const detail = `An ellipse needs ${coverageMinDeg} degrees of the bore; the readings cover ${coverageDeg.toFixed(1)}.`;
  return new ComputeError("coverage_insufficient", detail, {
    at: [readingsMember[form]],
    reached: coverageDeg,
  });
}
