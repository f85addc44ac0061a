import { readdirSync, readFileSync } from "node:fs";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Fault } from "../../shared/error-codes.ts";
import type { CrossedResult, OneStationResult } from "../../shared/schemas/repeatability-answers.ts";
import {
  repeatabilityStudyRequest,
  repeatabilityStudyResult,
  type CrossedStudyRequest,
  type OneStationStudyRequest,
  type RepeatabilityStudyRequest,
} from "../../shared/schemas/repeatability-studies.ts";
import type { Units } from "../../shared/units.ts";
import {
  publishedStudy,
  publishedStudyPrinted as printed,
} from "../compute/repeatability/published-study.ts";
import { seededRandom } from "../../tests/support/seeded-random.ts";
import { CalculationRefusal } from "./calculation-kind.ts";
import { repeatabilityStudyKind } from "./repeatability-study.ts";

const mm: Units = { axial: "mm", bore: "mm", offset: "mm" };
const one = (request: OneStationStudyRequest) =>
  repeatabilityStudyKind.answer(request).result as OneStationResult;
const cross = (request: CrossedStudyRequest) =>
  repeatabilityStudyKind.answer(request).result as CrossedResult;
const codes = ({ warnings }: { warnings: { code: string }[] }) => warnings.map(({ code }) => code);

const random = seededRandom(4);
const readings = Array.from({ length: 10 }, () => ({
  h: 0.1 + 0.002 * random.normal(),
  v: -0.2 + 0.003 * random.normal(),
}));
const repeats: OneStationStudyRequest = { units: mm, form: "one_station", station: "brg-1", readings };
const minutes = (each: number) =>
  readings.map((reading, i) => ({
    ...reading,
    at: new Date(Date.UTC(2026, 2, 11, 8, each * i)).toISOString(),
  }));

/** The published example: parts as stations, appraisers as people. */
const cells: CrossedStudyRequest["cells"] = publishedStudy.flatMap((people, i) =>
  people.map((trials, j) => ({
    station: `part-${i + 1}`,
    person: "ABC"[j]!,
    readings: trials.map((value) => ({ h: value, v: -value })),
  })),
);
const study: CrossedStudyRequest = { units: mm, form: "crossed", cells };

