import type { PlaneCovariance, PlaneVector } from "../plane.ts";

/** Something the reader must know before using the numbers beside it. */
export interface FitWarning {
  readonly code: FitWarningCode;
  readonly detail: string;
}

export type FitWarningCode =
  | "weak_arc"
  | "weak_angles"
  | "no_redundancy"
  | "scatter_exceeds_uncertainty"
  | "readings_at_number_resolution"
  | "readings_excluded"
  | "few_readings_for_outliers"
  | "diameter_far_from_nominal"
  | "criterion_unsuited_to_arc"
  | "another_centre_as_good";

/** Half-widths at `level`: factor × standard uncertainty. */
export interface ExpandedUncertainty {
  readonly hMm: number;
  readonly vMm: number;
  /** Null where the diameter is not known. */
  readonly diameterMm: number | null;
  readonly factor: number;
  /** Null is infinite. */
  readonly dof: number | null;
  readonly level: number;
}

/** How the fit stands to its readings. */
export interface FitStatistics {
  readonly readingsUsed: number;
  readonly parameters: number;
  /** √(Σr²/n) of the readings used. */
  readonly rmsMm: number;
  /** Σ(r/u)²; null where no uncertainty was stated. */
  readonly chiSquare: number | null;
  /** F: what (JᵀWJ)⁻¹ was multiplied by beyond the stated variances; null where nothing was stated. */
  readonly varianceInflation: number | null;
  /** Worst standard uncertainty of the centre ÷ that of an even full ring of as many readings; 1 is best. */
  readonly dilution: number;
  readonly iterations: number;
}

/** One reading put aside by the outlier rule. */
export interface Exclusion {
  readonly index: number;
  /** |r|/u ÷ (1.4826 × median) when it was put aside; it passed the threshold. */
  readonly ratio: number;
}

interface Common {
  readonly centre: PlaneVector;
  /** Null where nothing was stated and no reading is left over. */
  readonly covariance: PlaneCovariance | null;
  readonly expandedUncertainty: ExpandedUncertainty | null;
  readonly statistics: FitStatistics;
  readonly warnings: readonly FitWarning[];
}

/** A bore found from points on its wall. Centre and diameter are those at z = 0, downstream view. */
export interface WallFit extends Common {
  readonly form: "points" | "turned_gauge" | "wire";
  readonly diameterMm: number | null;
  /** Peak-to-valley of the radial residuals in use. */
  readonly roundnessMm: number;
  /** Distance from the axis − radius there, in the order sent, excluded readings too. */
  readonly residualsMm: readonly number[];
  readonly used: readonly boolean[];
  readonly exclusions: readonly Exclusion[];
  readonly arc: { readonly coverageDeg: number; readonly largestGapDeg: number };
  readonly taper: { readonly halfAngleDeg: number; readonly expandedUncertaintyDeg: number | null } | null;
  /** Slopes of the centre line of a bore read at two or more planes, mm per mm. */
  readonly tilt: { readonly h: number; readonly v: number } | null;
  /** Readings on the limiting circle or circles, by index, rising; only where the criterion has such. */
  readonly contacts?: readonly number[];
  /** Only where an ellipse was fitted. */
  readonly ellipse?: EllipseAxes;
}

/** The axes of a bore that is oval. */
export interface EllipseAxes {
  /** Diameters; null where the gauge's zero does not tell them. */
  readonly majorMm: number | null;
  readonly minorMm: number | null;
  /** Major − minor diameter. */
  readonly ovalityMm: number;
  /** Half-width at the level of the fit; null where nothing tells it. */
  readonly ovalityExpandedMm: number | null;
  /** Clock direction of the major axis, [0, 180); null where the ovality is no larger than its own uncertainty. */
  readonly majorClockDeg: number | null;
}

/** A bore found from the spots of a turned target: its centre relative to the beam, no size. */
export interface SpotFit extends Common {
  readonly form: "rotating_target";
  readonly residualsMm: readonly PlaneVector[];
}

export type BoreFit = WallFit | SpotFit;
