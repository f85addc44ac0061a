import { describe, expect, it } from "vitest";
import {
  clockAngles,
  gaugeInput,
  onRing,
  pointsInput,
  wallPoint,
} from "../../../tests/support/bore-inputs.ts";
import { gaussNewton, residualOf, type OraclePoint } from "../../../tests/support/circle-oracle.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { WallPoint } from "./bore-input.ts";
import { fitBore } from "./fit-bore.ts";

const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);
const origin = { hMm: 0, vMm: 0 };
const codes = ({ warnings }: { warnings: readonly { code: string }[] }) => warnings.map(({ code }) => code);

/** The rule as its definition reads, each fit by another method: no line of it is shared with the engine. */
function excludePlainly(points: readonly WallPoint[], threshold: number) {
  const seen = points.map(({ hMm, vMm, uMm }): OraclePoint => ({ h: hMm, v: vMm, z: 0, u: uMm ?? 1 }));
  const out: { index: number; ratio: number }[] = [];
  for (;;) {
    const used = seen.filter((_, i) => !out.some(({ index }) => index === i));
    if (used.length <= 3 + 2 || 2 * out.length >= seen.length) return out;
    const found = gaussNewton("circle", used, [0, 0, 100]);
    const sizes = used
      .map((point) => Math.abs(residualOf("circle", point, found)) / point.u)
      .sort((a, b) => a - b);
    const half = Math.floor(sizes.length / 2);
    const median = sizes.length % 2 ? sizes[half]! : (sizes[half - 1]! + sizes[half]!) / 2;
    const worst = sizes.at(-1)!;
    if (worst / (1.4826 * median) <= threshold) return out;
    const index = seen.findIndex(
      (point) => used.includes(point) && Math.abs(residualOf("circle", point, found)) / point.u === worst,
    );
    out.push({ index, ratio: worst / (1.4826 * median) });
  }
}

/**
 * Six directions and their opposites, radius 100 and off by the same at both: by symmetry the centre is exact and the
 * radius the mean. The first pair are slips of 0.5.
 */
const directions = [
  [0, 1],
  [3 / 5, 4 / 5],
  [4 / 5, 3 / 5],
  [1, 0],
  [4 / 5, -3 / 5],
  [3 / 5, -4 / 5],
] as const;
const offs = [0.5, 0.01, -0.01, 0.02, -0.02, 0];
const twelve = [1, -1].flatMap((side) =>
  directions.map(([h, v], i) => wallPoint(side * (100 + offs[i]!) * h, side * (100 + offs[i]!) * v)),
);

