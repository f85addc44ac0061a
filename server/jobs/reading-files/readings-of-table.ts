import type { Fault } from "../../../shared/error-codes.ts";
import { convertLength } from "../../../shared/figures/write-number.ts";
import { limits } from "../../../shared/limits.ts";
import { readingSchema, type Reading } from "../../../shared/schemas/job-entries.ts";
import type { Units } from "../../../shared/units.ts";
import { schemaFaults } from "../../http/schema-faults.ts";
import { decimalSigns, readBoolean, readMoment, readNumber, type Decimal } from "./read-cell.ts";
import { readingColumns, type Column, type MappedColumn, type ReadingColumn } from "./reading-columns.ts";
import {
  bodyOf,
  rowMembers,
  wholeMembers,
  wireMembers,
  type GatheredValues,
  type Value,
  type Values,
} from "./reading-members.ts";
import type { Cell, Table, TableFault } from "./table.ts";

/** A reading as its rows tell it, before it is known to be sound. */
interface Gathered extends GatheredValues {
  readonly line: number;
  readonly rows: { readonly line: number; readonly values: Values }[];
  /** Cells that are there and could not be read: told where they stand, and not missing beside. */
  readonly unread: Set<string>;
}

export interface ReadReadings {
  readonly readings: readonly Reading[];
  /** The line on which each reading begins. */
  readonly lines: readonly number[];
  readonly decimal: Decimal;
  readonly faults: readonly TableFault[];
}

/**
 * Makes readings of a table: rows of one station, moment and closing are one reading. What holds for the whole reading
 * stands in its first row, and may be repeated; a row that says otherwise is a fault. Lengths are converted from the unit
 * of their head into the machine's.
 */
export function readingsOfTable(table: Table, columns: readonly MappedColumn[], units: Units): ReadReadings {
  const faults: TableFault[] = [];
  // Of numbers alone: a station may be called 1.2, and what is to be ignored may hold anything.
  const isNumber = columns.map(({ column }) => column !== null && readingColumns[column].as === "number");
  const signs = decimalSigns(table.rows.flatMap(({ cells }) => cells.filter((_, index) => isNumber[index])));
  const [sign = null] = signs;
  if (signs.size > 1) {
    const detail = "Some numbers have a decimal point, some a comma: what was meant is not guessed.";
    faults.push({ line: 1, column: null, code: "combination_invalid", detail });
  }
  if (table.rows.length > limits.readingRowsPerFile) {
    const detail = `A file holds at most ${limits.readingRowsPerFile} rows.`;
    faults.push({ line: limits.readingRowsPerFile + 2, column: null, code: "too_many_items", detail });
  }
  const gathered = gather(table, columns, units, faults);
  const sound: Reading[] = [];
  const lines: number[] = [];
  for (const one of gathered) {
    const body = bodyOf(one);
    const wrong = schemaFaults(readingSchema, body);
    faults.push(...wrong.flatMap((fault) => placed(fault, one) ?? []));
    if (wrong.length > 0) continue;
    sound.push(readingSchema.parse(body));
    lines.push(one.line);
  }
  return { readings: sound, lines, decimal: sign, faults };
}

function gather(
  table: Table,
  columns: readonly MappedColumn[],
  units: Units,
  faults: TableFault[],
): Gathered[] {
  const all = new Map<string, Gathered>();
  for (const { line, cells } of table.rows) {
    const { whole, row, unread } = readRow(line, cells, columns, units, faults);
    const place = JSON.stringify([whole.station, whole["taken at"], whole.closing ?? false]);
    const earlier = all.get(place);
    const reading = earlier ?? { line, whole: { ...whole }, rows: [], unread: new Set() };
    all.set(place, reading);
    for (const column of unread) reading.unread.add(cellKey(column, line));
    for (const [name, value] of Object.entries(whole) as [ReadingColumn, Value][]) {
      const stands = reading.whole[name];
      if (stands === undefined) reading.whole[name] = value;
      else if (stands !== value) {
        const detail = `Line ${reading.line} says ${stands}: a reading has one ${name}.`;
        faults.push({ line, column: name, code: "combination_invalid", detail });
      }
    }
    if (Object.keys(row).length > 0) reading.rows.push({ line, values: row });
  }
  return [...all.values()];
}

function readRow(
  line: number,
  cells: readonly Cell[],
  columns: readonly MappedColumn[],
  units: Units,
  faults: TableFault[],
): { whole: Values; row: Values; unread: readonly ReadingColumn[] } {
  const unread: ReadingColumn[] = [];
  const whole: Values = {};
  const row: Values = {};
  const isSpots = cells.some(
    (cell, index) => columns[index]?.column === "form" && cell === "rotating_target",
  );
  columns.forEach(({ column, unit, header }, index) => {
    const cell = cells[index] ?? null;
    if (!column || cell === null) return;
    const { of, as, dimension }: Column = readingColumns[column];
    const read = readAs(as, cell);
    if (read === null) {
      unread.push(column);
      faults.push({
        line,
        column: header,
        code: "wrong_type",
        detail: `${cut(cell)} is not taken here: ${wanted[as]}.`,
      });
      return;
    }
    // The spots of a rotating target are readings, where the coordinates of a wall point are lengths.
    const into = isSpots && (column === "h" || column === "v") ? "offset" : dimension;
    const value = typeof read === "number" && unit && into ? convertLength(read, unit, units[into]) : read;
    (of === "row" ? row : whole)[column] = value;
  });
  if (cells.length > columns.length && cells.slice(columns.length).some((cell) => cell !== null)) {
    faults.push({
      line,
      column: null,
      code: "too_many_items",
      detail: "The row has more cells than the head.",
    });
  }
  return { whole, row, unread };
}

const wanted: Readonly<Record<string, string>> = {
  number: "a number, with a decimal point or comma and nothing between thousands",
  moment: "a moment with its zone, such as 2026-11-04T07:40:00Z",
  boolean: "yes or no",
  text: "a text",
};

function readAs(as: string, cell: Cell): Value | null {
  if (as === "number") return readNumber(cell);
  if (as === "moment") return readMoment(cell);
  if (as === "boolean") return readBoolean(cell);
  return String(cell);
}

const cut = (cell: Cell): string => `"${String(cell).slice(0, limits.echoedTextLength)}"`;

/** A cell of a row by its line; of the whole reading by its column alone, wherever it stands. */
const cellKey = (column: ReadingColumn, line: number): string =>
  readingColumns[column].of === "row" ? `${column} ${line}` : column;

/** A fault of a reading at the line and column it comes from; null for what is missing because its cell was not read. */
function placed({ pointer, code, detail }: Fault, { line, rows, unread }: Gathered): TableFault | null {
  const [, member = "", index, inner = ""] = pointer.split("/");
  const row = ["points", "readings", "spots"].includes(member) ? rows[Number(index)] : undefined;
  const column = row
    ? rowMembers[inner]
    : member === "wire"
      ? wireMembers[index ?? ""]
      : wholeMembers[member];
  if (code === "required" && column && unread.has(cellKey(column, row?.line ?? line))) return null;
  return { line: row?.line ?? line, column: column ?? ((row ? inner : member) || null), code, detail };
}
