import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { clockAngles, onRing, pointsInput, wallPoint } from "../../../tests/support/bore-inputs.ts";
import { seededRandom } from "../../../tests/support/seeded-random.ts";
import type { PointsInput, WallPoint } from "./bore-input.ts";
import type { WallFit } from "./bore-fit.ts";
import { fitBore } from "./fit-bore.ts";

/** A ring read over 120 degrees or more, with scatter up to 1/1000 of its radius, each reading with its own u. */
const ring = fc
  .record({
    radiusMm: fc.double({ min: 20, max: 1500, noNaN: true }),
    hMm: fc.double({ min: -30, max: 30, noNaN: true }),
    vMm: fc.double({ min: -30, max: 30, noNaN: true }),
    count: fc.integer({ min: 4, max: 40 }),
    fromDeg: fc.double({ min: 0, max: 360, noNaN: true }),
    overDeg: fc.double({ min: 120, max: 360, noNaN: true }),
    scatter: fc.constantFrom(0, 1e-6, 1e-3),
    stated: fc.boolean(),
    seed: fc.integer({ min: 1, max: 1e6 }),
  })
  .map(({ radiusMm, hMm, vMm, count, fromDeg, overDeg, scatter, stated, seed }) => {
    const random = seededRandom(seed);
    const points = clockAngles(count, fromDeg, overDeg).map((clockDeg) => ({
      ...onRing({ hMm, vMm }, radiusMm, clockDeg, scatter * radiusMm * random.normal()),
      uMm: stated ? 1e-4 * radiusMm * (1 + 3 * random.uniform()) : null,
    }));
    return { input: pointsInput(points), radiusMm };
  });

const changed = (
  input: PointsInput,
  change: (point: WallPoint, index: number) => WallPoint,
): PointsInput => ({
  ...input,
  points: input.points.map(change),
});
const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);

/** What does not depend on where the bore lies or how it is turned; `size` is its radius. */
function expectSameShape(after: WallFit, before: WallFit, size: number, factor = 1): void {
  const within = 1e-11 * size;
  near(after.diameterMm! / factor, before.diameterMm!, within);
  near(after.roundnessMm / factor, before.roundnessMm, within);
  near(after.statistics.dilution, before.statistics.dilution, 1e-9 * before.statistics.dilution);
  before.residualsMm.forEach((residual, i) => near(after.residualsMm[i]! / factor, residual, within));
  expect(after.covariance === null).toBe(before.covariance === null);
  if (!before.expandedUncertainty) return;
  // Rounding of residuals that are all but 0 shows as a share of them.
  const half = before.expandedUncertainty.diameterMm!;
  near(after.expandedUncertainty!.diameterMm! / factor, half, 1e-8 * half + 1e-11 * size);
}

