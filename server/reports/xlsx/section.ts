import {
  fixed,
  headingCell,
  numberCell,
  numberHeadingCell,
  textCell,
  type CellLook,
  type SheetCell,
} from "../../spreadsheets/cell.ts";
import type { Cell, FigureTable } from "../../../shared/figures/figure-table.ts";

/** Told apart without colour too: by the word itself and its weight. */
export const verdictLooks: Readonly<Record<"conforms" | "undecided" | "exceeds", CellLook>> = {
  conforms: { backgroundColor: "#E3F1E5" },
  undecided: { backgroundColor: "#FFF3D6" },
  exceeds: { backgroundColor: "#F8DEDA", fontWeight: "bold" },
};

/** Lines under the title of a sheet, in line with it. */
export const lineUnderTitle = (words: string, look: CellLook = {}): SheetCell[] => [
  textCell(words, { align: "left", ...look }),
];

/** Headings as their columns stand: over numbers at the right. */
export function headingRow(
  headings: readonly string[],
  rows: readonly (readonly SheetCell[])[],
): SheetCell[] {
  return headings.map((heading, index) => {
    const kinds = rows.map((row) => row[index]).filter((cell) => cell?.look.align === undefined);
    const holdsNumbers = kinds.some((cell) => cell?.kind === "number" || cell?.kind === "formula");
    return holdsNumbers ? numberHeadingCell(heading) : headingCell(heading);
  });
}

/**
 * A table of the report under a heading of its own, units in its headings; `empty` where it has no row, and nothing
 * where that is null. Its last column, when of text, takes what is left of a sheet `columns` wide.
 */
export function section(table: FigureTable | null, empty: string | null, columns: number): SheetCell[][] {
  if (table === null || table.rows.length === 0) {
    if (empty === null) return [];
    return [headOf(table?.caption ?? ""), [textCell(empty)], []];
  }
  const last = table.columns.length - 1;
  const headings = table.columns.map(({ heading, unit }) =>
    unit === null ? heading : `${heading} (${unit})`,
  );
  const isText = table.columns[last]?.align === "start";
  const span = isText && columns > last + 1 ? { columnSpan: columns - last } : {};
  const rows = filledDown(table).map((row) =>
    row.map((cell, index) => sheetCell(cell, index === 0 ? atLeft : {})),
  );
  const spanned = [headingRow(headings, rows), ...rows].map((row) => [
    ...row.slice(0, last),
    widened(row[last], span),
  ]);
  return [headOf(table.caption), ...spanned, []];
}

/** What names a row stands at the left, a number too. */
const atLeft: CellLook = { align: "left" };

function widened(cell: SheetCell | undefined, look: CellLook): SheetCell {
  return cell?.kind === "text" ? { ...cell, look: { ...cell.look, ...look } } : (cell ?? null);
}

const headOf = (caption: string): SheetCell[] => [textCell(caption, { fontWeight: "bold", fontSize: 12 })];

/** On paper a row that belongs to the one above leaves out what they share; here every row stands for itself. */
function filledDown({ rows }: FigureTable): Cell[][] {
  const filled: Cell[][] = [];
  for (const row of rows) {
    const above = filled.at(-1);
    const belongs = isBlank(row[0]);
    filled.push(row.map((cell, index) => (belongs && isBlank(cell) ? (above?.[index] ?? cell) : cell)));
  }
  return filled;
}

const isBlank = (cell: Cell | undefined): boolean => cell?.kind === "text" && cell.text === "";

/** A dash on paper is an empty cell here. */
function sheetCell(cell: Cell, look: CellLook): SheetCell {
  switch (cell.kind) {
    case "text":
      return cell.text === "\u2013" ? null : textCell(cell.text, { wrap: true });
    case "number":
      return numberCell(cell.value, fixed(cell.decimals), look);
    case "verdict":
      return textCell(cell.verdict, verdictLooks[cell.verdict]);
  }
}
