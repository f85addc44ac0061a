import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { clockAngles, onRing, pointsInput } from "../../../tests/support/bore-inputs.ts";
import { fitOrCode } from "../../../tests/support/criterion-inputs.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { PointsInput, WallPoint } from "./bore-input.ts";
import type { WallFit } from "./bore-fit.ts";
import type { CriterionMethod } from "./fit-criterion.ts";
import { fitBore } from "./fit-bore.ts";

/** A bore read over three quarters or more: no gap over 90°, roundness below 1 % of the diameter, sometimes oval. */
const bore = fc
  .record({
    radiusMm: fc.double({ min: 20, max: 1500, noNaN: true }),
    hMm: fc.double({ min: -30, max: 30, noNaN: true }),
    vMm: fc.double({ min: -30, max: 30, noNaN: true }),
    count: fc.integer({ min: 6, max: 40 }),
    fromDeg: fc.double({ min: 0, max: 360, noNaN: true }),
    overDeg: fc.double({ min: 300, max: 360, noNaN: true }),
    scatter: fc.constantFrom(1e-6, 1e-5, 1e-3),
    oval: fc.constantFrom(0, 2e-3),
    seed: fc.integer({ min: 1, max: 1e6 }),
  })
  .map(({ radiusMm, hMm, vMm, count, fromDeg, overDeg, scatter, oval, seed }) => {
    const random = seededRandom(seed);
    const points = clockAngles(count, fromDeg, overDeg).map((clockDeg) => {
      const lobe = oval * Math.cos((2 * clockDeg * Math.PI) / 180);
      return {
        ...onRing({ hMm, vMm }, radiusMm, clockDeg, radiusMm * (lobe + scatter * random.normal())),
        uMm: 1e-5 * radiusMm * (1 + random.uniform()),
      };
    });
    return { input: pointsInput(points), radiusMm };
  });

const methods: readonly CriterionMethod[] = [
  "minimum_zone",
  "maximum_inscribed",
  "minimum_circumscribed",
  "ellipse",
];
const changed = (
  input: PointsInput,
  change: (point: WallPoint, index: number) => WallPoint,
): PointsInput => ({ ...input, points: input.points.map(change) });
const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);

/** Both refuse alike, or both answer. A centre is known as well as the readings, times how badly they lie. */
function both(
  before: WallFit | string,
  after: WallFit | string,
  check: (before: WallFit, after: WallFit, share: number) => void,
) {
  if (typeof before === "string" || typeof after === "string") expect(after).toBe(before);
  else check(before, after, 1e-11 * (1 + before.statistics.dilution ** 2));
}

function expectSameShape(before: WallFit, after: WallFit, within: number, factor = 1): void {
  near(after.diameterMm! / factor, before.diameterMm!, within);
  near(after.roundnessMm / factor, before.roundnessMm, within);
  before.residualsMm.forEach((residual, i) => near(after.residualsMm[i]! / factor, residual, within));
  expect(after.contacts).toEqual(before.contacts);
  expect(after.warnings.map(({ code }) => code)).toEqual(before.warnings.map(({ code }) => code));
  const half = before.expandedUncertainty!.diameterMm!;
  near(after.expandedUncertainty!.diameterMm! / factor, half, 1e-6 * half);
  if (!before.ellipse) return;
  near(after.ellipse!.ovalityMm / factor, before.ellipse.ovalityMm, within);
  const expanded = before.ellipse.ovalityExpandedMm!;
  near(after.ellipse!.ovalityExpandedMm! / factor, expanded, 1e-6 * expanded);
}

