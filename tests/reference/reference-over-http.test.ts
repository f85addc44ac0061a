import { afterAll, beforeAll, expect } from "vitest";
import { openTestApp, type TestApp } from "../support/app.ts";
import { makeOrganisation } from "../support/factories.ts";
import { describeCases, mismatches } from "./read-cases.ts";

/** The published cases through the whole service: JSON in, a stored record, JSON out. */
let app: TestApp;
let key: string;
beforeAll(async () => {
  app = await openTestApp();
  key = (await (await makeOrganisation(app.deps)).key("calculations:write")).secret;
});
afterAll(() => app.close());

const units = { axial: "mm", bore: "mm", offset: "mm" };

async function post<Result>(path: string, body: object): Promise<Result> {
  const answer = await app.call().post(path).set("Authorization", `Bearer ${key}`).send(body);
  expect(answer.status, answer.text).toBe(201);
  return (answer.body as { result: Result }).result;
}

interface FittedBore {
  centre: { h: number; v: number };
  diameter: number;
  residuals: number[];
  covariance: [[number, number], [number, number]];
}

describeCases<{ points: [number, number][] }, object>(
  "POST /v1/bore-fits",
  ["circle-least-squares"],
  async (reference) => {
    const points = reference.input.points.map(([h, v]) => ({ h, v }));
    const body = { units, seen: "downstream", bores: [{ id: reference.id, form: "points", points }] };
    const { bores } = await post<{ bores: FittedBore[] }>("/v1/bore-fits", body);
    const { centre, diameter, residuals, covariance } = bores[0] as FittedBore;
    const rss = residuals.reduce((sum, residual) => sum + residual ** 2, 0);
    const variance = rss / (points.length - 3);
    const got = {
      center: [centre.h, centre.v],
      radius: diameter / 2,
      rss,
      rms: Math.sqrt(rss / points.length),
      residual_norm: Math.sqrt(rss),
      // Nothing stated, so the service scaled the cofactors by s².
      covariance_center_unit: covariance.map((row) => row.map((entry) => entry / variance)),
    };
    // One case also gives the linear (Kåsa) circle, which is not a method of the service.
    expect(mismatches(reference, got).filter(({ field }) => !field.startsWith("linear_"))).toEqual([]);
  },
);

type Line = { at0: number; slope: number };
type LineCovariance = [[number, number], [number, number]];
interface AxisAnswer {
  axis: {
    h: Line;
    v: Line;
    covariance: { h: LineCovariance; v: LineCovariance } | null;
    chiSquare?: { h: number; v: number };
    zoneWidth?: { h: number; v: number };
    sumAbsolute?: { h: number; v: number };
  };
  stations: { id: string; deviation: { h: number; v: number } }[];
}

/** Observations as reference stations: the value lies in h, and, negated, in v, so that both planes are held to it. */
function stationsOf(z: readonly number[], value: readonly number[], u?: readonly number[]) {
  return z.map((at, index) => {
    const observed = value[index] ?? 0;
    const variance = (u?.[index] ?? 0) ** 2;
    return {
      id: `s${index}`,
      z: at,
      centre: { h: observed, v: -observed },
      ...(u
        ? {
            covariance: [
              [variance, 0],
              [0, variance],
            ],
          }
        : {}),
    };
  });
}

async function fitAxis(
  stations: ReturnType<typeof stationsOf>,
  method = "least_squares",
  through = stations.map(({ id }) => id),
) {
  const answer = await post<AxisAnswer>("/v1/axis-deviations", {
    units,
    axis: { method, through },
    stations,
  });
  expect(Math.abs(answer.axis.h.at0 + answer.axis.v.at0)).toBeLessThan(
    1e-12 * (1 + Math.abs(answer.axis.h.at0)),
  );
  return answer;
}

describeCases<{ z: number[]; h: number[] }, object>(
  "POST /v1/axis-deviations by minimum_zone and least_absolute",
  ["line-minimax"],
  async (reference) => {
    const { z, h } = reference.input;
    const zone = await fitAxis(stationsOf(z, h), "minimum_zone");
    const sum = await fitAxis(stationsOf(z, h), "least_absolute");
    const got = {
      intercept: zone.axis.h.at0,
      slope: zone.axis.h.slope,
      max_abs: (zone.axis.zoneWidth?.h ?? NaN) / 2,
      l1_sum_abs: sum.axis.sumAbsolute?.v,
    };
    expect(mismatches(reference, got)).toEqual([]);
  },
);

describeCases<{ x: number[]; y: number[] }, { l1?: [number, number] }>(
  "POST /v1/axis-deviations by least_absolute",
  ["robust-line"],
  async ({ input, recomputed }) => {
    const { axis } = await fitAxis(stationsOf(input.x, input.y), "least_absolute");
    expect(Math.abs(axis.h.at0 - (recomputed?.l1?.[0] ?? NaN))).toBeLessThan(1e-12);
    expect(Math.abs(axis.h.slope - (recomputed?.l1?.[1] ?? NaN))).toBeLessThan(1e-12);
  },
);

