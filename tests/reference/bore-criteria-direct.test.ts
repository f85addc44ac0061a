import { expect } from "vitest";
import { fitBore } from "../../server/compute/bore/fit-bore.ts";
import { fitByCriterion } from "../../server/compute/bore/fit-criterion.ts";
import { localFrameOf } from "../../server/compute/bore/local-frame.ts";
import { solveEllipse } from "../../server/compute/bore/solve-ellipse.ts";
import { pairsInput } from "../support/bore-inputs.ts";
import { figuresOfCriteria } from "./criterion-figures.ts";
import { describeCases, mismatches } from "./read-cases.ts";

interface Circle {
  readonly points: readonly [number, number][];
}

describeCases<Circle, object>("bore fits: circle-circumscribed", ["circle-circumscribed"], (reference) => {
  const { centre, diameterMm } = fitByCriterion(pairsInput(reference.input.points), "minimum_circumscribed");
  const got = { center: [centre.hMm, centre.vMm], radius: diameterMm! / 2 };
  expect(mismatches(reference, got)).toEqual([]);
});

describeCases<Circle, object>("bore fits: circle-extremal", ["circle-extremal"], (reference) => {
  const input = pairsInput(reference.input.points);
  const got = figuresOfCriteria((method) => {
    const { centre, diameterMm, roundnessMm } =
      method === "least_squares" ? fitBore(input) : fitByCriterion(input, method);
    return { h: centre.hMm, v: centre.vMm, diameter: diameterMm!, roundness: roundnessMm };
  });
  expect(mismatches(reference, got)).toEqual([]);
});

// By the fit alone: the readings cover less of the ellipse than the service asks for.
describeCases<Circle, object>("bore fits: ellipse-geometric", ["ellipse-geometric"], (reference) => {
  const { input } = reference;
  const columns = { hMm: input.points.map(([h]) => h), vMm: input.points.map(([, v]) => v) };
  const readings = { ...columns, zMm: null, uMm: null };
  const solution = solveEllipse(readings, localFrameOf(readings, null), null, "points");
  const { centre, majorMm, minorMm, axisRad, residualsMm } = solution;
  const got = {
    center: [centre.hMm, centre.vMm],
    semi_axes: [majorMm, minorMm],
    angle: axisRad,
    rss: residualsMm.reduce((sum, residual) => sum + residual * residual, 0),
  };
  expect(mismatches(reference, got)).toEqual([]);
});
