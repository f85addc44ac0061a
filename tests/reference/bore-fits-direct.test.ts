import { expect } from "vitest";
import { fitBore } from "../../server/compute/bore/fit-bore.ts";
import { pairsInput } from "../support/bore-inputs.ts";
import { describeCases, mismatches } from "./read-cases.ts";

interface Circle {
  readonly points: readonly [number, number][];
}

describeCases<Circle, object>("bore fits: circle-least-squares", ["circle-least-squares"], (reference) => {
  const { points } = reference.input;
  const { centre, diameterMm, residualsMm, covariance, statistics } = fitBore(pairsInput(points));
  const rss = residualsMm.reduce((sum, residual) => sum + residual * residual, 0);
  // Nothing stated, so the answer's covariance is the cofactors times s².
  const variance = rss / (points.length - 3);
  const { hhMm2, hvMm2, vvMm2 } = covariance!;
  const got = {
    center: [centre.hMm, centre.vMm],
    radius: diameterMm! / 2,
    rss,
    rms: statistics.rmsMm,
    residual_norm: Math.sqrt(rss),
    covariance_center_unit: [
      [hhMm2 / variance, hvMm2 / variance],
      [hvMm2 / variance, vvMm2 / variance],
    ],
  };
  // One case also prints the linear (Kåsa) circle, which is no method of the service.
  expect(mismatches(reference, got).filter(({ field }) => !field.startsWith("linear_"))).toEqual([]);
});

interface Answer {
  readonly center: [number, number];
  readonly radius: number;
  readonly covariance_abr?: number[][];
}

describeCases<Circle, Answer>(
  "bore fits: circle-least-squares, against 50-digit arithmetic",
  ["circle-least-squares"],
  (reference) => {
    const { center, radius, covariance_abr } = reference.recomputed!;
    const { points } = reference.input;
    const { centre, diameterMm, covariance, expandedUncertainty, statistics } = fitBore(pairsInput(points));
    // A thin arc knows its centre less well than its points: dilution is by how much.
    const within =
      4 * Number.EPSILON * statistics.dilution ** 2 * Math.max(radius, ...points.flat().map(Math.abs));
    expect(Math.abs(centre.hMm - center[0])).toBeLessThan(within);
    expect(Math.abs(centre.vMm - center[1])).toBeLessThan(within);
    expect(Math.abs(diameterMm! / 2 - radius)).toBeLessThan(within);
    if (!covariance_abr) return;
    const near = (got: number, wanted: number) => expect(Math.abs(got / wanted - 1)).toBeLessThan(1e-9);
    near(covariance!.hhMm2, covariance_abr[0]![0]!);
    near(covariance!.hvMm2, covariance_abr[0]![1]!);
    near(covariance!.vvMm2, covariance_abr[1]![1]!);
    const { diameterMm: half, factor } = expandedUncertainty!;
    near((half! / factor / 2) ** 2, covariance_abr[2]![2]!);
  },
);