const spread = (covariance: LineCovariance) => ({
  u_intercept: Math.sqrt(covariance[0][0]),
  u_slope: Math.sqrt(covariance[1][1]),
  cov: covariance[0][1],
});

describeCases<{ x: number[]; y: number[]; u: number[]; y0?: number; u_y0?: number }, object>(
  "POST /v1/axis-deviations with stated uncertainties",
  ["line-weighted"],
  async (reference) => {
    const { x, y, u, y0 = 0, u_y0 = 0 } = reference.input;
    const { axis } = await fitAxis(stationsOf(x, y, u));
    const covariance = axis.covariance?.h as LineCovariance;
    const chi2 = axis.chiSquare?.h ?? NaN;
    const scale = chi2 / (x.length - 2);
    const { at0: intercept, slope } = axis.h;
    const x0 = (y0 - intercept) / slope;
    const [[vaa, vab], [, vbb]] = covariance;
    const got = {
      intercept,
      slope,
      ...spread(covariance),
      chi2,
      known_u: spread(covariance),
      scaled: spread([
        [vaa * scale, vab * scale],
        [vab * scale, vbb * scale],
      ]),
      // Inverse evaluation from the answered line, as ISO 28037 clause 6 states it.
      x0,
      u_x0: Math.sqrt(u_y0 ** 2 + vaa + 2 * x0 * vab + x0 ** 2 * vbb) / slope,
    };
    expect(mismatches(reference, got)).toEqual([]);
  },
);

describeCases<{ t: number[]; b: number[]; t0: number; t_predict: number }, object>(
  "POST /v1/axis-deviations without uncertainties",
  ["line-least-squares"],
  async (reference) => {
    const { t, b, t0, t_predict } = reference.input;
    const { axis, stations } = await fitAxis(
      stationsOf(
        t.map((at) => at - t0),
        b,
      ),
    );
    const [[vaa, vab], [, vbb]] = axis.covariance?.h as LineCovariance;
    const at = t_predict - t0;
    const rss = stations.reduce((sum, { deviation }) => sum + deviation.h ** 2, 0);
    const got = {
      y1: axis.h.at0,
      y2: axis.h.slope,
      u_y1: Math.sqrt(vaa),
      u_y2: Math.sqrt(vbb),
      r: vab / Math.sqrt(vaa * vbb),
      s: Math.sqrt(rss / (t.length - 2)),
      rss,
      b30: axis.h.at0 + axis.h.slope * at,
      u_b30: Math.sqrt(vaa + 2 * at * vab + at * at * vbb),
    };
    expect(mismatches(reference, got)).toEqual([]);
  },
);

describeCases<{ z: [number, number]; h: [number, number]; v: [number, number]; query_z: number[] }, object>(
  "POST /v1/axis-deviations through two stations",
  ["line-two-point"],
  async ({ input, ...reference }) => {
    const ends = input.z.map((z, index) => ({
      id: `end${index}`,
      z,
      centre: { h: input.h[index] ?? 0, v: input.v[index] ?? 0 },
    }));
    // A station whose centre is 0 deviates from the axis by minus the axis.
    const asked = input.query_z.map((z, index) => ({ id: `q${index}`, z, centre: { h: 0, v: 0 } }));
    const body = {
      units,
      axis: { method: "two_station", through: ["end0", "end1"] },
      stations: [...ends, ...asked],
    };
    const { stations } = await post<AxisAnswer>("/v1/axis-deviations", body);
    const line = stations.filter(({ id }) => id.startsWith("q")).map(({ deviation }) => deviation);
    expect(mismatches(reference, { h: line.map(({ h }) => -h), v: line.map(({ v }) => -v) })).toEqual([]);
  },
);

describeCases<
  { powers: number[]; x: number[]; y: number[] },
  { coefficients: number[]; sd: number[]; residual_sd: number }
>("POST /v1/axis-deviations on certified regressions", ["linear-regression"], async ({ input, expected }) => {
  const { axis } = await fitAxis(stationsOf(input.x, input.y));
  const covariance = axis.covariance?.h as LineCovariance;
  const got = [axis.h.at0, axis.h.slope, Math.sqrt(covariance[0][0]), Math.sqrt(covariance[1][1])];
  const wanted = [...expected.coefficients, ...expected.sd];
  // 1e-12 relative: what double arithmetic can promise of NIST's 15 certified digits.
  for (const [index, value] of got.entries())
    expect(Math.abs(value / (wanted[index] ?? NaN) - 1)).toBeLessThan(1e-12);
});
