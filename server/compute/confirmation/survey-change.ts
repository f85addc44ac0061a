import type { PlaneCovariance, PlaneVector } from "../plane.ts";

/** One centre as one survey measured it. */
export interface MeasuredCentre {
  readonly centre: PlaneVector;
  /** Standard covariance, mm²; null: not known. */
  readonly covariance: PlaneCovariance | null;
  /** Its degrees of freedom; null: infinite. */
  readonly dof: number | null;
}

/** A station that both surveys measured. */
export interface ComparedStation {
  readonly zMm: number;
  readonly before: MeasuredCentre;
  readonly after: MeasuredCentre;
}

/** One survey's share in the error of a change. */
export interface ErrorPart {
  readonly covariance: PlaneCovariance;
  /** Infinity: known exactly. */
  readonly dof: number;
}

export interface ChangeError {
  readonly parts: readonly ErrorPart[];
  /** Their sum, mm². */
  readonly total: PlaneCovariance;
  /** Inverse of `total`, 1/mm². */
  readonly inverse: PlaneCovariance;
}

/** after − before of one station, as read. */
export interface StationChange {
  readonly zMm: number;
  readonly change: PlaneVector;
  /** Null where a survey does not state its covariance. */
  readonly error: ChangeError | null;
}

/** The correlation of a change nearer to ±1 than this leaves a direction without any error. */
const correlationRest = 1e-12;

/** What moved between two surveys, and how well it is known: Δ = after − before, Σ = Σ_before + Σ_after, mm and mm². */
export function changeOf({ zMm, before, after }: ComparedStation): StationChange {
  const change = {
    hMm: after.centre.hMm - before.centre.hMm,
    vMm: after.centre.vMm - before.centre.vMm,
  };
  if (!before.covariance || !after.covariance) return { zMm, change, error: null };
  const total = addCovariances(before.covariance, after.covariance);
  const parts = [
    { covariance: before.covariance, dof: before.dof ?? Infinity },
    { covariance: after.covariance, dof: after.dof ?? Infinity },
  ];
  return { zMm, change, error: { parts, total, inverse: invertCovariance(total) } };
}

/** Whether a covariance leaves no direction without an error: only then can a change be held against it. */
export function isDefinite({ hhMm2, hvMm2, vvMm2 }: PlaneCovariance): boolean {
  const both = hhMm2 * vvMm2;
  return hhMm2 > 0 && vvMm2 > 0 && both > 0 && (hvMm2 * hvMm2) / both < 1 - correlationRest;
}

/** Sum of two covariances, mm². */
export function addCovariances(one: PlaneCovariance, other: PlaneCovariance): PlaneCovariance {
  return {
    hhMm2: one.hhMm2 + other.hhMm2,
    hvMm2: one.hvMm2 + other.hvMm2,
    vvMm2: one.vvMm2 + other.vvMm2,
  };
}

/** Inverse of a definite covariance, 1/mm². */
export function invertCovariance({ hhMm2, hvMm2, vvMm2 }: PlaneCovariance): PlaneCovariance {
  const determinant = hhMm2 * vvMm2 - hvMm2 * hvMm2;
  return { hhMm2: vvMm2 / determinant, hvMm2: -hvMm2 / determinant, vvMm2: hhMm2 / determinant };
}

/** Matrix times vector. */
export function applyCovariance(
  { hhMm2, hvMm2, vvMm2 }: PlaneCovariance,
  { hMm, vMm }: PlaneVector,
): PlaneVector {
  return { hMm: hhMm2 * hMm + hvMm2 * vMm, vMm: hvMm2 * hMm + vvMm2 * vMm };
}

/** Scalar product of two vectors. */
export function dot(one: PlaneVector, other: PlaneVector): number {
  return one.hMm * other.hMm + one.vMm * other.vMm;
}

/** The variance of a vector along a direction, wᵀΣw. */
export function varianceAlong(covariance: PlaneCovariance, along: PlaneVector): number {
  return dot(along, applyCovariance(covariance, along));
}
