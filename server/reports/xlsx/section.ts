import { headingCell, textCell, type SheetCell } from "../../spreadsheets/cell.ts";

/** A table under a heading of its own, or the words that stand for an empty one. */
export function section(
  heading: string,
  columns: readonly string[],
  empty: string,
  rows: readonly SheetCell[][] = [],
): SheetCell[][] {
  const head = [textCell(heading, { fontWeight: "bold", fontSize: 12 })];
  return rows.length > 0 ? [head, columns.map(headingCell), ...rows, []] : [head, [textCell(empty)], []];
}