describe("fitBore", () => {
  it("moves its centre with the points, and nothing else", () => {
    fc.assert(
      fc.property(
        ring,
        fc.double({ min: -1e3, max: 1e3, noNaN: true }),
        fc.double({ min: -1e3, max: 1e3, noNaN: true }),
        ({ input, radiusMm }, h, v) => {
          const before = fitBore(input);
          const after = fitBore(changed(input, (p) => ({ ...p, hMm: p.hMm + h, vMm: p.vMm + v })));
          const size = radiusMm + Math.abs(h) + Math.abs(v);
          near(after.centre.hMm, before.centre.hMm + h, 1e-11 * size);
          near(after.centre.vMm, before.centre.vMm + v, 1e-11 * size);
          expectSameShape(after, before, size);
        },
      ),
    );
  });

  it("turns its centre and its covariance with the points", () => {
    fc.assert(
      fc.property(
        ring,
        fc.double({ min: 0, max: 2 * Math.PI, noNaN: true }),
        ({ input, radiusMm }, angleRad) => {
          const [sin, cos] = [Math.sin(angleRad), Math.cos(angleRad)];
          const before = fitBore(input);
          const after = fitBore(
            changed(input, (p) => ({ ...p, hMm: cos * p.hMm + sin * p.vMm, vMm: cos * p.vMm - sin * p.hMm })),
          );
          const { hMm, vMm } = before.centre;
          near(after.centre.hMm, cos * hMm + sin * vMm, 1e-11 * radiusMm);
          near(after.centre.vMm, cos * vMm - sin * hMm, 1e-11 * radiusMm);
          expectSameShape(after, before, radiusMm);
          if (!before.covariance) return;
          const { hhMm2, hvMm2, vvMm2 } = before.covariance;
          const scale = hhMm2 + vvMm2;
          const turned = cos * cos * hhMm2 + 2 * sin * cos * hvMm2 + sin * sin * vvMm2;
          near(after.covariance!.hhMm2, turned, 1e-8 * scale + 1e-22 * radiusMm ** 2);
        },
      ),
    );
  });

  it("looks the same from the other end: h and the h–v term change sign, to the last bit", () => {
    fc.assert(
      fc.property(ring, ({ input }) => {
        const before = fitBore(input);
        const mirrored = changed(input, (p) => ({ ...p, hMm: -p.hMm }));
        const after = fitBore(mirrored);
        expect(Math.abs(after.centre.hMm + before.centre.hMm)).toBe(0);
        expect(after.centre.vMm).toBe(before.centre.vMm);
        expect(after.residualsMm).toEqual(before.residualsMm);
        const terms = [before, after].map(({ covariance }) => covariance?.hvMm2 ?? 0);
        expect(Math.abs(terms[0]! + terms[1]!)).toBe(0);
        // Read from upstream, the mirrored points are those of the bore as it is.
        expect(fitBore({ ...mirrored, seen: "upstream" })).toEqual(before);
      }),
    );
  });

  it("does not feel the unit: lengths scale by the factor, variances by its square, k and dof never", () => {
    fc.assert(
      fc.property(ring, fc.constantFrom(1 / 25.4, 1e-3, 25.4, 1e6), ({ input, radiusMm }, factor) => {
        const before = fitBore(input);
        const after = fitBore(
          changed(input, (p) => ({
            ...p,
            hMm: p.hMm * factor,
            vMm: p.vMm * factor,
            uMm: p.uMm === null ? null : p.uMm * factor,
          })),
        );
        near(after.centre.hMm / factor, before.centre.hMm, 1e-11 * radiusMm);
        near(after.centre.vMm / factor, before.centre.vMm, 1e-11 * radiusMm);
        expectSameShape(after, before, radiusMm, factor);
        near(after.arc.coverageDeg, before.arc.coverageDeg, 1e-9);
      }),
    );
  });

  it("does not mind the order of the readings: residuals follow their own", () => {
    fc.assert(
      fc.property(ring, fc.integer({ min: 1, max: 39 }), ({ input, radiusMm }, by) => {
        const n = input.points.length;
        const from = (i: number) => (n - 1 - i + by) % n;
        const before = fitBore(input);
        const after = fitBore(changed(input, (_, i) => input.points[from(i)]!));
        near(after.centre.hMm, before.centre.hMm, 1e-11 * radiusMm);
        near(after.centre.vMm, before.centre.vMm, 1e-11 * radiusMm);
        const back = [...after.residualsMm];
        after.residualsMm.forEach((residual, i) => (back[from(i)] = residual));
        expectSameShape({ ...after, residualsMm: back }, before, radiusMm);
      }),
    );
  });

  it("is moved by no reading that lies exactly on the fitted circle", () => {
    fc.assert(
      fc.property(ring, fc.double({ min: 0, max: 360, noNaN: true }), ({ input, radiusMm }, clockDeg) => {
        const before = fitBore(input);
        const { hMm, vMm } = onRing(before.centre, before.diameterMm! / 2, clockDeg);
        const { uMm } = input.points[0]!;
        const after = fitBore({ ...input, points: [...input.points, wallPoint(hMm, vMm, { uMm })] });
        near(after.centre.hMm, before.centre.hMm, 1e-11 * radiusMm);
        near(after.centre.vMm, before.centre.vMm, 1e-11 * radiusMm);
        near(after.diameterMm!, before.diameterMm!, 1e-11 * radiusMm);
        near(after.residualsMm.at(-1)!, 0, 1e-11 * radiusMm);
      }),
    );
  });
});