describe("repeatabilityStudyKind.answer, one station", () => {
  it("answers in the shape of its schema", () => {
    const answer = repeatabilityStudyKind.answer({ ...repeats, tolerance: { radial: 0.05 } });
    expect(answer).toMatchObject({ units: mm, level: 0.95, result: { form: "one_station", count: 10 } });
    expect(repeatabilityStudyResult.parse(answer.result)).toEqual(answer.result);
  });

  it("has its drift per hour where times were sent, per reading where not", () => {
    const plain = one(repeats).drift!;
    const timed = one({ ...repeats, readings: minutes(15) }).drift!;
    expect([plain.per, timed.per]).toEqual(["reading", "hour"]);
    expect(Math.abs(timed.h.slope / plain.h.slope - 4)).toBeLessThan(1e-9);
    expect(Math.abs(timed.h.t! - plain.h.t!)).toBeLessThan(1e-9);
    // A reading not taken in turn weighs by its time.
    const late = minutes(15).with(9, { ...readings[9]!, at: "2026-03-12T08:00:00Z" });
    expect(Math.abs(one({ ...repeats, readings: late }).drift!.h.t! - plain.h.t!)).toBeGreaterThan(1e-3);
  });

  it("sets six standard deviations against the width of a tolerance, each plane or the worst direction", () => {
    const {
      standardDeviation: s,
      covariance,
      percentOfTolerance,
    } = one({
      ...repeats,
      tolerance: { h: 0.05, v: [-0.02, 0.04] },
    });
    const share = percentOfTolerance as { h: number; v: number };
    expect(Math.abs(share.h - (600 * s.h) / 0.1)).toBeLessThan(1e-9);
    expect(Math.abs(share.v - (600 * s.v) / 0.06)).toBeLessThan(1e-9);
    const round = one({ ...repeats, tolerance: { radial: 0.05 } }).percentOfTolerance as { radial: number };
    const [[hh, hv], [, vv]] = covariance as [[number, number], [number, number]];
    const worst = (hh + vv) / 2 + Math.sqrt(((hh - vv) / 2) ** 2 + hv ** 2);
    expect(Math.abs(round.radial - (600 * Math.sqrt(worst)) / 0.1)).toBeLessThan(1e-9);
  });

  it("warns of drift, of neighbours alike, of a reading that stands out, of a flat plane, of too wide a scatter", () => {
    const drifting = readings.map(({ h, v }, i) => ({ h: h + 0.003 * i, v }));
    expect(codes(one({ ...repeats, readings: drifting }))).toContain("readings_drift");
    const slow = Array.from({ length: 30 }, (_, i) => ({ h: Math.sin(i / 4), v: random.normal() }));
    expect(codes(one({ ...repeats, readings: slow }))).toContain("readings_correlated");
    const slip = readings.with(4, { h: 0.2, v: -0.2 });
    const found = one({ ...repeats, readings: slip });
    expect(found.farthest.h).toMatchObject({ index: 4, standsOut: true });
    expect(found.farthest.v?.standsOut).toBe(false);
    expect(codes(found)).toContain("reading_stands_out");
    expect(codes(one({ ...repeats, readings: readings.map(({ v }) => ({ h: 0.1, v })) }))).toEqual([
      "no_scatter",
    ]);
    expect(codes(one({ ...repeats, tolerance: { radial: 0.01 } }))).toContain("tolerance_taken_by_readings");
    expect(codes(one(repeats))).toEqual([]);
  });

  it.each([
    { axial: "m", bore: "mm", offset: "um" },
    { axial: "in", bore: "in", offset: "mil" },
    { axial: "ft", bore: "in", offset: "in" },
  ] as const)("says the same in $offset", (units) => {
    // Exact by definition (international inch, 1959).
    const per = { um: 0.001, mil: 0.0254, in: 25.4 }[units.offset];
    const wanted = one(repeats);
    const got = one({
      ...repeats,
      units,
      readings: readings.map(({ h, v }) => ({ h: h / per, v: v / per })),
    });
    const near = (a: number, b: number) => expect(Math.abs(a / b - 1)).toBeLessThan(1e-9);
    near(got.mean.h * per, wanted.mean.h);
    near(got.standardDeviation.v * per, wanted.standardDeviation.v);
    near(got.covariance[0]![1]! * per * per, wanted.covariance[0]![1]!);
    near(got.expandedUncertainty.radial! * per, wanted.expandedUncertainty.radial!);
    near(got.drift!.v.pValue!, wanted.drift!.v.pValue!);
  });
});

describe("repeatabilityStudyKind.answer, crossed", () => {
  it("answers the published worked example in the shape of its schema, its interaction pooled by rule", () => {
    const answer = repeatabilityStudyKind.answer({
      ...study,
      pooling: { rule: "above" },
      tolerance: { h: 4, v: 4 },
    });
    const result = answer.result as CrossedResult;
    expect(repeatabilityStudyResult.parse(result)).toEqual(result);
    expect(result.interaction).toMatchObject({
      pooled: true,
      rule: "pooled above a probability of 0.25 in h and in v",
    });
    for (const name of ["repeatability", "reproducibility", "reading", "station"] as const) {
      expect(Math.abs(result.components[name].h - printed.pooled[name])).toBeLessThan(2e-6);
      expect(Math.abs(result.components[name].v - printed.pooled[name])).toBeLessThan(2e-6);
    }
    expect(Math.abs((result.percentOfTolerance!.reading as { h: number }).h - 22.68)).toBeLessThan(0.005);
    expect(result.people).toEqual(["A", "B", "C"]);
  });

  it("does not pool unless asked, and says so", () => {
    const { interaction, table, components } = cross(study);
    expect(interaction).toMatchObject({ pooled: false, rule: "never pooled" });
    expect(table.h.map(({ source }) => source)).toContain("interaction");
    expect(Math.abs(components.repeatability.h - printed.repeatabilityNotPooled)).toBeLessThan(6e-7);
    expect(codes(cross(study))).toEqual(["component_below_zero"]);
  });

  it("does not mind the order of the cells", () => {
    const [found, back] = [cross(study), cross({ ...study, cells: [...cells].reverse() })];
    expect(back.stations).toEqual([...found.stations].reverse());
    found.table.h.forEach((line, i) => {
      expect(Math.abs(line.sumOfSquares - back.table.h[i]!.sumOfSquares)).toBeLessThan(1e-12);
    });
    const offset = (result: CrossedResult) => result.personOffsets.find(({ person }) => person === "B")!.h;
    expect(Math.abs(offset(found) - offset(back))).toBeLessThan(1e-12);
  });
});

