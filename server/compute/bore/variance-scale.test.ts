import { describe, expect, it } from "vitest";
import { clockAngles, onRing, pointsInput } from "../../../tests/support/bore-inputs.ts";
import { fitBore } from "./fit-bore.ts";
import { varianceScale } from "./variance-scale.ts";

const codes = ({ warnings }: { warnings: readonly { code: string }[] }) => warnings.map(({ code }) => code);
const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);

/**
 * Eight points 45 degrees apart, opposite ones off alike by ±0.02 mm: by symmetry the centre is exact, the radius the
 * mean and every residual ±0.02. JᵀJ of an even ring is diag(n/2, n/2, n).
 */
const eight = clockAngles(8).map((clockDeg, i) =>
  onRing({ hMm: 0, vMm: 0 }, 250, clockDeg, i % 2 ? 0.02 : -0.02),
);
const fitWith = (readingUncertaintyMm: number | null) =>
  fitBore(pointsInput(eight, { readingUncertaintyMm }));

describe("varianceScale", () => {
  it("is F = max(1, q) with stated uncertainties, q = χ² ÷ what is left over", () => {
    expect(varianceScale(32, 5, true)).toEqual({ factor: 6.4, dof: 5 * (6.4 / 5.4) ** 2 });
    expect(varianceScale(5, 5, true)).toEqual({ factor: 1, dof: null });
    expect(varianceScale(0, 5, true)).toEqual({ factor: 1, dof: null });
  });

  it("has degrees of freedom that come from infinity at q = 1 and end at n − p, without a jump", () => {
    const dofAt = (q: number) => varianceScale(q * 7, 7, true)!.dof!;
    expect(dofAt(1 + 1e-6)).toBeGreaterThan(1e12);
    const falling = [1.001, 1.01, 1.1, 2, 10, 1000].map(dofAt);
    expect([...falling].sort((a, b) => b - a)).toEqual(falling);
    near(dofAt(1e9), 7, 1e-6);
  });

  it("is s² with n − p degrees of freedom when nothing is stated", () => {
    expect(varianceScale(0.05, 5, false)).toEqual({ factor: 0.01, dof: 5 });
    expect(varianceScale(0, 5, false)).toEqual({ factor: 0, dof: 5 });
  });

  it("is 1 with n = p readings if stated, and otherwise unknown", () => {
    expect(varianceScale(1e-24, 0, true)).toEqual({ factor: 1, dof: null });
    expect(varianceScale(1e-24, 0, false)).toBeNull();
  });
});

describe("the scale in an answer", () => {
  it("enlarges stated uncertainties that the scatter belies: by hand χ² = 32, F = 6.4, dof = 7.02", () => {
    const { statistics, covariance, expandedUncertainty, warnings } = fitWith(0.01);
    near(statistics.chiSquare!, 32, 1e-9);
    near(statistics.varianceInflation!, 6.4, 1e-9);
    near(expandedUncertainty!.dof!, 5 * (6.4 / 5.4) ** 2, 1e-8);
    near(covariance!.hhMm2, (2 / 8) * 0.01 ** 2 * 6.4, 1e-12);
    near(covariance!.vvMm2, (2 / 8) * 0.01 ** 2 * 6.4, 1e-12);
    const { diameterMm, factor } = expandedUncertainty!;
    near((diameterMm! / factor) ** 2, (4 / 8) * 0.01 ** 2 * 6.4, 1e-12);
    // Any χ² table: 11.07 is the 0.95 quantile for 5 degrees of freedom.
    expect(codes({ warnings })).toEqual(["scatter_exceeds_uncertainty"]);
    expect(warnings[0]!.detail).toContain("11.07");
  });

  it("does not shrink stated uncertainties when the readings agree better", () => {
    const { statistics, covariance, expandedUncertainty, warnings } = fitWith(0.05);
    near(statistics.chiSquare!, 1.28, 1e-10);
    expect(statistics.varianceInflation).toBe(1);
    near(covariance!.hhMm2, (2 / 8) * 0.05 ** 2, 1e-12);
    expect(expandedUncertainty!.dof).toBeNull();
    near(expandedUncertainty!.factor, 1.959963985, 1e-8); // normal quantile, any table
    expect(warnings).toEqual([]);
  });

  it("does not warn of a scatter that is larger than stated and still within its chance", () => {
    const fit = fitWith(0.018); // χ² = 9.88 between 5 and 11.07
    expect(fit.statistics.varianceInflation!).toBeGreaterThan(1);
    expect(codes(fit)).toEqual([]);
  });

  it("takes the scatter itself when nothing is stated", () => {
    const { statistics, covariance, expandedUncertainty } = fitWith(null);
    const variance = (8 * 0.02 ** 2) / 5;
    near(covariance!.hhMm2, (2 / 8) * variance, 1e-12);
    expect(expandedUncertainty!.dof).toBe(5);
    expect([statistics.chiSquare, statistics.varianceInflation]).toEqual([null, null]);
    near(statistics.rmsMm, 0.02, 1e-12);
  });

  it("with three points answers the stated uncertainty alone, or none, and says that nothing checks it", () => {
    for (const first of [0, 17, 140, 301]) {
      const three = clockAngles(3, first).map((clockDeg) => onRing({ hMm: 9, vMm: -3 }, 250, clockDeg));
      const stated = fitBore(pointsInput(three, { readingUncertaintyMm: 0.01 }));
      near(stated.covariance!.hhMm2, (2 / 3) * 0.01 ** 2, 1e-12);
      expect(stated.expandedUncertainty!.dof).toBeNull();
      expect(stated.statistics.varianceInflation).toBe(1);
      const bare = fitBore(pointsInput(three));
      expect([bare.covariance, bare.expandedUncertainty, bare.statistics.varianceInflation]).toEqual([
        null,
        null,
        null,
      ]);
      for (const fit of [stated, bare]) {
        near(fit.centre.hMm, 9, 1e-11);
        near(fit.diameterMm!, 500, 1e-11);
        expect(codes(fit)).toEqual(["no_redundancy"]);
      }
    }
  });

  /** JCGM 100:2008 (GUM), Table G.2: t_p(ν) for p = 90, 95 and 99 %. */
  it.each([
    { dof: 1, t: [6.31, 12.71, 63.66] },
    { dof: 2, t: [2.92, 4.3, 9.92] },
    { dof: 3, t: [2.35, 3.18, 5.84] },
    { dof: 5, t: [2.02, 2.57, 4.03] },
    { dof: 10, t: [1.81, 2.23, 3.17] },
    { dof: 30, t: [1.7, 2.04, 2.75] },
  ])("expands by Student's t of GUM Table G.2 with $dof readings left over", ({ dof, t }) => {
    const points = clockAngles(dof + 3).map((clockDeg, i) =>
      onRing({ hMm: 1, vMm: 2 }, 250, clockDeg, 0.01 * Math.sin(7 * i)),
    );
    [0.9, 0.95, 0.99].forEach((level, i) => {
      const { covariance, expandedUncertainty } = fitBore(pointsInput(points, { level }));
      expect(expandedUncertainty).toMatchObject({ dof, level });
      near(expandedUncertainty!.factor, t[i]!, 0.0051); // half of the last printed digit
      near(expandedUncertainty!.hMm, expandedUncertainty!.factor * Math.sqrt(covariance!.hhMm2), 1e-15);
      near(expandedUncertainty!.vMm, expandedUncertainty!.factor * Math.sqrt(covariance!.vvMm2), 1e-15);
    });
  });
});
