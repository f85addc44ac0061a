import type { PlaneVector } from "../plane.ts";
import { columns } from "./columns.ts";
import type { WallReadings } from "./wall-readings.ts";

const wholeTurn = 2 * Math.PI;

/**
 * How much of the ring the readings in use cover, as seen from `centre`: 360° less the largest gap between neighbours
 * in clock angle. Linear: the turn is cut into as many sectors as readings, and since the largest gap is never
 * shorter than a sector, it lies between the last reading of one sector and the first of a later one.
 */
export function arcCoverage(
  { hMm, vMm }: WallReadings,
  used: readonly boolean[],
  centre: PlaneVector,
): { readonly coverageDeg: number; readonly largestGapDeg: number } {
  const sectors = hMm.length;
  const [first, last] = columns(sectors, 2) as [Float64Array, Float64Array];
  first.fill(Infinity);
  last.fill(-Infinity);
  for (let i = 0; i < hMm.length; i++) {
    if (!used[i]!) continue;
    const clockRad = Math.atan2(hMm[i]! - centre.hMm, vMm[i]! - centre.vMm);
    const sector = Math.min(sectors - 1, Math.floor(((clockRad + Math.PI) / wholeTurn) * sectors));
    if (clockRad < first[sector]!) first[sector] = clockRad;
    if (clockRad > last[sector]!) last[sector] = clockRad;
  }
  let least = Infinity;
  let before = NaN;
  let gapRad = 0;
  for (let sector = 0; sector < sectors; sector++) {
    if (first[sector] === Infinity) continue;
    if (least === Infinity) least = first[sector]!;
    else gapRad = Math.max(gapRad, first[sector]! - before);
    before = last[sector]!;
  }
  gapRad = Math.max(gapRad, least + wholeTurn - before);
  const largestGapDeg = Math.min(360, (gapRad * 180) / Math.PI);
  return { coverageDeg: 360 - largestGapDeg, largestGapDeg };
}
