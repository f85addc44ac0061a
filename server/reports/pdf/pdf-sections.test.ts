import { describe, expect, it } from "vitest";
import { writeFellgateJob } from "../../../tests/support/job-record.ts";
import { JobWriter } from "../../../tests/support/job-writer.ts";
import { readPdf, type ReadPdf } from "../../../tests/support/read-pdf.ts";
import { foreignName, stressJob } from "../../../tests/support/stress-job.ts";
import { fellgateDocument } from "../../demo/fellgate-document.ts";
import { asFoundReadings, fellgateJobDetails } from "../../demo/fellgate-job.ts";
import { pdfReport } from "./pdf-report.ts";

const writeJob = async (job: JobWriter): Promise<ReadPdf> =>
  readPdf(await pdfReport.write(job.record(), job.context()));
const pageOf = ({ pages }: ReadPdf, title: string): string =>
  pages.find((page) => page.includes(title)) ?? `no page has ${title}`;
const numbersIn = (line: string): string[] => line.match(/[+\u2212]?\d+\.\d+/g) ?? [];

describe("the parts of the PDF report", () => {
  it("lists surveys after steps, and a concession beside the station in the latest survey alone", async () => {
    const job = writeFellgateJob("found");
    const readings = asFoundReadings();
    job.survey(
      { stage: "after_step", sameSetUp: true, instrument: "gauge-1", label: "Casing set" },
      readings,
    );
    job.add("concession", {
      station: "exh-1",
      name: "Ada Verne",
      reason: "To be shimmed at the next outage.",
    });
    const pdf = await writeJob(job);
    const rows = pageOf(pdf, "Deviations as found, after a step")
      .split("\n")
      .filter((line) => /as found|after a step/.test(line) && numbersIn(line).length > 7);
    expect(rows).toHaveLength(28);
    const conceded = rows.filter((line) => line.includes("Ada Verne"));
    expect(conceded).toHaveLength(1);
    expect(conceded[0]).toContain("after a step");
    for (const title of ["Plan and elevation", "End view"])
      expect(pageOf(pdf, title)).toContain("Concessions: exh-1 by Ada Verne.");
    expect(pageOf(pdf, "Set-up checks")).toContain("Casing set (after a step)");
  });

  it("says that no temperature was noted", async () => {
    const job = new JobWriter(fellgateDocument, fellgateJobDetails);
    job.survey({ stage: "as_found", sameSetUp: false, instrument: "gauge-1" }, asFoundReadings());
    expect(pageOf(await writeJob(job), "Set-up checks")).toMatch(/Temperatures\s+None was noted\./);
  });

  it("writes a name in letters that the type has not as code points, in full on the first sheet", async () => {
    const { pages } = await writeJob(stressJob());
    const codes = Array.from(
      foreignName.replaceAll(" ", ""),
      (letter) => `[U+${letter.codePointAt(0)?.toString(16).toUpperCase().padStart(4, "0")}]`,
    );
    for (const code of codes) expect(pages[0]).toContain(code);
  });
});
