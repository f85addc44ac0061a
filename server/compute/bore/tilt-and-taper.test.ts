import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { clockAngles, onRing, pointsInput } from "../../../tests/support/bore-inputs.ts";
import type { WallPoint } from "./bore-input.ts";
import { fitBore } from "./fit-bore.ts";

const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);
const centre = { hMm: 4, vMm: -9 };
const radiusMm = 480;

/** Rings at z, opened by the tangent, their centres on a line through `centre` at z = 0. */
function rings(
  planes: readonly number[],
  shape: { tangent?: number; slope?: { h: number; v: number }; offs?: number },
) {
  const { tangent = 0, slope = { h: 0, v: 0 }, offs = 0 } = shape;
  return planes.flatMap((zMm, k) =>
    clockAngles(11, 13 * k, 300).map((clockDeg, i): WallPoint => {
      const at = { hMm: centre.hMm + slope.h * zMm, vMm: centre.vMm + slope.v * zMm };
      return { ...onRing(at, radiusMm + tangent * zMm, clockDeg, offs * Math.cos(5 * i + k)), zMm };
    }),
  );
}
const angle = fc.double({ min: -30, max: 30, noNaN: true });
const tangentOf = (halfAngleDeg: number) => Math.tan((halfAngleDeg * Math.PI) / 180);

describe("a conical bore", () => {
  it("is found at z = 0 with its half angle, wherever its planes lie", () => {
    fc.assert(
      fc.property(angle, fc.constantFrom([0, 80], [-60, 60], [200, 230, 400]), (halfAngleDeg, planes) => {
        const points = rings(planes, { tangent: tangentOf(halfAngleDeg) });
        const known = fitBore(pointsInput(points, { taper: { form: "known", halfAngleDeg } }));
        const unknown = fitBore(pointsInput(points, { taper: { form: "estimate" } }));
        for (const { centre: found, diameterMm, taper, tilt } of [known, unknown]) {
          near(found.hMm, centre.hMm, 1e-9);
          near(found.vMm, centre.vMm, 1e-9);
          near(diameterMm!, 2 * radiusMm, 1e-8);
          near(taper!.halfAngleDeg, halfAngleDeg, 1e-9);
          expect(tilt).toBeNull();
        }
        expect([known.statistics.parameters, unknown.statistics.parameters]).toEqual([3, 4]);
      }),
    );
  });

  it("opens downstream with a positive half angle: at 45 degrees the radius grows as z does", () => {
    const points = rings([0, 25], { tangent: 1 });
    near(fitBore(pointsInput(points, { taper: { form: "estimate" } })).taper!.halfAngleDeg, 45, 1e-9);
    near(fitBore(pointsInput(points, { taper: { form: "known", halfAngleDeg: 45 } })).roundnessMm, 0, 1e-10);
    expect(
      fitBore(pointsInput(points, { taper: { form: "known", halfAngleDeg: -45 } })).roundnessMm,
    ).toBeGreaterThan(40);
  });

  it("stated as known has no uncertainty of its half angle, estimated one has", () => {
    const points = rings([0, 80], { tangent: 0.1, offs: 0.02 });
    const known = fitBore(pointsInput(points, { taper: { form: "known", halfAngleDeg: 5.7 } }));
    expect(known.taper).toEqual({ halfAngleDeg: 5.7, expandedUncertaintyDeg: null });
    const { taper } = fitBore(pointsInput(points, { taper: { form: "estimate" } }));
    expect(Math.abs(taper!.halfAngleDeg - (Math.atan(0.1) * 180) / Math.PI)).toBeLessThan(
      taper!.expandedUncertaintyDeg!,
    );
    expect(taper!.expandedUncertaintyDeg!).toBeLessThan(0.1);
  });

  it("of half angle 0 in one plane is the plain circle", () => {
    const points = rings([70], { offs: 0.03 });
    const cone = fitBore(pointsInput(points, { taper: { form: "known", halfAngleDeg: 0 } }));
    const circle = fitBore(pointsInput(points.map((point) => ({ ...point, zMm: null }))));
    expect({ ...cone, taper: null }).toEqual(circle);
  });
});

describe("a tilted bore", () => {
  const slopes = fc.record({
    h: fc.double({ min: -0.02, max: 0.02, noNaN: true }),
    v: fc.double({ min: -0.02, max: 0.02, noNaN: true }),
  });

  it("is found at z = 0 with both slopes, wherever its planes lie", () => {
    fc.assert(
      fc.property(slopes, fc.constantFrom([0, 80], [-60, 60], [200, 230, 400]), (slope, planes) => {
        const fit = fitBore(pointsInput(rings(planes, { slope })));
        near(fit.centre.hMm, centre.hMm, 1e-9);
        near(fit.centre.vMm, centre.vMm, 1e-9);
        near(fit.tilt!.h, slope.h, 1e-11);
        near(fit.tilt!.v, slope.v, 1e-11);
        near(fit.diameterMm!, 2 * radiusMm, 1e-9);
        expect([fit.statistics.parameters, fit.taper]).toEqual([5, null]);
      }),
    );
  });

  it("looks the same from the other end: only the slope in h changes sign", () => {
    const points = rings([0, 90], { slope: { h: 0.01, v: -0.004 }, offs: 0.05 });
    const mirrored = points.map((point) => ({ ...point, hMm: -point.hMm }));
    expect(fitBore(pointsInput(mirrored, { seen: "upstream" }))).toEqual(fitBore(pointsInput(points)));
    near(fitBore(pointsInput(mirrored)).tilt!.h, -0.01, 1e-3);
  });

  it("does not feel where z = 0 was put: the centre moves along its line, its shape stays", () => {
    fc.assert(
      fc.property(slopes, fc.double({ min: -500, max: 500, noNaN: true }), (slope, along) => {
        const points = rings([0, 90], { slope, offs: 0.05 });
        const before = fitBore(pointsInput(points));
        const after = fitBore(pointsInput(points.map((point) => ({ ...point, zMm: point.zMm! + along }))));
        near(after.centre.hMm, before.centre.hMm - before.tilt!.h * along, 1e-9);
        near(after.centre.vMm, before.centre.vMm - before.tilt!.v * along, 1e-9);
        near(after.tilt!.v, before.tilt!.v, 1e-12);
        near(after.roundnessMm, before.roundnessMm, 1e-10);
      }),
    );
  });

  it("read in one plane, all z alike, has no tilt and is the plain circle there", () => {
    const points = rings([55], { offs: 0.02 });
    const fit = fitBore(pointsInput(points));
    expect([fit.tilt, fit.statistics.parameters]).toEqual([null, 3]);
    expect(fit).toEqual(fitBore(pointsInput(points.map((point) => ({ ...point, zMm: null })))));
  });
});
