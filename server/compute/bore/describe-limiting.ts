import { arcCoverage } from "./arc-coverage.ts";
import type { Exclusion, FitWarning, WallFit } from "./bore-fit.ts";
import type { WallInput } from "./bore-input.ts";
import type { LimitingMethod } from "./circle-method.ts";
import { contactDilution, contactSpread } from "./contact-covariance.ts";
import { expandUncertainty } from "./expand-uncertainty.ts";
import { warnNominal, warnOutliers, warnRedundancy, warnResolution, warnWeak } from "./fit-warnings.ts";
import type { LimitingCircle } from "./limiting-circle.ts";
import { readingsMember, type WallReadings } from "./wall-readings.ts";

/** Centre and radius; a zone has two radii. */
const circleParameters = 3;
const zoneParameters = 4;

/** What was done with the readings before the limiting circle was sought. */
export interface LimitingChoice {
  readonly method: LimitingMethod;
  readonly used: readonly boolean[];
  readonly exclusions: readonly Exclusion[];
  /** Coverage as the least-squares circle's centre sees it; null where no such circle fits. */
  readonly ringCoverageDeg: number | null;
}

/**
 * States a limiting circle with its contacts, the covariance that stated uncertainties of the contacts give it, and
 * what to beware of. Nothing stated: the covariance is null, since extreme readings tell nothing of their scatter.
 * @throws ComputeError rank_deficient
 */
export function describeLimiting(
  input: WallInput,
  readings: WallReadings,
  choice: LimitingChoice,
  circle: LimitingCircle,
): WallFit {
  const { method, used, exclusions } = choice;
  const { centre, radiusMm, residualsMm, contacts } = circle;
  const { count, rmsMm, roundnessMm } = scatterOf(residualsMm, used);
  const sizeKnown = input.form !== "turned_gauge" || input.zero === "nominal";
  const diameterMm = sizeKnown ? 2 * radiusMm : null;
  const member = readingsMember[input.form];
  const spread = readings.uMm === null ? null : contactSpread(contacts, readings.uMm, member);
  const dilution = contactDilution(contacts, member);
  const indices = [...contacts.outer, ...contacts.inner].map(({ index }) => index);
  return {
    form: input.form,
    centre,
    diameterMm,
    covariance: spread?.covariance ?? null,
    expandedUncertainty: expandUncertainty(
      spread?.covariance ?? null,
      sizeKnown && spread ? 4 * spread.radiusVarianceMm2 : null,
      { factor: 1, dof: null },
      input.level,
    ),
    roundnessMm,
    residualsMm,
    used,
    exclusions,
    arc: arcCoverage(readings, used, centre),
    taper:
      input.form === "points" && input.taper?.form === "known"
        ? { halfAngleDeg: input.taper.halfAngleDeg, expandedUncertaintyDeg: null }
        : null,
    tilt: null,
    contacts: [...new Set(indices)].sort((a, b) => a - b),
    statistics: {
      readingsUsed: count,
      parameters: method === "minimum_zone" ? zoneParameters : circleParameters,
      rmsMm,
      chiSquare: null,
      varianceInflation: null,
      dilution,
      iterations: circle.cells,
    },
    warnings: [
      ...warnUnsuited(method, choice.ringCoverageDeg),
      ...warnTie(circle.tieAwayMm, radiusMm),
      ...warnWeak(dilution, "weak_arc"),
      ...warnRedundancy(count - circleParameters),
      ...warnResolution(circle.spacingMm, rmsMm, radiusMm),
      ...(input.form !== "wire" && input.outliers ? warnOutliers(exclusions.length, used.length) : []),
      ...warnNominal(diameterMm, input.nominalDiameterMm),
    ],
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
  return { count, rmsMm: Math.sqrt(squares / count), roundnessMm: most - least };
}

/** On less than half a ring the smallest circle round the readings leans on their ends: it is no bore. */
function warnUnsuited(method: LimitingMethod, ringCoverageDeg: number | null): FitWarning[] {
  if (method !== "minimum_circumscribed" || (ringCoverageDeg !== null && ringCoverageDeg >= 180)) return [];
  const seen = ringCoverageDeg === null ? "too flat an arc" : `${ringCoverageDeg.toFixed(1)} degrees`;
  const detail = `The readings cover ${seen} of the bore, less than half: the circumscribed circle is that of their chord, not of the wall.`;
  return [{ code: "criterion_unsuited_to_arc", detail }];
}

function warnTie(tieAwayMm: number | null, radiusMm: number): FitWarning[] {
  if (tieAwayMm === null) return [];
  const share = ((50 * tieAwayMm) / radiusMm).toPrecision(2);
  const detail = `Another centre, ${share} % of the diameter away, is as good within the reading uncertainty: the readings do not tell which is the bore's.`;
  return [{ code: "another_centre_as_good", detail }];
}
