import { parse } from "csv-parse/sync";
import { limits } from "../../../shared/limits.ts";
import { UnreadableFile, type Table } from "./table.ts";

const delimiters = [";", "\t", ","] as const;
const decoder = new TextDecoder("utf-8", { fatal: true });

/**
 * Reads a CSV file (RFC 4180) with a head row: in UTF-8, with semicolon, tab or comma between cells, whichever makes the
 * most of the head.
 * @throws UnreadableFile invalid_encoding, text_invalid (quotes), too_many_items, too_few_items
 */
export function parseCsv(bytes: Uint8Array): Table {
  const text = decode(bytes);
  const [headLine = ""] = text.split(/\r?\n/, 1);
  const delimiter = delimiters.reduce((best, one) =>
    headLine.split(one).length > headLine.split(best).length ? one : best,
  );
  const [head, ...rows] = rowsOf(text, delimiter);
  if (!head || rows.length === 0) {
    throw new UnreadableFile({
      line: 1,
      column: null,
      code: "too_few_items",
      detail: "The file has a head row and at least one row of readings.",
    });
  }
  return {
    delimiter,
    head: head.record.map((cell) => cell.trim()),
    rows: rows
      .map(({ record, info }) => ({
        line: info.lines,
        cells: record.map((cell) => (cell.trim() === "" ? null : cell.trim())),
      }))
      .filter(({ cells }) => cells.some((cell) => cell !== null)),
  };
}

interface ParsedRow {
  readonly record: string[];
  readonly info: { readonly lines: number };
}

function rowsOf(text: string, delimiter: string): ParsedRow[] {
  try {
    return parse(text, {
      delimiter,
      info: true,
      relax_column_count: true,
      skip_empty_lines: true,
      to: limits.readingRowsPerFile + 2,
    }) as unknown as ParsedRow[];
  } catch (error) {
    const { lines } = error as { lines?: unknown };
    throw new UnreadableFile({
      line: typeof lines === "number" ? lines : 1,
      column: null,
      code: "text_invalid",
      detail: "A quoted cell is not closed, or a quote stands inside a cell.",
    });
  }
}

function decode(bytes: Uint8Array): string {
  try {
    return decoder.decode(bytes);
  } catch {
    throw new UnreadableFile({
      line: 1,
      column: null,
      code: "invalid_encoding",
      detail: "The file is not UTF-8. Save it as CSV UTF-8.",
    });
  }
}
