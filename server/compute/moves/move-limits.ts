import type { LimitPlace } from "./move-plan.ts";
import type { MoveSupport, Plane } from "./move-problem.ts";
import type { Limit } from "./quadratic-program.ts";
import { rowAlong, type Mode } from "./rigid-freedom.ts";
import type { Place } from "./support-places.ts";

/** A limit on the amounts of a component's modes, and where it was stated. */
export interface PlacedLimit extends Limit {
  readonly place: LimitPlace;
}

/** Least and most move at every support, in `planes`: those that are stated. */
export function travelLimits(
  supports: readonly MoveSupport[],
  modes: readonly Mode[],
  planes: readonly Plane[],
): PlacedLimit[] {
  return supports.flatMap((support, index) =>
    planes.flatMap((plane) => {
      const row = rowAlong(modes, { h: plane === "h" ? 1 : 0, v: plane === "v" ? 1 : 0 }, support.zMm);
      const { minMm, maxMm } = support.travel[plane];
      const at = { of: "travel", support: index, plane } as const;
      return between(row, minMm, maxMm, at);
    }),
  );
}

/** What a stack may still give or take before it passes its own least and most thickness. */
export function stackLimits(
  { support, name, zMm, direction, offsetMm, stack }: Place,
  modes: readonly Mode[],
): PlacedLimit[] {
  const row = rowAlong(modes, direction, zMm);
  const at = { of: "stack", support, place: name } as const;
  const standsMm = stack.thicknessMm + offsetMm;
  return between(row, stack.minMm - standsMm, stack.maxMm - standsMm, at);
}

type Sideless<Placed> = Placed extends LimitPlace ? Omit<Placed, "side"> : never;

function between(row: readonly number[], min: number, max: number, at: Sideless<LimitPlace>): PlacedLimit[] {
  const lower = {
    row: row.map((value) => 0 - value),
    most: 0 - min,
    place: { ...at, side: "min" } as LimitPlace,
  };
  const upper = { row, most: max, place: { ...at, side: "max" } as LimitPlace };
  return [lower, upper].filter(({ most }) => Number.isFinite(most));
}
