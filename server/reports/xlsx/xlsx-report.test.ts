import { strFromU8, strToU8, unzipSync, zipSync } from "fflate";
import readExcelFile from "read-excel-file/node";
import { describe, expect, it } from "vitest";
import { hostileJob, hostileText, oneStationJob } from "../../../tests/support/hostile-job.ts";
import { fellgateReport, writeFellgateJob } from "../../../tests/support/job-record.ts";
import { JobWriter } from "../../../tests/support/job-writer.ts";
import { foreignName, stressJob } from "../../../tests/support/stress-job.ts";
import { openInSpreadsheetProgram, type OpenedWorkbook } from "../../../tests/support/spreadsheet-program.ts";
import type { JobDetails } from "../../../shared/schemas/job-entries.ts";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { fellgateDocument } from "../../demo/fellgate-document.ts";
import { asFoundReadings, fellgateJobDetails } from "../../demo/fellgate-job.ts";
import { fixed, numberCell } from "../../spreadsheets/cell.ts";
import { writeWorkbook } from "../../spreadsheets/write-workbook.ts";
import type { ReportContext } from "../report-format.ts";
import { xlsxReport } from "./xlsx-report.ts";

const write = (record: JobRecord, context: ReportContext) =>
  Promise.resolve(xlsxReport.write(record, context));
const reportOf = (job: JobWriter) => write(job.record(), job.context());
const partsOf = (bytes: Uint8Array) =>
  Object.fromEntries(Object.entries(unzipSync(bytes)).map(([path, part]) => [path, strFromU8(part)]));

/** Every formula's value made wrong: what is then shown was computed by the program that opened it. */
function withoutValues(bytes: Uint8Array): Uint8Array {
  const parts = unzipSync(bytes);
  const changed = Object.entries(parts).map(([path, part]) => [
    path,
    path.startsWith("xl/worksheets/sheet")
      ? strToU8(strFromU8(part).replaceAll(/<\/f><v>[^<]*<\/v>/g, "</f><v>777</v>"))
      : part,
  ]);
  return zipSync(Object.fromEntries(changed) as Record<string, Uint8Array>);
}

/** The rows of a survey's table by station, each cell under its heading without the unit. */
function tableOf(opened: OpenedWorkbook, sheet: string): Map<string, Record<string, string>> {
  const rows = opened[sheet] ?? [];
  const at = rows.findIndex(([first]) => first === "Station");
  const headings = (rows[at] ?? []).map((heading) => heading.replace(/ \([^)]*\)$/, ""));
  return new Map(
    rows
      .slice(at + 1)
      .map((row) => [
        row[0] ?? "",
        Object.fromEntries(headings.map((heading, index) => [heading, row[index] ?? ""])),
      ]),
  );
}

const through = ["brg-1", "cas-3", "shr-1", "shr-3"];
const everyAxis: [string, NonNullable<JobDetails["axis"]>][] = [
  ["of two stations", { method: "two_station", through: ["brg-1", "shr-3"] }],
  ["of least squares", { method: "least_squares", through }],
  ["of the narrowest zones", { method: "minimum_zone", zone: "planes", through }],
  ["of the narrowest cylinder", { method: "minimum_zone", zone: "cylinder", through }],
  ["of least distances", { method: "least_absolute", through }],
  ["that is the line of sight", { method: "line_of_sight" }],
];

