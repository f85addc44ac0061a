import type { Reading } from "../../../shared/schemas/job-entries.ts";
import type { ReadingPreview } from "../../../shared/schemas/reading-files.ts";
import type { Units } from "../../../shared/units.ts";
import { parseCsv } from "./parse-csv.ts";
import { parseWorkbook } from "./parse-workbook.ts";
import { mapColumns, type ReadingColumn } from "./reading-columns.ts";
import { readingsOfTable } from "./readings-of-table.ts";
import { UnreadableFile, type Table, type TableFault } from "./table.ts";

/** What a file of readings may be sent as. */
export const readingMediaTypes = [
  "text/csv",
  "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet",
] as const;
export type ReadingMediaType = (typeof readingMediaTypes)[number];

/** A file to be read: plain data, so that a thread can be sent it. */
export interface ReadingFile {
  readonly mediaType: ReadingMediaType;
  readonly content: Uint8Array;
  /** Their heads, and what each stands for. */
  readonly names: ReadonlyMap<string, ReadingColumn>;
  readonly ignored: readonly string[];
  /** Of the machine. */
  readonly units: Units;
}

/** What was read, as far as it could be. */
export interface ReadFile extends Pick<ReadingPreview, "delimiter" | "decimal" | "columns" | "faults"> {
  readonly readings: readonly Reading[];
  /** The line on which each begins. */
  readonly lines: readonly number[];
}

/** A file of which nothing could be read. */
export const unread = (...faults: ReadFile["faults"]): ReadFile => ({
  delimiter: null,
  decimal: null,
  columns: [],
  readings: [],
  lines: [],
  faults,
});

/** Reads a file of readings: what each column is taken for, the readings, and every fault with its line. Pure. */
export async function readFile({
  mediaType,
  content,
  names,
  ignored,
  units,
}: ReadingFile): Promise<ReadFile> {
  const table = await tryTable(content, mediaType);
  if (table instanceof UnreadableFile) return unread(table.fault);
  const { delimiter, head } = table;
  const mapped = mapColumns(head, { names, ignored });
  const columns = [...mapped.columns];
  if (mapped.faults.length > 0) return { ...unread(...mapped.faults), delimiter, columns };
  const nameless = namelessFaults(table);
  if (nameless.length > 0) return { ...unread(...nameless), delimiter, columns };
  const { readings, lines, decimal, faults } = readingsOfTable(table, columns, units);
  return { delimiter, decimal, columns, readings, lines, faults: [...faults] };
}

/** Values under no head are not dropped: a decimal comma that was taken for the end of a cell leaves its digits there. */
function namelessFaults({ head, rows }: Table): TableFault[] {
  const first = rows.find(({ cells }) => cells.some((cell, index) => cell !== null && head[index] === ""));
  const detail =
    "A value stands under no head: name the column, or put numbers with decimal commas in quotes.";
  return first ? [{ line: first.line, column: null, code: "unknown_field", detail }] : [];
}

async function tryTable(content: Uint8Array, mediaType: ReadingMediaType): Promise<Table | UnreadableFile> {
  try {
    return mediaType === "text/csv" ? parseCsv(content) : await parseWorkbook(content);
  } catch (error) {
    if (error instanceof UnreadableFile) return error;
    throw error;
  }
}
