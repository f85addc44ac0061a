import { assertFinite } from "../compute-error.ts";
import { findToleranceFaults } from "../conformity/find-tolerance-faults.ts";
import type { PlaneTolerance } from "../conformity/tolerance.ts";
import { dot, decompose, type LeastSquares } from "./least-squares-in-order.ts";
import type { MinimaxTerm } from "./minimax-program.ts";
import type { MoveStation, Plane } from "./move-problem.ts";
import { noMove, rowAlong, type Mode } from "./rigid-freedom.ts";
import { endStationsOf, tiltOf, type Tilt } from "./tilt.ts";

/** A least squares problem in as many rows as unknowns, and the part of its sum that no choice removes. */
export interface Pull extends LeastSquares {
  readonly rest: number;
}

/**
 * What the stations ask of the part that carries them: (dᵢ + δ(zᵢ))/T, d measured from the middle of its tolerance, in
 * `planes`: h and v in one term where the tolerance is round, apart where each has its own. A station without tolerance
 * asks for nothing; where none of them has one, all ask alike (T = 1 mm). A tilt tolerance S adds (s + θ)/S for the slope
 * s of the line through the part's end stations.
 */
export function termsOf(
  stations: readonly MoveStation[],
  modes: readonly Mode[],
  planes: readonly Plane[],
  tiltTolerance: Tilt | null = null,
): MinimaxTerm[] {
  const anyTolerance = stations.some(({ tolerance }) => tolerance !== null);
  const asking = stations.filter(({ tolerance }) => !anyTolerance || tolerance !== null);
  const terms = asking.flatMap((station) => {
    const parts = planes.map((plane) => {
      const { middleMm, halfWidthMm } = demandOf(station, plane);
      const deviationMm = plane === "h" ? station.deviation.hMm : station.deviation.vMm;
      const direction = { h: plane === "h" ? 1 / halfWidthMm : 0, v: plane === "v" ? 1 / halfWidthMm : 0 };
      return { row: rowAlong(modes, direction, station.zMm), target: (middleMm - deviationMm) / halfWidthMm };
    });
    return station.tolerance?.form === "planes" ? parts.map((part) => termOf([part])) : [termOf(parts)];
  });
  if (tiltTolerance) {
    terms.push(...tiltTerms(stations, modes, planes, tiltTolerance).map((part) => termOf([part])));
  }
  const targets = terms.flatMap((term) => term.targets);
  assertFinite(dot(targets, targets), "The stations' deviations, in tolerances and squared,");
  return terms;
}

/** Σ of the squares of all terms, reduced by singular values to one row per mode: its cost no longer depends on the stations. */
export function pullOf(terms: readonly MinimaxTerm[], size: number): Pull {
  const rows = terms.flatMap((term) => term.rows);
  const targets = terms.flatMap((term) => term.targets);
  return condense(rows, targets, size);
}

interface Part {
  readonly row: readonly number[];
  readonly target: number;
}

const termOf = (parts: readonly Part[]): MinimaxTerm => ({
  rows: parts.map(({ row }) => row),
  targets: parts.map(({ target }) => target),
});

function tiltTerms(
  stations: readonly MoveStation[],
  modes: readonly Mode[],
  planes: readonly Plane[],
  tolerance: Tilt,
): Part[] {
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
