import { farBends, type Measures } from "./centre-charts.ts";
import type { Region, Rivals } from "./descend-centre.ts";

/** What a region of centres can hold at best, judged from its middle. */
export interface CellBounds {
  /** No centre of the region has a smaller max(outer) − min(inner). */
  readonly lower: number;
  /** By how much the tangents at the middle may pass below or above g, both kinds together. */
  readonly bend: number;
  /** Whether the region is so small beside the distances that tangents say something. */
  readonly usesTangents: boolean;
  /** Values from which an outer rival, and up to which an inner one, can still be extreme somewhere in the region. */
  readonly outerFrom: number;
  readonly innerTo: number;
}

/** Curvature is left out of account only where a region is this much smaller than the distances. */
const tangentShare = 1 / 8;

/**
 * Bounds over the region from the measures of the rivals at its middle. Near chart: a distance never lies below its
 * tangent, and above it by at most size² ÷ 2 distances. Far chart: `farBends`. A part of the rivals gives bounds that
 * hold too, only less close. Linear.
 */
export function boundsOf(region: Region, { outer, inner }: Rivals, measures: Measures): CellBounds {
  const { value, slopeX, slopeY, distance } = measures;
  const { chart, halfX, halfY } = region;
  const near = chart === "near";
  const size = Math.hypot(halfX, halfY);
  const farBend = near ? 0 : farBendOf(region);
  const constant = value.length - 1;
  let lowest = -Infinity;
  for (let k = 0; k < outer.length; k++) {
    const i = outer[k]!;
    const low = value[i]! - Math.abs(slopeX[i]!) * halfX - Math.abs(slopeY[i]!) * halfY;
    if (low > lowest) lowest = low;
  }
  let highest = Infinity;
  let nearest = Infinity;
  for (let k = 0; k < inner.length; k++) {
    const j = inner[k]!;
    if (j === constant) {
      highest = Math.min(highest, 0);
      continue;
    }
    const rise = Math.abs(slopeX[j]!) * halfX + Math.abs(slopeY[j]!) * halfY;
    const d = near ? distance[j]! : 0;
    const high = value[j]! + (near ? Math.min(size, rise + (size * size) / (2 * d)) : rise);
    if (high < highest) highest = high;
  }
  const outerFrom = lowest - farBend;
  const innerTo = highest + farBend;
  if (near) {
    for (let k = 0; k < inner.length; k++) {
      const j = inner[k]!;
      if (j !== constant && distance[j]! < nearest && value[j]! - size <= innerTo) nearest = distance[j]!;
    }
  }
  return {
    lower: outerFrom - innerTo,
    bend: near ? (size * size) / (2 * nearest) : 2 * farBend,
    usesTangents: near ? size <= tangentShare * nearest : halfX <= 2 * tangentShare,
    outerFrom,
    innerTo,
  };
}

/** The rivals that can still be outermost or innermost somewhere in the region. */
export function rivalsLeft(
  region: Region,
  { outer, inner }: Rivals,
  { value, slopeX, slopeY, distance }: Measures,
  { outerFrom, innerTo }: CellBounds,
): Rivals {
  const { chart, halfX, halfY } = region;
  const near = chart === "near";
  const size = Math.hypot(halfX, halfY);
  const farBend = near ? 0 : farBendOf(region);
  const stillOuter = new Int32Array(outer.length);
  let outerCount = 0;
  for (let k = 0; k < outer.length; k++) {
    const i = outer[k]!;
    const rise = Math.abs(slopeX[i]!) * halfX + Math.abs(slopeY[i]!) * halfY;
    const high = near ? Math.min(size, rise + (size * size) / (2 * distance[i]!)) : rise + farBend;
    if (value[i]! + high >= outerFrom) stillOuter[outerCount++] = i;
  }
  const stillInner = new Int32Array(inner.length);
  let innerCount = 0;
  for (let k = 0; k < inner.length; k++) {
    const j = inner[k]!;
    const fall = Math.abs(slopeX[j]!) * halfX + Math.abs(slopeY[j]!) * halfY + farBend;
    if (value[j]! - fall <= innerTo) stillInner[innerCount++] = j;
  }
  return { outer: stillOuter.slice(0, outerCount), inner: stillInner.slice(0, innerCount) };
}

function farBendOf({ y, halfX, halfY }: Region): number {
  const { xx, xy, yy } = farBends(y + halfY);
  return (xx * halfX * halfX + 2 * xy * halfX * halfY + yy * halfY * halfY) / 2;
}
