import type { MachineHistory } from "../../schemas/machine-history.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsFor } from "../write-number.ts";

/** What every station drifted from one outage to the next, and whether that is shown. Found less left. */
export function tabulateDrifts({ units, outages, stations }: MachineHistory): FigureTable | null {
  const rows = stations.flatMap(({ id, drifts }) => drifts.map((drift) => ({ id, ...drift })));
  if (rows.length === 0) return null;
  const numberOf = outageNumbers(outages);
  const decimals = decimalsFor(
    rows.flatMap(({ change }) => [change.h, change.v]),
    decimalsAcross(units.offset),
  );
  return {
    caption: "Drift from one outage to the next",
    columns: [
      textColumn("station"),
      textColumn("drift"),
      numberColumn("left at", null),
      numberColumn("found at", null),
      numberColumn("h", units.offset),
      numberColumn("v", units.offset),
      numberColumn("radial", units.offset),
      numberColumn("statistic", null),
      numberColumn("limit", null),
      textColumn("remark"),
    ],
    rows: rows.map(({ id, from, to, change, statistic, limit, changed, reference, targetChanged }) => [
      textCell(reference ? `${id} (ref.)` : id),
      textCell(changed === null ? "not tested" : changed ? "drifted" : "none shown"),
      numberCell(numberOf(from), 0),
      numberCell(numberOf(to), 0),
      signedCell(change.h, decimals),
      signedCell(change.v, decimals),
      numberCell(change.radial, decimals),
      numberCell(statistic, 2),
      numberCell(limit, 2),
      textCell(
        [
          ...(reference ? ["set the axis: its own drift is hidden in it"] : []),
          ...(targetChanged ? ["its target was changed"] : []),
        ].join("; ") || "–",
      ),
    ]),
  };
}

/** Where every station was found and left at every outage, off that outage's own axis. */
export function tabulatePlaces({ units, outages, stations }: MachineHistory): FigureTable {
  const numberOf = outageNumbers(outages);
  const places = stations.flatMap(({ id, outages: own }) =>
    own.flatMap(({ jobId, reference, asFound, asLeft }) =>
      [
        { moment: "as found", place: asFound },
        { moment: "as left", place: asLeft },
      ].flatMap(({ moment, place }) => (place ? [{ id, jobId, reference, moment, place }] : [])),
    ),
  );
  const decimals = decimalsFor(
    places.flatMap(({ place }) => [place.position.h, place.position.v]),
    decimalsAcross(units.offset),
  );
  return {
    caption: "Places over the outages",
    columns: [
      textColumn("station"),
      textColumn("verdict"),
      numberColumn("outage", null),
      textColumn("as"),
      numberColumn("h", units.offset),
      numberColumn("v", units.offset),
      numberColumn("deviation h", units.offset),
      numberColumn("deviation v", units.offset),
    ],
    rows: places.map(({ id, jobId, reference, moment, place }) => [
      textCell(reference ? `${id} (ref.)` : id),
      place.verdict === null ? textCell("not judged") : { kind: "verdict", verdict: place.verdict },
      numberCell(numberOf(jobId), 0),
      textCell(moment),
      signedCell(place.position.h, decimals),
      signedCell(place.position.v, decimals),
      signedCell(place.deviation.h, decimals),
      signedCell(place.deviation.v, decimals),
    ]),
  };
}

function outageNumbers(outages: MachineHistory["outages"]): (jobId: string) => number | null {
  const numbers = new Map(outages.map(({ jobId }, index) => [jobId, index + 1]));
  return (jobId) => numbers.get(jobId) ?? null;
}
