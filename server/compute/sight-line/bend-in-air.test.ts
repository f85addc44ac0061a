import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { bendInAir, indexPerK, type SightAir } from "./bend-in-air.ts";

/**
 * Refractive index of dry air less 1, after K. P. Birch, M. J. Downs, Metrologia 31 (1994) 315, with the coefficients
 * that NIST's Engineering Metrology Toolbox prints for its modified Edlén equation (water left out).
 */
function refractivity(celsius: number, pascals: number, micrometres: number): number {
  const s = 1 / micrometres ** 2;
  const standard = 1e-8 * (8342.54 + 2406147 / (130 - s) + 15998 / (38.9 - s));
  const density = (1 + 1e-8 * (0.601 - 0.00972 * celsius) * pascals) / (1 + 0.003661 * celsius);
  return (pascals * standard * density) / 96095.43;
}

const air = (hKPerMm: number, vKPerMm: number, lengthMm: number): SightAir => ({
  gradient: { hKPerMm, vKPerMm },
  lengthMm,
});

describe("indexPerK", () => {
  it("is the slope of the published equation at 20 °C, one atmosphere and 633 nm", () => {
    // The index itself, 1.000 271 8 there (from memory), shows that the equation above is typed in rightly.
    expect(Math.abs(refractivity(20, 101_325, 0.633) - 2.718e-4)).toBeLessThan(1e-7);
    const slope = refractivity(20.5, 101_325, 0.633) - refractivity(19.5, 101_325, 0.633);
    expect(Math.abs(slope / indexPerK - 1)).toBeLessThan(0.005);
    const hot = refractivity(40.5, 101_325, 0.633) - refractivity(39.5, 101_325, 0.633);
    expect(Math.abs(hot / indexPerK - 0.875)).toBeLessThan(0.01);
  });
});

describe("bendInAir", () => {
  it("bends a beam by about 0.05 mm across 10 m at 1 K/m, away from the warm side", () => {
    // By hand: ½ · (10 m)² · 0.93e-6/K · 1 K/m = 46.5e-6 m.
    const bend = bendInAir(air(0.001, -0.001, 10_000), 10_000);
    expect(Math.abs(bend.hMm + 0.0465)).toBeLessThan(1e-12); // mm
    expect(Math.abs(bend.vMm - 0.0465)).toBeLessThan(1e-12); // mm
  });

  it("follows a ray traced step by step, through the gradient and straight on after it", () => {
    const [gradient, lengthMm, distanceMm, steps] = [0.0007, 6000, 9000, 90_000];
    const step = distanceMm / steps;
    let [heightMm, slope] = [0, 0];
    for (let i = 0; i < steps; i += 1) {
      const curvature = (i + 0.5) * step < lengthMm ? -0.93e-6 * gradient : 0;
      heightMm += slope * step + (curvature * step * step) / 2;
      slope += curvature * step;
    }
    const { hMm } = bendInAir(air(gradient, 0, lengthMm), distanceMm);
    expect(Math.abs(hMm - heightMm)).toBeLessThan(1e-9); // mm
  });

  it("grows with the gradient, and with the square of the length", () => {
    const positive = fc.double({ min: 1e-6, max: 1e5, noNaN: true });
    fc.assert(
      fc.property(positive, positive, (gradient, lengthMm) => {
        const { vMm } = bendInAir(air(0, gradient, lengthMm), lengthMm);
        const twice = bendInAir(air(0, 2 * gradient, 2 * lengthMm), 2 * lengthMm).vMm;
        expect(Math.abs(twice / vMm - 8)).toBeLessThan(1e-12);
      }),
    );
  });

  it("refuses what no number can hold", () => {
    expect(() => bendInAir(air(1e200, 0, 1e100), 1e100)).toThrow("not a finite number");
  });
});
