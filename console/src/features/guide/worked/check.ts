import { writeNumber } from "../../../../../shared/figures/write-number.ts";
import {
  numberColumn,
  signedCell,
  textCell,
  textColumn,
  type FigureTable,
} from "../../../../../shared/figures/figure-table.ts";

/** One number worked by hand from numbers that stand before it, beside the one that the service answered. */
export interface Check {
  readonly what: string;
  /** The formula with the numbers put in. */
  readonly working: string;
  readonly here: number;
  readonly answered: number;
}

/** A number inside a working: its own minus in brackets, so that two signs never stand side by side. */
export function put(value: number, decimals: number): string {
  const text = writeNumber(value, decimals);
  return text.startsWith("\u2212") ? `(${text})` : text;
}

/** Checks as a table: the working, what it comes to, and what was answered. */
export function tabulateChecks(
  caption: string,
  checks: readonly Check[],
  unit: string | null,
  decimals: number,
): FigureTable {
  return {
    caption,
    columns: [
      textColumn("number"),
      textColumn("worked by hand"),
      numberColumn("comes to", unit),
      numberColumn("answered", unit),
    ],
    rows: checks.map(({ what, working, here, answered }) => [
      textCell(what),
      textCell(working),
      signedCell(here, decimals),
      signedCell(answered, decimals),
    ]),
  };
}
