import type { PlaneCovariance } from "../plane.ts";
import { welchSatterthwaite } from "../statistics/welch-satterthwaite.ts";
import type { ErrorSource } from "./error-source.ts";
import type { PlaneFits } from "./fit-plane.ts";
import { writeGainsAt, type LineGains } from "./line-gains.ts";
import { tabulateSources, writeSource, type SourceTable } from "./source-table.ts";

/** Covariance of one deviation, and its effective degrees of freedom (null: infinite). */
export interface PropagatedError {
  readonly covariance: PlaneCovariance;
  readonly dof: number | null;
}

/**
 * Covariance of a deviation, A·Σ·Aᵀ: the station's own observation less the axis, which for a reference station holds
 * that observation too. Written as a sum of squares, so that no variance comes out below 0. Degrees of freedom by
 * Welch–Satterthwaite along h, along v and along the worst direction; the least of the three, the cautious one, serves
 * both factors.
 *
 * Returns the function that takes a station: its z, the error of its observation, and its place among `references`
 * (null for a station that did not set the axis). O(reference stations) a station.
 */
export function propagateErrors(
  fits: PlaneFits,
  references: readonly ErrorSource[],
): (zMm: number, source: ErrorSource, place: number | null) => PropagatedError {
  const last = references.length;
  const table = tabulateSources(references);
  const h = new Float64Array(last + 1);
  const v = new Float64Array(last + 1);
  return (zMm, source, place) => {
    // The last row is the station's own observation; a reference station has it among the others already.
    writeSource(table, last, source);
    writeSensitivities(fits.h.gains, zMm, place, h);
    writeSensitivities(fits.v.gains, zMm, place, v);
    const covariance = covarianceOf(table, h, v);
    return { covariance, dof: leastDof(table, h, v, covariance) };
  };
}

/** A row of A: +1 for the station's own observation, less the gains of the axis at z. */
function writeSensitivities(gains: LineGains, zMm: number, place: number | null, row: Float64Array): void {
  const last = row.length - 1;
  writeGainsAt(gains, zMm, row.subarray(0, last));
  for (let j = 0; j < last; j += 1) row[j] = -row[j]!;
  row[last] = 0;
  row[place ?? last]! += 1;
}

function covarianceOf(
  { measuredHH, measuredHV, measuredVV, targetH, targetV }: SourceTable,
  h: Float64Array,
  v: Float64Array,
): PlaneCovariance {
  let hhMm2 = 0;
  let hvMm2 = 0;
  let vvMm2 = 0;
  for (let j = 0; j < h.length; j += 1) {
    hhMm2 += h[j]! * h[j]! * (measuredHH[j]! + targetH[j]!);
    hvMm2 += h[j]! * v[j]! * measuredHV[j]!;
    vvMm2 += v[j]! * v[j]! * (measuredVV[j]! + targetV[j]!);
  }
  return { hhMm2, hvMm2, vvMm2 };
}

function leastDof(
  table: SourceTable,
  h: Float64Array,
  v: Float64Array,
  { hhMm2, hvMm2, vvMm2 }: PlaneCovariance,
): number | null {
  if (table.dof.every((dof) => dof === Infinity)) return null;
  const worst = Math.atan2(2 * hvMm2, hhMm2 - vvMm2) / 2;
  const along = (alongH: number, alongV: number) => dofAlong(table, h, v, alongH, alongV) ?? Infinity;
  const least = Math.min(
    along(1, 0),
    along(0, 1),
    hvMm2 === 0 ? Infinity : along(Math.cos(worst), Math.sin(worst)),
  );
  return least === Infinity ? null : least;
}

/** Degrees of freedom of the deviation's variance along one direction of the cross-section. */
function dofAlong(
  table: SourceTable,
  h: Float64Array,
  v: Float64Array,
  alongH: number,
  alongV: number,
): number | null {
  const { measuredHH, measuredHV, measuredVV, targetH, targetV, isScatter, dof } = table;
  const count = h.length;
  const shares = new Float64Array(count + 2);
  // After the sources: the scatter, one estimate that stands for many of them, and the targets, which count as known.
  for (let j = 0; j < count; j += 1) {
    const a = alongH * h[j]!;
    const b = alongV * v[j]!;
    const share = a * a * measuredHH[j]! + 2 * a * b * measuredHV[j]! + b * b * measuredVV[j]!;
    shares[isScatter[j] ? count : j]! += share;
    shares[count + 1]! += a * a * targetH[j]! + b * b * targetV[j]!;
  }
  return welchSatterthwaite(shares, dof);
}
