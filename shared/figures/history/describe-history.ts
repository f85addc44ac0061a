import { decimalsAcross, writeSigned } from "../write-number.ts";
import type { HistoryModel } from "./history-model.ts";

/** The history in sentences, for who cannot see the drawing. */
export function describeHistory({ offsetUnit, outages, stations }: HistoryModel): string {
  const decimals = decimalsAcross(offsetUnit);
  const changed = stations.flatMap(({ id, drifts }) =>
    drifts
      .filter((drift) => drift.changed === true)
      .map(({ from, to }) => `${id} between outages ${from + 1} and ${to + 1}`),
  );
  const untested = stations.flatMap(({ drifts }) => drifts).filter((drift) => drift.changed === null).length;
  const references = stations.filter(({ reference }) => reference).map(({ id }) => id);
  const newest = stations.flatMap(({ id, places }) => {
    const last = places.at(-1);
    return last
      ? [`${id} ${last.moment} at h ${writeSigned(last.h, decimals)}, v ${writeSigned(last.v, decimals)}`]
      : [];
  });
  return [
    `${stations.length} stations over ${outages.length} ${outages.length === 1 ? "outage" : "outages"}: ` +
      `${outages.map(({ title, day }, index) => `${index + 1} ${title}, ${day}`).join("; ")}.`,
    changed.length === 0 ? "No drift is shown between outages." : `Drifted: ${changed.join(", ")}.`,
    ...(untested > 0 ? [`${untested} ${untested === 1 ? "drift" : "drifts"} could not be tested.`] : []),
    ...(references.length > 0
      ? [`Reference stations, whose own drift is hidden in the axis: ${references.join(", ")}.`]
      : []),
    `Last known, in ${offsetUnit}: ${newest.join("; ")}.`,
  ].join(" ");
}
