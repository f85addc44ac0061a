import type { z } from "zod";
import { machineDocument, type MachineDocument } from "../../../shared/schemas/machines.ts";
import type { workbookFault } from "../../../shared/schemas/machine-workbooks.ts";
import { schemaFaults } from "../../http/schema-faults.ts";
import { openWorkbook, type OpenedSheet } from "../../spreadsheets/open-workbook.ts";
import { machineFaults, machineFaultsBesideSchema } from "../machine-faults.ts";
import { joinTables, type CellPlace, type ReadRow } from "./join-tables.ts";
import { guideSheet, machineSheet, nothingSheet, tableNames, tableSheets } from "./layout.ts";
import { readMachineSheet, readTableSheet } from "./read-sheets.ts";
import { nothingWords, restateNothing, type Nothing } from "./stated-as-nothing.ts";

export type WorkbookFault = z.infer<typeof workbookFault>;

/** A machine as a workbook has it: the document, or every fault with its sheet and cell. */
export type ReadMachine =
  | { readonly document: MachineDocument; readonly faults: readonly [] }
  | { readonly document: null; readonly faults: readonly WorkbookFault[] };

/** @throws UnreadableWorkbook */
export async function readMachineWorkbook(bytes: Uint8Array): Promise<ReadMachine> {
  const sheets = await openWorkbook(bytes);
  const faults: WorkbookFault[] = unknownSheets(sheets);
  const named = (name: string) => sheets.find((sheet) => sheet.name === name);
  const own = named(machineSheet.name);
  if (!own) {
    const detail = `The sheet ${machineSheet.name} is missing.`;
    return {
      document: null,
      faults: [...faults, { sheet: machineSheet.name, cell: null, code: "required", detail }],
    };
  }
  const machine = readMachineSheet(own);
  faults.push(...machine.faults);
  const tables = Object.fromEntries(
    tableNames.map((name): [string, readonly ReadRow[]] => {
      const sheet = named(tableSheets[name].name);
      if (!sheet) return [name, []];
      const read = readTableSheet(sheet, tableSheets[name].fields, machine.units);
      faults.push(...read.faults);
      return [name, read.rows];
    }),
  ) as unknown as Parameters<typeof joinTables>[2];
  const joined = joinTables(machine.item, machine.places, tables);
  faults.push(...joined.faults);
  const nothing = readNothing(named(nothingSheet.name));
  faults.push(...nothing.faults);
  restateNothing(joined.document, nothing.stated);
  faults.push(...documentFaults(joined.document, joined.places, faults));
  return faults.length > 0
    ? { document: null, faults }
    : { document: machineDocument.parse(joined.document), faults: [] };
}

function unknownSheets(sheets: readonly OpenedSheet[]): WorkbookFault[] {
  const known: readonly string[] = [
    machineSheet.name,
    guideSheet,
    nothingSheet.name,
    ...tableNames.map((name) => tableSheets[name].name),
  ];
  return sheets
    .filter(({ name }) => !known.includes(name))
    .map(({ name }) => ({
      sheet: name.slice(0, 100),
      cell: null,
      code: "unknown_field",
      detail: `No sheet of this name is read. Sheets: ${known.join(", ")}.`,
    }));
}

/** The faults of the document itself, in the cells of its members; none in a cell that is at fault already. */
function documentFaults(
  document: unknown,
  places: ReadonlyMap<string, CellPlace>,
  known: readonly WorkbookFault[],
): WorkbookFault[] {
  const ofSchema = schemaFaults(machineDocument, document);
  const found =
    ofSchema.length > 0
      ? [...ofSchema, ...machineFaultsBesideSchema(document)]
      : machineFaults(machineDocument.parse(document));
  const taken = new Set(known.map(({ sheet, cell }) => `${sheet}!${cell}`));
  return found
    .map(({ pointer, code, detail }): WorkbookFault => ({ ...placeOf(pointer, places), code, detail }))
    .filter(({ sheet, cell }) => cell === null || !taken.has(`${sheet}!${cell}`));
}

/** The cell of a member, or of what it stands in. */
function placeOf(pointer: string, places: ReadonlyMap<string, CellPlace>): CellPlace {
  for (let at = pointer; at !== ""; at = at.slice(0, at.lastIndexOf("/"))) {
    const place = places.get(at);
    if (place) return place;
  }
  const [, member = ""] = pointer.split("/");
  const table = tableNames.find((name) => name === member);
  return { sheet: table ? tableSheets[table].name : machineSheet.name, cell: null };
}

function readNothing(sheet: OpenedSheet | undefined): { stated: Nothing[]; faults: WorkbookFault[] } {
  const stated: Nothing[] = [];
  const faults: WorkbookFault[] = [];
  sheet?.rows.slice(1).forEach(([place = null, word = null], index) => {
    if (place === null && word === null) return;
    if (typeof place === "string" && typeof word === "string" && Object.hasOwn(nothingWords, word)) {
      stated.push({ place, value: nothingWords[word as keyof typeof nothingWords] });
      return;
    }
    const detail = `Value is one of ${Object.keys(nothingWords).join(", ")}.`;
    faults.push({ sheet: nothingSheet.name, cell: `B${index + 2}`, code: "choice_unknown", detail });
  });
  return { stated, faults };
}
