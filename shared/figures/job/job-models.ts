import type { JobRecord } from "../../schemas/jobs.ts";
import { boreSectionOf } from "../bore-section/bore-section-of.ts";
import type { BoreSectionModel } from "../bore-section/bore-section-model.ts";
import { endViewOf } from "../end-view/end-view-of.ts";
import type { EndViewModel } from "../end-view/end-view-model.ts";
import { planElevationOf, surveyOf } from "../plan-elevation/plan-elevation-of.ts";
import { inertText } from "../inert-text.ts";
import type { PlanElevationModel, Survey } from "../plan-elevation/plan-elevation-model.ts";
import { comparedSurveys, type ComputedSurvey } from "./compared-surveys.ts";

type Drawn = Pick<JobRecord, "machine" | "surveys" | "details">;
/** How a station's name is written where it is drawn: a drawing leaves room for what it then holds. */
type Write = (name: string) => string;

/** As found and as left over the machine's z, each from its own axis; null before a survey is computed. */
export function planElevationOfJob(record: Drawn, write: Write = inertText): PlanElevationModel | null {
  const compared = comparedSurveys(record);
  const newest = compared.at(-1);
  if (!newest) return null;
  const { units, stations } = record.machine;
  const model = planElevationOf({ units, stations }, newest.result);
  const moved = compared.some(({ result }) => !sameAxis(result.axis, newest.result.axis));
  return {
    ...model,
    axisWords: write(moved ? `each survey's own axis, of the newest: ${model.axisWords}` : model.axisWords),
    stations: model.stations.map(renamed(write)),
    surveys: compared.map(({ name, result }) => named(surveyOf(name, result), write)),
  };
}

/** The same stations' deviations as vectors; null before a survey is computed. */
export function endViewOfJob(record: Drawn, write: Write = inertText): EndViewModel | null {
  const compared = comparedSurveys(record);
  const newest = compared.at(-1);
  if (!newest) return null;
  const { units, stations } = record.machine;
  const model = endViewOf(
    { units, stations },
    compared.map(({ name, result }) => surveyOf(name, result)),
    new Set(newest.result.axis.through),
  );
  return {
    ...model,
    stations: model.stations.map(renamed(write)),
    surveys: model.surveys.map((survey) => named(survey, write)),
  };
}

const renamed =
  (write: Write) =>
  <Station extends { readonly id: string }>(station: Station): Station => ({
    ...station,
    id: write(station.id),
  });

const named = (survey: Survey, write: Write): Survey => ({
  ...survey,
  stations: survey.stations.map(renamed(write)),
});

/** A bore as one survey's reading of it was fitted; null where its readings are no wall points, or were not fitted. */
export function boreSectionOfJob(
  { machine, details }: Drawn,
  { survey, result }: ComputedSurvey,
  stationId: string,
): BoreSectionModel | null {
  const fit = result.fits.find(({ id }) => id === stationId);
  const reading = survey.readings.find(
    ({ reading: read, counts }) => counts && read.station === stationId && read.closing !== true,
  )?.reading;
  if (!fit || !reading || reading.form === "wire" || reading.form === "rotating_target") return null;
  const drawn = machine.stations.find(({ id }) => id === stationId)?.nominalDiameter;
  const bore =
    reading.form === "points"
      ? { ...reading, id: stationId }
      : { ...reading, id: stationId, nominalDiameter: reading.nominalDiameter ?? drawn ?? 0 };
  return boreSectionOf(bore, fit, machine.units, details.seen);
}

function sameAxis(one: ComputedSurvey["result"]["axis"], other: ComputedSurvey["result"]["axis"]): boolean {
  return one.method === other.method && one.through.join("\n") === other.through.join("\n");
}
