import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  clockAngles,
  onRing,
  pairsInput,
  pointsInput,
  refusalOf,
} from "../../../tests/support/bore-inputs.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import { worstVarianceMm2 } from "../plane.ts";
import { fitBore } from "./fit-bore.ts";
import { solvePlainCircle, startPlainCircle } from "./plain-circle.ts";
import { modelFor, solveWall, type WallSolution } from "./solve-wall.ts";
import type { WallReadings } from "./wall-readings.ts";

const between = (min: number, max: number) => fc.double({ min, max, noNaN: true });

/** Rings and arcs of any size and place; scatter relative to the radius; each reading with its own u, one for all, or none. */
const bores = (overDeg: readonly [number, number], scatters: readonly number[], far: number) =>
  fc
    .record({
      radiusMm: between(5, 3000),
      farH: between(-far, far),
      farV: between(-far, far),
      count: fc.integer({ min: 3, max: 60 }),
      fromDeg: between(0, 360),
      over: between(...overDeg),
      scatter: fc.constantFrom(...scatters),
      stated: fc.constantFrom("each", "alike", "none"),
      seed: fc.integer({ min: 1, max: 1e6 }),
    })
    .map(({ radiusMm, farH, farV, count, fromDeg, over, scatter, stated, seed }): WallReadings => {
      const random = seededRandom(seed);
      const centre = { hMm: farH * radiusMm, vMm: farV * radiusMm };
      const points = clockAngles(count, fromDeg, over).map((t) =>
        onRing(centre, radiusMm, t, scatter * radiusMm * random.normal()),
      );
      const uOf = () => 0.001 * (stated === "each" ? 0.5 + 3 * random.uniform() : 1);
      const uMm = stated === "none" ? null : points.map(uOf);
      return {
        hMm: points.map(({ hMm }) => hMm),
        vMm: points.map(({ vMm }) => vMm),
        zMm: null,
        uMm,
      };
    });

function quickly(readings: WallReadings): WallSolution | null {
  const start = startPlainCircle(readings);
  return start && solvePlainCircle(readings, start);
}

function generally(readings: WallReadings): WallSolution {
  const fittable = modelFor(readings, null, null, "points");
  if (fittable instanceof Error) throw fittable;
  return solveWall(readings, fittable, "points");
}

/**
 * Both stop where only rounding is left. Distances rounded by ε × the extent of the points move the centre by that times
 * the dilution; numbers far from their origin are rounded to the spacing there. Against doubled precision either path
 * keeps within 1 of this unit.
 */
function expectAlike(quick: WallSolution, general: WallSolution, extentMm: number): void {
  const { cofactors, evenRingCofactor, spacingMm, residualsMm } = general;
  const worst = worstVarianceMm2({ hhMm2: cofactors.hh, hvMm2: cofactors.hv, vvMm2: cofactors.vv });
  const dilution = Math.sqrt(worst / evenRingCofactor);
  const rounding = Number.EPSILON * extentMm + spacingMm;
  const near = (one: number, other: number, allowed: number) =>
    expect(Math.abs(one - other)).toBeLessThanOrEqual(allowed);
  near(quick.centre.hMm, general.centre.hMm, 4 * rounding * dilution);
  near(quick.centre.vMm, general.centre.vMm, 4 * rounding * dilution);
  near(quick.radiusMm, general.radiusMm, 4 * rounding * dilution);
  residualsMm.forEach((value, i) => near(quick.residualsMm[i]!, value, 16 * rounding));
  // In units of an even ring's variance: u²/n, whether u is stated or 1.
  const rmsOf = ({ weightedSquares }: WallSolution) => Math.sqrt((weightedSquares * evenRingCofactor) / 2);
  near(rmsOf(quick), rmsOf(general), 16 * rounding);
  const share = 1e-13 * dilution * dilution;
  near(quick.cofactors.hh, cofactors.hh, share * worst);
  near(quick.cofactors.hv, cofactors.hv, share * worst);
  near(quick.cofactors.vv, cofactors.vv, share * worst);
  near(quick.cofactors.radius, cofactors.radius, share * (worst + cofactors.radius));
  near(quick.evenRingCofactor, evenRingCofactor, 1e-13 * evenRingCofactor);
  expect(quick.spacingMm).toBe(spacingMm);
  expect([quick.model, quick.tangent, quick.slope]).toEqual([general.model, 0, { h: 0, v: 0 }]);
}

