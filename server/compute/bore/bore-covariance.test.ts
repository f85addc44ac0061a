import { describe, expect, it } from "vitest";
import { clockAngles, onRing, pointsInput } from "../../../tests/support/bore-inputs.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { PointsInput, WallPoint } from "./bore-input.ts";
import type { WallFit } from "./bore-fit.ts";
import { fitBore } from "./fit-bore.ts";

const draws = 4000;
/** A sample variance of normal numbers has a relative standard deviation of √(2/draws) = 2.2 %. */
const threeSigma = 3 * Math.sqrt(2 / draws);
const truth = { hMm: 0.35, vMm: -0.81 };
const tangent = Math.tan((5 * Math.PI) / 180);

/** 210 degrees of a wall at two planes, the readings known unlike each other. */
function wall(form: "circle" | "taper" | "tilt"): PointsInput {
  const points = clockAngles(18, 70, 210).map((clockDeg, i): WallPoint => {
    const zMm = i % 2 === 0 ? -40 : 110;
    const lean = form === "tilt" ? 0.002 * zMm : 0;
    const opening = form === "taper" ? tangent * zMm : 0;
    const at = { hMm: truth.hMm + lean, vMm: truth.vMm - lean };
    const uMm = 0.004 + 0.003 * (i % 5);
    return { ...onRing(at, 300, clockDeg, opening), zMm: form === "circle" ? null : zMm, uMm };
  });
  return pointsInput(points, { taper: form === "taper" ? { form: "estimate" } : null });
}

/** The bore read again: every point moved along its radius by a draw of its own uncertainty. */
function readAgain(input: PointsInput, random: ReturnType<typeof seededRandom>, uMm?: number): WallFit {
  const points = input.points.map((point) => {
    const error = (uMm ?? point.uMm!) * random.normal();
    const distance = Math.hypot(point.hMm - truth.hMm, point.vMm - truth.vMm);
    return {
      ...point,
      hMm: point.hMm + (error * (point.hMm - truth.hMm)) / distance,
      vMm: point.vMm + (error * (point.vMm - truth.vMm)) / distance,
    };
  });
  return fitBore({ ...input, points });
}

function sampleCovariance(a: readonly number[], b: readonly number[]): number {
  const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;
  const [meanA, meanB] = [mean(a), mean(b)];
  return a.reduce((sum, value, i) => sum + (value - meanA) * (b[i]! - meanB), 0) / (a.length - 1);
}

describe("the covariance of a bore", () => {
  it.each(["circle", "taper", "tilt"] as const)(
    "is the scatter of the bore read again and again: %s",
    (form) => {
      const input = wall(form);
      const random = seededRandom(41);
      const fits = Array.from({ length: draws }, () => readAgain(input, random));
      // Without error nothing enlarges the stated variances: F is 1.
      const stated = fitBore(input);
      expect(stated.statistics.varianceInflation).toBe(1);
      const { hhMm2, hvMm2, vvMm2 } = stated.covariance!;
      const { diameterMm: half, factor } = stated.expandedUncertainty!;
      const h = fits.map(({ centre }) => centre.hMm);
      const v = fits.map(({ centre }) => centre.vMm);
      const diameter = fits.map(({ diameterMm }) => diameterMm!);
      const drawn = (one: number[], other: number[]) => sampleCovariance(one, other);
      expect(Math.abs(drawn(h, h) / hhMm2 - 1)).toBeLessThan(threeSigma);
      expect(Math.abs(drawn(v, v) / vvMm2 - 1)).toBeLessThan(threeSigma);
      expect(Math.abs(drawn(h, v) - hvMm2)).toBeLessThan(threeSigma * Math.sqrt(hhMm2 * vvMm2));
      expect(Math.abs(drawn(diameter, diameter) / (half! / factor) ** 2 - 1)).toBeLessThan(threeSigma);
      if (form === "taper") {
        const angles = fits.map(({ taper }) => taper!.halfAngleDeg);
        const wanted = (stated.taper!.expandedUncertaintyDeg! / factor) ** 2;
        expect(Math.abs(drawn(angles, angles) / wanted - 1)).toBeLessThan(threeSigma);
      }
      // The centre has no bias that its uncertainty would not cover.
      const mean = h.reduce((sum, value) => sum + value, 0) / draws;
      expect(Math.abs(mean - truth.hMm)).toBeLessThan(3 * Math.sqrt(hhMm2 / draws));
    },
  );

  it("comes with a χ² that is on average the number of readings left over", () => {
    const input = wall("circle");
    const random = seededRandom(42);
    const dof = input.points.length - 3;
    const sum = Array.from({ length: draws }, () => readAgain(input, random).statistics.chiSquare!).reduce(
      (total, chiSquare) => total + chiSquare,
      0,
    );
    expect(Math.abs(sum / draws - dof)).toBeLessThan(3 * Math.sqrt((2 * dof) / draws));
  });

  it.each([
    { count: 5, level: 0.95 },
    { count: 7, level: 0.99 },
    { count: 25, level: 0.6827 },
  ])("with nothing stated, $count readings keep the promised $level", ({ count, level }) => {
    const points = clockAngles(count, 100, 250).map((clockDeg) => onRing(truth, 300, clockDeg));
    const input = pointsInput(points, { level });
    const random = seededRandom(count);
    const outside = Array.from({ length: draws }, () => {
      const { centre, diameterMm, expandedUncertainty } = readAgain(input, random, 0.01);
      return [
        Math.abs(centre.hMm - truth.hMm) > expandedUncertainty!.hMm,
        Math.abs(centre.vMm - truth.vMm) > expandedUncertainty!.vMm,
        Math.abs(diameterMm! - 600) > expandedUncertainty!.diameterMm!,
      ];
    });
    for (const figure of [0, 1, 2]) {
      const share = outside.filter((figures) => figures[figure]).length / draws;
      expect(Math.abs(share - (1 - level))).toBeLessThan(3 * Math.sqrt((level * (1 - level)) / draws));
    }
  });
});
