/** What is read: distances of the wall, or spots on a target turned about the bore's own centre. */
export type PlanForm = "wall" | "rotating_target";

/** Readings that were taken, or are supposed to be, at one clock angle. */
export interface TakenReading {
  readonly clockDeg: number;
  readonly times: number;
  /** Standard uncertainty: of the distance, or of each of the spot's two coordinates. */
  readonly uMm: number;
}

/** A place that can be reached. */
export interface ReachablePlace {
  readonly clockDeg: number;
  /** How many readings may still be taken there. */
  readonly readingsMax: number;
}

/** Expanded uncertainty of the centre that is wanted: in the worst direction, or of each plane. */
export type WantedUncertainty =
  | { readonly form: "radial"; readonly radialMm: number }
  | { readonly form: "planes"; readonly hMm: number; readonly vMm: number };

export interface PlanInput {
  readonly form: PlanForm;
  readonly taken: readonly TakenReading[];
  readonly places: readonly ReachablePlace[];
  /** Standard uncertainty of a reading still to be taken. */
  readonly uMm: number;
  readonly wanted: WantedUncertainty;
  /** Coverage probability, in (0, 1). */
  readonly level: number;
  /** Readings that may be added at the most. */
  readonly addedMax: number;
  /** Pairs of readings that the exchange may weigh. */
  readonly exchangesMax: number;
}
