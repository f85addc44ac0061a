import type { WallFit } from "../bore/bore-fit.ts";
import { fitBore } from "../bore/fit-bore.ts";
import { publishedCircles, type CircleFigure, type PublishedCircle } from "../bore/published-cases.ts";
import type { SelfCase } from "./self-case.ts";

/** Orthogonal least-squares circles in print. */
export const circleCases: readonly SelfCase[] = publishedCircles.map((circle) => ({
  id: `circle-${circle.id}`,
  area: "bore-fit",
  source: circle.source,
  figures: (Object.keys(circle.expected) as CircleFigure[]).map((figure) => ({
    figure,
    expected: circle.expected[figure] ?? Number.NaN,
    tolerance: circle.tolerance[figure] ?? 0,
  })),
  compute: () => figuresOf(fitPublished(circle)),
}));

function fitPublished({ points }: PublishedCircle): WallFit {
  return fitBore({
    form: "points",
    points: points.map(([hMm, vMm]) => ({ hMm, vMm, zMm: null, uMm: null })),
    readingUncertaintyMm: null,
    nominalDiameterMm: null,
    taper: null,
    outliers: null,
    seen: "downstream",
    level: 0.95,
  });
}

/** The figures that sources print, from an answer for which no uncertainty was stated: its covariance is s² × cofactor. */
function figuresOf({ centre, diameterMm, covariance, statistics }: WallFit): Record<CircleFigure, number> {
  const { readingsUsed, parameters, rmsMm } = statistics;
  const squares = rmsMm * rmsMm * readingsUsed;
  const variance = squares / (readingsUsed - parameters);
  return {
    centreH: centre.hMm,
    centreV: centre.vMm,
    radius: (diameterMm ?? Number.NaN) / 2,
    rms: rmsMm,
    squares,
    cofactorHh: (covariance?.hhMm2 ?? Number.NaN) / variance,
    cofactorHv: (covariance?.hvMm2 ?? Number.NaN) / variance,
    cofactorVv: (covariance?.vvMm2 ?? Number.NaN) / variance,
  };
}
