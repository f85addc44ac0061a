import type { ConfirmationResult } from "../../schemas/confirmation-answers.ts";
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

/** Deviations and verdicts of the later survey; null where no axis could be laid in it. */
export function tabulateAsLeft({ verdicts }: ConfirmationResult, units: Units): FigureTable | null {
  if (verdicts.length === 0) return null;
  const unit = units.offset;
  const decimals = decimalsFor(
    verdicts.flatMap(({ deviation }) => [deviation.h, deviation.v]),
    decimalsAcross(unit),
  );
  return {
    caption: "Deviations as left",
    columns: [
      textColumn("station"),
      textColumn("verdict"),
      numberColumn("h", unit),
      numberColumn("v", unit),
      numberColumn("radial", unit),
      numberColumn("U of h", unit),
      numberColumn("U of v", unit),
      numberColumn("U of radial", unit),
      numberColumn("of tolerance", "%"),
    ],
    rows: verdicts.map(({ id, verdict, deviation, expandedUncertainty, ratio, reference }) => [
      textCell(reference ? `${id} (ref.)` : id),
      verdict === null ? textCell("not judged") : { kind: "verdict", verdict },
      signedCell(deviation.h, decimals),
      signedCell(deviation.v, decimals),
      numberCell(deviation.radial, decimals),
      numberCell(expandedUncertainty?.h, decimals),
      numberCell(expandedUncertainty?.v, decimals),
      numberCell(expandedUncertainty?.radial, decimals),
      numberCell(ratio === null ? null : ratio * 100, 0),
    ]),
  };
}
