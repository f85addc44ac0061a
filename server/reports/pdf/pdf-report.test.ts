import { beforeAll, describe, expect, it } from "vitest";
import { writeNumber, writeSigned } from "../../../shared/figures/write-number.ts";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { farApartJob, hostileJob, oneStationJob } from "../../../tests/support/hostile-job.ts";
import { fellgateReport, writeFellgateJob } from "../../../tests/support/job-record.ts";
import type { JobWriter } from "../../../tests/support/job-writer.ts";
import { manyStationsJob } from "../../../tests/support/many-stations-job.ts";
import { stressJob } from "../../../tests/support/stress-job.ts";
import { readPdf, type ReadPdf } from "../../../tests/support/read-pdf.ts";
import { draftMark, type ReportContext } from "../report-format.ts";
import { pdfReport } from "./pdf-report.ts";

const write = async (record: JobRecord, context: ReportContext): Promise<ReadPdf> =>
  readPdf(await pdfReport.write(record, context));
const writeJob = (job: JobWriter) => write(job.record(), job.context());
const pageWith = ({ pages }: ReadPdf, title: string): string =>
  pages.find((page) => page.includes(title)) ?? `no page has ${title}`;
const numbersIn = (line: string): string[] => line.match(/[+\u2212]?\d+\.\d+/g) ?? [];

