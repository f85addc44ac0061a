import { assertFinite } from "../compute-error.ts";
import { findToleranceFaults } from "../conformity/find-tolerance-faults.ts";
import type { PlaneTolerance } from "../conformity/tolerance.ts";
import { dot, decompose, type LeastSquares } from "./least-squares-in-order.ts";
import type { MoveStation, Plane } from "./move-problem.ts";
import { noMove, rowAlong, type Mode } from "./rigid-freedom.ts";
import { endStationsOf, tiltOf, type Tilt } from "./tilt.ts";

/** A least squares problem in as many rows as unknowns, and the part of its sum that no choice removes. */
export interface Pull extends LeastSquares {
  readonly rest: number;
}

/**
 * What the stations ask of the part that carries them: Σ w·(dᵢ + δ(zᵢ))², w = 1/T², d measured from the middle of its
 * tolerance, in `planes`. A station without tolerance asks for nothing; where none of them has one, all ask alike
 * (T = 1 mm). A tilt tolerance S adds (s + θ)²/S² for the slope s of the line through the part's end stations. Reduced by singular values to one row per mode, so that its cost no longer depends on the stations.
 */
export function pullOf(
  stations: readonly MoveStation[],
  modes: readonly Mode[],
  planes: readonly Plane[],
  tiltTolerance: Tilt | null = null,
): Pull {
  const anyTolerance = stations.some(({ tolerance }) => tolerance !== null);
  const asking = stations.flatMap((station) =>
    anyTolerance && !station.tolerance ? [] : planes.map((plane) => ({ station, plane })),
  );
  const terms = asking.map(({ station, plane }) => {
    const { middleMm, halfWidthMm } = demandOf(station, plane);
    const deviationMm = plane === "h" ? station.deviation.hMm : station.deviation.vMm;
    const direction = { h: plane === "h" ? 1 / halfWidthMm : 0, v: plane === "v" ? 1 / halfWidthMm : 0 };
    return { row: rowAlong(modes, direction, station.zMm), target: (middleMm - deviationMm) / halfWidthMm };
  });
  if (tiltTolerance) terms.push(...tiltTerms(stations, modes, planes, tiltTolerance));
  const targets = terms.map(({ target }) => target);
  assertFinite(dot(targets, targets), "The stations' deviations, in tolerances and squared,");
  return condense(
    terms.map(({ row }) => row),
    targets,
    modes.length,
  );
}

function tiltTerms(
  stations: readonly MoveStation[],
  modes: readonly Mode[],
  planes: readonly Plane[],
  tolerance: Tilt,
): { row: number[]; target: number }[] {
  const ends = endStationsOf(stations);
  const slope = tiltOf(stations, noMove);
  if (!ends || !slope) return [];
  const lengthMm = ends[1].zMm - ends[0].zMm;
  return planes.map((plane) => {
    const [first, last] = ends.map(({ zMm }) =>
      rowAlong(modes, { h: plane === "h" ? 1 : 0, v: plane === "v" ? 1 : 0 }, zMm),
    );
    const row = modes.map((_, k) => ((last?.[k] ?? 0) - (first?.[k] ?? 0)) / lengthMm / tolerance[plane]);
    return { row, target: (0 - slope[plane]) / tolerance[plane] };
  });
}

/** Σ of the squares at `amounts`. */
export function costOf({ rows, targets, rest }: Pull, amounts: readonly number[]): number {
  return rest + rows.reduce((sum, row, i) => sum + (dot(row, amounts) - (targets[i] ?? 0)) ** 2, 0);
}

function demandOf({ tolerance }: MoveStation, plane: Plane): { middleMm: number; halfWidthMm: number } {
  if (tolerance === null) return { middleMm: 0, halfWidthMm: 1 };
  const [fault] = findToleranceFaults(tolerance);
  if (fault) throw fault;
  if (tolerance.form === "radial") return { middleMm: 0, halfWidthMm: tolerance.halfWidthMm };
  const { minMm, maxMm }: PlaneTolerance = tolerance[plane];
  return { middleMm: (minMm + maxMm) / 2, halfWidthMm: (maxMm - minMm) / 2 };
}

/** M = UΣVᵀ: ‖Mx − b‖² = ‖ΣVᵀx − Uᵀb‖² + what of b lies outside U. */
function condense(rows: readonly (readonly number[])[], targets: readonly number[], columns: number): Pull {
  if (columns === 0 || rows.length === 0) return { rows: [], targets: [], rest: dot(targets, targets) };
  const { singular, left, right } = decompose(rows, columns);
  const kept = [...singular.keys()].filter((k) => (singular[k] ?? 0) > 0);
  const turned = kept.map((k) => dot(left[k] ?? [], targets));
  const outside = targets.map(
    (target, i) => target - kept.reduce((sum, k, at) => sum + (left[k]?.[i] ?? 0) * (turned[at] ?? 0), 0),
  );
  return {
    rows: kept.map((k) => (right[k] ?? []).map((value) => value * (singular[k] ?? 0))),
    targets: turned,
    rest: dot(outside, outside),
  };
}