describe("the outlier rule", () => {
  it("puts two opposite slips aside, step by step as worked by hand", () => {
    // Mean off 1/12: |r| = 5/12 for the slips, else 0.0633, 0.0733, 0.0833, 0.0933, 0.1033, each twice.
    // Median (0.08333 + 0.09333)/2; ratio (5/12) ÷ (1.4826 · 0.088333) = 3.1816. A tie: the first of the two goes.
    const fit = fitBore(pointsInput(twelve, { outliers: { threshold: 3 } }));
    expect(fit.exclusions.map(({ index }) => index)).toEqual([0, 6]);
    near(fit.exclusions[0]!.ratio, 5 / 12 / (1.4826 * 0.0883333333333), 1e-9);
    // With both out the others are symmetrical again: median 0.01, largest 0.02, ratio 1.35.
    near(fit.centre.hMm, 0, 1e-13);
    near(fit.centre.vMm, 0, 1e-13);
    near(fit.diameterMm!, 200, 1e-12);
    expect(fit.used).toEqual(twelve.map((_, i) => i !== 0 && i !== 6));
    near(fit.residualsMm[0]!, 0.5, 1e-12); // told of those put aside, too
    near(fit.roundnessMm, 0.04, 1e-12); // and of those in use only
    expect(fit.statistics.readingsUsed).toBe(10);
    expect(codes(fit)).toEqual(["readings_excluded"]);
  });

  it("takes the first of two that are off alike to the last bit", () => {
    // Left and right of the plumb line, side by side in the order sent: sums cancel exactly and h is exactly 0.
    for (let slip = 0; slip < 5; slip++) {
      const pairs = directions.slice(1).flatMap(([h, v], i) =>
        [1, -1].map((side) => {
          const radius = 100 + (i === slip ? 0.7 : offs[i + 1]!);
          return wallPoint(side * radius * h, radius * v);
        }),
      );
      const { exclusions, residualsMm } = fitBore(pointsInput(pairs, { outliers: { threshold: 1000 } }));
      expect(exclusions).toEqual([]);
      expect(residualsMm[2 * slip]).toBe(residualsMm[2 * slip + 1]);
      const first = fitBore(pointsInput(pairs, { outliers: { threshold: 1.5 } })).exclusions[0]!;
      const worst = Math.max(...residualsMm.map(Math.abs));
      expect(first.index).toBe(residualsMm.findIndex((residual) => Math.abs(residual) === worst));
    }
  });

  it("excludes nothing when the largest stays under the threshold, nor without a rule", () => {
    const under = fitBore(pointsInput(twelve, { outliers: { threshold: 3.2 } }));
    expect(under.exclusions).toEqual([]);
    expect(codes(under)).toEqual([]);
    expect(fitBore(pointsInput(twelve)).used).toEqual(twelve.map(() => true));
  });

  it("does what its definition does when that is followed plainly with another fit", () => {
    const counts = [1, 2, 3, 4, 5, 6, 7, 8].map((seed) => {
      const random = seededRandom(seed);
      const points = clockAngles(16, 10, 280).map((clockDeg, i) => ({
        ...onRing(
          { hMm: 0.3, vMm: 0.2 },
          100,
          clockDeg,
          0.01 * random.normal() + (i % 5 === seed % 5 ? 0.15 : 0),
        ),
        uMm: seed % 2 ? 0.01 * (1 + random.uniform()) : null,
      }));
      const { exclusions } = fitBore(pointsInput(points, { outliers: { threshold: 2.5 } }));
      const plainly = excludePlainly(points, 2.5);
      expect(exclusions.map(({ index }) => index)).toEqual(plainly.map(({ index }) => index));
      exclusions.forEach(({ ratio }, k) => near(ratio / plainly[k]!.ratio, 1, 1e-6));
      return plainly.length;
    });
    expect(Math.max(...counts)).toBeGreaterThan(2);
    expect(new Set(counts).size).toBeGreaterThan(2);
  });

  it("judges by |r|/u: a reading known badly may lie far off", () => {
    const ring = clockAngles(12).map((clockDeg, i) =>
      onRing(origin, 100, clockDeg, i === 4 ? 0.3 : 0.01 * Math.cos(4 * i)),
    );
    const known = (uOfSlip: number) =>
      fitBore(
        pointsInput(
          ring.map((point, i) => ({ ...point, uMm: i === 4 ? uOfSlip : 0.01 })),
          { outliers: { threshold: 3.5 } },
        ),
      ).exclusions.map(({ index }) => index);
    expect(known(0.01)).toEqual([4]);
    expect(known(0.3)).toEqual([]);
  });

  it("finds a slip at every position, whatever form it is read in", () => {
    for (let slip = 0; slip < 10; slip++) {
      const off = (i: number) => 0.01 * Math.cos(7 * i) + (i === slip ? 0.4 : 0);
      const rule = { outliers: { threshold: 3.5 } };
      const points = fitBore(
        pointsInput(
          clockAngles(10, 15).map((t, i) => onRing(origin, 600, t, off(i))),
          rule,
        ),
      );
      const readings = clockAngles(10, 15).map((clockDeg, i) => ({ clockDeg, readingMm: off(i), uMm: null }));
      const gauge = fitBore(gaugeInput({ readings, ...rule }));
      expect([points, gauge].map(({ exclusions }) => exclusions[0]?.index)).toEqual([slip, slip]);
    }
  });

  it("stops at two readings more than unknowns, and when half are out", () => {
    // The most that scatter with heavy tails gets out under the lowest threshold, over many draws.
    const most = (count: number) =>
      Math.max(
        ...Array.from({ length: 60 }, (_, seed) => {
          const random = seededRandom(seed + 1);
          const points = clockAngles(count).map((t) => onRing(origin, 100, t, 0.1 * random.normal() ** 3));
          return fitBore(pointsInput(points, { outliers: { threshold: 1 } })).exclusions.length;
        }),
      );
    expect([5, 6, 7, 8].map(most)).toEqual([0, 1, 2, 3]);
    expect([20, 21].map(most)).toEqual([10, 11]);
  });

  it("excludes nothing from a perfect circle, whose median is rounding and no measure", () => {
    for (const radius of [1, 250, 1e6]) {
      const ring = clockAngles(13, 3).map((t) => onRing({ hMm: 1e3, vMm: -1e3 }, radius, t));
      for (const uMm of [null, 1e-3]) {
        const input = pointsInput(ring, { readingUncertaintyMm: uMm, outliers: { threshold: 1 } });
        expect(fitBore(input).exclusions).toEqual([]);
      }
    }
  });

  it("warns that under eight readings it can hardly judge", () => {
    const ring = (count: number) =>
      clockAngles(count).map((t, i) => onRing(origin, 100, t, 0.01 * Math.cos(5 * i)));
    const rule = { outliers: { threshold: 100 } };
    expect(codes(fitBore(pointsInput(ring(7), rule)))).toEqual(["few_readings_for_outliers"]);
    expect(codes(fitBore(pointsInput(ring(8), rule)))).toEqual([]);
    expect(codes(fitBore(pointsInput(ring(7))))).toEqual([]);
  });
});
