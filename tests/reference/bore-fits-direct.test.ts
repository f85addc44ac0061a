import { expect } from "vitest";
import type { PointsInput } from "../../server/compute/bore/bore-input.ts";
import { fitBore } from "../../server/compute/bore/fit-bore.ts";
import { describeCases, mismatches } from "./read-cases.ts";

describeCases<{ points: [number, number][] }, object>("fitBore", ["circle-least-squares"], (reference) => {
  const fit = fitBore({
    form: "points",
    seen: "downstream",
    level: 0.95,
    readingUncertaintyMm: null,
    nominalDiameterMm: null,
    taper: null,
    outliers: null,
    points: reference.input.points.map(([hMm, vMm]) => ({ hMm, vMm, zMm: null, uMm: null })),
  });
  const c = fit.centre;
  const e = reference.recomputed!;
  console.log(
    reference.id,
    fit.statistics.iterations,
    (c.hMm - e.center[0]) / e.radius,
    (c.vMm - e.center[1]) / e.radius,
    (fit.diameterMm! / 2 - e.radius) / e.radius,
    fit.statistics.dilution,
    fit.arc.coverageDeg,
    fit.warnings.map((w) => w.code).join(),
  );
});
