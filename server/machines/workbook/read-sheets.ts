import { pointerOf } from "../../../shared/pointer.ts";
import type { MachineDocument } from "../../../shared/schemas/machines.ts";
import { unitChoices } from "../../../shared/units.ts";
import { addressOf } from "../../spreadsheets/cell.ts";
import type { OpenedCell, OpenedSheet } from "../../spreadsheets/open-workbook.ts";
import { readHeading, sameWords, unitWords } from "./headings.ts";
import type { CellPlace, JoinedDocument, ReadRow } from "./join-tables.ts";
import { machineFields, machineSheet, type Field } from "./layout.ts";
import { putAt, valueAt, type Item } from "./nested.ts";
import { readCell } from "./read-cell.ts";

type Faults = JoinedDocument["faults"][number][];
/** Null where the machine's sheet does not state them rightly: then no heading can be held to them. */
type KnownUnits = Pick<MachineDocument["units"], "axial" | "bore" | "offset"> | null;

/** The machine's own sheet: a member a row. */
export function readMachineSheet(sheet: OpenedSheet): {
  readonly item: Item;
  readonly places: Map<string, CellPlace>;
  readonly units: KnownUnits;
  readonly faults: Faults;
} {
  const { name } = machineSheet;
  const item: Item = {};
  const places = new Map<string, CellPlace>();
  const faults: Faults = [];
  const headings: { readonly field: Field; readonly cell: string; readonly unit: string | null }[] = [];
  sheet.rows.slice(1).forEach((row, index) => {
    const at = index + 1;
    const [heading = null, value = null] = row;
    if (heading === null && value === null) return;
    const { words, unit } = readHeading(textOf(heading));
    const field = machineFields.find((one) => sameWords(one.heading, words));
    if (!field) {
      const detail = `${textOf(heading) || "A row without a name"} is no field of this sheet.`;
      faults.push({ sheet: name, cell: addressOf(at, 0), code: "unknown_field", detail });
      return;
    }
    headings.push({ field, cell: addressOf(at, 0), unit });
    const cell = addressOf(at, 1);
    for (let length = 1; length <= field.path.length; length += 1) {
      const pointer = pointerOf(field.path.slice(0, length));
      if (!places.has(pointer)) places.set(pointer, { sheet: name, cell });
    }
    take(sheet, faults, item, field, value, cell);
  });
  const units = unitsOf(item);
  for (const { field, cell, unit } of headings) checkUnit(name, faults, units, field, cell, unit);
  return { item, places, units, faults };
}

/** A table sheet: its columns by their headings, an item a row. */
export function readTableSheet(
  sheet: OpenedSheet,
  fields: readonly Field[],
  units: KnownUnits,
): { readonly rows: ReadRow[]; readonly faults: Faults } {
  const { name } = sheet;
  const faults: Faults = [];
  const columns = new Map<Field, number>();
  (sheet.rows[0] ?? []).forEach((heading, column) => {
    const cell = addressOf(0, column);
    const filled = sheet.rows.slice(1).some((row) => (row[column] ?? null) !== null);
    if (heading === null) {
      if (filled) faults.push({ sheet: name, cell, code: "required", detail: "The column has no heading." });
      return;
    }
    const { words, unit } = readHeading(textOf(heading));
    const field = fields.find((one) => sameWords(one.heading, words));
    if (!field || columns.has(field)) {
      const detail = field
        ? `${field.heading} stands twice.`
        : `${textOf(heading).slice(0, 100)} is no column of this sheet.`;
      faults.push({ sheet: name, cell, code: field ? "duplicate_id" : "unknown_field", detail });
      return;
    }
    columns.set(field, column);
    checkUnit(name, faults, units, field, cell, unit);
  });
  const dataRows = sheet.rows
    .map((cells, at) => ({ cells, at }))
    .slice(1)
    .filter(({ cells }) => cells.some((cell) => cell !== null));
  for (const { heading, required } of dataRows.length > 0 ? fields.filter((one) => !columns.has(one)) : []) {
    if (required)
      faults.push({ sheet: name, cell: "A1", code: "required", detail: `The column ${heading} is missing.` });
  }
  const rows = dataRows.map(({ cells, at }): ReadRow => {
    const item: Item = {};
    for (const [field, column] of columns)
      take(sheet, faults, item, field, cells[column] ?? null, addressOf(at, column));
    return {
      item,
      addressOf: (field) => {
        const column = columns.get(field);
        return column === undefined ? `A${at + 1}` : addressOf(at, column);
      },
    };
  });
  return { rows, faults };
}

function take(
  { name, formulas, errors }: OpenedSheet,
  faults: Faults,
  item: Item,
  field: Field,
  value: OpenedCell,
  cell: string,
): void {
  if (formulas.has(cell)) {
    const detail = "Holds a formula: no formula is computed here. Enter its value.";
    faults.push({ sheet: name, cell, code: "wrong_type", detail });
    return;
  }
  if (errors.has(cell)) {
    const detail = "Holds an error of the spreadsheet and no value. Enter its value.";
    faults.push({ sheet: name, cell, code: "wrong_type", detail });
    return;
  }
  const read = readCell(value, field.kind);
  if ("code" in read) faults.push({ sheet: name, cell, ...read });
  else if (read.value !== undefined && !putAt(item, field.path, read.value)) {
    const detail = `${field.heading} does not go together with what another column of this row states.`;
    faults.push({ sheet: name, cell, code: "combination_invalid", detail });
  }
}

/** A heading states the unit of its numbers, and the one that the machine has: a number in mil read as mm can wreck it. */
function checkUnit(
  sheet: string,
  faults: Faults,
  units: KnownUnits,
  field: Field,
  cell: string,
  unit: string | null,
): void {
  if (field.unit === undefined || units === null) return;
  const expected = unitWords(field.unit, units);
  if (unit === expected) return;
  faults.push(
    unit === null
      ? {
          sheet,
          cell,
          code: "units_missing",
          detail: `The heading states no unit: write ${field.heading} (${expected}).`,
        }
      : {
          sheet,
          cell,
          code: "combination_invalid",
          detail: `The heading says ${unit}, the sheet ${machineSheet.name} makes it ${expected}.`,
        },
  );
}

function unitsOf(item: Item): KnownUnits {
  const [axial, bore, offset] = ["axial", "bore", "offset"].map((name) => valueAt(item, ["units", name]));
  const is = <Unit extends string>(choices: readonly Unit[], unit: unknown): unit is Unit =>
    (choices as readonly unknown[]).includes(unit);
  return is(unitChoices.axial, axial) && is(unitChoices.bore, bore) && is(unitChoices.offset, offset)
    ? { axial, bore, offset }
    : null;
}

const textOf = (cell: OpenedCell): string =>
  cell === null ? "" : cell instanceof Date ? cell.toISOString() : String(cell);