describe("the workbook of a job", () => {
  it.each([
    ["in millimetres", () => fellgateReport({ signed: true })],
    [
      "in inches and mils, with names that are traps",
      () => ({ record: hostileJob().record(), context: hostileJob().context() }),
    ],
  ])(
    "is computed again by LibreOffice to the service's own numbers, %s",
    async (_, make) => {
      const { record, context } = make();
      const opened = await openInSpreadsheetProgram(withoutValues(await write(record, context)));
      expect(Object.keys(opened).sort()).toEqual(["As found", "As left", "Conditions", "Moves", "Summary"]);
      for (const cell of Object.values(opened).flat(2)) expect(cell).not.toMatch(/^(#|Err:\d)/);
      let compared = 0;
      for (const [sheet, stage] of [
        ["As found", "as_found"],
        ["As left", "as_left"],
      ] as const) {
        const table = tableOf(opened, sheet);
        const result = record.surveys.find(({ survey }) => survey.stage === stage)?.result;
        for (const { id, deviation, ratio, verdict } of result?.stations ?? []) {
          const row = table.get(id);
          const differs = (name: string, value: number) => Math.abs(Number(row?.[name]) - value);
          expect(differs("Deviation h", deviation.h)).toBeLessThan(1e-9);
          expect(differs("Deviation v", deviation.v)).toBeLessThan(1e-9);
          expect(differs("Radial", deviation.radial)).toBeLessThan(1e-9);
          expect(differs("Share of tolerance used", ratio ?? NaN)).toBeLessThan(1e-9);
          // Where the deviation is nothing but rounding its direction is too.
          if (deviation.radial > 1e-9) expect(differs("Clock", deviation.clockDeg ?? NaN)).toBeLessThan(1e-6);
          expect(row?.["Verdict"]).toBe(verdict);
          expect(row?.["Simple rule, recomputed"]).toBe((ratio ?? 0) <= 1 ? "conforms" : "exceeds");
          compared += 1;
        }
      }
      expect(compared).toBe(28);
    },
    120_000,
  );

  it.each(everyAxis)(
    "is computed again to the service's own numbers from an axis %s, surveys after steps too",
    async (_, axis) => {
      const job = new JobWriter(fellgateDocument, { ...fellgateJobDetails, axis });
      const setUp = { sameSetUp: false, instrument: "gauge-1" };
      job.survey({ stage: "as_found", ...setUp }, asFoundReadings());
      job.survey({ stage: "after_step", ...setUp, label: "Casing set" }, asFoundReadings().slice(0, 12));
      const record = job.record();
      const opened = await openInSpreadsheetProgram(withoutValues(await reportOf(job)));
      expect(Object.keys(opened)).toContain("Survey 2");
      expect(opened["Survey 2"]?.[0]?.[0]).toBe("Survey 2, Casing set (after a step): Fellgate Unit 2");
      const [found, step] = record.surveys;
      for (const [sheet, survey, count] of [
        ["As found", found, 14],
        ["Survey 2", step, 12],
      ] as const) {
        const table = tableOf(opened, sheet);
        expect(table.size).toBe(count);
        for (const { id, deviation } of survey?.result?.stations ?? []) {
          const row = table.get(id);
          for (const plane of ["h", "v"] as const)
            expect(Math.abs(Number(row?.[`Deviation ${plane}`]) - deviation[plane])).toBeLessThan(1e-9); // mm
        }
      }
    },
    120_000,
  );

  it("shows numbers of either sign, and what rounds to nothing without one", async () => {
    const bytes = await writeWorkbook({
      title: "",
      creator: "",
      description: "",
      createdAt: new Date(0),
      pageHead: { left: "", right: "" },
      pageFoot: [],
      sheets: [
        {
          name: "A",
          widths: [12],
          rows: [0.12346, -0.12346, -0.00006, -0.00004, 0].map((value) => [numberCell(value, fixed(4))]),
        },
      ],
    });
    const { A: shown = [] } = await openInSpreadsheetProgram(bytes, { asShown: true });
    expect(shown.flat()).toEqual(["0.1235", "-0.1235", "-0.0001", "0.0000", "0.0000"]);
  }, 60_000);

  it("holds a job as large as they come: every survey, move, check and concession, its rows high enough", async () => {
    const job = stressJob();
    const record = job.record();
    const sheets = await readExcelFile(await reportOf(job), { trim: false });
    expect(sheets.map(({ sheet }) => sheet)).toEqual([
      "Summary",
      "As found",
      "Moves",
      "Survey 2",
      "Survey 3",
      "As left",
      "Conditions",
    ]);
    const cellsOf = (name: string) => sheets.find(({ sheet }) => sheet === name)?.data ?? [];
    const moved = cellsOf("Moves").filter(([at]) => /^2026-11-\d\d \d\d:\d\d$/.test(String(at)));
    expect(moved).toHaveLength(record.moves.reduce((total, { moved: all = [] }) => total + all.length, 0));
    for (const row of moved) expect(row[1]).toMatch(/^\d-/);
    expect(
      cellsOf("Conditions")
        .flat()
        .filter((cell) => cell === "not answered"),
    ).toHaveLength(5);
    const conceded = (name: string) =>
      cellsOf(name)
        .map((row) => row.at(-1))
        .filter((cell) => cell === foreignName);
    expect([conceded("As found"), conceded("As left")]).toEqual([[], [foreignName]]);
  }, 60_000);

  it("shows the service's numbers to readers that do not compute", async () => {
    const { record, context } = fellgateReport({ signed: true });
    const sheets = await readExcelFile(await write(record, context));
    const rows = sheets.find(({ sheet }) => sheet === "As found")?.data ?? [];
    const at = rows[8]?.indexOf("Deviation h (mm)") ?? -1;
    const stations = record.surveys[0]?.result?.stations ?? [];
    expect(rows.slice(9).map((row) => row[at])).toEqual(stations.map(({ deviation }) => deviation.h));
  });

  it("holds no formula but its own, whatever the names begin with", async () => {
    const parts = partsOf(await reportOf(hostileJob()));
    const formulas = Object.values(parts).flatMap((xml) =>
      [...xml.matchAll(/<f>([^<]*)<\/f>/g)].map(([, formula]) => formula ?? ""),
    );
    expect(formulas.length).toBe(28 * 8);
    for (const formula of formulas) expect(formula).toMatch(/^(axis_|[A-Z]+\d+[-/]|SQRT\(|IF\(|MAX\()/);
    const sheets = await readExcelFile(await reportOf(hostileJob()), { trim: false });
    const texts = sheets.flatMap(({ data }) => data.flat());
    for (const text of [
      "=1+1",
      "+cmd|' /C calc'!A0",
      "-2",
      "@SUM(A1:A9)",
      "_x0041_",
      "<b>&amp;</b>",
      hostileText,
    ])
      expect(texts).toContain(text);
  });

  it("names the record, its hash and its engine, and says that it is a draft until it is signed", async () => {
    const draft = fellgateReport({ signed: false });
    const signed = fellgateReport({ signed: true });
    for (const { record, context } of [draft, signed]) {
      const parts = partsOf(await write(record, context));
      const words = record.signature ? "Signed by Ines Alder" : "DRAFT, not signed";
      for (let sheet = 1; sheet <= 5; sheet += 1) {
        const xml = parts[`xl/worksheets/sheet${sheet}.xml`] ?? "";
        expect(xml).toContain(words);
        expect(xml).toContain(`Job ${record.id} r1\nRecord ${context.recordHash}`);
        expect(xml).toMatch(/orientation="landscape" fitToWidth="1" fitToHeight="0"/);
      }
      expect(parts["docProps/core.xml"]).toContain(
        "<dc:title>Fellgate Unit 2: Unit 2, major outage</dc:title>",
      );
      expect(parts["docProps/core.xml"]).toContain(context.engineVersion);
      expect(parts["docProps/app.xml"]).toContain("<Application>Borewright</Application>");
      expect(parts["xl/workbook.xml"]).toContain(
        `<definedName name="_xlnm.Print_Titles" localSheetId="1">'As found'!$9:$9</definedName>`,
      );
      expect(parts["xl/worksheets/sheet2.xml"]).toContain('ySplit="9" xSplit="1" topLeftCell="B10"');
    }
  });

  it("dates itself by the record and its parts by nothing", async () => {
    const { record, context } = fellgateReport({ signed: true });
    const bytes = await write(record, context);
    expect(partsOf(bytes)["docProps/core.xml"]).toContain(
      record.signature?.createdAt.replace(/\.\d+Z$/, "Z") ?? "never",
    );
    // MS-DOS date of a zip's local header: 1980-01-01.
    expect(bytes.readUInt16LE(12)).toBe((1 << 5) | 1);
  });

  it("says what there is not, of a job just begun and of one station", async () => {
    const begun = await readExcelFile(await reportOf(writeFellgateJob("started")));
    const words = begun.flatMap(({ data }) => data.flat());
    expect(words.filter((word) => word === "No survey of this stage has been computed.")).toHaveLength(2);
    expect(words).toContain("No move was logged.");
    const one = await openInSpreadsheetProgram(await reportOf(oneStationJob()));
    expect(tableOf(one, "As found").size).toBe(1);
  }, 60_000);
});
