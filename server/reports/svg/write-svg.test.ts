import { describe, expect, it } from "vitest";
import { jobFigures } from "../../../shared/figures/job/job-figures.ts";
import type { JobRecord } from "../../../shared/schemas/jobs.ts";
import { hostileJob } from "../../../tests/support/hostile-job.ts";
import { fellgateReport, writeFellgateJob } from "../../../tests/support/job-record.ts";
import { readXml, type XmlElement } from "../../../tests/support/read-xml.ts";
import type { ReportContext } from "../report-format.ts";
import { writeJobFigure } from "./figure-sheet.ts";
import { escapeXml, writeSvg } from "./write-svg.ts";

interface Report {
  readonly record: JobRecord;
  readonly context: ReportContext;
}
const signed = fellgateReport({ signed: true });
const hostileWriter = hostileJob();
const hostile: Report = { record: hostileWriter.record(), context: hostileWriter.context() };

const svgOf = ({ record, context }: Report, wanted: string): string => {
  const figure = jobFigures(record).find(({ id }) => id === wanted);
  if (!figure) throw new Error(`There is no figure ${wanted}.`);
  return writeJobFigure(figure, record, context);
};
const parse = (svg: string): XmlElement[] => readXml([svg])[0] ?? [];
const textOf = (elements: readonly XmlElement[], wanted: string): string =>
  elements.find(({ name }) => name === wanted)?.text ?? "";
const textsOf = (svg: string): string[] =>
  parse(svg).flatMap(({ name, text }) => (name === "text" ? [text] : []));

describe("the figures of a job", () => {
  it("are plan and elevation, end view, and a section of every bore of every survey that was read on its wall", () => {
    const { record } = signed;
    const figures = jobFigures(record);
    const sections = record.surveys.flatMap((_, survey) =>
      record.machine.stations.map((_station, station) => `bore-${survey + 1}-${station + 1}`),
    );
    expect(figures.map(({ id }) => id)).toEqual(["plan-elevation", "end-view", ...sections]);
    expect(figures.find(({ id }) => id === "bore-2-3")).toMatchObject({
      survey: record.surveys[1]?.id,
      station: record.machine.stations[2]?.id,
      title: "Bore section cas-2, as left",
    });
  });

  it("are none before a survey is computed", () => {
    expect(jobFigures(writeFellgateJob("started").record())).toEqual([]);
  });
});

describe("a figure as SVG", () => {
  const every = [signed, hostile].flatMap((report) =>
    jobFigures(report.record).map(({ id }) => svgOf(report, id)),
  );
  const parsed = readXml(every);

  it("is well-formed, named and described", () => {
    expect(parsed).toHaveLength(60);
    for (const elements of parsed) {
      const [root] = elements;
      expect(root).toMatchObject({ name: "svg", namespace: "http://www.w3.org/2000/svg" });
      for (const [attribute, wanted] of [
        ["aria-labelledby", "title"],
        ["aria-describedby", "desc"],
      ] as const) {
        const named = elements.find(({ name }) => name === wanted);
        expect(named?.attributes["id"]).toBe(root?.attributes[attribute]);
        expect(named?.text.length).toBeGreaterThan(5);
      }
    }
  });

  it("holds shapes and text alone: nothing that runs, loads or links", () => {
    const allowed = "svg title desc rect g line polyline polygon circle path text".split(" ");
    for (const { name, attributes } of parsed.flat()) {
      expect(allowed).toContain(name);
      for (const attribute of Object.keys(attributes))
        expect(attribute).not.toMatch(/^on|href$|^style$|^src$/);
    }
  });

  it("is as large on paper as it says: a user unit is a millimetre", () => {
    const { attributes = {} } = parse(svgOf(signed, "plan-elevation"))[0] ?? {};
    const [, , width, height] = (attributes["viewBox"] ?? "").split(" ");
    expect(attributes["width"]).toBe(`${width}mm`);
    expect(attributes["height"]).toBe(`${height}mm`);
    expect(Number(width)).toBe(260);
  });

  it("shows as found and as left together, every station, the record's hash and its state", () => {
    for (const id of ["plan-elevation", "end-view"]) {
      const words = textsOf(svgOf(signed, id)).join(" ");
      for (const part of ["as found", "as left", signed.context.recordHash, "Signed by Ines Alder"])
        expect(words).toContain(part);
      for (const station of signed.record.machine.stations) expect(words).toContain(station.id);
    }
    const draft = writeFellgateJob();
    expect(
      textsOf(svgOf({ record: draft.record(), context: draft.context() }, "end-view")).join(" "),
    ).toContain("DRAFT, not signed");
  });

  it("bears the record's flags, drawn and said", () => {
    for (const id of ["plan-elevation", "end-view", "bore-1-1"]) {
      const svg = svgOf(hostile, id);
      expect(textsOf(svg).join(" ")).toContain("Flag: set_up_unchecked");
      expect(textOf(parse(svg), "desc")).toContain("Flag: set_up_unchecked");
    }
  });

  it("says which figure it is, and under what judges a station its concession", () => {
    const job = writeFellgateJob("found");
    job.add("concession", {
      station: "exh-1",
      name: "Ada Verne",
      reason: "To be shimmed at the next outage.",
    });
    const report = { record: job.record(), context: job.context() };
    const drawn = (id: string) => textsOf(svgOf(report, id)).join(" ");
    expect(drawn("bore-1-5")).toContain("Bore section cas-4, as found. Fellgate Unit 2.");
    expect(drawn("end-view")).toContain("Concessions: exh-1 by Ada Verne.");
    expect(drawn("bore-1-5")).not.toContain("Concessions");
  });

  it("shows names that would act as text", () => {
    const texts = textsOf(svgOf(hostile, "plan-elevation"));
    for (const name of ["<b>&amp;</b>", 'say "no"', "[U+202E]lamron", "'quoted"])
      expect(texts).toContain(name);
    expect(svgOf(hostile, "plan-elevation")).not.toContain("\u202e");
  });

  it("is the same for the same record", () => {
    expect(svgOf(fellgateReport({ signed: true }), "end-view")).toBe(svgOf(signed, "end-view"));
  });
});

describe("writeSvg", () => {
  it("draws arcs clockwise from the top, the long way round where they are longer than half", () => {
    const svg = writeSvg({
      width: 20,
      height: 20,
      title: "arcs",
      alternative: "two arcs",
      shapes: [90, 270].map((endDeg) => ({
        kind: "arc" as const,
        pen: "narrow" as const,
        centre: { x: 10, y: 10 },
        radius: 5,
        startDeg: 0,
        endDeg,
      })),
    });
    const paths = parse(svg).flatMap(({ name, attributes }) => (name === "path" ? [attributes["d"]] : []));
    expect(paths).toEqual(["M10 5A5 5 0 0 1 15 10", "M10 5A5 5 0 1 1 5 10"]);
  });

  it("escapes what XML reserves, and writes what it cannot hold as a code point", () => {
    expect(escapeXml(`<a b="c" d='e'>&\u0000`)).toBe("&lt;a b=&quot;c&quot; d=&#39;e&#39;&gt;&amp;[U+0000]");
  });
});
