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

/** Opens a workbook in LibreOffice, which computes every formula itself, and reads what the sheets then show. */
export async function openInSpreadsheetProgram(workbook: Uint8Array): Promise<OpenedWorkbook> {
  const folder = await mkdtemp(join(tmpdir(), "borewright-calc-"));
  try {
    const profile = join(folder, "profile");
    await mkdir(join(profile, "user"), { recursive: true });
    await writeFile(join(profile, "user", "registrymodifications.xcu"), recalculate);
    await writeFile(join(folder, "book.xlsx"), workbook);
    const { code, stderr } = await runProgram(
      [
        "soffice",
        `-env:UserInstallation=${pathToFileURL(profile).href}`,
        "--headless",
        "--convert-to",
        "csv:Text - txt - csv (StarCalc):44,34,76,1,,0,false,false,false,false,false,-1",
        "--outdir",
        join(folder, "out"),
        join(folder, "book.xlsx"),
      ],
      {},
    );
    if (code !== 0) throw new Error(stderr);
    const files = await readdir(join(folder, "out"));
    const sheets = files.map(async (file) => {
      const rows = parse(await readFile(join(folder, "out", file)), { relax_column_count: true });
      return [file.replace(/^book-(.*)\.csv$/, "$1"), rows as string[][]] as const;
    });
    return Object.fromEntries(await Promise.all(sheets));
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}
