import type { BoreFitResult } from "../../schemas/bore-fits.ts";
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

/** All bores of a fit, one row a bore in the order sent. */
export function tabulateBoreFits(fits: readonly BoreFitResult[], units: Units): FigureTable {
  const least = decimalsAcross(units.offset);
  const decimals = decimalsFor(
    fits.flatMap(({ centre }) => [centre.h, centre.v]),
    least,
  );
  const reduced = fits.some(({ diameterAt20C }) => diameterAt20C !== undefined);
  return {
    caption: "Centres and sizes",
    columns: [
      textColumn("bore"),
      numberColumn("centre h", units.offset),
      numberColumn("centre v", units.offset),
      numberColumn("U of h", units.offset),
      numberColumn("U of v", units.offset),
      numberColumn("diameter", units.bore),
      ...(reduced ? [numberColumn("diameter at 20 °C", units.bore)] : []),
      numberColumn("roundness", units.offset),
      numberColumn("coverage", "\u00b0"),
      numberColumn("used", null),
      numberColumn("of", null),
    ],
    rows: fits.map((fit) => [
      textCell(fit.id),
      signedCell(fit.centre.h, decimals),
      signedCell(fit.centre.v, decimals),
      numberCell(fit.expandedUncertainty?.h, decimals),
      numberCell(fit.expandedUncertainty?.v, decimals),
      numberCell(fit.diameter, decimalsAcross(units.bore)),
      ...(reduced ? [numberCell(fit.diameterAt20C, decimalsAcross(units.bore))] : []),
      numberCell(fit.roundness, decimals),
      numberCell(fit.arc?.coverageDeg, 1),
      numberCell(fit.used.filter(Boolean).length, 0),
      numberCell(fit.used.length, 0),
    ]),
  };
}