describe.each(methods)("fitByCriterion: %s", (method) => {
  it("moves its centre with the points, and nothing else", () => {
    fc.assert(
      fc.property(bore, fc.integer({ min: -1000, max: 1000 }), ({ input, radiusMm }, by) => {
        const shifted = changed(input, (p) => ({ ...p, hMm: p.hMm + by, vMm: p.vMm - by / 3 }));
        both(fitOrCode(input, method), fitOrCode(shifted, method), (before, after, share) => {
          const within = share * (radiusMm + Math.abs(by));
          near(after.centre.hMm, before.centre.hMm + by, within);
          near(after.centre.vMm, before.centre.vMm - by / 3, within);
          expectSameShape(before, after, within);
        });
      }),
    );
  });

  it("turns its centre, its covariance and its oval with the points", () => {
    fc.assert(
      fc.property(bore, fc.double({ min: 0, max: 6.28, noNaN: true }), ({ input, radiusMm }, angleRad) => {
        const [sin, cos] = [Math.sin(angleRad), Math.cos(angleRad)];
        const turned = changed(input, (p) => ({
          ...p,
          hMm: cos * p.hMm + sin * p.vMm,
          vMm: cos * p.vMm - sin * p.hMm,
        }));
        both(fitOrCode(input, method), fitOrCode(turned, method), (before, after, share) => {
          const within = share * radiusMm;
          const { hMm, vMm } = before.centre;
          near(after.centre.hMm, cos * hMm + sin * vMm, within);
          near(after.centre.vMm, cos * vMm - sin * hMm, within);
          expectSameShape(before, after, within);
          const { hhMm2, hvMm2, vvMm2 } = before.covariance!;
          const expected = cos * cos * hhMm2 + 2 * sin * cos * hvMm2 + sin * sin * vvMm2;
          near(after.covariance!.hhMm2, expected, 1e-6 * (hhMm2 + vvMm2));
          const clockDeg = before.ellipse?.majorClockDeg;
          if (clockDeg === undefined || clockDeg === null || after.ellipse!.majorClockDeg === null) return;
          const off = after.ellipse!.majorClockDeg - clockDeg - (angleRad * 180) / Math.PI;
          // Where the oval is all but round its direction is known no better than its size.
          const shareOfOval = (within / before.ellipse!.ovalityMm) * 180;
          near(Math.abs(((((off + 90) % 180) + 180) % 180) - 90), 0, 1e-6 + shareOfOval);
        });
      }),
    );
  });

  it("looks the same from the other end", () => {
    fc.assert(
      fc.property(bore, ({ input, radiusMm }) => {
        const mirrored = changed(input, (p) => ({ ...p, hMm: -p.hMm }));
        const before = fitOrCode(input, method);
        expect(fitOrCode({ ...mirrored, seen: "upstream" }, method)).toEqual(before);
        both(before, fitOrCode(mirrored, method), (one, other, share) => {
          near(other.centre.hMm, -one.centre.hMm, share * radiusMm);
          near(other.centre.vMm, one.centre.vMm, share * radiusMm);
          expectSameShape(one, other, share * radiusMm);
        });
      }),
    );
  });

  it("does not feel the unit", () => {
    fc.assert(
      fc.property(bore, fc.constantFrom(1 / 25.4, 1e-3, 25.4, 1e6), ({ input, radiusMm }, factor) => {
        const scaled = changed(input, (p) => ({
          ...p,
          hMm: p.hMm * factor,
          vMm: p.vMm * factor,
          uMm: p.uMm! * factor,
        }));
        both(fitOrCode(input, method), fitOrCode(scaled, method), (before, after, share) => {
          near(after.centre.hMm / factor, before.centre.hMm, share * radiusMm);
          near(after.centre.vMm / factor, before.centre.vMm, share * radiusMm);
          expectSameShape(before, after, share * radiusMm, factor);
        });
      }),
    );
  });

  it("does not mind the order of the readings", () => {
    fc.assert(
      fc.property(bore, fc.integer({ min: 1, max: 39 }), ({ input, radiusMm }, by) => {
        const n = input.points.length;
        const from = (i: number) => (n - 1 - i + by) % n;
        const reordered = changed(input, (_, i) => input.points[from(i)]!);
        both(fitOrCode(input, method), fitOrCode(reordered, method), (before, after, share) => {
          near(after.centre.hMm, before.centre.hMm, share * radiusMm);
          near(after.centre.vMm, before.centre.vMm, share * radiusMm);
          const back = [...after.residualsMm];
          after.residualsMm.forEach((residual, i) => (back[from(i)] = residual));
          const contacts = after.contacts?.map(from).sort((a, b) => a - b);
          const same = { ...after, residualsMm: back, ...(contacts ? { contacts } : {}) };
          expectSameShape(before, same, share * radiusMm);
        });
      }),
    );
  });
});

describe("the criteria of one bore", () => {
  it("have the narrowest zone, and the inscribed circle below, the circumscribed above least squares", () => {
    fc.assert(
      fc.property(bore, ({ input, radiusMm }) => {
        const round = fitBore(input);
        const zone = fitOrCode(input, "minimum_zone");
        const inscribed = fitOrCode(input, "maximum_inscribed");
        const circumscribed = fitOrCode(input, "minimum_circumscribed");
        if (typeof zone === "string" || typeof inscribed === "string" || typeof circumscribed === "string")
          throw new Error("A bore read all round was refused.");
        const rounding = 1e-12 * radiusMm;
        for (const other of [round, inscribed, circumscribed]) {
          expect(zone.roundnessMm).toBeLessThanOrEqual(other.roundnessMm + rounding);
        }
        expect(inscribed.diameterMm!).toBeLessThanOrEqual(round.diameterMm! + rounding);
        expect(circumscribed.diameterMm!).toBeGreaterThanOrEqual(round.diameterMm! - rounding);
        // Residuals on one side only, or as far out as in.
        expect(Math.min(...inscribed.residualsMm)).toBeGreaterThanOrEqual(-rounding);
        expect(Math.max(...circumscribed.residualsMm)).toBeLessThanOrEqual(rounding);
        near(Math.max(...zone.residualsMm) + Math.min(...zone.residualsMm), 0, rounding);
        near(Math.max(...zone.residualsMm) - Math.min(...zone.residualsMm), zone.roundnessMm, rounding);
      }),
    );
  });

  it("find an ellipse that no circle fits better", () => {
    fc.assert(
      fc.property(bore, ({ input }) => {
        const ellipse = fitOrCode(input, "ellipse");
        if (typeof ellipse === "string") throw new Error(ellipse);
        const round = fitBore(input);
        expect(ellipse.statistics.chiSquare!).toBeLessThanOrEqual(
          round.statistics.chiSquare! * (1 + 1e-9) + 1e-9,
        );
      }),
    );
  });
});
