import type { DecisionRule } from "../conformity/judge.ts";
import type { Tolerance } from "../conformity/tolerance.ts";
import type { PlaneCovariance, PlaneVector } from "../plane.ts";

/** One bore of the machine as measured, and where it should be. A missing datum is null. */
export interface AxisStation {
  readonly zMm: number;
  readonly centre: PlaneVector;
  /** Standard covariance of the centre. */
  readonly covariance: PlaneCovariance | null;
  /** Degrees of freedom of that covariance; null: infinite. */
  readonly dof: number | null;
  /** Where the centre should lie, relative to the axis. */
  readonly target: PlaneVector;
  /** Standard uncertainties of the target; 0 where it is exact. */
  readonly targetUncertainty: PlaneVector;
  readonly tolerance: Tolerance | null;
  /** Multiplies the station's distance in minimum_zone and least_absolute; null or absent where not stated. */
  readonly weight?: number | null;
}

export type AxisMethod =
  "two_station" | "least_squares" | "minimum_zone" | "least_absolute" | "line_of_sight";

/** What minimum_zone and least_absolute measure by: h and v apart, or the radial distance. */
export type AxisZone = "planes" | "cylinder";

export interface AxisInput {
  readonly method: AxisMethod;
  /** Of minimum_zone and least_absolute; planes when absent. */
  readonly zone?: AxisZone;
  /** Indices into `stations` of those that set the axis. */
  readonly reference: readonly number[];
  readonly stations: readonly AxisStation[];
  /** Coverage probability of expanded uncertainties, in (0, 1). */
  readonly level: number;
  readonly rule: DecisionRule;
}
