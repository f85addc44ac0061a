import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsFor } from "../write-number.ts";
import { clockDegOf, type EndViewModel } from "./end-view-model.ts";

/** The vectors of the end view, one row a station and survey, the surveys of a station together. */
export function tabulateEndView(model: EndViewModel): FigureTable {
  const unit = model.offsetUnit;
  const decimals = decimalsFor(
    model.surveys.flatMap(({ stations }) => stations.flatMap(({ deviation: { h, v } }) => [h, v])),
    decimalsAcross(unit),
  );
  return {
    caption: "Deviations as vectors",
    columns: [
      textColumn("station"),
      textColumn("survey"),
      textColumn("verdict"),
      numberColumn("h", unit),
      numberColumn("v", unit),
      numberColumn("radial", unit),
      numberColumn("clock", "\u00b0"),
    ],
    rows: model.stations.flatMap(({ id, reference }) =>
      model.surveys.flatMap(({ name, stations }) => {
        const found = stations.find((station) => station.id === id);
        if (!found) return [];
        const { deviation, radial, verdict } = found;
        return [
          [
            textCell(reference ? `${id} (ref.)` : id),
            textCell(name),
            verdict === null ? textCell("not judged") : { kind: "verdict" as const, verdict },
            signedCell(deviation.h, decimals),
            signedCell(deviation.v, decimals),
            numberCell(radial, decimals),
            numberCell(clockDegOf(deviation), 1),
          ],
        ];
      }),
    ),
  };
}
