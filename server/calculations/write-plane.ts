import type { Converter } from "../../shared/units.ts";
import type { PlaneCovariance, PlaneVector } from "../compute/plane.ts";

/** A plane vector in the caller's unit. */
export function writeVector({ hMm, vMm }: PlaneVector, offset: Converter): { h: number; v: number } {
  return { h: offset.fromMm(hMm), v: offset.fromMm(vMm) };
}

/** A covariance as 2 × 2 numbers in the square of the caller's unit. */
export function writeCovariance({ hhMm2, hvMm2, vvMm2 }: PlaneCovariance, offset: Converter): number[][] {
  const hv = offset.squareFromMm2(hvMm2);
  return [
    [offset.squareFromMm2(hhMm2), hv],
    [hv, offset.squareFromMm2(vvMm2)],
  ];
}
