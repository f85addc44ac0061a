import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  clockAngles,
  gaugeInput,
  onRing,
  pointsInput,
  refusalOf,
} from "../../../tests/support/bore-inputs.ts";
import type { PlaneVector } from "../plane.ts";
import type { GaugeReading, TurnedGaugeInput } from "./bore-input.ts";
import { fitBore } from "./fit-bore.ts";

const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);

/** What a gauge on an axis at 0 reads of a circle: the exact distance along the clock angle, less the nominal radius. */
function readCircle(
  centre: PlaneVector,
  radiusMm: number,
  nominalMm: number,
  angles: readonly number[],
): GaugeReading[] {
  return angles.map((clockDeg) => {
    const angle = (clockDeg * Math.PI) / 180;
    const along = centre.hMm * Math.sin(angle) + centre.vMm * Math.cos(angle);
    const across = centre.hMm * Math.cos(angle) - centre.vMm * Math.sin(angle);
    const distance = along + Math.sqrt(radiusMm ** 2 - across ** 2);
    return { clockDeg, readingMm: distance - nominalMm / 2, uMm: null };
  });
}
const negated = (readings: readonly GaugeReading[]) =>
  readings.map((r) => ({ ...r, readingMm: -r.readingMm }));
const far = { hMm: 21, vMm: -34 };

