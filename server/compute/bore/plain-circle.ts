import { taubinCentre } from "./algebraic-circle.ts";
import type { WallSolution } from "./solve-wall.ts";
import type { WallReadings } from "./wall-readings.ts";

/** A start is taken only where the points' least rms spread, in any direction, is this share of their reach or more. */
const spreadMin = 1e-2;
/** Their reach in number spacings, and the range of it in mm, for which no sum of fourth powers comes to harm. */
const spacingsMin = 1e4;
const reachRange = { min: 1e-60, max: 1e60 };
const iterationsMax = 12;
/** A column that keeps less than this of its square beside the other is left to the general iteration. */
const pivotMin = 1e-8;
/** As in the general iteration: what only rounding can still win, relative to the points' extent. */
const settledChange = 1e-13;
const settledStep = 1e-6;
const roundingShare = 1e-13;
const residualRounding = 4 * Number.EPSILON;

const model = { tangent: 0, free: "nothing" } as const;
const upright = { h: 0, v: 0 };

/** Where the iteration begins. Lengths in mm, about the origin (hMm, vMm), which is the points' weighted mean. */
export interface PlainCircleStart {
  readonly hMm: number;
  readonly vMm: number;
  /** (smallest u ÷ uᵢ)²; null where all are 1. */
  readonly weight: readonly number[] | null;
  readonly weightSum: number;
  /** u² where the weight is 1; 1 where nothing is stated. */
  readonly unitVarianceMm2: number;
  /** Taubin's centre and radius. */
  readonly a: number;
  readonly b: number;
  readonly radiusMm: number;
  /** Root mean square distance from the origin. */
  readonly extentMm: number;
  /** Spacing of numbers at the largest coordinate. */
  readonly spacingMm: number;
}

/**
 * Start of `solvePlainCircle`, or null where these points are not plainly spread in two directions, well above the
 * spacing of numbers: then the general path judges them. A start proves that they are neither coincident nor
 * collinear: the largest distance from any line is at least the rms spread about the weighted mean. Linear.
 */
export function startPlainCircle({ hMm, vMm, uMm }: WallReadings): PlainCircleStart | null {
  const n = hMm.length;
  const { least: leastMm, most: mostMm } = uMm === null ? { least: 1, most: 1 } : rangeOf(uMm);
  const weight = uMm === null || leastMm === mostMm ? null : uMm.map((u) => (leastMm / u) ** 2);
  let weightSum = 0;
  let meanH = 0;
  let meanV = 0;
  let largest = 0;
  for (let i = 0; i < n; i++) {
    const w = weight === null ? 1 : weight[i]!;
    const h = hMm[i]!;
    const v = vMm[i]!;
    weightSum += w;
    meanH += w * h;
    meanV += w * v;
    if (Math.abs(h) > largest) largest = Math.abs(h);
    if (Math.abs(v) > largest) largest = Math.abs(v);
  }
  meanH /= weightSum;
  meanV /= weightSum;
  let xx = 0;
  let xy = 0;
  let yy = 0;
  let xs = 0;
  let ys = 0;
  let ss = 0;
  let reachSquare = 0;
  for (let i = 0; i < n; i++) {
    const w = weight === null ? 1 : weight[i]!;
    const x = hMm[i]! - meanH;
    const y = vMm[i]! - meanV;
    const square = x * x + y * y;
    xx += w * x * x;
    xy += w * x * y;
    yy += w * y * y;
    xs += w * x * square;
    ys += w * y * square;
    ss += w * square * square;
    if (square > reachSquare) reachSquare = square;
  }
  const reach = Math.sqrt(reachSquare);
  const spacingMm = largest * Number.EPSILON;
  const inRange = reach > reachRange.min && reach < reachRange.max && reach > spacingsMin * spacingMm;
  // det ÷ trace is at most the smaller eigenvalue.
  if (!inRange || !(xx * yy - xy * xy > (spreadMin * reach) ** 2 * weightSum * (xx + yy))) return null;
  const k = 1 / weightSum;
  const { a, b } = taubinCentre(xx * k, xy * k, yy * k, xs * k, ys * k, ss * k);
  const extentSquare = (xx + yy) * k;
  const radiusMm = Math.sqrt(a * a + b * b + extentSquare);
  if (!Number.isFinite(radiusMm)) return null;
  return {
    hMm: meanH,
    vMm: meanV,
    weight,
    weightSum,
    unitVarianceMm2: leastMm * leastMm,
    a,
    b,
    radiusMm,
    extentMm: Math.sqrt(extentSquare),
    spacingMm,
  };
}

/**
 * The circle in one plane, without taper, tilt or outlier rule: minimises Σ w(|p − c| − R)², R eliminated as the mean
 * distance, by Newton's method with the full second derivative of the two unknowns that remain, solved in closed form.
 * The same problem, start, steps and stop as `fitSurface`: a step that would change the residuals by rounding only,
 * at the very place answered, and that no longer shrinks. One loop over the points an iteration, on numbers alone;
 * sums are taken about the last iteration's means, so that freeing the columns of theirs costs no digits.
 * Cofactors (JᵀWJ)⁻¹ as in `cofactorsOf`. Null where anything is out of the ordinary: no descent, no positive second
 * derivative, a weakly determined centre, no end in 12 iterations. Then the general path decides and says why.
 */
