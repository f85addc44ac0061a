import type { Measures } from "./centre-charts.ts";

/** Half-planes ax·δx + ay·δy ≤ reach for the step; the first four are those of a box: right, left, top, bottom. */
export interface StepSides {
  readonly ax: Float64Array;
  readonly ay: Float64Array;
  readonly reach: Float64Array;
  readonly count: number;
}

export interface TangentStep {
  readonly dx: number;
  readonly dy: number;
  /** Least value of max(outer) − min(inner) of the tangent planes on the sides' region: also if stopped early, a lower bound. */
  readonly value: number;
  /** Whether a side pushes: the least value lies on the region's edge. */
  readonly pushed: boolean;
  readonly pivots: number;
  /** Stopped where a constraint was broken that the basis holds already: by rounding, which further pivots only stir. */
  readonly rounded: boolean;
  /** The columns that carry the value, by place: outer, then inner, then the sides. */
  readonly basis: readonly number[];
}

const rows = 4;
const pivotsMax = 400;
/** A constraint broken by less is broken by rounding; all values are of the order of 1. */
const slack = 4e-15;
const pivotMin = 1e-11;

/**
 * Minimises max over outer of (vᵢ + sᵢ·δ) − min over inner of (vⱼ + sⱼ·δ) over the region that the sides bound: the
 * tangents of the criterion at one centre. Solved in its dual, Σλ = 1, Σμ = 1, Σλs − Σμs + Σνa = 0, by the simplex
 * method with four rows (the exchange method of Chebyshev approximation): each pivot brings in the constraint broken
 * most. Every basis gives a lower bound, so that an early stop costs sharpness, never truth. Returns null where the
 * region is empty. O(pivots · (outer + inner + sides)).
 */
