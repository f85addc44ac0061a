import { ComputeError } from "../compute-error.ts";
import { columns } from "./columns.ts";
import type { WallReadings } from "./wall-readings.ts";

/** Farthest point from the centroid below this × the largest coordinate: one place, as far as numbers can tell. */
const placeRatio = 1e-13;
/** Farthest point from the best line below this × the farthest along it: a line. An arc that flat spans 1e-8 rad. */
const lineRatio = 1e-9;
/** Distances below this many number spacings are rounding. */
const spacings = 4;

/** The readings in use, about their own centroid and at a size near 1, so that no digit is lost to a far origin. */
export interface LocalFrame {
  readonly count: number;
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** In the same scale; null where all lie in one plane. */
  readonly z: Float64Array | null;
  /** (smallest u ÷ uᵢ)²: at most 1. */
  readonly weight: Float64Array;
  /** Origin of the frame, in two parts: their sum has more digits than a number holds. */
  readonly origin: { readonly hMm: number; readonly vMm: number; readonly zMm: number };
  readonly originRest: { readonly hMm: number; readonly vMm: number };
  /** A power of two: scaling by it is exact. */
  readonly scaleMm: number;
  /** u² where the weight is 1; 1 where nothing is stated. */
  readonly unitVarianceMm2: number;
  /** Spacing of numbers at the largest coordinate, mm. */
  readonly spacingMm: number;
}

/** Takes the readings at `indices` (all when null) to their own frame. At least one reading. */
export function localFrameOf(readings: WallReadings, indices: Int32Array | null): LocalFrame {
  const count = indices?.length ?? readings.hMm.length;
  const [x, y, zColumn, weight] = columns(count, 4) as [
    Float64Array,
    Float64Array,
    Float64Array,
    Float64Array,
  ];
  pick(readings.hMm, indices, x);
  pick(readings.vMm, indices, y);
  const largestMm = Math.max(largest(x), largest(y));
  const hMm = centre(x);
  const vMm = centre(y);
  const originRest = { hMm: centre(x), vMm: centre(y) };
  let squares = 0;
  for (let i = 0; i < count; i++) squares += x[i]! * x[i]! + y[i]! * y[i]!;
  const scaleMm = squares > 0 ? 2 ** Math.round(Math.log2(squares / count) / 2) : 1;
  scale(x, scaleMm);
  scale(y, scaleMm);
  const { z, zMm } = planes(readings.zMm, indices, scaleMm, zColumn);
  const unitVarianceMm2 = fillWeights(readings.uMm, indices, weight);
  return {
    count,
    x,
    y,
    z,
    weight,
    origin: { hMm, vMm, zMm },
    originRest,
    scaleMm,
    unitVarianceMm2,
    spacingMm: largestMm * Number.EPSILON,
  };
}

/**
 * Why these points hold no circle: all at one place, or all in a line. Both are judged against the points' own extent
 * and the spacing of numbers at their coordinates, never against zero.
 */
export function spreadRefusal(frame: LocalFrame, member: string): ComputeError | null {
  const { x, y, count, scaleMm, spacingMm } = frame;
  let xx = 0;
  let xy = 0;
  let yy = 0;
  for (let i = 0; i < count; i++) {
    xx += x[i]! * x[i]!;
    xy += x[i]! * y[i]!;
    yy += y[i]! * y[i]!;
  }
  const axisRad = Math.atan2(2 * xy, xx - yy) / 2;
  const cos = Math.cos(axisRad);
  const sin = Math.sin(axisRad);
  let along = 0;
  let across = 0;
  for (let i = 0; i < count; i++) {
    along = Math.max(along, Math.abs(x[i]! * cos + y[i]! * sin));
    across = Math.max(across, Math.abs(y[i]! * cos - x[i]! * sin));
  }
  const spacing = spacingMm / scaleMm;
  if (along <= (placeRatio / Number.EPSILON) * spacing) {
    return new ComputeError("points_coincident", "All points lie at one place.", { at: [member] });
  }
  if (across <= Math.max(lineRatio * along, spacings * spacing)) {
    return new ComputeError("points_collinear", "All points lie in one line.", { at: [member] });
  }
  return null;
}

function pick(column: readonly number[], indices: Int32Array | null, into: Float64Array): void {
  if (indices === null) for (let i = 0; i < into.length; i++) into[i] = column[i]!;
  else for (let i = 0; i < into.length; i++) into[i] = column[indices[i]!]!;
}

/** Subtracts the mean in place and returns it. */
function centre(column: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < column.length; i++) sum += column[i]!;
  const mean = sum / column.length;
  for (let i = 0; i < column.length; i++) column[i]! -= mean;
  return mean;
}

function scale(column: Float64Array, scaleMm: number): void {
  for (let i = 0; i < column.length; i++) column[i]! /= scaleMm;
}

function largest(column: Float64Array): number {
  let top = 0;
  for (let i = 0; i < column.length; i++) top = Math.max(top, Math.abs(column[i]!));
  return top;
}

/** Planes closer than this × the points' own extent, or than rounding of z, are one plane. */
function planes(zMm: readonly number[] | null, indices: Int32Array | null, scaleMm: number, z: Float64Array) {
  if (zMm === null) return { z: null, zMm: 0 };
  pick(zMm, indices, z);
  const samePlaneMm = Math.max(lineRatio * scaleMm, spacings * largest(z) * Number.EPSILON);
  const meanMm = centre(z);
  if (largest(z) <= samePlaneMm) return { z: null, zMm: meanMm };
  scale(z, scaleMm);
  return { z, zMm: meanMm };
}

/** Fills `weight` and returns the variance that a weight of 1 stands for. */
function fillWeights(
  uMm: readonly number[] | null,
  indices: Int32Array | null,
  weight: Float64Array,
): number {
  if (uMm === null) {
    weight.fill(1);
    return 1;
  }
  pick(uMm, indices, weight);
  let leastMm = Infinity;
  for (let i = 0; i < weight.length; i++) leastMm = Math.min(leastMm, weight[i]!);
  for (let i = 0; i < weight.length; i++) weight[i] = (leastMm / weight[i]!) ** 2;
  return leastMm * leastMm;
}