describe("the PDF report", () => {
  const { record, context } = fellgateReport({ signed: true });
  let signed: ReadPdf;
  let draft: ReadPdf;
  beforeAll(async () => {
    signed = await write(record, context);
    draft = await writeJob(writeFellgateJob());
  }, 60_000);

  it("reads back the numbers of the record, station by station and survey by survey", () => {
    const lines = pageWith(signed, "Deviations as found, as left")
      .split("\n")
      .filter((line) => /as found|as left/.test(line));
    for (const [index, survey] of record.surveys.entries()) {
      for (const { id, deviation, expandedUncertainty } of survey.result?.stations ?? []) {
        const first = lines.findIndex((line) => new RegExp(`^[A-F ]*${id} `).test(line));
        // As left stands under as found.
        const numbers = numbersIn(lines[first + index] ?? "");
        const fit = survey.result?.fits.find((one) => one.id === id);
        for (const written of [
          writeSigned(fit?.centre.h ?? NaN, 4),
          writeSigned(fit?.centre.v ?? NaN, 4),
          writeSigned(deviation.h, 4),
          writeSigned(deviation.v, 4),
          writeNumber(deviation.radial, 4),
          writeNumber(expandedUncertainty?.h ?? NaN, 4),
          writeNumber(expandedUncertainty?.v ?? NaN, 4),
        ])
          expect(numbers).toContain(written);
      }
    }
  });

  it("reads back every shim, every indicator and every logged move", () => {
    const text = signed.pages.join("\n");
    const [plan] = record.plans;
    for (const { id, stacks } of plan?.result.components ?? []) {
      for (const { support, place, from, to } of stacks) {
        const row = text
          .split("\n")
          .find(
            (line) => line.includes(`${id} `) && line.includes(` ${support} `) && line.includes(` ${place} `),
          );
        expect(numbersIn(row ?? "")).toEqual(
          expect.arrayContaining([writeNumber(from, 4), writeNumber(to, 4)]),
        );
      }
    }
    for (const { increments } of plan?.result.steps ?? [])
      for (const { indicators } of increments)
        for (const { reading } of indicators) expect(text).toContain(writeSigned(reading, 4));
    for (const { at, component } of record.moves)
      expect(text).toMatch(new RegExp(`${at.slice(0, 16).replace("T", " ")} +${component} +Sol Winter +yes`));
  });

  it("lists set-up checks, temperatures, drift, readings, people, instruments and cautions", () => {
    const text = signed.pages.join("\n");
    for (const { text: check } of record.checks) expect(text).toContain(check);
    expect(text).toMatch(/casing, turbine end +21\.2 +°C/);
    const drift = record.surveys[0]?.result?.drift;
    expect(text).toMatch(new RegExp(`as found +brg-1 +${writeSigned(drift?.h ?? NaN, 4)}`));
    const readings = pageWith(signed, "Readings as found");
    for (const { reading } of record.surveys[0]?.readings ?? [])
      expect(readings).toMatch(new RegExp(`${reading.takenAt.slice(11, 16)} +${reading.station}`));
    expect(signed.pages[0]).toContain("Sol Winter Millwright lead");
    expect(signed.pages[0]).toContain("Turned bore gauge on the line of sight 2026-06-01 2027-06-01");
    const cover = (signed.pages[0] ?? "").replaceAll(/\s+/g, " ");
    for (const { text: caution } of record.cautions)
      expect(cover).toContain(caution.split(" ").slice(0, 5).join(" "));
  });

  it("bears number, hash, engine version and the fields of ISO 7200 on every sheet", () => {
    expect(signed.info["Pages"]).toBe(String(signed.pages.length));
    for (const [index, page] of signed.pages.entries()) {
      for (const field of [
        "Legal owner",
        "Identification number",
        "Title",
        "Supplementary title",
        "Creator",
        "Approval person",
        "Document type",
        "Date of issue",
        "Revision",
        "Language",
        "Sheet",
        `${index + 1} of ${signed.pages.length}`,
        `${record.id} / 1`,
        "Fellgate Works (demo)",
        "Fellgate Unit 2 (FG-2-GT)",
        context.recordHash,
        `Engine version ${context.engineVersion}`,
      ])
        expect(page).toContain(field);
    }
  });

  it("says on every sheet that it is a draft until it is signed, and then who signed", () => {
    for (const page of draft.pages) {
      // Large beside the title block, and as its status.
      expect(page.split(draftMark).length - 1).toBeGreaterThanOrEqual(2);
      expect(page).not.toContain("Signed by");
    }
    for (const page of signed.pages) {
      expect(page).not.toContain(draftMark);
      expect(page).toContain("Signed by Ines Alder on 2026-11-04");
    }
    expect(signed.pages[0]).toContain("As left, reviewed.");
  });

  it("draws plan and elevation and the end view, with their scales and what they stand on", () => {
    const plan = pageWith(signed, "Plan and elevation, as found and as left");
    expect(plan).toMatch(/Offsets exaggerated [\d\u00a0 ]+ times against z/);
    expect(plan).toMatch(/At A3, the size of this sheet, z is to scale 1 : \d+\.\d/);
    const endView = pageWith(signed, "End view, as found and as left");
    expect(endView).toMatch(/Deviations magnified \d+ times/);
    for (const { id } of record.machine.stations) {
      expect(plan).toContain(id);
      expect(endView).toContain(id);
    }
  });

  it("draws z true to the scale that it states", async () => {
    const two = await writeJob(writeFellgateJob("found"));
    const index = two.pages.findIndex((page) => page.includes("Plan and elevation"));
    const [, scale] = /to scale 1 : (\d+\.\d)/.exec(two.pages[index] ?? "") ?? [];
    const middle = (name: string) => {
      const word = two.words[index]?.find(({ text }) => text === name);
      return word ? (word.left + word.right) / 2 : NaN;
    };
    const zOf = (id: string) => record.machine.stations.find((station) => station.id === id)?.z ?? NaN;
    const drawn = (zOf("brg-2") - zOf("cas-1")) / Number(scale);
    expect(Math.abs(middle("brg-2") - middle("cas-1") - drawn)).toBeLessThan(drawn * 0.003); // scale to three figures
  });

  it("is tagged: parts, headings, figures with words, tables with heads; and says what it is", () => {
    expect(signed.info).toMatchObject({
      Tagged: "yes",
      Title: "Fellgate Unit 2: Unit 2, major outage, revision 1",
      Author: "Ines Alder",
      Subject: "Alignment record, signed by Ines Alder",
      CreationDate: record.signature?.createdAt.replace(".000", ""),
      ModDate: record.signature?.createdAt.replace(".000", ""),
      Encrypted: "no",
    });
    expect(signed.info["Keywords"]).toContain(context.recordHash);
    expect(signed.info["Page size"]).toContain("A3");
    const { structure } = signed;
    expect(structure.match(/^ +H1 /gm)?.length).toBe(structure.match(/^ +Sect /gm)?.length);
    expect(structure.match(/^ +Figure/gm)).toHaveLength(2);
    expect(signed.alternatives.map((words) => words.split(" relative")[0]?.slice(0, 42))).toEqual([
      "Plan and elevation of 14 stations",
      "End view of 14 stations looking downstream",
    ]);
    // A number that only a reader of the words would hear.
    expect(signed.alternatives[0]).toMatch(/Largest deviation 0\.4373 mm at exh-1: h \u22120\.1260/);
    expect(structure).toMatch(/Table "Set-up checks"[^]*?TR\s+TH/);
  });

  it("embeds what it letters with, of that the letters used, and nothing else", () => {
    expect(signed.fonts.length).toBe(2);
    for (const font of signed.fonts) expect(font).toMatch(/IBMPlexMono-(Regular|SemiBold) .* yes yes yes /);
  });

  it.each([
    ["a job just begun", () => writeFellgateJob("started"), 3],
    ["one survey alone", () => writeFellgateJob("found"), 8],
    ["one that was planned and not moved", () => writeFellgateJob("planned"), 10],
    ["the whole of it", () => writeFellgateJob(), 13],
    ["one station", oneStationJob, 8],
    ["stations far apart", farApartJob, 8],
    ["hostile names, in inches and mils", hostileJob, 14],
    ["a hundred stations", () => manyStationsJob(100), 20],
    ["a job as large as they come", stressJob, 48],
  ])(
    "of %s keeps every word inside the frame and off every other",
    async (_words, begin, sheets) => {
      const { words, pages } = await writeJob(begin());
      expect(Math.abs(pages.length - sheets)).toBeLessThanOrEqual(3);
      for (const page of words) {
        for (const [index, word] of page.entries()) {
          expect(word.left).toBeGreaterThan(14);
          expect(word.right).toBeLessThan(416);
          expect(word.top).toBeGreaterThan(3);
          expect(word.bottom).toBeLessThan(294);
          const over = page.slice(index + 1).find((other) => overlap(word, other));
          expect(over && `${word.text} over ${over.text}`).toBeUndefined();
        }
      }
    },
    60_000,
  );

  it("says of a job without a survey that it holds no verdict, and draws none", async () => {
    const { pages } = await writeJob(writeFellgateJob("started"));
    expect(pages[0]).toContain("No survey has been computed: this record holds no verdict.");
    expect(pages.join("")).not.toContain("Plan and elevation");
  });

  it("shows names that would act as text, and the record's flags on every figure", async () => {
    const hostile = await writeJob(hostileJob());
    const text = hostile.pages.join("\n");
    for (const id of ["=1+1", "[U+202E]lamron", "<b>&amp;</b>", "%%d^J\\U+000A", "{\\fArial;x}"])
      expect(text).toContain(id);
    expect([...text].filter((character) => character < " " && character !== "\n")).toEqual([]);
    expect(text).not.toContain("\u202e");
    for (const title of ["Plan and elevation", "End view"])
      expect(pageWith(hostile, title)).toContain("set_up_unchecked");
  });

  it("gives every one of a hundred stations its row under a head", async () => {
    const job = manyStationsJob(100);
    const { pages } = await writeJob(job);
    const sheets = pages.filter((page) => page.includes("Deviations as found"));
    expect(sheets.length).toBeGreaterThan(1);
    for (const sheet of sheets) expect(sheet).toMatch(/station .*tolerance .*survey .*verdict/);
    const text = sheets.join("\n");
    for (const { id } of job.record().machine.stations)
      expect(text).toMatch(new RegExp(`(^|[ A-F])${id} `, "m"));
  });
});

interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

/** A word's box holds room over its capitals and under its line; letters overlap where the middles of boxes do. */
function overlap(one: Box, other: Box): boolean {
  const inner = ({ left, top, right, bottom }: Box) => {
    const height = bottom - top;
    return { left: left + 0.2, right: right - 0.2, top: top + height * 0.3, bottom: bottom - height * 0.25 };
  };
  const [a, b] = [inner(one), inner(other)];
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
}
