import type { LengthUnit } from "../../units.ts";
import type { Verdict } from "../draw-verdict-mark.ts";

export interface PlanePair {
  readonly h: number;
  readonly v: number;
}

/** Where a bore should lie, and how far from there it may. */
export interface PlannedStation {
  readonly id: string;
  /** In the axial unit. */
  readonly z: number;
  readonly reference: boolean;
  /** Relative to the axis, in the offset unit. */
  readonly target: PlanePair;
  /** Least and most deviation per plane, in the offset unit; a round tolerance is its radius each way. */
  readonly allowed: { readonly h: readonly [number, number]; readonly v: readonly [number, number] } | null;
}

/** Where a bore was found to lie. Offset units. */
export interface SurveyedStation {
  readonly id: string;
  /** From the target. */
  readonly deviation: PlanePair;
  readonly radial: number;
  /** Expanded, per plane; null when nothing is known. */
  readonly uncertainty: PlanePair | null;
  /** Null without a tolerance. */
  readonly verdict: Verdict | null;
}

export interface Survey {
  /** "as found", "as left", or "measured" when it stands alone. */
  readonly name: string;
  readonly stations: readonly SurveyedStation[];
}

/** One survey, or two of one machine with the state that has been replaced first. */
export interface PlanElevationModel {
  readonly axialUnit: LengthUnit;
  readonly offsetUnit: LengthUnit;
  /** "least-squares axis through brg-1, brg-2" */
  readonly axisWords: string;
  /** What the line at zero is: the axis, or every station's target where deviations alone are known. */
  readonly zero: "axis" | "target";
  readonly stations: readonly PlannedStation[];
  readonly surveys: readonly Survey[];
}

export type Plane = "h" | "v";
