import type { LengthUnit } from "../../units.ts";
import type { PlanePair, Survey } from "../plan-elevation/plan-elevation-model.ts";

/** What a station's deviation is held to: a round tolerance, or one per plane. In the offset unit. */
export type ToleranceOutline =
  | { readonly kind: "ring"; readonly radius: number }
  | {
      readonly kind: "box";
      readonly h: readonly [least: number, most: number];
      readonly v: readonly [least: number, most: number];
    };

export interface EndViewStation {
  readonly id: string;
  /** In the axial unit. */
  readonly z: number;
  readonly reference: boolean;
  /** Null without a tolerance: then nothing is judged. */
  readonly tolerance: ToleranceOutline | null;
}

/** Every station's deviation from its own target, seen looking downstream: one survey, or the replaced one first. */
export interface EndViewModel {
  readonly axialUnit: LengthUnit;
  readonly offsetUnit: LengthUnit;
  /** In the order in which they are drawn. */
  readonly stations: readonly EndViewStation[];
  readonly surveys: readonly Survey[];
}

/** Direction of a deviation, clockwise from the top, in [0, 360); null where there is none. */
export function clockDegOf({ h, v }: PlanePair): number | null {
  if (h === 0 && v === 0) return null;
  const clockDeg = (Math.atan2(h, v) * 180) / Math.PI;
  return clockDeg < 0 ? clockDeg + 360 : clockDeg;
}
