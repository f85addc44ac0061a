import { describe, expect, it } from "vitest";
import { pairsInput } from "../../../tests/support/bore-inputs.ts";
import { fitAlgebraicCircle } from "./algebraic-circle.ts";
import type { WallFit } from "./bore-fit.ts";
import { fitBore } from "./fit-bore.ts";
import { localFrameOf } from "./local-frame.ts";
import { publishedCircles, type CircleFigure } from "./published-cases.ts";
import { gatherWall } from "./wall-readings.ts";

/** The figures that sources print, from an answer for which no uncertainty was stated. */
function figuresOf({ centre, diameterMm, covariance, statistics }: WallFit): Record<CircleFigure, number> {
  const { readingsUsed: n, parameters, rmsMm } = statistics;
  const squares = rmsMm * rmsMm * n;
  // Nothing stated: the answer's covariance is the cofactor times s².
  const variance = squares / (n - parameters);
  return {
    centreH: centre.hMm,
    centreV: centre.vMm,
    radius: diameterMm! / 2,
    rms: rmsMm,
    squares,
    cofactorHh: covariance!.hhMm2 / variance,
    cofactorHv: covariance!.hvMm2 / variance,
    cofactorVv: covariance!.vvMm2 / variance,
  };
}

describe("fitBore against published circles", () => {
  it.each(publishedCircles)("gives the printed figures of $source", ({ points, expected, tolerance }) => {
    const got = figuresOf(fitBore(pairsInput(points)));
    const figures = Object.keys(expected) as CircleFigure[];
    expect(figures).toEqual(expect.arrayContaining(["centreH", "centreV", "radius"]));
    for (const figure of figures) {
      expect(Math.abs(got[figure] - expected[figure]!), figure).toBeLessThan(tolerance[figure]!);
    }
  });

  it("gives the closed form of points alternately on two concentric circles", () => {
    // No source: by symmetry the centre is theirs, the radius their mean, every residual half the difference.
    const points = Array.from({ length: 12 }, (_, i): [number, number] => {
      const radius = i % 2 === 0 ? 120.05 : 119.95;
      return [3.5 + radius * Math.cos((i * Math.PI) / 6), -2.25 + radius * Math.sin((i * Math.PI) / 6)];
    });
    const fit = fitBore(pairsInput(points));
    expect(Math.abs(fit.centre.hMm - 3.5)).toBeLessThan(1e-12); // mm
    expect(Math.abs(fit.centre.vMm + 2.25)).toBeLessThan(1e-12);
    expect(Math.abs(fit.diameterMm! - 240)).toBeLessThan(1e-12);
    expect(Math.abs(fit.roundnessMm - 0.1)).toBeLessThan(1e-12);
    expect(Math.abs(fit.statistics.rmsMm - 0.05)).toBeLessThan(1e-12);
  });
});

describe("fitAlgebraicCircle", () => {
  it("gives Taubin's circle of the points of Gander, Golub and Strebel", () => {
    // N. Chernov's test program for algebraic circle fits: (4.613933, 2.795209), radius 4.879213.
    const { readings } = gatherWall(pairsInput(publishedCircles[0]!.points));
    const frame = localFrameOf(readings, null);
    const { a, b } = fitAlgebraicCircle(frame);
    const h = frame.origin.hMm + frame.originRest.hMm + frame.scaleMm * a;
    const v = frame.origin.vMm + frame.originRest.vMm + frame.scaleMm * b;
    expect(Math.abs(h - 4.613933)).toBeLessThan(6e-7);
    expect(Math.abs(v - 2.795209)).toBeLessThan(6e-7);
  });
});
