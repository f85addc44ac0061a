import type { SheetCell } from "./cell.ts";

/** One sheet, and how it is shown and printed. */
export interface Sheet {
  readonly name: string;
  readonly rows: readonly (readonly SheetCell[])[];
  /** In characters, column by column. */
  readonly widths: readonly number[];
  /** What stays in view: so many rows from the top and columns from the left. */
  readonly frozen?: { readonly rows: number; readonly columns: number };
  /** The row, counted from 0, that is printed again at the head of every page. */
  readonly headingRow?: number;
  /** A4 when absent. Always landscape, and as many pages long as it takes. */
  readonly paper?: "A3" | "A4";
  /** Names for cells, good in this sheet alone: name to address. */
  readonly names?: Readonly<Record<string, string>>;
}

/** A workbook, and what stands on every page of it. */
export interface Workbook {
  readonly sheets: readonly Sheet[];
  readonly title: string;
  readonly creator: string;
  readonly description: string;
  readonly createdAt: Date;
  readonly pageHead: { readonly left: string; readonly right: string };
  /** Lines at the foot, beside the number of the page. */
  readonly pageFoot: readonly string[];
}
