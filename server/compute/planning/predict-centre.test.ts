import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  clockAngles,
  onRing,
  pointsInput,
  refusalOf,
  targetInput,
} from "../../../tests/support/bore-inputs.ts";
import { placesAt, plainPlan, planOf, takenAt } from "../../../tests/support/plan-inputs.ts";
import { eigenvalues, planCovariance } from "../../../tests/support/plan-oracle.ts";
import { fitBore } from "../bore/fit-bore.ts";
import { ComputeError } from "../compute-error.ts";

const { uMm } = plainPlan;
/** √(−2·ln 0.05), and the normal 97.5 % point: printed in any table. */
const kRadial = 2.4477468306808166;
const k = 1.959963984540054;
const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThanOrEqual(within);

describe("planMeasurement predicts", () => {
  it.each([3, 4, 12, 24, 101])("u²·2/n in every direction for %d wall distances evenly round", (n) => {
    const { now } = planOf({ taken: takenAt(clockAngles(n, 17)) });
    const variance = (2 * uMm ** 2) / n;
    near(now!.covariance.hhMm2, variance, 1e-12 * variance);
    near(now!.covariance.vvMm2, variance, 1e-12 * variance);
    near(now!.covariance.hvMm2, 0, 1e-12 * variance);
    near(now!.evenRingMm, uMm * Math.sqrt(2 / n), 1e-15);
    near(now!.dilution, 1, 1e-12);
    near(now!.expanded.hMm, k * uMm * Math.sqrt(2 / n), 1e-12);
    near(now!.expanded.radialMm, kRadial * uMm * Math.sqrt(2 / n), 1e-12);
  });

  it.each([2, 3, 8, 24])("u²/n in every direction for %d spots of a turned target evenly round", (n) => {
    const { now } = planOf({ form: "rotating_target", taken: takenAt(clockAngles(n, 17)) });
    near(now!.covariance.hhMm2, uMm ** 2 / n, 1e-12 * uMm ** 2);
    near(now!.covariance.vvMm2, uMm ** 2 / n, 1e-12 * uMm ** 2);
    near(now!.dilution, 1, 1e-12);
  });

  it.each([3, 6, 18, 90])("the closed form of %d distances evenly over the lower half", (n) => {
    // Angles (k + ½)·180°/n either side of 6 o'clock: Σcos²φ = n/2, and the mean of cos φ is 1/(n·sin(90°/n)).
    const { now } = planOf({
      taken: takenAt(Array.from({ length: n }, (_, i) => 90 + ((i + 0.5) * 180) / n)),
    });
    const mean = 1 / (n * Math.sin(Math.PI / (2 * n)));
    near(now!.covariance.hhMm2, uMm ** 2 / (n / 2), 1e-10 * uMm ** 2);
    near(now!.covariance.vvMm2, uMm ** 2 / (n * (0.5 - mean ** 2)), 1e-9 * uMm ** 2);
    near(now!.covariance.hvMm2, 0, 1e-12 * uMm ** 2);
  });

  it("the three readings of a wire: u²/2 across, 3u²/2 up", () => {
    const { now } = planOf({ taken: takenAt([270, 90, 180]) });
    near(now!.covariance.hhMm2, uMm ** 2 / 2, 1e-15);
    near(now!.covariance.vvMm2, 1.5 * uMm ** 2, 1e-15);
  });

  it("what the engine answers of readings without scatter, and the inverse of JᵀWJ", () => {
    const each = fc.double({ min: 0.001, max: 0.02, noNaN: true });
    const draws = fc.uniqueArray(fc.tuple(fc.integer({ min: 0, max: 359 }), each), {
      minLength: 5,
      maxLength: 20,
      selector: ([angle]) => angle,
    });
    fc.assert(
      fc.property(draws, (pairs) => {
        const taken = pairs.map(([clockDeg, ofOne]) => ({ clockDeg, uMm: ofOne, times: 1 }));
        const wall = planCovariance(taken, "wall");
        fc.pre(wall !== null);
        const { now } = planOf({ taken });
        const worst = eigenvalues(wall)[1];
        near(now!.covariance.hhMm2, wall[0]![0]!, 1e-8 * worst);
        near(now!.covariance.hvMm2, wall[0]![1]!, 1e-8 * worst);
        near(now!.covariance.vvMm2, wall[1]![1]!, 1e-8 * worst);
        const points = taken.map((one) => ({
          ...onRing({ hMm: 1, vMm: 2 }, 300, one.clockDeg),
          uMm: one.uMm,
        }));
        const fitted = fitBore(pointsInput(points));
        near(fitted.covariance!.vvMm2, now!.covariance.vvMm2, 1e-6 * worst);
        near(fitted.statistics.dilution, now!.dilution, 1e-6 * now!.dilution);
        const spots = taken.map((one) => ({ clockDeg: one.clockDeg, uMm: one.uMm, hMm: 0, vMm: 0 }));
        const turned = planOf({ form: "rotating_target", taken }).now!;
        const target = planCovariance(taken, "rotating_target")!;
        near(turned.covariance.hhMm2, target[0]![0]!, 1e-8 * target[0]![0]!);
        near(
          fitBore(targetInput({ spots })).covariance!.vvMm2,
          turned.covariance.vvMm2,
          1e-9 * turned.covariance.vvMm2,
        );
      }),
    );
  });

  it("nothing where the readings taken leave the centre open, and says so of all that can be reached", () => {
    expect(planOf({ taken: takenAt([0, 180]), places: placesAt([90]) }).now).toBeNull();
    for (const [input, at] of [
      [{ taken: takenAt([0, 90, 90]) }, "taken"],
      [{ taken: takenAt([10]), places: placesAt([370, -350, 190], 9) }, "places"],
      [{ form: "rotating_target", places: placesAt([33], 5) }, "places"],
    ] as const) {
      let refusal: unknown;
      try {
        planOf(input);
      } catch (error) {
        refusal = error;
      }
      expect(refusal).toBeInstanceOf(ComputeError);
      expect(refusal).toMatchObject({ code: "angles_insufficient", details: { at: [at] } });
    }
    // As the fit itself judges: two wall points determine no circle.
    expect(
      refusalOf(pointsInput([onRing({ hMm: 0, vMm: 0 }, 9, 0), onRing({ hMm: 0, vMm: 0 }, 9, 90)])).code,
    ).toBe("too_few_points");
  });
});
