import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { CrossedResult, OneStationResult } from "../../shared/schemas/repeatability-answers.ts";
import { openTestApp, type TestApp } from "../support/app.ts";
import { exactMoments } from "../support/exact-moments.ts";
import { makeOrganisation } from "../support/factories.ts";
import {
  publishedStudy,
  publishedStudyPrinted as printed,
} from "../../server/compute/repeatability/published-study.ts";
import { describeCases, mismatches } from "./read-cases.ts";

/** The published cases through the whole service: JSON in, a stored record, JSON out. */
let app: TestApp;
let key: string;
beforeAll(async () => {
  app = await openTestApp();
  key = (await (await makeOrganisation(app.deps)).key("calculations:write")).secret;
});
afterAll(() => app.close());

async function study<Result>(body: object): Promise<Result> {
  const answer = await app
    .call()
    .post("/v1/repeatability-studies")
    .set("Authorization", `Bearer ${key}`)
    .send({ units: { axial: "mm", bore: "mm", offset: "mm" }, ...body });
  expect(answer.status, answer.text).toBe(201);
  return (answer.body as { result: Result }).result;
}

/** The value lies in h, and, negated, in v, so that both planes are held to it. */
const repeats = (values: readonly number[], level = 0.95) =>
  study<OneStationResult>({
    form: "one_station",
    station: "s",
    level,
    readings: values.map((value) => ({ h: value, v: -value })),
  });

describeCases<{ y: number[] }, { mean: number; sd: number; autocorrelation_lag1: number }>(
  "POST /v1/repeatability-studies on certified univariate data",
  ["univariate"],
  async ({ input: { y }, expected, tolerance }) => {
    const { mean, standardDeviation, autocorrelation } = await repeats(y);
    const got = {
      h: { mean: mean.h, sd: standardDeviation.h, autocorrelation_lag1: autocorrelation.h ?? NaN },
      v: { mean: -mean.v, sd: standardDeviation.v, autocorrelation_lag1: autocorrelation.v ?? NaN },
    };
    // Of the numbers as JSON delivers them, doubles: to the case's own tolerance.
    const exact = exactMoments(y);
    for (const plane of [got.h, got.v]) expect(mismatches({ expected: exact, tolerance }, plane)).toEqual([]);
    // Of the decimals as certified: what holding them as doubles changes comes on top, half a spacing each.
    const half = Number.EPSILON * Math.max(...y.map(Math.abs));
    const held = { mean: half, sd: 2 * half, autocorrelation_lag1: (8 * half) / expected.sd };
    for (const name of ["mean", "sd", "autocorrelation_lag1"] as const) {
      const own = (tolerance[name] as { rel: number }).rel * Math.abs(expected[name]);
      expect(Math.abs(got.h[name] - expected[name])).toBeLessThanOrEqual(own + held[name]);
    }
  },
);

describeCases<{ x: number[]; alpha: number }, object>(
  "POST /v1/repeatability-studies on Grubbs' test",
  ["outlier-test"],
  async (reference) => {
    const { x, alpha } = reference.input;
    // One-tailed at alpha is two-tailed at 2·alpha.
    const { farthest, warnings } = await repeats(x, 1 - 2 * alpha);
    const got = { G: farthest.h?.ratio, critical: farthest.h?.limit, outlier_index: farthest.h?.index };
    expect(mismatches(reference, got)).toEqual([]);
    expect(warnings.map(({ code }) => code)).toContain("reading_stands_out");
  },
);

describe("POST /v1/repeatability-studies on the worked example of a gauge study", () => {
  const cells = publishedStudy.flatMap((people, i) =>
    people.map((trials, j) => ({
      station: `part-${i + 1}`,
      person: "ABC"[j],
      readings: trials.map((value) => ({ h: value, v: 1 - value })),
    })),
  );

  it("prints the table of the handbook (AIAG, Measurement Systems Analysis, 4th ed.)", async () => {
    const { table } = await study<CrossedResult>({ form: "crossed", cells });
    for (const { source, sumOfSquares, dof, f } of table.h) {
      expect(Math.abs(sumOfSquares - printed.sumOfSquares[source])).toBeLessThan(0.00006);
      expect(dof).toBe(printed.dof[source]);
      if (source in printed.f) {
        expect(Math.abs(f! - printed.f[source as keyof typeof printed.f])).toBeLessThan(0.0006);
      }
    }
    expect(table.h.map(({ source }) => source)).toEqual(Object.keys(printed.sumOfSquares));
  });

  it("prints its components, the interaction pooled above 0.25", async () => {
    const { components, interaction } = await study<CrossedResult>({
      form: "crossed",
      cells,
      pooling: { rule: "above", probability: 0.25 },
    });
    expect(interaction.pooled).toBe(true);
    for (const name of ["repeatability", "reproducibility", "reading", "station"] as const) {
      expect(Math.abs(components[name].v - printed.pooled[name])).toBeLessThan(2e-6);
    }
  });
});
