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
  /** Near chart: no inner rival that can be innermost in the region lies nearer to its middle. */
  readonly nearest: number;
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
    const v = value[i]!;
    // What falls from there on cannot come to lie higher.
    if (v <= lowest) continue;
    const low = v - Math.abs(slopeX[i]!) * halfX - Math.abs(slopeY[i]!) * halfY;
    if (low > lowest) lowest = low;
  }
  let highest = Infinity;
  let nearest = Infinity;
  for (let k = 0; k < inner.length; k++) {
    const j = inner[k]!;
    const v = j === constant ? 0 : value[j]!;
    if (v >= highest) continue;
    if (j === constant) {
      highest = v;
      continue;
    }
    const rise = Math.abs(slopeX[j]!) * halfX + Math.abs(slopeY[j]!) * halfY;
    const high = v + (near ? Math.min(size, rise + (size * size) / (2 * distance[j]!)) : rise);
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
    nearest,
  };
}

/** The bend of a near region of which no inner rival lies nearer to its middle; null where tangents say nothing. */
export function bendWithin({ halfX, halfY }: Region, nearest: number): number | null {
  const size = Math.hypot(halfX, halfY);
  return size <= tangentShare * nearest ? (size * size) / (2 * nearest) : null;
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
    if (value[i]! >= outerFrom) {
      stillOuter[outerCount++] = i;
      continue;
    }
    const rise = Math.abs(slopeX[i]!) * halfX + Math.abs(slopeY[i]!) * halfY;
    const high = near ? Math.min(size, rise + (size * size) / (2 * distance[i]!)) : rise + farBend;
    if (value[i]! + high >= outerFrom) stillOuter[outerCount++] = i;
  }
  const stillInner = new Int32Array(inner.length);
  let innerCount = 0;
  for (let k = 0; k < inner.length; k++) {
    const j = inner[k]!;
    if (value[j]! <= innerTo) {
      stillInner[innerCount++] = j;
      continue;
    }
    const fall = Math.abs(slopeX[j]!) * halfX + Math.abs(slopeY[j]!) * halfY + farBend;
    if (value[j]! - fall <= innerTo) stillInner[innerCount++] = j;
  }
  return {
    outer: outerCount === outer.length ? outer : stillOuter.slice(0, outerCount),
    inner: innerCount === inner.length ? inner : stillInner.slice(0, innerCount),
  };
}

function farBendOf({ y, halfX, halfY }: Region): number {
  const { xx, xy, yy } = farBends(y + halfY);
  return (xx * halfX * halfX + 2 * xy * halfX * halfY + yy * halfY * halfY) / 2;
}
