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
  const cross =
    fits.h.crossGains && fits.v.crossGains ? { h: fits.h.crossGains, v: fits.v.crossGains } : null;
  const rows: Rows = {
    h,
    v,
    cross: cross && { hOfV: new Float64Array(last + 1), vOfH: new Float64Array(last + 1) },
  };
  return (zMm, source, place) => {
    // The last row is the station's own observation; a reference station has it among the others already.
    writeSource(table, last, source);
    writeSensitivities(fits.h.gains, zMm, place, h);
    writeSensitivities(fits.v.gains, zMm, place, v);
    if (cross && rows.cross) {
      writeAxisPart(cross.h, zMm, rows.cross.hOfV);
      writeAxisPart(cross.v, zMm, rows.cross.vOfH);
    }
    const covariance = covarianceOf(table, rows);
    return { covariance, dof: leastDof(table, rows, covariance) };
  };
}

/** Rows of A: of the deviation in each plane, of the observations in that plane, and in the other where it depends on them. */
interface Rows {
  readonly h: Float64Array;
  readonly v: Float64Array;
  readonly cross: { readonly hOfV: Float64Array; readonly vOfH: Float64Array } | null;
}

/** A row of A: +1 for the station's own observation, less the gains of the axis at z. */
function writeSensitivities(gains: LineGains, zMm: number, place: number | null, row: Float64Array): void {
  writeAxisPart(gains, zMm, row);
  row[place ?? row.length - 1]! += 1;
}

/** Less the gains of the axis at z; 0 for the station's own observation. */
function writeAxisPart(gains: LineGains, zMm: number, row: Float64Array): void {
  const last = row.length - 1;
  writeGainsAt(gains, zMm, row.subarray(0, last));
  for (let j = 0; j < last; j += 1) row[j] = -row[j]!;
  row[last] = 0;
}

function covarianceOf(
  { measuredHH, measuredHV, measuredVV, targetH, targetV }: SourceTable,
  { h, v, cross }: Rows,
): PlaneCovariance {
  let hhMm2 = 0;
  let hvMm2 = 0;
  let vvMm2 = 0;
  for (let j = 0; j < h.length; j += 1) {
    hhMm2 += h[j]! * h[j]! * (measuredHH[j]! + targetH[j]!);
    hvMm2 += h[j]! * v[j]! * measuredHV[j]!;
    vvMm2 += v[j]! * v[j]! * (measuredVV[j]! + targetV[j]!);
  }
  if (!cross) return { hhMm2, hvMm2, vvMm2 };
  const { hOfV, vOfH } = cross;
  for (let j = 0; j < h.length; j += 1) {
    const totalHH = measuredHH[j]! + targetH[j]!;
    const totalVV = measuredVV[j]! + targetV[j]!;
    const mixed = measuredHV[j]!;
    hhMm2 += hOfV[j]! * (2 * h[j]! * mixed + hOfV[j]! * totalVV);
    vvMm2 += vOfH[j]! * (2 * v[j]! * mixed + vOfH[j]! * totalHH);
    hvMm2 += h[j]! * totalHH * vOfH[j]! + hOfV[j]! * (mixed * vOfH[j]! + totalVV * v[j]!);
  }
  return { hhMm2: Math.max(0, hhMm2), hvMm2, vvMm2: Math.max(0, vvMm2) };
}

function leastDof(table: SourceTable, rows: Rows, { hhMm2, hvMm2, vvMm2 }: PlaneCovariance): number | null {
  if (table.dof.every((dof) => dof === Infinity)) return null;
  const worst = Math.atan2(2 * hvMm2, hhMm2 - vvMm2) / 2;
  const along = (alongH: number, alongV: number) => dofAlong(table, rows, alongH, alongV) ?? Infinity;
  const least = Math.min(
    along(1, 0),
    along(0, 1),
    hvMm2 === 0 ? Infinity : along(Math.cos(worst), Math.sin(worst)),
  );
  return least === Infinity ? null : least;
}

/** Degrees of freedom of the deviation's variance along one direction of the cross-section. */
function dofAlong(table: SourceTable, { h, v, cross }: Rows, alongH: number, alongV: number): number | null {
  const { measuredHH, measuredHV, measuredVV, targetH, targetV, isScatter, dof } = table;
  const count = h.length;
  const shares = new Float64Array(count + 2);
  // After the sources: the scatter, one estimate that stands for many of them, and the targets, which count as known.
  for (let j = 0; j < count; j += 1) {
    const a = alongH * h[j]! + (cross ? alongV * cross.vOfH[j]! : 0);
    const b = alongV * v[j]! + (cross ? alongH * cross.hOfV[j]! : 0);
    const share = a * a * measuredHH[j]! + 2 * a * b * measuredHV[j]! + b * b * measuredVV[j]!;
    shares[isScatter[j] ? count : j]! += share;
    shares[count + 1]! += a * a * targetH[j]! + b * b * targetV[j]!;
  }
  return welchSatterthwaite(shares, dof);
}
