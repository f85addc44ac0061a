import { mkdtemp, mkdir, readdir, readFile, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { parse } from "csv-parse/sync";
import { runProgram } from "./run-program.ts";

/** Formulas are computed when a file is opened, whatever values it holds. */
const recalculate = `<?xml version="1.0" encoding="UTF-8"?>
<oor:items xmlns:oor="http://openoffice.org/2001/registry" xmlns:xs="http://www.w3.org/2001/XMLSchema" xmlns:xsi="http://www.w3.org/2001/XMLSchema-instance">
<item oor:path="/org.openoffice.Office.Calc/Formula/Load"><prop oor:name="OOXMLRecalcMode" oor:op="fuse"><value>0</value></prop></item>
</oor:items>`;

/** Sheet name to its rows, every number in full. */
export type OpenedWorkbook = Readonly<Record<string, readonly (readonly string[])[]>>;

/**
 * Opens a workbook in LibreOffice, which computes every formula itself, and reads what the sheets then hold; every number
 * by its format where asked.
 */
export function openInSpreadsheetProgram(
  workbook: Uint8Array,
  { asShown = false }: { readonly asShown?: boolean } = {},
): Promise<OpenedWorkbook> {
  const everySheet = `csv:Text - txt - csv (StarCalc):44,34,76,1,,0,false,false,${asShown},false,false,-1`;
  return converted(workbook, everySheet, async (folder) => {
    const sheets = (await readdir(folder)).map(async (file) => {
      const rows = parse(await readFile(join(folder, file)), { relax_column_count: true });
      return [file.replace(/^book-(.*)\.csv$/, "$1"), rows] as const;
    });
    return Object.fromEntries(await Promise.all(sheets));
  });
}

/** A workbook as LibreOffice saves it. */
export function saveBySpreadsheetProgram(workbook: Uint8Array): Promise<Buffer> {
  return converted(workbook, "xlsx:Calc MS Excel 2007 XML", (folder) => readFile(join(folder, "book.xlsx")));
}

async function converted<Result>(
  workbook: Uint8Array,
  target: string,
  read: (folder: string) => Promise<Result>,
): Promise<Result> {
  const folder = await mkdtemp(join(tmpdir(), "borewright-calc-"));
  try {
    const profile = join(folder, "profile");
    await mkdir(join(profile, "user"), { recursive: true });
    await writeFile(join(profile, "user", "registrymodifications.xcu"), recalculate);
    const [sent, out] = [join(folder, "book.xlsx"), join(folder, "out")];
    await writeFile(sent, workbook);
    const own = `-env:UserInstallation=${pathToFileURL(profile).href}`;
    const { code, stderr } = await runProgram(
      ["soffice", own, "--headless", "--convert-to", target, "--outdir", out, sent],
      {},
    );
    if (code !== 0) throw new Error(stderr);
    return await read(out);
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}
