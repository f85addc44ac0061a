import { decimalsAcross, decimalsFor, writeNumber, writeSigned } from "../write-number.ts";
import type { PlanElevationModel, Survey } from "./plan-elevation-model.ts";

/** Plan and elevation in sentences: what a reader who cannot see them needs to know. */
export function describePlanElevation(model: PlanElevationModel): string {
  const references = model.stations.filter((station) => station.reference).map((station) => station.id);
  return [
    `Plan and elevation of ${model.stations.length} stations relative to the ${model.axisWords}.`,
    references.length === 0 ? "" : `Reference stations: ${references.join(", ")}.`,
    ...model.surveys.map((survey) => describeSurvey(model, survey)),
  ]
    .filter((sentence) => sentence !== "")
    .join(" ");
}

function describeSurvey(model: PlanElevationModel, survey: Survey): string {
  const named = (verdict: string): string[] =>
    survey.stations.filter((station) => station.verdict === verdict).map((station) => station.id);
  const [conforming, undecided, exceeding] = [named("conforms"), named("undecided"), named("exceeds")];
  const farthest = survey.stations.reduce<Survey["stations"][number] | undefined>(
    (most, station) => (most && most.radial >= station.radial ? most : station),
    undefined,
  );
  const decimals = decimalsFor(
    survey.stations.map((station) => station.radial),
    decimalsAcross(model.offsetUnit),
  );
  const judged = conforming.length + undecided.length + exceeding.length > 0;
  const counts = [
    `${conforming.length} conform`,
    `${undecided.length} undecided${undecided.length > 0 ? ` (${undecided.join(", ")})` : ""}`,
    `${exceeding.length} exceed${exceeding.length > 0 ? ` (${exceeding.join(", ")})` : ""}`,
  ];
  const most =
    farthest === undefined
      ? ""
      : ` Largest deviation ${writeNumber(farthest.radial, decimals)} ${model.offsetUnit} at ${farthest.id}: h ${writeSigned(farthest.deviation.h, decimals)}, v ${writeSigned(farthest.deviation.v, decimals)}.`;
  return `${capitalise(survey.name)}: ${judged ? counts.join(", ") : "not judged"}.${most}`;
}

function capitalise(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}
