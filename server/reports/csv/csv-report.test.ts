import { parse } from "csv-parse/sync";
import { describe, expect, it } from "vitest";
import { hostileJob, oneStationJob } from "../../../tests/support/hostile-job.ts";
import { fellgateReport, writeFellgateJob } from "../../../tests/support/job-record.ts";
import { stressJob } from "../../../tests/support/stress-job.ts";
import type { JobWriter } from "../../../tests/support/job-writer.ts";
import { asFoundReadings } from "../../demo/fellgate-job.ts";
import { writeCsv } from "../../spreadsheets/write-csv.ts";
import { csvReport } from "./csv-report.ts";

const textOf = async (job: Pick<JobWriter, "record" | "context">) =>
  String(await csvReport.write(job.record(), job.context()));
const records = (text: string) => parse<Record<string, string>>(text, { columns: true });

describe("the table of a job", () => {
  it.each([
    ["the demo's", () => writeFellgateJob()],
    ["just begun", () => writeFellgateJob("started")],
    ["of one station", oneStationJob],
    ["with names that are traps", hostileJob],
    ["as large as they come", stressJob],
  ])("read by csv-parse and written again is the same bytes: %s", async (_, begin) => {
    const text = await textOf(begin());
    const rows = parse(text, { record_delimiter: "\r\n" });
    expect(writeCsv(rows)).toBe(text);
  });

  it("holds every number in full, of both surveys", async () => {
    const { record, context } = fellgateReport({ signed: true });
    const rows = records(String(await csvReport.write(record, context)));
    for (const [stage, words] of [
      ["as_found", "as found"],
      ["as_left", "as left"],
    ] as const) {
      const stations = record.surveys.find(({ survey }) => survey.stage === stage)?.result?.stations ?? [];
      expect(rows.map((row) => row[`${words} deviation v (mm)`])).toEqual(
        stations.map(({ deviation }) => String(deviation.v)),
      );
      expect(rows.map((row) => row[`${words} verdict`])).toEqual(stations.map(({ verdict }) => verdict));
    }
    expect(new Set(rows.map((row) => row["record hash"]))).toEqual(new Set([context.recordHash]));
    expect(rows[0]?.["status"]).toBe("Signed by Ines Alder on 2026-11-04");
  });

  it("has columns for surveys after steps, between as found and as left", async () => {
    const job = writeFellgateJob("found");
    const setUp = { sameSetUp: true, instrument: "gauge-1" };
    const some = asFoundReadings().filter(({ station }) =>
      ["brg-1", "cas-1", "cas-2", "shr-3"].includes(station),
    );
    job.survey({ stage: "after_step", ...setUp, label: "Casing set" }, some);
    job.survey({ stage: "as_left", ...setUp }, asFoundReadings());
    const rows = records(await textOf(job));
    const [, step] = job.record().surveys;
    const heading = "survey 2, Casing set (after a step) deviation v (mm)";
    const headings = Object.keys(rows[0] ?? {});
    expect(headings.indexOf(heading)).toBeGreaterThan(headings.indexOf("as found verdict"));
    expect(headings.indexOf(heading)).toBeLessThan(headings.indexOf("as left deviation v (mm)"));
    const known = new Map(step?.result?.stations.map(({ id, deviation }) => [id, String(deviation.v)]));
    expect(known.size).toBe(4);
    expect(rows.map((row) => row[heading])).toEqual(rows.map(({ station = "" }) => known.get(station) ?? ""));
  });

  it("leaves what is missing empty, never 0", async () => {
    const rows = records(await textOf(writeFellgateJob("found")));
    expect(rows).toHaveLength(14);
    for (const row of rows) {
      expect(row["as found centre h (mm)"]).not.toBe("");
      expect(row["as left centre h (mm)"]).toBe("");
      expect(row["status"]).toBe("DRAFT, not signed");
    }
  });

  it("states its units in the headings and puts an apostrophe before what would be a formula", async () => {
    const rows = records(await textOf(hostileJob()));
    expect(Object.keys(rows[0] ?? {})).toContain("as found deviation h (mil)");
    expect(rows.map((row) => row["station"]).slice(0, 5)).toEqual([
      "'=1+1",
      "'+cmd|' /C calc'!A0",
      "-2",
      "'@SUM(A1:A9)",
      'say "no"',
    ]);
    expect(rows[0]?.["concession"]).toBe("'@boss: -because");
  });
});

describe("writeCsv", () => {
  it("guards text alone, and quotes by RFC 4180", () => {
    expect(writeCsv([[-0.02, "-0.02", "-2", "-x", "\tx", "\rx", "+1", 1e-7, null, "", 'a"b', " a"]])).toBe(
      `-0.02,-0.02,-2,'-x,'\tx,"'\rx",'+1,1e-7,,,"a""b"," a"\r\n`,
    );
  });
});
