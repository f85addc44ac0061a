import { machineDocument, type MachineDocument } from "../../../shared/schemas/machines.ts";
import { quantityAt } from "../../http/schema-faults.ts";
import { headingCell, numberCell, textCell, titleCell, type SheetCell } from "../../spreadsheets/cell.ts";
import type { Sheet } from "../../spreadsheets/sheet.ts";
import { writeWorkbook } from "../../spreadsheets/write-workbook.ts";
import { tablesOf } from "./document-tables.ts";
import { headingOf } from "./headings.ts";
import { joinTables } from "./join-tables.ts";
import {
  guideSheet,
  machineFields,
  machineSheet,
  nothingSheet,
  tableNames,
  tableSheets,
  type Field,
  type TableName,
  type TableSheet,
} from "./layout.ts";
import { putAt, valueAt, type Item, type Json } from "./nested.ts";
import { joinParts } from "./read-cell.ts";
import { findNothing, wordOf, type Nothing } from "./stated-as-nothing.ts";

type Units = MachineDocument["units"];

/** A machine as a workbook that is read back to the same document, to the last bit. */
export function writeMachineWorkbook(
  document: MachineDocument,
  about: { readonly description: string; readonly createdAt: Date },
): Promise<Buffer> {
  const tables = tablesOf(document);
  const nothings = findNothing(document, whatRowsTell(document));
  return writeSheets(document.units, document.name, about, [
    machineRows(document, document.units),
    ...tableNames.map((name) => tableSheet(name, tables[name], document.units)),
    ...(nothings.length > 0 ? [nothingRows(nothings)] : []),
  ]);
}

/** The same sheets with nothing in them, to be filled in. */
export function writeMachineTemplate(units: Units): Promise<Buffer> {
  // Of no day: the template never changes but with the service.
  const about = { description: "Machine template", createdAt: new Date(0) };
  return writeSheets(units, "Machine template", about, [
    machineRows({ units }, units),
    ...tableNames.map((name) => tableSheet(name, [], units)),
  ]);
}

function writeSheets(
  units: Units,
  title: string,
  { description, createdAt }: { readonly description: string; readonly createdAt: Date },
  sheets: readonly Sheet[],
): Promise<Buffer> {
  return writeWorkbook({
    title,
    creator: "Borewright",
    description,
    createdAt,
    pageHead: { left: title, right: "" },
    pageFoot: [description],
    sheets: [...sheets, guide(units)],
  });
}

function machineRows(document: unknown, units: Units): Sheet {
  return {
    name: machineSheet.name,
    rows: [
      machineSheet.headings.map(headingCell),
      ...machineFields.map((field) => [
        headingCell(headingOf(field, units)),
        fieldCell(field, valueAt(document, field.path), { wrap: true, alignVertical: "top" }),
        textCell(noteOf(field), { wrap: true, alignVertical: "top" }),
      ]),
    ],
    widths: [34, 50, 60],
    frozen: { rows: 1, columns: 1 },
    headingRow: 0,
  };
}

function tableSheet(name: TableName, items: readonly Item[], units: Units): Sheet {
  const { fields, name: words }: TableSheet = tableSheets[name];
  return {
    name: words,
    rows: [
      fields.map((field) => headingCell(headingOf(field, units))),
      ...items.map((item) => fields.map((field) => fieldCell(field, valueAt(item, field.path)))),
    ],
    widths: fields.map(({ kind, heading }) => (kind === "number" ? 13 : heading === "Caution" ? 100 : 20)),
    frozen: { rows: 1, columns: 1 },
    headingRow: 0,
  };
}

/** What is of another kind than the field's stands in another field, or on the sheet of what is stated as nothing. */
function fieldCell({ kind }: Field, value: unknown, look = {}): SheetCell {
  switch (kind) {
    case "number":
      return typeof value === "number" ? numberCell(value, "General", look) : null;
    case "yes_no":
      return typeof value === "boolean" ? textCell(value ? "yes" : "no", look) : null;
    case "list":
    case "numbers":
      return Array.isArray(value) ? textCell(joinParts(value.map(String)), look) : null;
    case "text":
    case "choice":
      return typeof value === "string" ? textCell(value, look) : null;
  }
}

/** The document that the rows alone would be read back to. */
function whatRowsTell(document: MachineDocument): Item {
  const tables = tablesOf(document);
  const told = (fields: readonly Field[], whole: unknown): Item => {
    const item: Item = {};
    for (const { path, kind } of fields) {
      const value = valueAt(whole, path);
      if (fieldCell({ kind } as Field, value) !== null) putAt(item, path, value as Json);
    }
    return item;
  };
  const rows = Object.fromEntries(
    tableNames.map((name) => [
      name,
      tables[name].map((item) => ({ item: told(tableSheets[name].fields, item), addressOf: () => null })),
    ]),
  ) as unknown as Parameters<typeof joinTables>[2];
  return joinTables(told(machineFields, document), new Map(), rows).document;
}

function nothingRows(nothings: readonly Nothing[]): Sheet {
  return {
    name: nothingSheet.name,
    rows: [
      nothingSheet.headings.map(headingCell),
      ...nothings.map(({ place, value }) => [textCell(place), textCell(wordOf(value))]),
    ],
    widths: [80, 12],
    frozen: { rows: 1, columns: 1 },
  };
}

function guide(units: Units): Sheet {
  const wrapped = { wrap: true, alignVertical: "top" } as const;
  return {
    name: guideSheet,
    rows: [
      [titleCell("How to fill in the sheets")],
      [textCell("An empty cell is missing, never 0. Formulas are not read. This sheet is not read.")],
      [textCell("Numbers are entered as numbers, in the unit of the heading.")],
      [textCell("Several ids or numbers in one cell stand one a line, or with semicolons between them.")],
      [],
      ...tableNames.flatMap((name) => {
        const { name: sheet, what, fields, root }: TableSheet = tableSheets[name];
        return [
          [textCell(sheet, { fontWeight: "bold" }), textCell(what, wrapped)],
          ...fields.map((field) => [
            textCell(headingOf(field, units), wrapped),
            textCell(`${noteOf(field)}${rangeOf([...root, ...field.path])}`, wrapped),
          ]),
          [],
        ];
      }),
    ],
    widths: [34, 90, 20],
  };
}

const noteOf = ({ note, required }: Field): string =>
  [required ? "Required." : "", note].filter(Boolean).join(" ");

/** The numbers that the document's own schema takes there. */
function rangeOf(path: readonly (string | number)[]): string {
  const { min, max } = quantityAt(machineDocument, path, {}).allowed ?? {};
  if (min === undefined || max === undefined || max >= Number.MAX_SAFE_INTEGER) return "";
  return ` From ${min} to ${max}.`;
}
