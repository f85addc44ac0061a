import type { AxisDeviations } from "../axis/axis-result.ts";
import type { AxisStation } from "../axis/axis-input.ts";
import { deviationsFromAxis } from "../axis/deviations-from-axis.ts";
import { publishedLines, type PrintedFigure, type PublishedLine } from "../axis/published-cases.ts";
import type { SelfCase } from "./self-case.ts";

const figureNames = [
  "at0",
  "slope",
  "uAt0",
  "uSlope",
  "covariance",
  "correlation",
  "chiSquare",
  "scatter",
] as const;
type LineFigure = (typeof figureNames)[number];

/** Straight lines in print, fitted as the h line of an axis through as many stations. */
export const lineCases: readonly SelfCase[] = publishedLines.map((line) => ({
  id: `line-${line.id}`,
  area: "axis-deviation",
  source: line.source,
  figures: figureNames.flatMap((figure) => {
    const printed: PrintedFigure | undefined = line[figure];
    return printed ? [{ figure, expected: printed.value, tolerance: printed.within }] : [];
  }),
  compute: () => figuresOf(fitPublished(line)),
}));

function fitPublished({ x, y, u }: PublishedLine): AxisDeviations {
  const stations = x.map((zMm, k): AxisStation => {
    const variance = u ? (u[k] ?? Number.NaN) ** 2 : null;
    return {
      zMm,
      centre: { hMm: y[k] ?? Number.NaN, vMm: 0 },
      covariance: variance === null ? null : { hhMm2: variance, hvMm2: 0, vvMm2: variance },
      dof: null,
      target: { hMm: 0, vMm: 0 },
      targetUncertainty: { hMm: 0, vMm: 0 },
      tolerance: null,
    };
  });
  const reference = x.map((_, index) => index);
  return deviationsFromAxis({ method: "least_squares", reference, stations, level: 0.95, rule: "guarded" });
}

function figuresOf({
  axis: { h, covariance, chiSquare, scatterMm },
}: AxisDeviations): Record<LineFigure, number> {
  const [[aa, ab], [, bb]] = covariance?.h ?? [
    [Number.NaN, Number.NaN],
    [Number.NaN, Number.NaN],
  ];
  return {
    at0: h.at0Mm,
    slope: h.slope,
    uAt0: Math.sqrt(aa),
    uSlope: Math.sqrt(bb),
    covariance: ab,
    correlation: ab / Math.sqrt(aa * bb),
    chiSquare: chiSquare?.h ?? Number.NaN,
    scatter: scatterMm?.h ?? Number.NaN,
  };
}
