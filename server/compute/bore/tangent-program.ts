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
): TangentStep | null {
  const outerCount = outer.length;
  const points = outerCount + inner.length;
  const columns = points + sides.count;
  const basis = new Int32Array(rows);
  const amount = new Float64Array(rows);
  const inverse = new Float64Array(rows * rows);
  const entering = new Float64Array(rows);
  const direction = new Float64Array(rows);
  const cost = (k: number) =>
    k < outerCount
      ? value[outer[k]!]!
      : k < points
        ? -value[inner[k - outerCount]!]!
        : -sides.reach[k - points]!;

  let first = 0;
  for (let k = 1; k < outerCount; k++) if (value[outer[k]!]! > value[outer[first]!]!) first = k;
  let second = 0;
  for (let k = 1; k < inner.length; k++) if (value[inner[k]!]! < value[inner[second]!]!) second = k;
  const spareX = slopeX[outer[first]!]! - slopeX[inner[second]!]!;
  const spareY = slopeY[outer[first]!]! - slopeY[inner[second]!]!;
  const sideX = spareX > 0 ? 1 : 0;
  const sideY = spareY > 0 ? 3 : 2;
  basis.set([first, outerCount + second, points + sideX, points + sideY]);
  amount.set([1, 1, Math.abs(spareX), Math.abs(spareY)]);
  // The inverse of (outer, inner, ±x, ±y), written down: the sides take up what the two points leave.
  const [sx, sy] = [sideX === 0 ? 1 : -1, sideY === 2 ? 1 : -1];
  const [io, ii] = [outer[first]!, inner[second]!];
  inverse.set([1, 0, 0, 0, 0, 1, 0, 0]);
  inverse.set([-sx * slopeX[io]!, sx * slopeX[ii]!, sx, 0, -sy * slopeY[io]!, sy * slopeY[ii]!, 0, sy], 8);

  let pivots = 0;
  for (;;) {
    let top = 0;
    let bottom = 0;
    let px = 0;
    let py = 0;
    for (let row = 0; row < rows; row++) {
      const c = cost(basis[row]!);
      top += c * inverse[row * rows]!;
      bottom += c * inverse[row * rows + 1]!;
      px += c * inverse[row * rows + 2]!;
      py += c * inverse[row * rows + 3]!;
    }
    // π = (top, bottom, −δ): top bounds the outer tangents, −bottom the inner ones.
    let worst = slack;
    let enter = -1;
    for (let k = 0; k < outerCount; k++) {
      const i = outer[k]!;
      const broken = value[i]! - slopeX[i]! * px - slopeY[i]! * py - top;
      if (broken > worst) [worst, enter] = [broken, k];
    }
    for (let k = outerCount; k < points; k++) {
      const j = inner[k - outerCount]!;
      const broken = slopeX[j]! * px + slopeY[j]! * py - value[j]! - bottom;
      if (broken > worst) [worst, enter] = [broken, k];
    }
    for (let k = points; k < columns; k++) {
      const s = k - points;
      const broken = -sides.ax[s]! * px - sides.ay[s]! * py - sides.reach[s]!;
      if (broken > worst) [worst, enter] = [broken, k];
    }
    if (enter < 0 || pivots === pivotsMax) {
      let total = 0;
      let pushed = false;
      for (let row = 0; row < rows; row++) {
        total += cost(basis[row]!) * amount[row]!;
        if (basis[row]! >= points && amount[row]! > pivotMin) pushed = true;
      }
      return { dx: -px, dy: -py, value: total, pushed, pivots };
    }
    pivots++;
    fillColumn(enter);
    let leave = -1;
    let ratio = Infinity;
    for (let row = 0; row < rows; row++) {
      let d = 0;
      for (let k = 0; k < rows; k++) d += inverse[row * rows + k]! * entering[k]!;
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
  }

  function fillColumn(k: number): void {
    if (k < outerCount) {
      const i = outer[k]!;
      entering.set([1, 0, slopeX[i]!, slopeY[i]!]);
    } else if (k < points) {
      const j = inner[k - outerCount]!;
      entering.set([0, 1, -slopeX[j]!, -slopeY[j]!]);
    } else {
      entering.set([0, 0, sides.ax[k - points]!, sides.ay[k - points]!]);
    }
  }
}
