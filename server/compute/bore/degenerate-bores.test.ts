import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { clockAngles, onRing, pairsInput, pointsInput } from "../../../tests/support/bore-inputs.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import { ComputeError } from "../compute-error.ts";
import { fitBore } from "./fit-bore.ts";

type Pair = [number, number];
const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);
const origin = { hMm: 0, vMm: 0 };
const corners: Pair[] = [
  [0, 10],
  [10, 0],
  [0, -10],
  [-10, 0],
];

describe("fitBore, on readings at the edge of what can be fitted, answers", () => {
  it("10,000 points, in well under two seconds", () => {
    const random = seededRandom(3);
    const points = clockAngles(10_000).map((clockDeg) =>
      onRing(origin, 600, clockDeg, 0.01 * random.normal()),
    );
    const begun = performance.now();
    const fit = fitBore(pointsInput(points, { outliers: { threshold: 6 } }));
    expect(performance.now() - begun).toBeLessThan(2000);
    // σ = 0.01·√(2/n) = 0.00014 mm: four of them
    near(fit.centre.hMm, 0, 6e-4);
    near(fit.centre.vMm, 0, 6e-4);
    near(fit.diameterMm!, 1200, 8e-4);
    near(Math.sqrt(fit.covariance!.hhMm2), 0.01 * Math.sqrt(2 / 10_000), 1e-5);
  });

  it("every point sent twice: the same circle, half the variance where u is stated", () => {
    const points = clockAngles(9, 20, 200).map((t, i) => onRing(origin, 80, t, 0.01 * Math.cos(5 * i)));
    const once = fitBore(pointsInput(points, { readingUncertaintyMm: 0.05 }));
    const twice = fitBore(pointsInput([...points, ...points], { readingUncertaintyMm: 0.05 }));
    near(twice.centre.hMm, once.centre.hMm, 1e-12);
    near(twice.diameterMm!, once.diameterMm!, 1e-11);
    near(twice.covariance!.vvMm2 / once.covariance!.vvMm2, 0.5, 1e-9);
  });

  it.each([
    { overDeg: 90, within: 1e-11 },
    { overDeg: 10, within: 1e-9 },
    { overDeg: 1, within: 1e-7 },
    { overDeg: 0.1, within: 1e-5 },
  ])(
    "an arc of $overDeg degrees: right to what its rounding allows, and called weak",
    ({ overDeg, within }) => {
      const fit = fitBore(
        pointsInput(clockAngles(20, 33, overDeg).map((t) => onRing({ hMm: 1, vMm: -2 }, 500, t))),
      );
      near(fit.centre.hMm, 1, within * 500);
      near(fit.centre.vMm, -2, within * 500);
      near(fit.arc.coverageDeg, overDeg, 1e-6);
      expect(fit.warnings.map(({ code }) => code)).toContain("weak_arc");
    },
  );

  it.each([1e6, 1e8])("a bore %d mm from its origin, to the spacing of numbers there", (far) => {
    const fit = fitBore(pointsInput(clockAngles(24).map((t) => onRing({ hMm: far, vMm: -far / 2 }, 200, t))));
    near(fit.centre.hMm, far, 2 * far * Number.EPSILON);
    near(fit.centre.vMm, -far / 2, 2 * far * Number.EPSILON);
    near(fit.diameterMm!, 400, 2 * far * Number.EPSILON);
  });

  it("coordinates of 1e9 with scatter of 1e-6: warns that numbers cannot resolve them", () => {
    const random = seededRandom(9);
    const ring = (far: number) =>
      fitBore(
        pointsInput(
          clockAngles(24).map((t) => onRing({ hMm: far, vMm: far }, 200, t, 1e-6 * random.normal())),
        ),
      );
    expect(ring(1e9).warnings.map(({ code }) => code)).toEqual(["readings_at_number_resolution"]);
    near(ring(1e9).centre.hMm, 1e9, 1e-6);
    expect(ring(1e3).warnings).toEqual([]);
  });

  it("scatter of every size from rounding to a thousandth of the radius, on any arc over 20 degrees: it settles", () => {
    const random = seededRandom(31);
    for (let draw = 0; draw < 3000; draw++) {
      const scatterMm = 200 * 10 ** (-16 + 13 * random.uniform());
      const overDeg = 20 + 340 * random.uniform();
      const points = clockAngles(6 + (draw % 20), 360 * random.uniform(), overDeg).map((t) =>
        onRing({ hMm: 30, vMm: -7 }, 200, t, scatterMm * random.normal()),
      );
      const { centre, covariance } = fitBore(pointsInput(points));
      // Three readings left over at least: 30 standard deviations never come; rounding, as 20 degrees enlarge it, may.
      near(centre.hMm, 30, 30 * Math.sqrt(covariance!.hhMm2) + 1e-9);
    }
  });

  it("thin arcs that scatter by a third of their own rise, where the objective is all but flat: it settles", () => {
    const random = seededRandom(8);
    for (let draw = 0; draw < 2500; draw++) {
      const overDeg = 10 ** (-1.5 + 2.5 * random.uniform());
      const riseMm = 200 * (1 - Math.cos((overDeg * Math.PI) / 360));
      const scatterMm = riseMm * (0.24 + 0.18 * random.uniform());
      const points = clockAngles(6 + (draw % 30), 30, overDeg).map((t) =>
        onRing({ hMm: 3, vMm: 4 }, 200, t, scatterMm * random.normal()),
      );
      const { warnings } = fitBore(pointsInput(points));
      expect(warnings.map(({ code }) => code)).toContain("weak_arc");
    }
  });

  it("a point at the very centre, which has no direction", () => {
    const fit = fitBore(pairsInput([...corners, [0, 0]]));
    near(fit.centre.hMm, 0, 1e-12);
    near(fit.diameterMm!, 16, 1e-12); // twice the mean of four distances of 10 and one of 0
  });

  it("anything on a coarse grid: a coded refusal, or a finite answer at which no gradient is left", () => {
    const cell = fc.integer({ min: -3, max: 3 });
    fc.assert(
      fc.property(fc.array(fc.tuple(cell, cell), { minLength: 0, maxLength: 9 }), (pairs) => {
        try {
          const { centre, residualsMm } = fitBore(pairsInput(pairs));
          const sums = [0, 0, 0];
          pairs.forEach(([h, v], i) => {
            const distance = Math.hypot(h - centre.hMm, v - centre.vMm);
            sums[0]! += residualsMm[i]!;
            sums[1]! += distance > 0 ? (residualsMm[i]! * (h - centre.hMm)) / distance : 0;
            sums[2]! += distance > 0 ? (residualsMm[i]! * (v - centre.vMm)) / distance : 0;
          });
          for (const sum of sums) near(sum, 0, 1e-10);
        } catch (error) {
          expect(error).toBeInstanceOf(ComputeError);
        }
      }),
      { numRuns: 3000 },
    );
  });
});
