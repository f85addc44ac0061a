import type { Converter } from "../../shared/units.ts";
import type { PlaneVector } from "../compute/plane.ts";

/** A plane vector as sent, in millimetres. */
export function readVector(
  { h, v }: { readonly h: number; readonly v: number },
  offset: Converter,
): PlaneVector {
  return { hMm: offset.toMm(h), vMm: offset.toMm(v) };
}
