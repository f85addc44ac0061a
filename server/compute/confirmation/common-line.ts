import { factorCholesky, invertCholesky, solveCholesky } from "../bore/cholesky.ts";
import type { Line } from "../axis/fit-line.ts";
import type { PlaneCovariance, PlaneVector } from "../plane.ts";
import type { StationChange } from "./survey-change.ts";

/** A shift and a tilt that several stations share: change(z) = at0Mm + slope·z in each plane. */
export interface CommonLine {
  readonly h: Line;
  readonly v: Line;
  /** Indices of the stations it was laid through. */
  readonly through: readonly number[];
  /** Its change at a station, mm. */
  readonly at: (zMm: number) => PlaneVector;
  /** N⁻¹·Bᵀw of a direction w at z: what a change there shares with the line; null without covariances. */
  readonly shareOf: ((zMm: number, direction: PlaneVector) => Float64Array) | null;
  /** B·p: the plane vector that parameters p are at z. */
  readonly vectorAt: (zMm: number, parameters: Float64Array) => PlaneVector;
}

const size = 4;
/** A pivot this far below its diagonal means that the stations do not span a line. */
const pivotMin = 1e-12;
/** The second pass takes off what the first left to rounding. */
const passes = 2;
const alike: PlaneCovariance = { hhMm2: 1, hvMm2: 0, vvMm2: 1 };

/**
 * The common shift and tilt of the changes of some stations: generalised least squares, minimise
 * Σ (Δᵢ − B(zᵢ)·p)ᵀΣᵢ⁻¹(Δᵢ − B(zᵢ)·p) over p = (shift h, shift v, tilt h, tilt v), with each change's whole 2 × 2
 * covariance (Rao, Linear Statistical Inference, 4a, from memory); all alike where not every station states one. Both surveys' axes are then laid with the same weights, so
 * that bores off the axis by the same in both show no change. Null where the stations stand at one z, or one outweighs
 * all others. O(stations).
 */
export function fitCommonLine(
  changes: readonly StationChange[],
  through: readonly number[],
): CommonLine | null {
  const at = through.map((index) => changes[index]!);
  const known = at.every(({ error }) => error !== null);
  const weights = at.map(({ error }) => (known && error ? error.inverse : alike));
  // z from the heaviest station and then from the weighted mean, so that weights far apart cost no digits.
  const heavy = weights.map(({ hhMm2, vvMm2 }) => hhMm2 + vvMm2);
  const heaviest = Math.max(...heavy);
  const baseMm = at[heavy.indexOf(heaviest)]?.zMm ?? 0;
  const shares = heavy.map((weight) => weight / heaviest);
  const total = shares.reduce((sum, share) => sum + share, 0);
  const fromBaseMm = at.reduce((sum, { zMm }, i) => sum + (shares[i]! / total) * (zMm - baseMm), 0);
  const spanMm = Math.max(0, ...at.map(({ zMm }) => Math.abs(zMm - baseMm)));
  if (!(spanMm > 0)) return null;
  const along = (zMm: number) => (zMm - baseMm - fromBaseMm) / spanMm;

  const normal = new Float64Array(size * size);
  at.forEach(({ zMm }, i) => addWeight(normal, weights[i]!, along(zMm)));
  const factor = new Float64Array(size * size);
  if (!factorCholesky(normal, size, factor, pivotMin)) return null;

  const vectorAt = (zMm: number, p: Float64Array): PlaneVector => ({
    hMm: p[0]! + p[2]! * along(zMm),
    vMm: p[1]! + p[3]! * along(zMm),
  });
  const parameters = new Float64Array(size);
  const step = new Float64Array(size);
  for (let pass = 0; pass < passes; pass += 1) {
    const right = new Float64Array(size);
    at.forEach(({ zMm, change }, i) => {
      const fitted = vectorAt(zMm, parameters);
      addWeighted(right, weights[i]!, along(zMm), change.hMm - fitted.hMm, change.vMm - fitted.vMm);
    });
    solveCholesky(factor, size, right, step);
    for (let k = 0; k < size; k += 1) parameters[k]! += step[k]!;
  }
  const inverse = invertCholesky(factor, size);
  const line = (shift: number, tilt: number): Line => ({
    at0Mm: shift + tilt * along(0),
    slope: tilt / spanMm,
  });
  return {
    h: line(parameters[0]!, parameters[2]!),
    v: line(parameters[1]!, parameters[3]!),
    through,
    at: (zMm) => vectorAt(zMm, parameters),
    shareOf: known ? (zMm, direction) => timesDesign(inverse, along(zMm), direction) : null,
    vectorAt,
  };
}

/** Adds BᵀWB of one station. */
function addWeight(normal: Float64Array, { hhMm2, hvMm2, vvMm2 }: PlaneCovariance, along: number): void {
  const block = [hhMm2, hvMm2, hvMm2, vvMm2];
  for (let row = 0; row < size; row += 1) {
    for (let column = 0; column < size; column += 1) {
      const power = (row < 2 ? 1 : along) * (column < 2 ? 1 : along);
      normal[row * size + column]! += power * block[(row % 2) * 2 + (column % 2)]!;
    }
  }
}

/** Adds BᵀWr of one station. */
function addWeighted(
  right: Float64Array,
  { hhMm2, hvMm2, vvMm2 }: PlaneCovariance,
  along: number,
  hMm: number,
  vMm: number,
): void {
  const h = hhMm2 * hMm + hvMm2 * vMm;
  const v = hvMm2 * hMm + vvMm2 * vMm;
  right[0]! += h;
  right[1]! += v;
  right[2]! += along * h;
  right[3]! += along * v;
}

function timesDesign(inverse: Float64Array, along: number, { hMm, vMm }: PlaneVector): Float64Array {
  const design = [hMm, vMm, along * hMm, along * vMm];
  return Float64Array.from({ length: size }, (_, row) =>
    design.reduce((sum, value, column) => sum + inverse[row * size + column]! * value, 0),
  );
}
