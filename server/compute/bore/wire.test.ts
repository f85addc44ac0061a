import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { pairsInput, refusalOf, wireInput } from "../../../tests/support/bore-inputs.ts";
import { gaussNewton } from "../../../tests/support/circle-oracle.ts";
import { fitBore } from "./fit-bore.ts";

const near = (got: number, wanted: number, within: number) =>
  expect(Math.abs(got - wanted)).toBeLessThan(within);
const reading = fc.double({ min: 150, max: 250, noNaN: true });

describe("a wire", () => {
  it("with the upper half off: the circle through left, right and bottom, by hand", () => {
    // Through (−a, 0), (b, 0), (0, −c): h = (b − a)/2, v = (ab − c²)/2c, R² = (v + c)² + h².
    fc.assert(
      fc.property(reading, reading, reading, (a, b, c) => {
        const fit = fitBore(wireInput({ leftMm: a, rightMm: b, bottomMm: c }));
        const h = (b - a) / 2;
        const v = (a * b - c * c) / (2 * c);
        near(fit.centre.hMm, h, 1e-10);
        near(fit.centre.vMm, v, 1e-10);
        near(fit.diameterMm!, 2 * Math.hypot(v + c, h), 1e-9);
        for (const residual of fit.residualsMm) near(residual, 0, 1e-10);
      }),
    );
  });

  it("lies above its sagged self: the centre is lowered by the sag", () => {
    const readings = { leftMm: 200.1, rightMm: 200.3, bottomMm: 200.4 };
    const straight = fitBore(wireInput(readings));
    const sagged = fitBore(wireInput({ ...readings, sagMm: 0.11 }));
    near(sagged.centre.vMm, straight.centre.vMm - 0.11, 1e-12);
    near(sagged.centre.hMm, straight.centre.hMm, 1e-12);
    near(sagged.diameterMm!, straight.diameterMm!, 1e-11);
  });

  it("touched at its surface: half its diameter is added to every reading", () => {
    const toCentre = { leftMm: 200.1, rightMm: 200.3, bottomMm: 200.4, topMm: 199.8 };
    const toSurface = {
      leftMm: 199.85,
      rightMm: 200.05,
      bottomMm: 200.15,
      topMm: 199.55,
      touchedWireDiameterMm: 0.5,
    };
    const centre = fitBore(wireInput(toCentre));
    const surface = fitBore(wireInput(toSurface));
    near(surface.centre.hMm, centre.centre.hMm, 1e-11);
    near(surface.centre.vMm, centre.centre.vMm, 1e-11);
    near(surface.diameterMm!, centre.diameterMm!, 1e-11);
  });

  it("with four readings: least squares, as a second method finds it", () => {
    const even = fc.double({ min: 195, max: 205, noNaN: true });
    fc.assert(
      fc.property(even, even, even, even, (leftMm, rightMm, bottomMm, topMm) => {
        const fit = fitBore(wireInput({ leftMm, rightMm, bottomMm, topMm, readingUncertaintyMm: 1 }));
        const [h, v, radius] = gaussNewton(
          "circle",
          [
            { h: -leftMm, v: 0, z: 0, u: 1 },
            { h: rightMm, v: 0, z: 0, u: 1 },
            { h: 0, v: -bottomMm, z: 0, u: 1 },
            { h: 0, v: topMm, z: 0, u: 1 },
          ],
          [0, 0, 200],
        );
        near(fit.centre.hMm, h!, 1e-6);
        near(fit.centre.vMm, v!, 1e-6);
        near(fit.diameterMm!, 2 * radius!, 1e-6);
      }),
    );
  });

  it("answers residuals as left, right, bottom, top: outwards positive where the wall is farther", () => {
    // On all four alike but top, which is 0.4 farther: by symmetry of left and right h is 0.
    const { centre, residualsMm } = fitBore(wireInput({ topMm: 200.4 }));
    near(centre.hMm, 0, 1e-12);
    near(centre.vMm, 0.2, 1e-3);
    const [left, right, bottom, top] = residualsMm as [number, number, number, number];
    near(left, right, 1e-12);
    near(bottom, top, 1e-3);
    expect(left).toBeLessThan(0);
    expect(top).toBeGreaterThan(0);
    near(left + right + bottom + top, 0, 1e-11);
  });

  it("read looking upstream: left and right change places, the order of residuals stays", () => {
    const down = fitBore(wireInput({ leftMm: 199, rightMm: 201, bottomMm: 200.2, topMm: 199.5 }));
    const up = fitBore(
      wireInput({ leftMm: 201, rightMm: 199, bottomMm: 200.2, topMm: 199.5, seen: "upstream" }),
    );
    near(down.centre.hMm, 1, 0.01);
    near(up.centre.hMm, down.centre.hMm, 1e-12);
    near(up.centre.vMm, down.centre.vMm, 1e-12);
    const [left, right, ...others] = up.residualsMm as [number, number, number, number];
    [right, left, ...others].forEach((residual, i) => near(residual, down.residualsMm[i]!, 1e-12));
  });

  it("is worth what its points are: the same covariance and expanded uncertainty", () => {
    const stated = { readingUncertaintyMm: 0.02 };
    const wire = fitBore(wireInput({ leftMm: 199, rightMm: 201, bottomMm: 200.2, topMm: 199.5, ...stated }));
    const pairs = [
      [-199, 0],
      [201, 0],
      [0, -200.2],
      [0, 199.5],
    ] as const;
    const points = fitBore(pairsInput(pairs, stated));
    expect(wire.covariance).toEqual(points.covariance);
    expect(wire.expandedUncertainty).toEqual(points.expandedUncertainty);
    expect(wire.form).toBe("wire");
  });

  it("refuses a distance of 0 or less, at its place", () => {
    expect(refusalOf(wireInput({ bottomMm: -5 }))).toEqual({
      code: "radius_not_positive",
      at: "wire/bottom",
    });
    expect(refusalOf(wireInput({ leftMm: -1 }))).toEqual({ code: "radius_not_positive", at: "wire/left" });
    expect(refusalOf(wireInput({ topMm: -20 })).at).toBe("wire/top");
  });
});
