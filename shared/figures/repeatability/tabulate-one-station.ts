import type { OneStationResult } from "../../schemas/repeatability-answers.ts";
import type { Units } from "../../units.ts";
import {
  numberCell,
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../figure-table.ts";
import { decimalsForSmallest } from "../significant-decimals.ts";
import { decimalsAcross, decimalsFor } from "../write-number.ts";
import { probabilityCell, significanceCell } from "./probability-cell.ts";

const planes = ["h", "v"] as const;

/** Mean and scatter of repeat readings, one row a plane. */
export function tabulateRepeats(result: OneStationResult, units: Units): FigureTable {
  const { mean, standardDeviation, uncertainty, expandedUncertainty } = result;
  const unit = units.offset;
  const decimals = decimalsForSmallest(
    planes.flatMap((plane) => [standardDeviation[plane], uncertainty[plane]]),
    decimalsFor([mean.h, mean.v], decimalsAcross(unit)),
  );
  return {
    caption: `${result.count} readings of ${result.station}`,
    columns: [
      textColumn("plane"),
      numberColumn("mean", unit),
      numberColumn("s of one reading", unit),
      numberColumn("u of the mean", unit),
      numberColumn("U of the mean", unit),
      numberColumn("dof", null),
      numberColumn("correlation of neighbours", null),
    ],
    rows: planes.map((plane) => [
      textCell(plane),
      signedCell(mean[plane], decimals),
      numberCell(standardDeviation[plane], decimals),
      numberCell(uncertainty[plane], decimals),
      numberCell(expandedUncertainty[plane], decimals),
      numberCell(result.dof, 0),
      signedCell(result.autocorrelation[plane], 3),
    ]),
  };
}

/** The slope against time and whether chance makes such a one; null where drift cannot be told. */
export function tabulateDrift({ drift }: OneStationResult, units: Units): FigureTable | null {
  if (drift === null) return null;
  const unit = `${units.offset} per ${drift.per}`;
  const decimals = decimalsForSmallest(
    planes.map((plane) => drift[plane].standardError),
    decimalsAcross(units.offset),
  );
  const together = drift.together;
  return {
    caption: "Drift",
    columns: [
      textColumn("plane"),
      numberColumn("slope", unit),
      numberColumn("standard error", unit),
      numberColumn("t or T²", null),
      numberColumn("probability", null),
      textColumn("outcome"),
    ],
    rows: [
      ...planes.map((plane) => {
        const { slope, standardError, t, pValue, significant } = drift[plane];
        return [
          textCell(plane),
          signedCell(slope, decimals),
          numberCell(standardError, decimals),
          signedCell(t, 3),
          probabilityCell(pValue),
          significanceCell(significant),
        ];
      }),
      ...(together === null
        ? []
        : [
            [
              textCell("both"),
              numberCell(null, 0),
              numberCell(null, 0),
              numberCell(together.square, 3),
              probabilityCell(together.pValue),
              significanceCell(together.significant),
            ],
          ]),
    ],
  };
}

/** The reading farthest from the mean in each plane; null where neither plane has one. */
export function tabulateFarthest({ farthest }: OneStationResult): FigureTable | null {
  const told = planes.flatMap((plane) => {
    const reading = farthest[plane];
    return reading === null ? [] : [{ plane, ...reading }];
  });
  if (told.length === 0) return null;
  return {
    caption: "Reading farthest from the mean (kept)",
    columns: [
      textColumn("plane"),
      numberColumn("reading", null),
      numberColumn("off by", "s"),
      numberColumn("Grubbs' limit", "s"),
      textColumn("outcome"),
    ],
    rows: told.map(({ plane, index, ratio, limit, standsOut }) => [
      textCell(plane),
      numberCell(index + 1, 0),
      numberCell(ratio, 3),
      numberCell(limit, 3),
      textCell(standsOut ? "stands out" : "as chance allows"),
    ]),
  };
}
