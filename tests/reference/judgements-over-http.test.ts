import { afterAll, beforeAll, expect } from "vitest";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { describeCases, mismatches } from "./read-cases.ts";

/** Published factors and decision rules through the whole service: stations on the line of sight, seen in the h plane. */
let app: TestApp;
let key: string;
beforeAll(async () => {
  app = await openTestApp();
  key = (await (await makeOrganisation(app.deps)).key("calculations:write")).secret;
});
afterAll(() => app.close());

interface Seen {
  readonly y: number;
  readonly u: number;
  readonly dof?: number;
  /** The one limit that can be met; the other lies far away. */
  readonly upper?: number;
}
interface Judged {
  readonly verdict: "conforms" | "undecided" | "exceeds" | null;
  readonly expandedUncertainty: { readonly k: number };
}

async function judge(readings: readonly Seen[], level: number, rule = "guarded"): Promise<Judged[]> {
  const stations = readings.map(({ y, u, dof, upper }, index) => ({
    id: `s${index}`,
    z: index,
    centre: { h: y, v: 0 },
    covariance: [
      [u * u, 0],
      [0, 1e-12],
    ],
    ...(dof === undefined ? {} : { dof }),
    ...(upper === undefined ? {} : { tolerance: { h: [upper - 1e3, upper], v: 1 } }),
  }));
  const body = {
    units: { axial: "mm", bore: "mm", offset: "mm" },
    level,
    axis: { method: "line_of_sight" },
    verdict: { rule },
    stations,
  };
  const answer = await app
    .call()
    .post("/v1/axis-deviations")
    .set("Authorization", `Bearer ${key}`)
    .send(body);
  expect(answer.status, answer.text).toBe(201);
  return (answer.body as { result: { stations: Judged[] } }).result.stations;
}

describeCases<{ p: number[]; nu: number[] }, object>(
  "POST /v1/axis-deviations: coverage-factor",
  ["coverage-factor"],
  async (reference) => {
    const { p, nu } = reference.input;
    const byLevel: number[][] = [];
    for (const level of p) {
      const stations = await judge(
        nu.map((dof) => ({ y: 0, u: 0.01, dof })),
        level,
      );
      byLevel.push(stations.map(({ expandedUncertainty }) => expandedUncertainty.k));
    }
    const t = nu.map((_, row) => byLevel.map((column) => column[row] ?? NaN));
    expect(mismatches(reference, { t })).toEqual([]);
  },
);

interface Conformity {
  readonly readings?: readonly { readonly y: number; readonly U: number; readonly T_U: number }[];
  readonly u?: number;
  readonly T_U?: number;
  readonly y?: readonly number[];
  readonly upper?: { readonly y: number; readonly u: number; readonly T_U: number };
  readonly lower?: { readonly y: number; readonly u: number; readonly T_L: number };
}

/** The two-sided normal factor of 0.95: a guard U is stated as the standard uncertainty U/k. */
const k95 = 1.959963984540054;
const verdicts = async (readings: readonly Seen[], level = 0.95, rule = "guarded") =>
  (await judge(readings, level, rule)).map(({ verdict }) => verdict);

describeCases<Conformity, { verdict?: string[]; p_upper?: number; p_lower?: number }>(
  "POST /v1/axis-deviations: conformity",
  ["conformity"],
  async (reference) => {
    const { readings, u, T_U, y, upper, lower } = reference.input;
    if (readings) {
      const seen = readings.map((one) => ({ y: one.y, u: one.U / k95, upper: one.T_U }));
      const passes = (verdict: string | null) => (verdict === "conforms" ? "pass" : "fail");
      const simple = (await verdicts(seen, 0.95, "simple")).map(passes);
      const guarded = await verdicts(seen);
      const non_binary = guarded.map((verdict, i) =>
        verdict === "undecided" ? `conditional ${simple[i]}` : simple[i],
      );
      expect(mismatches(reference, { simple, guarded: guarded.map(passes), non_binary })).toEqual([]);
    } else if (y && u !== undefined && T_U !== undefined) {
      const names = { conforms: "conforming", undecided: "neither", exceeds: "nonconforming" };
      const seen = (values: readonly number[]) =>
        values.map((value) => ({ y: value, u: (1.65 * u) / k95, upper: T_U }));
      const got = (await verdicts(seen(y))).map((verdict) => verdict && names[verdict]);
      // 10.066 stands exactly on the limit, where the standard has nonconformity proved and the house's rule,
      // |d| − U > T, has not: every other reading must agree.
      expect(got.slice(0, 4)).toEqual(reference.expected.verdict?.slice(0, 4));
      expect(await verdicts(seen([(y[4] ?? NaN) + 1e-9]))).toEqual(["exceeds"]);
    } else {
      // The conformance probability Φ((T_U − y)/u) passes p exactly where a normal guard of level 2p − 1 is met.
      const half = (reference.tolerance["p_upper"] as { abs: number }).abs;
      const { p_upper = NaN, p_lower = NaN } = reference.expected;
      for (const [seen, p] of [
        [{ y: upper?.y ?? NaN, u: upper?.u ?? NaN, upper: upper?.T_U ?? NaN }, p_upper],
        // Mirrored: a lower limit is an upper one of −y.
        [{ y: -(lower?.y ?? NaN), u: lower?.u ?? NaN, upper: -(lower?.T_L ?? NaN) }, p_lower],
      ] as const) {
        expect(await verdicts([seen], 2 * (p - half) - 1)).toEqual(["conforms"]);
        expect(await verdicts([seen], 2 * (p + half) - 1)).toEqual(["undecided"]);
      }
    }
  },
);
