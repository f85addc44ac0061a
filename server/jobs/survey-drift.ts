import type { BoreFitResult } from "../../shared/schemas/bore-fits.ts";
import type { SurveyDrift } from "../../shared/schemas/job-surveys.ts";
import { convertersFor } from "../../shared/units.ts";
import { readCovariance } from "../calculations/read-covariance.ts";
import { expandUncertainty } from "../compute/conformity/expand-uncertainty.ts";
import { radialMm, worstVarianceMm2, type PlaneCovariance, type PlaneVector } from "../compute/plane.ts";
import { welchSatterthwaite } from "../compute/statistics/welch-satterthwaite.ts";
import { closingId, type JobBasis } from "./job-requests.ts";
import { countingReadings, type SurveyState } from "./job-log.ts";

/** As POST /v1/bore-fits has it, where the job names none. */
const levelDefault = 0.95;

/**
 * How far the first station has moved from its opening to its closing reading, against the uncertainty of both together:
 * U = k₂·√λ, λ the larger eigenvalue of the sum of the two covariances, k₂ the two-dimensional factor at the job's level
 * with the degrees of freedom of Welch and Satterthwaite (JCGM 100:2008, G.2b). A change longer than U is not explained by
 * the readings alone. It is told and never taken out: that a survey is held against its own repeat of the first
 * station, and repeated where the two differ, is common practice, no source. Null without a closing reading.
 */
export function surveyDriftOf(
  { machine, details }: JobBasis,
  survey: SurveyState,
  fits: readonly BoreFitResult[],
): SurveyDrift | null {
  const { opening, closing } = countingReadings(survey);
  const first = opening[0]?.document.reading.station;
  const again = closing.find(({ document }) => document.reading.station === first) ?? closing[0];
  if (!again) return null;
  const { station } = again.document.reading;
  const opened = fits.find(({ id }) => id === station);
  const closed = fits.find(({ id }) => id === closingId(machine, station));
  if (!opened || !closed) return null;
  const { offset } = convertersFor(machine.units);
  const level = details.level ?? levelDefault;
  const change: PlaneVector = {
    hMm: offset.toMm(closed.centre.h) - offset.toMm(opened.centre.h),
    vMm: offset.toMm(closed.centre.v) - offset.toMm(opened.centre.v),
  };
  const expandedMm = expandedOf(
    [opened, closed].map(({ covariance, expandedUncertainty }) => ({
      covariance: covariance && readCovariance(covariance, offset),
      dof: expandedUncertainty?.dof ?? null,
    })),
    level,
  );
  return {
    station,
    h: closed.centre.h - opened.centre.h,
    v: closed.centre.v - opened.centre.v,
    uncertainty: expandedMm === null ? null : offset.fromMm(expandedMm),
    level,
    exceeds: expandedMm === null ? null : radialMm(change) > expandedMm,
  };
}

interface Uncertain {
  readonly covariance: PlaneCovariance | null;
  /** Null: infinite. */
  readonly dof: number | null;
}

function expandedOf(readings: readonly Uncertain[], level: number): number | null {
  const known = readings.flatMap(({ covariance, dof }) => (covariance ? [{ covariance, dof }] : []));
  if (known.length < readings.length) return null;
  const sum = (part: keyof PlaneCovariance) =>
    known.reduce((total, { covariance }) => total + covariance[part], 0);
  const dof = welchSatterthwaite(
    known.map(({ covariance }) => worstVarianceMm2(covariance)),
    known.map((one) => one.dof ?? Infinity),
  );
  const together = { hhMm2: sum("hhMm2"), hvMm2: sum("hvMm2"), vvMm2: sum("vvMm2") };
  return expandUncertainty(together, dof, level).radialMm;
}