describe("repeatabilityStudyKind", () => {
  const places = (faults: readonly Fault[]) => faults.map(({ pointer, code }) => `${pointer} ${code}`);
  function faultsOf(request: RepeatabilityStudyRequest): string[] {
    try {
      repeatabilityStudyKind.answer(request);
    } catch (error) {
      if (error instanceof CalculationRefusal) return places(error.faults);
      throw error;
    }
    return [];
  }

  it("refuses times of some readings, and readings out of their order, each at its place", () => {
    const timed = minutes(15);
    const faulty: OneStationStudyRequest["readings"] = [...timed];
    faulty[2] = readings[2]!;
    faulty[5] = timed[1]!;
    expect(faultsOf({ ...repeats, readings: faulty, tolerance: { h: [1, 0], v: 1 } })).toEqual([
      "/tolerance/h tolerance_invalid",
      "/readings/2/at combination_invalid",
      "/readings/5/at combination_invalid",
    ]);
  });

  it("refuses a study that is not crossed or not balanced, naming every cell at fault", () => {
    const short = { ...cells[4]!, readings: cells[4]!.readings.slice(1) };
    expect(
      faultsOf({
        ...study,
        cells: [...cells.slice(0, 4), short, ...cells.slice(5, 29), cells[0]!],
        pooling: { rule: "never", probability: 0.1 },
      }),
    ).toEqual([
      "/cells/4/readings combination_invalid",
      "/cells/29 combination_invalid",
      "/cells combination_invalid",
      "/pooling/probability combination_invalid",
    ]);
    const alone = cells.filter(({ person }) => person === "A");
    expect(faultsOf({ ...study, cells: alone })).toEqual(["/cells combination_invalid"]);
  });

  it("finds the faults of the sound parts beside one that the schema refuses, and makes something of any body", () => {
    const beside = (body: unknown) => places(repeatabilityStudyKind.faultsBesideSchema!(body, []));
    const broken = [{ ...cells[0]!, readings: "three" }, ...cells.slice(1, 6), cells[1]!];
    expect(beside({ ...study, units: undefined, cells: broken })).toEqual(["/cells/6 combination_invalid"]);
    expect(
      beside({ ...repeats, readings: [{ h: "left" }, ...minutes(15).slice(0, 3), readings[0]] }),
    ).toEqual(["/readings/4/at combination_invalid"]);
    fc.assert(
      fc.property(fc.anything(), fc.anything(), fc.constantFrom("crossed", "one_station"), (a, b, form) => {
        expect(Array.isArray(beside(a))).toBe(true);
        expect(
          Array.isArray(beside({ units: mm, form, cells: [a, b], readings: [b, a], tolerance: a })),
        ).toBe(true);
      }),
    );
  });

  it("works every example of the documentation", () => {
    const folder = new URL("../../examples/requests/repeatability-studies/", import.meta.url);
    const files = readdirSync(folder);
    expect(files.length).toBeGreaterThan(1);
    for (const file of files) {
      const request = repeatabilityStudyRequest.parse(
        JSON.parse(readFileSync(new URL(file, folder), "utf8")),
      );
      const { result } = repeatabilityStudyKind.answer(request);
      expect(repeatabilityStudyResult.safeParse(result).success).toBe(true);
    }
  });

  it("answers any readings with finite numbers", () => {
    const value = fc.double({ min: -1e9, max: 1e9, noNaN: true });
    fc.assert(
      fc.property(fc.array(fc.record({ h: value, v: value }), { minLength: 8, maxLength: 8 }), (all) => {
        const four = [0, 1, 2, 3].map((c) => ({
          station: `s${c >> 1}`,
          person: `p${c & 1}`,
          readings: all.slice(2 * c, 2 * c + 2),
        }));
        const text = JSON.stringify(
          [cross({ ...study, cells: four }), one({ ...repeats, readings: all })],
          (_, number: unknown) =>
            typeof number === "number" && !Number.isFinite(number) ? "not finite" : number,
        );
        expect(text).not.toContain("not finite");
      }),
    );
  });
});