describe("solvePlainCircle, beside the general path", () => {
  it.each([
    { what: "rings and arcs over 60 degrees", over: [60, 360], scatters: [0, 1e-9, 1e-6, 1e-3], far: 2 },
    { what: "arcs of 8 to 60 degrees", over: [8, 60], scatters: [0, 1e-9, 1e-6, 1e-4], far: 2 },
    { what: "badly out of round", over: [120, 360], scatters: [0.01, 0.05, 0.2], far: 2 },
    { what: "far from the origin", over: [60, 360], scatters: [0, 1e-6, 1e-3], far: 1e6 },
  ] as const)("finds the same circle to rounding: $what", ({ over, scatters, far }) => {
    fc.assert(
      fc.property(bores(over, scatters, far), (readings) => {
        const start = startPlainCircle(readings);
        const quick = start && solvePlainCircle(readings, start);
        if (quick) expectAlike(quick, generally(readings), start.extentMm);
      }),
      { numRuns: 1500 },
    );
  });

  it("answers every ordinary bore: over 60 degrees, scatter to a thousandth of the radius", () => {
    fc.assert(
      fc.property(bores([60, 360], [1e-9, 1e-6, 1e-4, 1e-3], 1e3), (readings) => {
        const count = readings.hMm.length;
        fc.pre(count >= 6);
        const quick = quickly(readings);
        expect(quick).not.toBeNull();
        expect(quick!.iterations).toBeLessThanOrEqual(5);
      }),
      { numRuns: 1500 },
    );
  });

  it("leaves to the general path what it cannot prove, and its answer stands then", () => {
    const thin = clockAngles(20, 33, 2).map((t) => onRing({ hMm: 1, vMm: -2 }, 500, t));
    const columns = {
      hMm: thin.map(({ hMm }) => hMm),
      vMm: thin.map(({ vMm }) => vMm),
      zMm: null,
      uMm: null,
    };
    expect(startPlainCircle(columns)).toBeNull();
    expect(Math.abs(fitBore(pointsInput(thin)).centre.hMm - 1)).toBeLessThan(1e-6);
    // A reading at the very centre has no direction: the quick path meets it after its start.
    const [hMm, vMm] = [
      [0, 10, 0, -10, 0],
      [10, 0, -10, 0, 0],
    ] as const;
    const readings = { hMm, vMm, zMm: null, uMm: null };
    expect(startPlainCircle(readings)).not.toBeNull();
    expect(quickly(readings)).toBeNull();
    expect(fitBore(pairsInput(hMm.map((h, i) => [h, vMm[i]!]))).diameterMm).toBe(16);
  });

  it("never starts on what is refused", () => {
    const line = clockAngles(9, 0, 90).map((h): [number, number] => [h, 0.3 * h + 1]);
    for (const [pairs, code] of [
      [line, "points_collinear"],
      [
        [
          [3, 4],
          [3, 4],
          [3, 4],
        ],
        "points_coincident",
      ],
      [
        [
          [3e9, 4],
          [3e9 + 1e-6, 4],
          [3e9, 4 + 1e-6],
          [3e9, 4],
        ],
        "points_coincident",
      ],
      [
        [
          [0, 0],
          [1, 1],
        ],
        "too_few_points",
      ],
    ] as const) {
      const readings = { hMm: pairs.map(([h]) => h), vMm: pairs.map(([, v]) => v), zMm: null, uMm: null };
      expect(startPlainCircle(readings)).toBeNull();
      expect(refusalOf(pairsInput(pairs)).code).toBe(code);
    }
  });

  it("changes none of its input", () => {
    const points = clockAngles(12).map((t, i) => onRing({ hMm: 5, vMm: 6 }, 70, t, 0.01 * Math.sin(3 * i)));
    const freeze = (values: number[]): readonly number[] => Object.freeze(values);
    const readings = Object.freeze({
      hMm: freeze(points.map(({ hMm }) => hMm)),
      vMm: freeze(points.map(({ vMm }) => vMm)),
      zMm: null,
      uMm: freeze(points.map((_, i) => 0.001 + 0.0001 * i)),
    });
    const start = Object.freeze(startPlainCircle(readings)!);
    expect(solvePlainCircle(readings, start)).toEqual(solvePlainCircle(readings, start));
  });
});
