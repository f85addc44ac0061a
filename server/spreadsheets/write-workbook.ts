import writeExcelFile, { type Cell, type CellObject } from "write-excel-file/node";
import { cellText } from "./xml-text.ts";
import type { CellLook, SheetCell } from "./cell.ts";
import { finishPackage } from "./finish-package.ts";
import type { Sheet, Workbook } from "./sheet.ts";

/** Writes a workbook as XLSX (ECMA-376). The same workbook gives the same bytes, whatever the clock and its zone. */
export async function writeWorkbook(workbook: Workbook): Promise<Buffer> {
  const written = await writeExcelFile(
    workbook.sheets.map((sheet) => ({
      sheet: sheet.name,
      data: sheet.rows.map((row) => withHeight(row.map(writeCell), linesOf(row, sheet.widths))),
      columns: sheet.widths.map((width) => ({ width })),
      orientation: "landscape" as const,
      ...stickyOf(sheet),
    })),
    { fontFamily: "Arial", fontSize: 10 },
  ).toBuffer();
  return finishPackage(written, workbook);
}

/** Both ways or neither: the writer names a pane that only then exists. */
const stickyOf = ({ frozen }: Sheet) =>
  frozen ? { stickyRowsCount: frozen.rows, stickyColumnsCount: Math.max(1, frozen.columns) } : {};

const pointsPerLine = 13;

/** Readers do not fit a row to its text by themselves. */
function withHeight(cells: Cell[], lines: number): Cell[] {
  if (lines < 2) return cells;
  const at = cells.findIndex((cell) => cell !== null);
  return cells.map((cell, index) =>
    index === at ? { ...(cell as CellObject), height: lines * pointsPerLine } : cell,
  );
}

/** A word longer than a line begins on one of its own. */
function linesFor(line: string, room: number): number {
  const isBroken = line.includes(" ") && line.split(" ").some((word) => word.length > room);
  return Math.max(1, Math.ceil(line.length / room) + (isBroken ? 1 : 0));
}

/** Lines that the fullest cell of a row takes; words do not fill a line to its end. */
function linesOf(row: readonly SheetCell[], widths: readonly number[]): number {
  const lines = row.map((cell, column) => {
    if (cell?.kind !== "text" || !cell.look.wrap) return 1;
    const span = cell.look.columnSpan ?? 1;
    const width = sum(widths.slice(column, column + span)) || 10;
    const room = width < 15 ? width * 0.7 : width < 40 ? width * 0.85 : width;
    return sum(cell.value.split("\n").map((line) => linesFor(line, room)));
  });
  return Math.min(30, Math.max(1, ...lines));
}

const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);

function writeCell(cell: SheetCell): Cell {
  if (cell === null) return null;
  // What stands in a row with a text of several lines begins beside its first.
  const look: CellLook =
    cell.look.fontSize === undefined ? { alignVertical: "top", ...cell.look } : cell.look;
  switch (cell.kind) {
    // The text format keeps a text what it is when somebody edits the cell.
    case "text":
      return cell.value === ""
        ? { ...look }
        : { ...indent(look), ...look, value: cellText(cell.value), type: String, format: "@" };
    case "number":
      return {
        ...look,
        ...(look.align ? { indent: 1 } : {}),
        value: cell.value,
        type: Number,
        format: cell.format,
      };
    case "moment":
      return { ...look, value: cell.value, type: Date, format: "yyyy-mm-dd hh:mm:ss" };
    case "formula":
      return { ...look, value: cell.formula, type: "Formula", format: cell.format };
  }
}

/** Off the number in the column before. */
const indent = ({ align, fontSize }: CellLook): CellObject =>
  align === undefined && fontSize === undefined ? { align: "left", indent: 1 } : {};
