import { openWorkbook, type OpenedCell } from "../../spreadsheets/open-workbook.ts";
import { UnreadableWorkbook } from "../../spreadsheets/unpack.ts";
import { UnreadableFile, type Cell, type Table } from "./table.ts";

/**
 * Reads the first sheet of an XLSX workbook, its first row the head. Numbers come as they are kept, whatever their
 * format shows; a moment has to be text with its zone, since a spreadsheet's own dates have none.
 * @throws UnreadableFile as the workbook's opener says, wrong_type for a formula or an error, too_few_items
 */
export async function parseWorkbook(bytes: Uint8Array): Promise<Table> {
  const [sheet] = await openWorkbook(bytes).catch((error: unknown) => {
    if (!(error instanceof UnreadableWorkbook)) throw error;
    throw new UnreadableFile({ line: 1, column: null, code: error.code, detail: error.detail });
  });
  const [head = [], ...rows] = sheet?.rows ?? [];
  const [formula] = sheet?.formulas ?? [];
  if (formula !== undefined) throw notTaken(formula, "holds a formula, and none is evaluated here");
  const [error] = sheet?.errors ?? [];
  if (error !== undefined) throw notTaken(error, "holds an error of the spreadsheet and no value");
  if (rows.length === 0) {
    throw new UnreadableFile({
      line: 1,
      column: null,
      code: "too_few_items",
      detail: "The sheet has a head row and at least one row of readings.",
    });
  }
  return {
    delimiter: null,
    head: head.map((cell) => String(cellOf(cell) ?? "")),
    rows: rows
      .map((cells, index) => ({ line: index + 2, cells: cells.map(cellOf) }))
      .filter(({ cells }) => cells.some((cell) => cell !== null)),
  };
}

function notTaken(address: string, why: string): UnreadableFile {
  const line = Number(/\d+$/.exec(address)?.[0] ?? 1);
  return new UnreadableFile({
    line,
    column: null,
    code: "wrong_type",
    detail: `${address} ${why}: send values.`,
  });
}

function cellOf(cell: OpenedCell): Cell {
  if (cell === null || typeof cell === "number") return cell;
  if (cell instanceof Date) return cell.toISOString().replace("Z", "");
  const text = String(cell).trim();
  return text === "" ? null : text;
}
