import { expect } from "vitest";
import { deviationsFromAxis } from "../../server/compute/axis/deviations-from-axis.ts";
import { axisInput, stationAt, stationsOnLine } from "../support/axis-stations.ts";
import { describeCases, mismatches } from "./read-cases.ts";

/** The least-squares line of y over x in the h plane, with what the answer says of it. */
function fitted(x: readonly number[], y: readonly number[], u: readonly number[] | null) {
  const reference = x.map((_, index) => index);
  const { axis } = deviationsFromAxis(axisInput("least_squares", reference, stationsOnLine(x, y, u)));
  const [[varianceAt0, covariance], [, varianceSlope]] = axis.covariance!.h;
  return {
    intercept: axis.h.at0Mm,
    slope: axis.h.slope,
    u_intercept: Math.sqrt(varianceAt0),
    u_slope: Math.sqrt(varianceSlope),
    cov: covariance,
    chi2: axis.chiSquare?.h,
    scatter: axis.scatterMm?.h,
    dof: axis.dof!,
  };
}

interface Weighted {
  readonly x: number[];
  readonly y: number[];
  readonly u: number[];
  readonly y0?: number;
  readonly u_y0?: number;
}

describeCases<Weighted, object>("axis deviations: line-weighted", ["line-weighted"], (reference) => {
  const { x, y, u, y0 = 0, u_y0 = 0 } = reference.input;
  const line = fitted(x, y, u);
  // The inverse evaluation and the scaled covariance of the source follow from the answer.
  const x0 = (y0 - line.intercept) / line.slope;
  const u_x0 =
    Math.sqrt(u_y0 ** 2 + line.u_intercept ** 2 + x0 ** 2 * line.u_slope ** 2 + 2 * x0 * line.cov) /
    line.slope;
  const scale = line.chi2! / line.dof;
  const scaled = {
    u_intercept: line.u_intercept * Math.sqrt(scale),
    u_slope: line.u_slope * Math.sqrt(scale),
    cov: line.cov * scale,
  };
  expect(mismatches(reference, { ...line, x0, u_x0, known_u: line, scaled })).toEqual([]);
});

interface Thermometer {
  readonly t: number[];
  readonly b: number[];
  readonly t0: number;
  readonly t_predict: number;
}

describeCases<Thermometer, object>(
  "axis deviations: line-least-squares",
  ["line-least-squares"],
  (reference) => {
    const { t, b, t0, t_predict } = reference.input;
    const line = fitted(
      t.map((temperature) => temperature - t0),
      b,
      null,
    );
    const along = t_predict - t0;
    const variance = line.u_intercept ** 2 + 2 * along * line.cov + along ** 2 * line.u_slope ** 2;
    const got = {
      y1: line.intercept,
      u_y1: line.u_intercept,
      y2: line.slope,
      u_y2: line.u_slope,
      r: line.cov / line.u_intercept / line.u_slope,
      s: line.scatter,
      b30: line.intercept + along * line.slope,
      u_b30: Math.sqrt(variance),
      rss: line.scatter! ** 2 * line.dof,
    };
    expect(mismatches(reference, got)).toEqual([]);
  },
);

interface TwoStations {
  readonly z: [number, number];
  readonly h: [number, number];
  readonly v: [number, number];
  readonly query_z: number[];
}

describeCases<TwoStations, object>("axis deviations: line-two-point", ["line-two-point"], (reference) => {
  const { z, h, v, query_z } = reference.input;
  const set = z.map((at, i) => stationAt(at, h[i]!, v[i]!));
  // A station whose centre is at (0, 0) deviates by minus the axis.
  const asked = query_z.map((at) => stationAt(at, 0, 0));
  const { stations } = deviationsFromAxis(axisInput("two_station", [0, 1], [...set, ...asked]));
  const axis = stations.slice(2).map(({ deviation }) => deviation);
  const got = { h: axis.map(({ hMm }) => -hMm), v: axis.map(({ vMm }) => -vMm) };
  expect(mismatches(reference, got)).toEqual([]);
});

interface Regression {
  readonly powers: number[];
  readonly x: number[];
  readonly y: number[];
}

describeCases<Regression, object>(
  "axis deviations: linear-regression, straight lines with an intercept (Norris of the NIST data sets)",
  ["linear-regression"],
  (reference) => {
    const line = fitted(reference.input.x, reference.input.y, null);
    const got = {
      coefficients: [line.intercept, line.slope],
      sd: [line.u_intercept, line.u_slope],
      residual_sd: line.scatter,
    };
    expect(mismatches(reference, got)).toEqual([]);
  },
);

/** The line of y over x that is best by another criterion than least squares, in the h plane. */
function bestLine(method: "minimum_zone" | "least_absolute", x: readonly number[], y: readonly number[]) {
  const reference = x.map((_, index) => index);
  const { axis } = deviationsFromAxis(axisInput(method, reference, stationsOnLine(x, y, null)));
  if (axis.optimum?.zone !== "planes") throw new Error("Each plane has its own evidence.");
  const { objectiveMm, extentMm, unique } = axis.optimum.h;
  return { intercept: axis.h.at0Mm, slope: axis.h.slope, objective: objectiveMm, extent: extentMm, unique };
}

interface Minimax {
  readonly z: number[];
  readonly h: number[];
}

describeCases<Minimax, object>("axis deviations: line-minimax", ["line-minimax"], (reference) => {
  const { z, h } = reference.input;
  const zone = bestLine("minimum_zone", z, h);
  const sum = bestLine("least_absolute", z, h);
  const got = { ...zone, max_abs: zone.extent / 2, l1_sum_abs: sum.extent };
  expect(mismatches(reference, got)).toEqual([]);
});

interface Robust {
  readonly x: number[];
  readonly y: number[];
}

describeCases<Robust, { l1?: [number, number]; l1_sum_abs?: number; l1_unique?: boolean }>(
  "axis deviations: robust-line, its least sum of absolute residuals",
  ["robust-line"],
  ({ input: { x, y }, recomputed }) => {
    const sum = bestLine("least_absolute", x, y);
    const got = [sum.intercept, sum.slope, sum.objective];
    [...recomputed!.l1!, recomputed!.l1_sum_abs!].forEach((wanted, i) => {
      expect(Math.abs(got[i]! - wanted)).toBeLessThan(1e-12);
    });
    expect(sum.unique).toBe(recomputed!.l1_unique);
  },
);
