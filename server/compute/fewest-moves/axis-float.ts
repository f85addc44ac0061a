import type { PlaneTolerance } from "../conformity/tolerance.ts";
import { planes, type MoveStation, type Plane } from "../moves/move-problem.ts";
import type { Limit } from "../moves/quadratic-program.ts";
import type { FewestMovesProblem, LimitSource } from "./fewest-moves-problem.ts";

/**
 * The axis that may float, as unknowns: its heights h₁, h₂ at the first and the last reference station along z, then v₁,
 * v₂, in mm from the axis as surveyed; between and beyond them it is straight. None where no reference is stated.
 */
export interface AxisFloat {
  /** Of the unknowns, the first of all: 4, or 0. */
  readonly size: number;
  /** Height at z per unit of the two heights of a plane. */
  sharesAt(zMm: number): readonly [number, number];
  /** Between which heights the axis can lie at z: never too narrow, and no wider than its neighbours allow. */
  rangeAt(zMm: number, plane: Plane): PlaneTolerance;
  readonly limits: readonly (Limit & { readonly source: LimitSource })[];
  readonly zMm: readonly number[];
}

/** The float of a problem whose reference stations stand apart along z. O(references). */
export function axisFloatOf({
  stations,
  references,
}: Pick<FewestMovesProblem, "stations" | "references">): AxisFloat {
  const zOf = new Map(stations.map(({ id, zMm }: MoveStation) => [id, zMm]));
  const zMm = references.map(({ stationId }) => zOf.get(stationId) ?? 0);
  const along = [...zMm.keys()].sort((a, b) => zMm[a]! - zMm[b]!);
  const [first, last] = [along[0], along.at(-1)];
  if (first === undefined || last === undefined) return stillAxis;
  const [fromMm, lengthMm] = [zMm[first]!, zMm[last]! - zMm[first]!];
  const sharesAt = (z: number): readonly [number, number] => {
    const share = (z - fromMm) / lengthMm;
    return [1 - share, share];
  };
  const rangeAt = (z: number, plane: Plane): PlaneTolerance => {
    const after = along.find((k) => zMm[k]! > z);
    const before = [...along].reverse().find((k) => zMm[k]! <= z);
    const pairs: [number, number][] = [[first, last]];
    if (before !== undefined && after !== undefined) pairs.push([before, after]);
    const ranges = pairs.map(([a, b]) => {
      const share = (z - zMm[a]!) / (zMm[b]! - zMm[a]!);
      return sumOf(references[a]!.float[plane], 1 - share, references[b]!.float[plane], share);
    });
    return {
      minMm: Math.max(...ranges.map(({ minMm }) => minMm)),
      maxMm: Math.min(...ranges.map(({ maxMm }) => maxMm)),
    };
  };
  const limits = references.flatMap(({ float }, reference) =>
    planes.flatMap((plane, p) => {
      const row = [0, 0, 0, 0];
      sharesAt(zMm[reference]!).forEach((share, k) => (row[2 * p + k] = share));
      const at = { of: "float", reference, plane } as const;
      return [
        {
          row: row.map((value) => 0 - value),
          most: 0 - float[plane].minMm,
          source: { ...at, side: "min" as const },
        },
        { row, most: float[plane].maxMm, source: { ...at, side: "max" as const } },
      ];
    }),
  );
  return { size: 4, sharesAt, rangeAt, limits, zMm };
}

const stillAxis: AxisFloat = {
  size: 0,
  sharesAt: () => [0, 0],
  rangeAt: () => ({ minMm: 0, maxMm: 0 }),
  limits: [],
  zMm: [],
};

/** Where a·x + b·y can lie for x and y in their ranges. */
function sumOf(x: PlaneTolerance, a: number, y: PlaneTolerance, b: number): PlaneTolerance {
  const ends = (range: PlaneTolerance, factor: number) =>
    factor < 0 ? [factor * range.maxMm, factor * range.minMm] : [factor * range.minMm, factor * range.maxMm];
  const [xEnds, yEnds] = [ends(x, a), ends(y, b)];
  return { minMm: xEnds[0]! + yEnds[0]!, maxMm: xEnds[1]! + yEnds[1]! };
}
