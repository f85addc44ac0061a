import type { PlaneVector } from "../plane.ts";

/** A bore at which the beam's spot was read. */
export interface SightStation {
  readonly zMm: number;
  /** Where the beam passes, relative to the bore's centre, downstream view. */
  readonly beam: PlaneVector;
  /** Where it should pass, relative to the same centre. */
  readonly expected: PlaneVector;
}

export type TwoStations = readonly [SightStation, SightStation];

/** The beam at the first station, read again at the end. */
export interface ClosingReading {
  readonly beam: PlaneVector;
  readonly allowedMm: number;
  /** Whether a drift that is allowed is shared out. */
  readonly shareOut: boolean;
}

export interface SightLineInput {
  readonly sourceZMm: number;
  /** A near and a far one, in the order read. */
  readonly stations: TwoStations;
  /** Radial distance from `expected` that the beam may have. */
  readonly wantedMm: number;
  /** Standard, of each coordinate of a spot; null where none is stated. */
  readonly uncertaintyMm: number | null;
  /** Coverage probability of the guard, in (0, 1). */
  readonly level: number;
  readonly closing: ClosingReading | null;
  /** Where the source can be moved. */
  readonly adjusterZMm: readonly number[];
}
