import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { ComputeError } from "../compute-error.ts";
import { catenarySagMm, parabolaSagMm, type Wire } from "./wire-sag.ts";

const near = (got: number, wanted: number, share: number) =>
  expect(Math.abs(got - wanted), `${got} for ${wanted}`).toBeLessThanOrEqual(share * Math.abs(wanted));

/** A wire of 0.5 mm steel, 7.85 g/cm³, under 150 N across 8 m. */
const taut: Wire = { weightNPerMm: 1.512e-5, tensionN: 150, fromMm: -500, toMm: 7500 };

const wires: fc.Arbitrary<Wire> = fc.record({
  weightNPerMm: fc.double({ min: -6, max: -3, noNaN: true }).map((power) => 10 ** power),
  tensionN: fc.double({ min: 10, max: 1000, noNaN: true }),
  fromMm: fc.double({ min: -5000, max: 5000, noNaN: true }),
  toMm: fc.double({ min: 5001, max: 30_000, noNaN: true }),
});

/** A second way: the differential equation y″ = (w/H)·√(1 + y′²) from the middle, by Runge–Kutta of fourth order. */
function sagByIntegration({ weightNPerMm, tensionN, fromMm, toMm }: Wire, zMm: number): number {
  const perMm = weightNPerMm / tensionN;
  const heightAt = (distanceMm: number) => {
    const steps = 4000;
    const h = distanceMm / steps;
    let height = 0;
    let slope = 0;
    const bend = (s: number) => perMm * Math.hypot(1, s);
    for (let i = 0; i < steps; i++) {
      const [k1, l1] = [slope, bend(slope)];
      const [k2, l2] = [slope + (h * l1) / 2, bend(slope + (h * l1) / 2)];
      const [k3, l3] = [slope + (h * l2) / 2, bend(slope + (h * l2) / 2)];
      const [k4, l4] = [slope + h * l3, bend(slope + h * l3)];
      height += (h * (k1 + 2 * k2 + 2 * k3 + k4)) / 6;
      slope += (h * (l1 + 2 * l2 + 2 * l3 + l4)) / 6;
    }
    return height;
  };
  const middle = (fromMm + toMm) / 2;
  return heightAt((toMm - fromMm) / 2) - heightAt(Math.abs(zMm - middle));
}

describe("catenarySagMm", () => {
  it("hangs as the differential equation of a catenary says", () => {
    const share = fc.double({ min: 0.05, max: 0.95, noNaN: true });
    fc.assert(
      fc.property(wires, share, (wire, at) => {
        const zMm = wire.fromMm + at * (wire.toMm - wire.fromMm);
        near(catenarySagMm(wire, zMm), sagByIntegration(wire, zMm), 1e-9);
      }),
      { numRuns: 40 },
    );
  });

  it("is the same from either end, 0 at both, greatest in the middle, never below the parabola", () => {
    fc.assert(
      fc.property(wires, fc.double({ min: 0, max: 1, noNaN: true }), (wire, at) => {
        const { fromMm, toMm } = wire;
        const zMm = fromMm + at * (toMm - fromMm);
        const sagMm = catenarySagMm(wire, zMm);
        const middle = catenarySagMm(wire, fromMm + (toMm - fromMm) / 2);
        expect(Math.abs(catenarySagMm(wire, fromMm + toMm - zMm) - sagMm)).toBeLessThanOrEqual(
          1e-11 * middle,
        );
        expect(sagMm).toBeLessThanOrEqual(middle * (1 + 1e-12));
        expect(sagMm).toBeGreaterThanOrEqual(parabolaSagMm(wire, zMm) * (1 - 1e-12) - 1e-300);
        expect([catenarySagMm(wire, fromMm), catenarySagMm(wire, toMm)]).toEqual([0, 0]);
      }),
    );
  });

  it("scales with its length at one ratio of weight to tension and length", () => {
    const twice = { weightNPerMm: 1, tensionN: 4000, fromMm: 0, toMm: 2000 };
    near(catenarySagMm(twice, 500), 2 * catenarySagMm({ ...twice, weightNPerMm: 2, toMm: 1000 }, 250), 1e-14);
  });

  it("is the parabola to all digits where the wire is taut, wL²/8H in the middle", () => {
    near(parabolaSagMm(taut, 3500), (1.512e-5 * 8000 ** 2) / (8 * 150), 1e-15);
    // The next term of the series is 1 + (wL/2H)²/12 = 1 + 1.4e-8.
    near(catenarySagMm(taut, 3500), parabolaSagMm(taut, 3500) * (1 + 1.35475e-8), 1e-12);
    const light = { ...taut, weightNPerMm: 1e-15 };
    near(catenarySagMm(light, 1234), parabolaSagMm(light, 1234), 1e-15);
  });

  it("refuses a wire so slack that its sag is no number", () => {
    const slack = { weightNPerMm: 1e6, tensionN: 1e-6, fromMm: 0, toMm: 1e6 };
    const attempt = () => catenarySagMm(slack, 5e5);
    expect(attempt).toThrow(ComputeError);
    expect(attempt).toThrow(expect.objectContaining({ code: "result_overflow" }));
  });
});
