import { describe, expect, it } from "vitest";
import { axisInput, stationAt } from "../../../tests/support/axis-stations.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { AxisMethod, AxisStation } from "./axis-input.ts";
import type { Matrix2 } from "./axis-result.ts";
import { deviationsFromAxis } from "./deviations-from-axis.ts";

/** Six bores known unlike each other, h and v correlated, targets uncertain; the first four may set the axis. */
const stations: readonly AxisStation[] = [
  known(0, 0.004, 0.006, 0.5, 0, 0.01),
  known(1800, 0.003, 0.003, -0.7, 0.002, 0),
  known(4650, 0.009, 0.002, 0.3, 0, 0.003),
  known(6900, 0.005, 0.005, 0.9, 0.004, 0.006),
  known(3100, 0.006, 0.004, -0.4, 0, 0.02),
  known(8200, 0.002, 0.008, 0, 0.001, 0.001),
];

function known(zMm: number, uH: number, uV: number, correlation: number, targetH: number, targetV: number) {
  return stationAt(zMm, 0.1, -0.2, {
    covariance: { hhMm2: uH * uH, hvMm2: correlation * uH * uV, vvMm2: uV * uV },
    target: { hMm: 0.02, vMm: -0.1 },
    targetUncertainty: { hMm: targetH, vMm: targetV },
  });
}

const draws = 4000;
/** A sample variance of normal numbers has a relative standard deviation of √(2/draws) = 2.2 %. */
const threeSigma = 3 * Math.sqrt(2 / draws);

/** The survey taken again: every centre and every target wrong by a draw of its own covariance. */
function surveyAgain(random: ReturnType<typeof seededRandom>): AxisStation[] {
  return stations.map((station) => {
    const { hhMm2, hvMm2, vvMm2 } = station.covariance!;
    const first = random.normal();
    const lower = hvMm2 / Math.sqrt(hhMm2);
    const errorH = Math.sqrt(hhMm2) * first;
    const errorV = lower * first + Math.sqrt(vvMm2 - lower * lower) * random.normal();
    return {
      ...station,
      centre: { hMm: station.centre.hMm + errorH, vMm: station.centre.vMm + errorV },
      target: {
        hMm: station.target.hMm + station.targetUncertainty.hMm * random.normal(),
        vMm: station.target.vMm + station.targetUncertainty.vMm * random.normal(),
      },
    };
  });
}

function sampleCovariance(a: readonly number[], b: readonly number[]): number {
  const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;
  const [meanA, meanB] = [mean(a), mean(b)];
  return a.reduce((sum, value, i) => sum + (value - meanA) * (b[i]! - meanB), 0) / (a.length - 1);
}

/** Compares a covariance found by drawing with the one propagated, at the scale of its own two variances. */
function expectDrawn(drawn: number, propagated: number, varianceA: number, varianceB: number): void {
  expect(Math.abs(drawn - propagated)).toBeLessThan(threeSigma * Math.sqrt(varianceA * varianceB));
}

describe("the propagated covariance", () => {
  const cases: [AxisMethod, number[]][] = [
    ["two_station", [0, 3]],
    ["least_squares", [0, 1, 2, 3]],
    ["line_of_sight", []],
  ];
  for (const [method, reference] of cases) {
    it(`is the scatter of surveys taken again and again: ${method}`, () => {
      const random = seededRandom(7);
      const surveys = Array.from({ length: draws }, () =>
        deviationsFromAxis(axisInput(method, reference, surveyAgain(random))),
      );
      const { axis, stations: found } = surveys[0]!;
      found.forEach(({ covariance }, i) => {
        const { hhMm2, hvMm2, vvMm2 } = covariance!;
        const h = surveys.map((one) => one.stations[i]!.deviation.hMm);
        const v = surveys.map((one) => one.stations[i]!.deviation.vMm);
        // A station that a line passes through exactly has a covariance of 0, and no scatter.
        expectDrawn(sampleCovariance(h, h), hhMm2, hhMm2 + 1e-30, hhMm2 + 1e-30);
        expectDrawn(sampleCovariance(h, v), hvMm2, hhMm2 + 1e-30, vvMm2 + 1e-30);
        expectDrawn(sampleCovariance(v, v), vvMm2, vvMm2 + 1e-30, vvMm2 + 1e-30);
      });
      if (method === "line_of_sight") return;
      const { h, v, hv } = axis.covariance!;
      const coefficients = {
        h: [surveys.map((one) => one.axis.h.at0Mm), surveys.map((one) => one.axis.h.slope)],
        v: [surveys.map((one) => one.axis.v.at0Mm), surveys.map((one) => one.axis.v.slope)],
      };
      for (const row of [0, 1] as const) {
        for (const column of [0, 1] as const) {
          const drawn = (a: "h" | "v", b: "h" | "v") =>
            sampleCovariance(coefficients[a][row]!, coefficients[b][column]!);
          expectDrawn(drawn("h", "h"), h[row][column], h[row][row], h[column][column]);
          expectDrawn(drawn("v", "v"), v[row][column], v[row][row], v[column][column]);
          expectDrawn(drawn("h", "v"), hv[row][column], h[row][row], v[column][column]);
        }
      }
    });
  }

  it("is uᵢ² + xᵀCx for a station not used and uᵢ² − xᵀCx for one used, when the weights are 1/u²", () => {
    const reference = [0, 1, 2, 3];
    const { axis, stations: found } = deviationsFromAxis(axisInput("least_squares", reference, stations));
    stations.forEach(({ zMm, covariance, targetUncertainty }, i) => {
      const sign = reference.includes(i) ? -1 : 1;
      const ofAxis = ([[aa, ab], [ba, bb]]: Matrix2) => aa + zMm * (ab + ba) + zMm * zMm * bb;
      const h = covariance!.hhMm2 + targetUncertainty.hMm ** 2 + sign * ofAxis(axis.covariance!.h);
      const v = covariance!.vvMm2 + targetUncertainty.vMm ** 2 + sign * ofAxis(axis.covariance!.v);
      expect(Math.abs(found[i]!.covariance!.hhMm2 - h)).toBeLessThan(1e-17); // mm²
      expect(Math.abs(found[i]!.covariance!.vvMm2 - v)).toBeLessThan(1e-17);
    });
  });

  it("keeps 95 % for a new station when nothing is stated and the scatter has 2 degrees of freedom", () => {
    const random = seededRandom(23);
    const z = [0, 1700, 2600, 5200, 6100];
    const outside = Array.from({ length: draws }, () => {
      const survey = z.map((at) => stationAt(at, 0.003 * random.normal(), 0.008 * random.normal()));
      const { stations: found } = deviationsFromAxis(axisInput("least_squares", [0, 1, 2, 3], survey));
      const { deviation, expandedUncertainty } = found[4]!;
      return [
        Math.abs(deviation.hMm) > expandedUncertainty!.hMm,
        Math.abs(deviation.vMm) > expandedUncertainty!.vMm,
      ];
    });
    for (const plane of [0, 1]) {
      const share = outside.filter((planes) => planes[plane]).length / draws;
      expect(Math.abs(share - 0.05)).toBeLessThan(3 * Math.sqrt((0.05 * 0.95) / draws));
    }
  });
});
