import type { PlaneVector } from "../plane.ts";

const wholeTurn = 2 * Math.PI;

interface Points {
  readonly hMm: ArrayLike<number>;
  readonly vMm: ArrayLike<number>;
}

/**
 * How much of the ring the readings in use cover, as seen from `centre`: 360° less the largest gap between neighbours
 * in clock angle. Linear in the number of readings, in whatever order they come.
 */
export function arcCoverage(
  points: Points,
  used: readonly boolean[],
  centre: PlaneVector,
): { readonly coverageDeg: number; readonly largestGapDeg: number } {
  const gapRad =
    gapInOrder(points, used, centre, 1) ??
    gapInOrder(points, used, centre, -1) ??
    gapBySectors(points, used, centre);
  const largestGapDeg = Math.min(360, (gapRad * 180) / Math.PI);
  return { coverageDeg: 360 - largestGapDeg, largestGapDeg };
}

/**
 * Largest gap of readings that follow one another clockwise (`side` 1) or anticlockwise (−1) once round, as they are
 * mostly taken; null where they do not. Angles are compared by h/(|h| + |v|) of their quadrant, which rises with the
 * angle, and gaps by the same of (cross, dot) of the two directions: one arctangent in all.
 */
function gapInOrder(
  { hMm, vMm }: Points,
  used: readonly boolean[],
  centre: PlaneVector,
  side: 1 | -1,
): number | null {
  const n = hMm.length;
  let first = 0;
  while (first < n && !used[first]!) first++;
  let beforeH = side * (hMm[first]! - centre.hMm);
  let beforeV = vMm[first]! - centre.vMm;
  let before = quadrantAngle(beforeH, beforeV);
  let turns = 0;
  let widest = -1;
  let widestCross = 0;
  let widestDot = 1;
  // Ends at the first reading again: the last gap is that across the start.
  for (let i = first + 1; i <= n; i++) {
    if (i < n && !used[i]!) continue;
    const at = i < n ? i : first;
    const h = side * (hMm[at]! - centre.hMm);
    const v = vMm[at]! - centre.vMm;
    const angle = quadrantAngle(h, v);
    const step = angle - before;
    if (step < 0) turns++;
    // A reading at the centre has no direction: its angle is no number.
    if (turns > 1 || Number.isNaN(step)) return null;
    const overHalf = (step < 0 ? step + 4 : step) >= 2;
    const cross = beforeV * h - beforeH * v;
    const dot = beforeH * h + beforeV * v;
    // Two directions apart by rounding only must not count as a whole turn.
    const sound = overHalf ? Math.min(cross, 0) : Math.max(cross, 0);
    const gap = quadrantAngle(sound, dot) || (overHalf ? 4 : 0);
    if (gap > widest) {
      widest = gap;
      widestCross = sound;
      widestDot = dot;
    }
    beforeH = h;
    beforeV = v;
    before = angle;
  }
  if (turns === 0) return wholeTurn;
  const gapRad = Math.atan2(widestCross, widestDot);
  return widest >= 2 && gapRad <= 0 ? gapRad + wholeTurn : gapRad;
}

/** Rises with the angle of (sin, cos) from 0 to 4 a turn, a quarter turn each 1; NaN for no direction. */
function quadrantAngle(sin: number, cos: number): number {
  const share = sin / (Math.abs(sin) + Math.abs(cos));
  if (cos < 0) return 2 - share;
  return share < 0 ? 4 + share : share;
}

/**
 * Largest gap of readings in any order: the turn is cut into as many sectors as readings, and since the largest gap is
 * never shorter than a sector, it lies between the last reading of one sector and the first of a later one.
 */
function gapBySectors({ hMm, vMm }: Points, used: readonly boolean[], centre: PlaneVector): number {
  const sectors = hMm.length;
  const first = new Array<number>(sectors).fill(Infinity);
  const last = new Array<number>(sectors).fill(-Infinity);
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
  return Math.max(gapRad, least + wholeTurn - before);
}
