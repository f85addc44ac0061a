import DxfParser from "dxf-parser";
import { describe, expect, it } from "vitest";
import { farApartJob, hostileJob, oneStationJob } from "../../../tests/support/hostile-job.ts";
import { writeFellgateJob } from "../../../tests/support/job-record.ts";
import type { JobWriter } from "../../../tests/support/job-writer.ts";
import { stressJob } from "../../../tests/support/stress-job.ts";
import { readDrawing, type ReadDrawing } from "../../../tests/support/read-drawing.ts";
import { millimetresPer } from "../../../shared/units.ts";
import { spread } from "./draw-dimensions.ts";
import { layerNames, plainText } from "./drawing.ts";
import { dxfReport } from "./dxf-report.ts";

const bytesOf = (job: JobWriter) => Promise.resolve(dxfReport.write(job.record(), job.context()));
const on = ({ entities }: ReadDrawing, layer: string, kind: string) =>
  entities.filter((entity) => entity.layer === layer && entity.kind === kind);
const textsOf = ({ entities }: ReadDrawing) => entities.flatMap(({ text }) => text ?? []);

/** Times as large as it is, as the drawing itself says: of the strips, and of the end views. */
function exaggerationsOf(drawing: ReadDrawing): [strips: number, endViews: number] {
  const words = textsOf(drawing).find((text) => text.startsWith("Scale:")) ?? "";
  const [, strips, endViews] =
    /([\d.e+-]+) times as large, in the end views ([\d.e+-]+) times/.exec(words) ?? [];
  return [Number(strips), Number(endViews)];
}

