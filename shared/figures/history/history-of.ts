import type { MachineHistory } from "../../schemas/machine-history.ts";
import type { HistoryModel, HistoryPlace } from "./history-model.ts";

/** The history of a machine as it is drawn: stations in order of z, without those never measured. */
export function historyModelOf({ units, outages, stations }: MachineHistory): HistoryModel {
  const indexOf = new Map(outages.map(({ jobId }, index) => [jobId, index]));
  return {
    offsetUnit: units.offset,
    outages: outages.map(({ title, at }) => ({ title, day: at.slice(0, 10) })),
    stations: [...stations]
      .sort((one, other) => one.z - other.z)
      .map((station) => ({
        id: station.id,
        reference: station.outages.some(({ reference }) => reference),
        places: station.outages.flatMap(({ jobId, asFound, asLeft }) => {
          const outage = indexOf.get(jobId);
          if (outage === undefined) return [];
          return (["found", "left"] as const).flatMap((moment): HistoryPlace[] => {
            const place = moment === "found" ? asFound : asLeft;
            return place ? [{ outage, moment, ...place.position, verdict: place.verdict }] : [];
          });
        }),
        drifts: station.drifts.flatMap(({ from, to, changed }) => {
          const [start, end] = [indexOf.get(from), indexOf.get(to)];
          return start === undefined || end === undefined ? [] : [{ from: start, to: end, changed }];
        }),
      }))
      .filter(({ places }) => places.length > 0),
  };
}
