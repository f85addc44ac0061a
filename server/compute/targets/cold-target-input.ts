import type { Shaft } from "../beam/shaft.ts";
import type { PlaneVector } from "../plane.ts";
import type { Growth } from "./growth.ts";
import type { Wire } from "./wire-sag.ts";

/** A bearing that holds the shaft. */
export interface RotorSupport {
  readonly zMm: number;
  /** Wanted hot place of the bearing's centre, relative to the axis. */
  readonly line: PlaneVector;
  /** Running place of the journal's centre, relative to the bearing's. */
  readonly running: PlaneVector;
}

export interface Rotor {
  readonly shaft: Shaft;
  readonly supports: readonly RotorSupport[];
}

/** A bore: a part round the rotor, or a bearing on its line. */
export interface TargetStation {
  readonly zMm: number;
  readonly follows: "rotor" | "bearing_line";
  readonly growths: readonly Growth[];
  /** Displacement from the state measured to the state run. */
  readonly closing: PlaneVector;
}

export interface ColdTargetInput {
  readonly stations: readonly TargetStation[];
  readonly rotor: Rotor | null;
  readonly wire: Wire | null;
}

/** Running place of a journal from its radial clearance and its lift off the bottom, mm. */
export function runningFromClearance(radialClearanceMm: number, lift: PlaneVector): PlaneVector {
  return { hMm: lift.hMm, vMm: lift.vMm - radialClearanceMm };
}

/** A nanometre, and the rounding of large coordinates: nearer places along z are the same. */
export function isSamePlace(zMm: number, otherMm: number): boolean {
  return Math.abs(zMm - otherMm) <= 1e-6 + 1e-12 * Math.max(Math.abs(zMm), Math.abs(otherMm));
}
