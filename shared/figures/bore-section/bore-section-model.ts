import type { LengthUnit } from "../../units.ts";

/** One reading of the wall, as the fit saw it. */
export interface WallPoint {
  /** Its number in the order sent, from 1. */
  readonly number: number;
  /** Direction from the fitted centre, clockwise from the top, looking downstream. */
  readonly clockDeg: number;
  /** Radial, in the offset unit; positive outside the fitted circle. */
  readonly residual: number;
  readonly used: boolean;
  readonly contact: boolean;
}

/** A fitted bore, ready to be drawn and tabulated. */
export interface BoreSectionModel {
  readonly id: string;
  readonly methodWords: string;
  readonly offsetUnit: LengthUnit;
  readonly boreUnit: LengthUnit;
  /** From what the centre is measured: "points' origin", "gauge's axis". */
  readonly originWords: string;
  /** In the offset unit. */
  readonly centre: { readonly h: number; readonly v: number };
  /** Expanded, per plane, in the offset unit; null when nothing is known. */
  readonly uncertainty: { readonly h: number; readonly v: number } | null;
  /** In the bore unit; null when the gauge's zero is arbitrary. */
  readonly diameter: number | null;
  /** In the offset unit. */
  readonly roundness: number | null;
  readonly points: readonly WallPoint[];
  readonly arc: { readonly coverageDeg: number; readonly largestGapDeg: number } | null;
}