describe("a turned gauge", () => {
  it("finds a centre 40 mm off its axis exactly, where the first harmonic would err by more than 1 mm", () => {
    const readings = readCircle(far, 600.35, 1200, clockAngles(12));
    const fit = fitBore(gaugeInput({ readings }));
    near(fit.centre.hMm, far.hMm, 1e-10);
    near(fit.centre.vMm, far.vMm, 1e-10);
    near(fit.diameterMm!, 1200.7, 1e-10);
    near(fit.roundnessMm, 0, 1e-10);
    const harmonic = readings.reduce((sum, r) => sum + r.readingMm, 0) / 12 + 600;
    expect(Math.abs(harmonic - 600.35)).toBeGreaterThan(0.5);
  });

  it("answers as the same points of the wall do, uncertainties and all", () => {
    const angles = clockAngles(15, 25, 220);
    const readings = readCircle(far, 598, 1200, angles).map((reading, i) => ({
      ...reading,
      readingMm: reading.readingMm + 0.02 * Math.sin(3 * i),
      uMm: 0.01 + 0.001 * i,
    }));
    const points = readings.map(({ clockDeg, readingMm, uMm }) => ({
      ...onRing({ hMm: 0, vMm: 0 }, 600, clockDeg, readingMm),
      uMm,
    }));
    const gauge = fitBore(gaugeInput({ readings }));
    const wall = fitBore(pointsInput(points));
    near(gauge.centre.hMm, wall.centre.hMm, 1e-11);
    near(gauge.centre.vMm, wall.centre.vMm, 1e-11);
    near(gauge.diameterMm!, wall.diameterMm!, 1e-11);
    near(gauge.covariance!.hvMm2, wall.covariance!.hvMm2, 1e-14);
    near(gauge.statistics.chiSquare!, wall.statistics.chiSquare!, 1e-7);
  });

  it("adds back a tip that hangs below its axis: what it touches lies lower by the sag", () => {
    // Tip = axis + distance along the clock angle − sag: the gauge reads the circle as if that were higher.
    const gaugeSagMm = 0.35;
    const readings = readCircle({ hMm: 0.4, vMm: -0.9 + gaugeSagMm }, 600, 1200, clockAngles(8));
    const fit = fitBore(gaugeInput({ readings, gaugeSagMm }));
    near(fit.centre.hMm, 0.4, 1e-10);
    near(fit.centre.vMm, -0.9, 1e-10);
    near(fitBore(gaugeInput({ readings })).centre.vMm, -0.55, 1e-10);
  });

  it("takes either sense: readings negated with it give the same answer to the last bit", () => {
    const readings = readCircle(far, 601, 1200, clockAngles(9, 3, 200));
    const nearer = fitBore(gaugeInput({ readings: negated(readings), sense: "larger_is_nearer" }));
    expect(nearer).toEqual(fitBore(gaugeInput({ readings })));
    // By hand: farther at 12 o'clock lifts the centre; nearer lowers it.
    const up = clockAngles(4).map((clockDeg): GaugeReading => ({
      clockDeg,
      readingMm: clockDeg === 0 ? 0.2 : 0,
      uMm: null,
    }));
    expect(fitBore(gaugeInput({ readings: up })).centre.vMm).toBeGreaterThan(0.09);
    expect(fitBore(gaugeInput({ readings: up, sense: "larger_is_nearer" })).centre.vMm).toBeLessThan(-0.09);
  });

  it("knows no diameter when its zero is arbitrary, and the same centre", () => {
    const readings = readCircle({ hMm: 0.12, vMm: -0.3 }, 600.2, 1200, clockAngles(10, 5)).map((r) => ({
      ...r,
      uMm: 0.01,
    }));
    const nominal = fitBore(gaugeInput({ readings }));
    const arbitrary = fitBore(gaugeInput({ readings, zero: "arbitrary" }));
    expect([arbitrary.diameterMm, arbitrary.expandedUncertainty!.diameterMm]).toEqual([null, null]);
    expect(arbitrary.centre).toEqual(nominal.centre);
    expect(arbitrary.covariance).toEqual(nominal.covariance);
    // Zeroed 0.7 mm elsewhere, the centre changes in proportion to what that is of the radius: 0.1 %.
    const shifted = readings.map((r) => ({ ...r, readingMm: r.readingMm + 0.7 }));
    const elsewhere = fitBore(gaugeInput({ readings: shifted, zero: "arbitrary" }));
    near(elsewhere.centre.vMm, -0.3, 0.3 * 0.0013);
    expect(elsewhere.diameterMm).toBeNull();
  });

  it("read from the other end gives the same bore: clock angle turned to 360 − angle", () => {
    const angle = fc.double({ min: -180, max: 180, noNaN: true });
    const reading = fc.double({ min: -2, max: 2, noNaN: true });
    fc.assert(
      fc.property(fc.array(fc.tuple(angle, reading), { minLength: 4, maxLength: 20 }), (pairs) => {
        const ring = clockAngles(4).map((clockDeg): GaugeReading => ({
          clockDeg,
          readingMm: 0.1,
          uMm: null,
        }));
        const readings = [
          ...ring,
          ...pairs.map(([clockDeg, readingMm]) => ({ clockDeg, readingMm, uMm: null })),
        ];
        const turned = readings.map((r) => ({ ...r, clockDeg: 360 - r.clockDeg }));
        const wanted = fitBore(gaugeInput({ readings }));
        const got = fitBore(gaugeInput({ readings: turned, seen: "upstream" }));
        near(got.centre.hMm, wanted.centre.hMm, 1e-11);
        near(got.centre.vMm, wanted.centre.vMm, 1e-11);
        got.residualsMm.forEach((residual, i) => near(residual, wanted.residualsMm[i]!, 1e-10));
      }),
    );
  });

  it("refuses a reading that reaches its own axis or beyond, at its place, in either sense", () => {
    const refused = (rest: Partial<TurnedGaugeInput>) =>
      refusalOf(gaugeInput({ readings: readCircle(far, 600, 1200, clockAngles(6)), ...rest }));
    const at2 = (readingMm: number) =>
      readCircle(far, 600, 1200, clockAngles(6)).map((r, i) => (i === 2 ? { ...r, readingMm } : r));
    const wanted = { code: "radius_not_positive", at: "readings/2/reading" };
    expect(refused({ readings: at2(-600) })).toEqual(wanted);
    expect(refused({ readings: at2(601), sense: "larger_is_nearer" })).toEqual(wanted);
    expect(refused({ readings: at2(0).slice(0, 2) })).toEqual({ code: "too_few_points", at: "readings" });
    const one = at2(0).map((r) => ({ ...r, clockDeg: 45 }));
    expect(refused({ readings: one }).code).toBe("points_collinear");
  });
});