export function solveTangentProgram(
  { value, slopeX, slopeY }: Measures,
  outer: Int32Array,
  inner: Int32Array,
  sides: StepSides,
  untilRounding = false,
): TangentStep | null {
  const outerCount = outer.length;
  const points = outerCount + inner.length;
  const columns = points + sides.count;
  const direction = [0, 0, 0, 0];
  // The columns side by side: every pivot looks at all of them.
  const column = new Float64Array(3 * points);
  for (let k = 0; k < points; k++) {
    const i = k < outerCount ? outer[k]! : inner[k - outerCount]!;
    column[3 * k] = value[i]!;
    column[3 * k + 1] = slopeX[i]!;
    column[3 * k + 2] = slopeY[i]!;
  }

  let first = 0;
  for (let k = 1; k < outerCount; k++) if (value[outer[k]!]! > value[outer[first]!]!) first = k;
  let second = 0;
  for (let k = 1; k < inner.length; k++) if (value[inner[k]!]! < value[inner[second]!]!) second = k;
  const spareX = slopeX[outer[first]!]! - slopeX[inner[second]!]!;
  const spareY = slopeY[outer[first]!]! - slopeY[inner[second]!]!;
  const sideX = spareX > 0 ? 1 : 0;
  const sideY = spareY > 0 ? 3 : 2;
  const basis = [first, outerCount + second, points + sideX, points + sideY];
  const costs = [value[outer[first]!]!, -value[inner[second]!]!, -sides.reach[sideX]!, -sides.reach[sideY]!];
  const amount = [1, 1, Math.abs(spareX), Math.abs(spareY)];
  // The inverse of (outer, inner, ±x, ±y), written down: the sides take up what the two points leave.
  const [sx, sy] = [sideX === 0 ? 1 : -1, sideY === 2 ? 1 : -1];
  const [io, ii] = [outer[first]!, inner[second]!];
  const inverse = [1, 0, 0, 0, 0, 1, 0, 0];
  inverse.push(-sx * slopeX[io]!, sx * slopeX[ii]!, sx, 0, -sy * slopeY[io]!, sy * slopeY[ii]!, 0, sy);

  let pivots = 0;
  for (;;) {
    let top = 0;
    let bottom = 0;
    let px = 0;
    let py = 0;
    for (let row = 0; row < rows; row++) {
      const c = costs[row]!;
      top += c * inverse[row * rows]!;
      bottom += c * inverse[row * rows + 1]!;
      px += c * inverse[row * rows + 2]!;
      py += c * inverse[row * rows + 3]!;
    }
    // π = (top, bottom, −δ): top bounds the outer tangents, −bottom the inner ones.
    let worst = slack;
    let enter = -1;
    for (let k = 0, at = 0; k < outerCount; k++, at += 3) {
      const broken = column[at]! - column[at + 1]! * px - column[at + 2]! * py - top;
      if (broken > worst) {
        worst = broken;
        enter = k;
      }
    }
    for (let k = outerCount, at = 3 * outerCount; k < points; k++, at += 3) {
      const broken = column[at + 1]! * px + column[at + 2]! * py - column[at]! - bottom;
      if (broken > worst) {
        worst = broken;
        enter = k;
      }
    }
    for (let k = points; k < columns; k++) {
      const s = k - points;
      const broken = -sides.ax[s]! * px - sides.ay[s]! * py - sides.reach[s]!;
      if (broken > worst) [worst, enter] = [broken, k];
    }
    const rounded = untilRounding && enter >= 0 && basis.includes(enter);
    if (enter < 0 || rounded || pivots === pivotsMax) {
      let total = 0;
      let pushed = false;
      for (let row = 0; row < rows; row++) {
        total += costs[row]! * amount[row]!;
        if (basis[row]! >= points && amount[row]! > pivotMin) pushed = true;
      }
      return { dx: -px, dy: -py, value: total, pushed, pivots, rounded, basis };
    }
    pivots++;
    // The column that enters: 1 in the row of its kind, its slopes, and its cost.
    const isPoint = enter < points;
    const side = enter - points;
    const sign = enter < outerCount ? 1 : -1;
    const e0 = enter < outerCount ? 1 : 0;
    const e1 = isPoint ? 1 - e0 : 0;
    const e2 = isPoint ? sign * column[3 * enter + 1]! : sides.ax[side]!;
    const e3 = isPoint ? sign * column[3 * enter + 2]! : sides.ay[side]!;
    const cost = isPoint ? sign * column[3 * enter]! : -sides.reach[side]!;
    let leave = -1;
    let ratio = Infinity;
    for (let row = 0; row < rows; row++) {
      const at = row * rows;
      const d = inverse[at]! * e0 + inverse[at + 1]! * e1 + inverse[at + 2]! * e2 + inverse[at + 3]! * e3;
      direction[row] = d;
      if (d <= pivotMin) continue;
      const next = amount[row]! / d;
      if (next < ratio || (next === ratio && d > direction[leave]!)) [ratio, leave] = [next, row];
    }
    // The dual grows without bound: no step keeps to all sides.
    if (leave < 0) return null;
    const pivot = direction[leave]!;
    for (let k = 0; k < rows; k++) inverse[leave * rows + k]! /= pivot;
    for (let row = 0; row < rows; row++) {
      if (row === leave) continue;
      const d = direction[row]!;
      amount[row] = Math.max(0, amount[row]! - ratio * d);
      for (let k = 0; k < rows; k++) inverse[row * rows + k]! -= d * inverse[leave * rows + k]!;
    }
    amount[leave] = ratio;
    basis[leave] = enter;
    costs[leave] = cost;
  }
}

/** The points of the basis that a program over `outer` and `inner` ended with. */
export function carriersOf({ basis }: TangentStep, outer: Int32Array, inner: Int32Array) {
  const points = outer.length + inner.length;
  return {
    outer: Int32Array.from(basis.filter((k) => k < outer.length).map((k) => outer[k]!)),
    inner: Int32Array.from(
      basis.filter((k) => k >= outer.length && k < points).map((k) => inner[k - outer.length]!),
    ),
  };
}
