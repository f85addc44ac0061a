import { strToU8, zipSync } from "fflate";
import readExcelFile from "read-excel-file/node";
import { UnreadableWorkbook, unpackWorkbook } from "./unpack.ts";

/** A cell as it stands; null where it is empty, which is missing and never 0. */
export type OpenedCell = string | number | boolean | Date | null;

export interface OpenedSheet {
  readonly name: string;
  readonly rows: readonly (readonly OpenedCell[])[];
  /** Addresses of cells that hold a formula: nothing evaluates it, and its stored value is not to be believed. */
  readonly formulas: ReadonlySet<string>;
  /** Addresses of cells that hold an error, such as #REF!: they have no value, and are not empty. */
  readonly errors: ReadonlySet<string>;
}

/** What a sheet may reach to. Farther cells would be filled up with empty ones. */
const farthest = { row: 20_000, column: 64 } as const;

/**
 * Opens a workbook: values alone, no formula evaluated, no link followed.
 * @throws UnreadableWorkbook
 */
export async function openWorkbook(bytes: Uint8Array): Promise<OpenedSheet[]> {
  const parts = unpackWorkbook(bytes);
  const scanned = new Map<string, Scanned>();
  for (const [path, xml] of parts) {
    if (/^xl\/worksheets\/[^/]+\.xml$/.test(path)) scanned.set(path, scanSheet(xml));
  }
  const files = sheetFiles(parts);
  // What was checked is what is read, packed again: no second reader of the zip can see another file.
  const checked = zipSync(Object.fromEntries([...parts].map(([path, xml]) => [path, strToU8(xml)])), {
    level: 0,
  });
  const sheets = await readExcelFile(Buffer.from(checked), { trim: false }).catch((error: unknown) => {
    throw new UnreadableWorkbook(
      "file_not_as_stated",
      `This is no XLSX workbook that can be read. ${error instanceof Error ? error.message.slice(0, 100) : ""}`,
    );
  });
  return sheets.map(({ sheet, data }) => ({
    name: sheet,
    // The reader's own types take the classes for what is made of them.
    rows: data as unknown as OpenedCell[][],
    ...(scanned.get(files.get(sheet) ?? "") ?? { formulas: new Set<string>(), errors: new Set<string>() }),
  }));
}

interface Scanned {
  readonly formulas: Set<string>;
  readonly errors: Set<string>;
}

/** Addresses of formulas and errors. @throws UnreadableWorkbook where a cell lies farther out than is taken */
function scanSheet(xml: string): Scanned {
  const found: Scanned = { formulas: new Set(), errors: new Set() };
  for (const [, row] of xml.matchAll(/<row\b[^>]*?\sr="(\d+)"/g)) refuseFar(Number(row), 1);
  for (const [, attributes = "", rest = ""] of xml.matchAll(/<c\b([^>]*)>(<(?:f|is|v)\b)?/g)) {
    const [, letters = "", row = "1"] = /\sr="([A-Z]+)(\d+)"/.exec(attributes) ?? [];
    if (letters.length > 3) refuseFar(1, Infinity);
    refuseFar(Number(row), columnNumber(letters));
    if (rest.startsWith("<f")) found.formulas.add(`${letters}${row}`);
    else if (/\st=(["'])e\1/.test(attributes)) found.errors.add(`${letters}${row}`);
  }
  return found;
}

function refuseFar(row: number, column: number): void {
  if (row <= farthest.row && column <= farthest.column) return;
  throw new UnreadableWorkbook(
    "call_too_large",
    `A sheet holds at most ${farthest.row} rows and ${farthest.column} columns.`,
  );
}

const columnNumber = (letters: string): number =>
  [...letters].reduce((sum, letter) => sum * 26 + letter.charCodeAt(0) - 64, 0);

/** Sheet name to the part that holds it. */
function sheetFiles(parts: ReadonlyMap<string, string>): Map<string, string> {
  const targets = new Map(
    elements(parts.get("xl/_rels/workbook.xml.rels"), "Relationship").map(({ Id, Target }) => [Id, Target]),
  );
  return new Map(
    elements(parts.get("xl/workbook.xml"), "sheet").map((sheet) => {
      const target = targets.get(sheet["r:id"]) ?? "";
      return [sheet["name"] ?? "", target.startsWith("/") ? target.slice(1) : `xl/${target}`];
    }),
  );
}

/** The attributes of every element of a name; no text of them is markup that matters here. */
function elements(xml = "", name: string): Partial<Record<string, string>>[] {
  return [...xml.matchAll(new RegExp(`<${name}\\s([^>]*)>`, "g"))].map(([, attributes = ""]) =>
    Object.fromEntries(
      [...attributes.matchAll(/([\w:]+)="([^"]*)"/g)].map(([, key = "", value = ""]) => [key, value]),
    ),
  );
}