describe("the drawing of a job", () => {
  it.each([
    ["the demo's", () => writeFellgateJob()],
    ["in inches and mils, with names that are traps", hostileJob],
  ])("shows every bore where the record has it, by ezdxf: %s", async (_, begin) => {
    const job = begin();
    const record = job.record();
    const drawing = await readDrawing(await bytesOf(job));
    expect(drawing.errors).toEqual([]);
    expect(drawing.fixes).toEqual([]);
    expect(drawing.units).toBe(4);
    expect(drawing.layers).toEqual(expect.arrayContaining(layerNames));
    const [times, endTimes] = exaggerationsOf(drawing);
    const [perZ, perOffset] = [
      millimetresPer[record.machine.units.axial],
      millimetresPer[record.machine.units.offset],
    ];
    for (const [stage, layer] of [
      ["as_found", "AS-FOUND"],
      ["as_left", "AS-LEFT"],
    ] as const) {
      const result = record.surveys.find(({ survey }) => survey.stage === stage)?.result;
      const [elevation, plan] = on(drawing, layer, "LWPOLYLINE").map(({ points = [] }) => points);
      // The plan's axis lies where its line is drawn: the second of the two that run along z.
      const planY = on(drawing, "AXIS", "LINE").filter(
        ({ points }) => points?.[0]?.[1] === points?.[1]?.[1],
      )[1]?.points?.[0]?.[1];
      expect(result?.stations).toHaveLength(14);
      result?.stations.forEach(({ id, z, deviation }, index) => {
        const target = record.machine.stations.find((station) => station.id === id)?.target ?? { h: 0, v: 0 };
        const expected = [
          [z * perZ, times * perOffset * (target.v + deviation.v)],
          [z * perZ, (planY ?? NaN) - times * perOffset * (target.h + deviation.h)],
        ];
        for (const [strip, point] of [elevation?.[index], plan?.[index]].entries()) {
          expect(Math.abs((point?.[0] ?? NaN) - (expected[strip]?.[0] ?? NaN))).toBeLessThan(1e-5); // mm
          expect(Math.abs((point?.[1] ?? NaN) - (expected[strip]?.[1] ?? NaN))).toBeLessThan(1e-5); // mm
        }
      });
      // End views: h right and v up.
      const vectors = on(drawing, layer, "LINE");
      result?.stations.forEach(({ deviation }, index) => {
        const [from, tip] = vectors[index]?.points ?? [];
        expect(
          Math.abs((tip?.[0] ?? NaN) - (from?.[0] ?? NaN) - endTimes * perOffset * deviation.h),
        ).toBeLessThan(1e-5);
        expect(
          Math.abs((tip?.[1] ?? NaN) - (from?.[1] ?? NaN) - endTimes * perOffset * deviation.v),
        ).toBeLessThan(1e-5);
      });
    }
    // Gates in both strips, and in the end views those that are not round.
    expect(on(drawing, "TOLERANCE", "LWPOLYLINE").filter(({ closed }) => closed)).toHaveLength(28 + 3);
  });

  it("names every station twice, with its verdict and concession under its end view", async () => {
    const job = writeFellgateJob("found");
    job.add("concession", {
      station: "exh-1",
      name: "Ada Verne",
      reason: "To be shimmed at the next outage.",
    });
    const texts = textsOf(await readDrawing(await bytesOf(job)));
    const [survey] = job.record().surveys;
    for (const { id, reference, deviation, verdict } of survey?.result?.stations ?? []) {
      const own = reference ? [id, `${id} (ref.)`] : [id, id];
      expect(texts.filter((text) => text === id || text === `${id} (ref.)`)).toEqual(own);
      expect(texts).toContain(`as found ${deviation.radial.toFixed(4)} mm ${verdict}`);
    }
    expect(texts.filter((text) => text.startsWith("conceded by"))).toEqual(["conceded by Ada Verne"]);
  });

  it("keeps text of a job as large as they come off every other", async () => {
    const drawing = await readDrawing(await bytesOf(stressJob()));
    expect([...drawing.errors, ...drawing.fixes]).toEqual([]);
    const placed = drawing.entities.filter(({ kind, layer }) => kind === "TEXT" && layer !== "DRAFT");
    const lines = placed.map(({ points, height }) => `${points?.[0]?.join(" ")} ${height}`);
    expect(new Set(lines).size).toBe(lines.length);
    expect(textsOf(drawing).join(" ")).toContain("survey 2, Casing set (after a step)");
  }, 30_000);

  it("carries the fields of a title block, the hash, the units and the cautions", async () => {
    const job = writeFellgateJob();
    const drawing = await readDrawing(await bytesOf(job));
    const { id } = job.record();
    const texts = textsOf(drawing);
    expect(texts).toEqual(
      expect.arrayContaining([
        "Legal owner: Fellgate Works (demo)",
        "Title: Fellgate Unit 2: bore alignment, Unit 2, major outage",
        `Identification number: ${id}`,
        "Date of issue: 2026-11-04",
        "Creator: Ines Alder",
        "Approval person: DRAFT, not signed",
        "Sheet: 1/1",
        "Units: mm",
        `Record hash: ${job.context().recordHash}`,
        "Engine version: 1.0.0",
        "DRAFT, NOT SIGNED",
      ]),
    );
    expect(texts.some((text) => text.startsWith("Caution: Lock out"))).toBe(true);
    job.sign();
    const signed = await readDrawing(await bytesOf(job));
    expect(on(signed, "DRAFT", "TEXT")).toHaveLength(0);
    expect(textsOf(signed)).toContain("Status: Signed by Ines Alder on 2026-11-04");
  });

  it("says of inches that they were converted, and what z is in both", async () => {
    const texts = textsOf(await readDrawing(await bytesOf(hostileJob())));
    expect(texts).toContain("Units: mm; the record is in in and mil, converted to mm here");
    expect(texts).toContain("620.00 in (15748.0 mm)");
  });

  it.each([
    ["one station", oneStationJob],
    ["stations two million kilometres apart", farApartJob],
    ["a job just begun", () => writeFellgateJob("started")],
  ])("is sound and can be read of %s", async (_, begin) => {
    const bytes = await bytesOf(begin());
    const drawing = await readDrawing(bytes);
    expect([...drawing.errors, ...drawing.fixes]).toEqual([]);
    const xs = drawing.entities.flatMap(({ points = [] }) => points.map(([x]) => x));
    const width = Math.max(...xs) - Math.min(...xs);
    // A sheet 400 mm wide shows lettering of about 1.5 mm or more.
    for (const { height } of drawing.entities)
      if (height) expect(height / width).toBeGreaterThan(1.5 / 400 / 2);
    expect(String(bytes)).not.toMatch(/NaN|Infinity/);
    // A second reader, of another author.
    expect(new DxfParser().parseSync(String(bytes))?.entities).toHaveLength(drawing.entities.length);
  });
});

describe("plainText", () => {
  it("leaves nothing that ends a line or begins a code", () => {
    expect(plainText("a\r\n0\nSECTION")).toBe("a 0 SECTION");
    expect(plainText("%%d ^J \\U+000A 5 %")).toBe("% %d ^ J \\ U+000A 5 %");
    expect(plainText("\ud800x")).toBe("\ufffdx");
  });
});

describe("spread", () => {
  it("keeps names apart and in order", () => {
    expect(spread([0, 0, 0.5, 10], 1)).toEqual([0, 1, 2, 10]);
  });
});