export function solvePlainCircle({ hMm, vMm }: WallReadings, start: PlainCircleStart): WallSolution | null {
  const { weight, weightSum, extentMm, unitVarianceMm2 } = start;
  const n = hMm.length;
  const residualsMm = new Array<number>(n);
  const changeMm2 = (settledChange * extentMm) ** 2 * weightSum;
  let { a, b } = start;
  // For weighted sums about the origin the mean direction is −c/R and the mean distance R, but for the scatter.
  let meanX = -a / start.radiusMm;
  let meanY = -b / start.radiusMm;
  let meanExcess = (extentMm * extentMm) / (start.radiusMm + Math.sqrt(a * a + b * b));
  let lastLength = Infinity;
  let lastObjective = Infinity;
  for (let iterations = 1; iterations <= iterationsMax; iterations++) {
    const originDistance = Math.sqrt(a * a + b * b);
    let e = 0;
    let x = 0;
    let y = 0;
    let ee = 0;
    let ex = 0;
    let ey = 0;
    let xx = 0;
    let xy = 0;
    let yy = 0;
    let bentXX = 0;
    let bentXY = 0;
    let bentYY = 0;
    for (let i = 0; i < n; i++) {
      const w = weight === null ? 1 : weight[i]!;
      const px = hMm[i]! - start.hMm;
      const py = vMm[i]! - start.vMm;
      const qx = px - a;
      const qy = py - b;
      const distance = Math.sqrt(qx * qx + qy * qy);
      const inverse = 1 / distance;
      // |q| − |c| keeps its digits this way, however far off the centre lies.
      const excess = (px * (qx - a) + py * (qy - b)) / (distance + originDistance);
      residualsMm[i] = excess;
      const nx = qx * inverse;
      const ny = qy * inverse;
      const r = excess - meanExcess;
      const dx = nx - meanX;
      const dy = ny - meanY;
      const wr = w * r;
      const wx = w * dx;
      const wy = w * dy;
      e += wr;
      x += wx;
      y += wy;
      ee += wr * r;
      ex += wr * dx;
      ey += wr * dy;
      xx += wx * dx;
      xy += wx * dy;
      yy += wy * dy;
      const bend = wr * inverse;
      bentXX += bend * ny * ny;
      bentXY -= bend * nx * ny;
      bentYY += bend * nx * nx;
    }
    const k = 1 / weightSum;
    const objective = ee - e * e * k;
    const downX = ex - e * x * k;
    const downY = ey - e * y * k;
    const gaussXX = xx - x * x * k;
    const gaussXY = xy - x * y * k;
    const gaussYY = yy - y * y * k;
    meanExcess += e * k;
    meanX += x * k;
    meanY += y * k;
    const radius = originDistance + meanExcess;
    const hessianXX = gaussXX + bentXX;
    const hessianXY = gaussXY + bentXY;
    const hessianYY = gaussYY + bentYY;
    const gaussRest = gaussYY - (gaussXY * gaussXY) / gaussXX;
    const hessianRest = hessianYY - (hessianXY * hessianXY) / hessianXX;
    const descends =
      objective <=
      lastObjective +
        roundingShare * lastObjective +
        2 * residualRounding * extentMm * Math.sqrt(lastObjective * weightSum);
    // Written so that a NaN, from a point on the centre itself, is not determined either.
    const determined =
      gaussXX > pivotMin * weightSum &&
      gaussRest > pivotMin * weightSum &&
      hessianXX > pivotMin * weightSum &&
      hessianRest > pivotMin * weightSum &&
      radius > 0;
    if (!determined || !descends) return null;
    const stepY = (downY - (hessianXY * downX) / hessianXX) / hessianRest;
    const stepX = (downX - hessianXY * stepY) / hessianXX;
    const length = Math.sqrt(stepX * stepX + stepY * stepY) / radius;
    const shrinks = length <= lastLength / 2 && length > Number.EPSILON;
    if (stepX * downX + stepY * downY <= changeMm2 && !shrinks && length <= settledStep) {
      for (let i = 0; i < n; i++) residualsMm[i]! -= meanExcess;
      const vv = 1 / gaussRest;
      const hv = -(gaussXY * vv) / gaussXX;
      const hh = (1 - gaussXY * hv) / gaussXX;
      return {
        centre: { hMm: start.hMm + a, vMm: start.vMm + b },
        radiusMm: radius,
        tangent: 0,
        slope: upright,
        model,
        cofactors: {
          hh: hh * unitVarianceMm2,
          hv: hv * unitVarianceMm2,
          vv: vv * unitVarianceMm2,
          radius:
            (k + meanX * (hh * meanX + hv * meanY) + meanY * (hv * meanX + vv * meanY)) * unitVarianceMm2,
          tangent: 0,
        },
        weightedSquares: objective / unitVarianceMm2,
        evenRingCofactor: 2 * k * unitVarianceMm2,
        residualsMm,
        spacingMm: start.spacingMm,
        iterations,
      };
    }
    a += stepX;
    b += stepY;
    lastLength = length;
    lastObjective = Math.max(0, objective);
  }
  return null;
}

function rangeOf(column: readonly number[]): { readonly least: number; readonly most: number } {
  let least = Infinity;
  let most = -Infinity;
  for (let i = 0; i < column.length; i++) {
    const value = column[i]!;
    if (value < least) least = value;
    if (value > most) most = value;
  }
  return { least, most };
}
