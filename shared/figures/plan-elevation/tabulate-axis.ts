import type { AxisDeviationResult } from "../../schemas/axis-deviations.ts";
import type { Units } from "../../units.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsAcross, decimalsFor } from "../write-number.ts";

/** The reference axis, one row a plane. */
export function tabulateAxis(axis: AxisDeviationResult["axis"], units: Units): FigureTable {
  const decimals = decimalsFor([axis.h.at0, axis.v.at0], decimalsAcross(units.offset));
  const slopeDecimals = decimalsFor([axis.h.slope, axis.v.slope], decimalsAcross(units.offset) + 2);
  const scatter = axis.chiSquare
    ? { heading: "chi-square", unit: null, values: axis.chiSquare, decimals: 3 }
    : axis.scatter
      ? { heading: "scatter s", unit: units.offset, values: axis.scatter, decimals }
      : null;
  return {
    caption: "Reference axis",
    columns: [
      textColumn("plane"),
      numberColumn("at z = 0", units.offset),
      numberColumn("slope", `${units.offset} per ${units.axial}`),
      ...(scatter ? [numberColumn(scatter.heading, scatter.unit), numberColumn("dof", null)] : []),
    ],
    rows: (["h", "v"] as const).map((plane) => [
      textCell(plane),
      signedCell(axis[plane].at0, decimals),
      signedCell(axis[plane].slope, slopeDecimals),
      ...(scatter ? [numberCell(scatter.values[plane], scatter.decimals), numberCell(axis.dof, 0)] : []),
    ]),
  };
}
