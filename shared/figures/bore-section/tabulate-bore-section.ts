import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsFor } from "../write-number.ts";
import type { BoreSectionModel } from "./bore-section-model.ts";

/** The numbers of the bore section, one row a reading in the order sent. */
export function tabulateBoreSection(model: BoreSectionModel): FigureTable {
  const decimals = decimalsFor(
    model.points.map((point) => point.residual),
    decimalsAcross(model.offsetUnit),
  );
  return {
    caption: `Readings of ${model.id}`,
    columns: [
      numberColumn("reading", null),
      numberColumn("clock angle", "\u00b0"),
      numberColumn("residual", model.offsetUnit),
      textColumn("in the fit"),
    ],
    rows: model.points.map((point) => [
      numberCell(point.number, 0),
      numberCell(point.clockDeg, 2),
      signedCell(point.residual, decimals),
      textCell(!point.used ? "excluded" : point.contact ? "contact" : "used"),
    ]),
  };
}
