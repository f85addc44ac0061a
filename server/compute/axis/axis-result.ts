import type { ExpandedUncertainty } from "../conformity/expand-uncertainty.ts";
import type { Verdict } from "../conformity/tolerance.ts";
import type { PlaneCovariance, PlaneVector } from "../plane.ts";
import type { AxisMethod } from "./axis-input.ts";
import type { Line } from "./fit-line.ts";

export type Matrix2 = readonly [readonly [number, number], readonly [number, number]];

/** Covariances of (at0Mm, slope): mm², mm, 1 by place. hv: rows of the h line, columns of the v line. */
export interface AxisCovariance {
  readonly h: Matrix2;
  readonly v: Matrix2;
  readonly hv: Matrix2;
}

export interface PerPlane {
  readonly h: number;
  readonly v: number;
}

export interface Warning {
  readonly code: string;
  readonly detail: string;
}

/** What an axis of minimum_zone or least_absolute attains in one plane, or in both at once, and the proof of it. */
export interface LineEvidence {
  /** What was least: the largest weight × distance of a reference station, or the sum of them. */
  readonly objectiveMm: number;
  /** No axis comes below it, from the multipliers. */
  readonly lowerBoundMm: number;
  /** Without weights: twice the largest distance of a reference station, or the sum of their distances. */
  readonly extentMm: number;
  /** Places among the reference stations of those that touch the zone, or that the axis passes through. */
  readonly contacts: readonly number[];
  /** Of those contacts that have any. In one plane the other member is 0. */
  readonly multipliers: readonly { readonly place: number; readonly h: number; readonly v: number }[];
  readonly unique: boolean;
  /** Whether other contacts than those that the covariance was taken from would do as well. */
  readonly spareContacts: boolean;
}

export type AxisOptimum =
  | { readonly zone: "planes"; readonly h: LineEvidence; readonly v: LineEvidence }
  | { readonly zone: "cylinder"; readonly both: LineEvidence };

export interface Axis {
  readonly method: AxisMethod;
  readonly h: Line;
  readonly v: Line;
  /** Null when it cannot be known: no covariances, and no more stations than the line needs. */
  readonly covariance: AxisCovariance | null;
  /** Σ(residual/u)² of the reference stations: least squares with stated covariances and more than two stations. */
  readonly chiSquare: PerPlane | null;
  /** Standard deviation of one observation from the residuals, mm: least squares with nothing stated. */
  readonly scatterMm: PerPlane | null;
  /** n − 2, of `chiSquare` or `scatterMm`. */
  readonly dof: number | null;
  /** Of minimum_zone and least_absolute only. */
  readonly optimum: AxisOptimum | null;
  readonly warnings: readonly Warning[];
}

export interface StationDeviation {
  /** centre − target − axis: positive where the bore lies right, or high. */
  readonly deviation: PlaneVector;
  readonly covariance: PlaneCovariance | null;
  readonly expandedUncertainty: ExpandedUncertainty | null;
  /** Null without a tolerance. */
  readonly verdict: Verdict | null;
  /** |d|/T; null without a tolerance. */
  readonly ratio: number | null;
  readonly reference: boolean;
  readonly warnings: readonly Warning[];
}

export interface AxisDeviations {
  readonly axis: Axis;
  /** In the order of the input. */
  readonly stations: readonly StationDeviation[];
}
