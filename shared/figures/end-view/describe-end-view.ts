import { decimalsAcross, decimalsFor, writeNumber } from "../write-number.ts";
import type { Survey } from "../plan-elevation/plan-elevation-model.ts";
import { clockDegOf, type EndViewModel } from "./end-view-model.ts";

/** Stations named one by one; a longer list stands in the table. */
const named = 30;

/** The end view in sentences: what a reader who cannot see it needs to know. */
export function describeEndView(model: EndViewModel): string {
  return [
    `End view of ${model.stations.length} stations looking downstream: deviation of each from its target.`,
    ...model.surveys.map((survey) => describeSurvey(model, survey)),
  ].join(" ");
}

function describeSurvey({ offsetUnit }: EndViewModel, { name, stations }: Survey): string {
  const decimals = decimalsFor(
    stations.map(({ radial }) => radial),
    decimalsAcross(offsetUnit),
  );
  const words = stations.slice(0, named).map(({ id, deviation, radial, verdict }) => {
    const clockDeg = clockDegOf(deviation);
    const direction = clockDeg === null ? "" : ` at ${writeNumber(clockDeg, 0)} degrees`;
    return `${id} ${writeNumber(radial, decimals)} ${offsetUnit}${direction}${verdict === null ? "" : `, ${verdict}`}`;
  });
  const rest = stations.length - words.length;
  return `${name.charAt(0).toUpperCase()}${name.slice(1)}: ${words.join("; ")}${rest > 0 ? `; and ${rest} more` : ""}.`;
}
