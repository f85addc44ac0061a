/** A stretch of one bending stiffness under one load along it. */
export interface BeamPiece {
  readonly lengthMm: number;
  /** E·I, N·mm². */
  readonly stiffnessNmm2: number;
  /** Downward load along the stretch, N/mm. */
  readonly loadNPerMm: number;
}

/** A downward force at one place, N. */
export interface PointLoad {
  readonly zMm: number;
  readonly downN: number;
}

/** A support that holds the beam at a height and lets it turn. */
export interface BeamSupport {
  readonly zMm: number;
  readonly upMm: number;
}

/** A straight beam in one plane, its pieces end to end from `startMm`. Loads and supports in any order. */
export interface BeamInput {
  readonly startMm: number;
  readonly pieces: readonly BeamPiece[];
  readonly loads: readonly PointLoad[];
  readonly supports: readonly BeamSupport[];
}
