/** What one call may hold. Served in the OpenAPI document, enforced by the schemas, quoted in refusals. */
export const limits = {
  /** Bytes of a request body after decompression. */
  bodyBytes: 4 * 1024 * 1024,
  /** Levels of nesting of a JSON body. */
  jsonDepth: 32,
  boresPerCall: 2_000,
  readingsPerBore: 10_000,
  /** Readings of all bores of one call together. */
  readingsPerCall: 50_000,
  stationsPerCall: 2_000,
  componentsPerCall: 500,
  supportsPerComponent: 50,
  padsPerSupport: 12,
  stockPerCall: 200,
  piecesPerStack: 50,
  indicatorsPerCall: 200,
  couplingsPerCall: 2_000,
  /** Cells of a crossed study, and readings in each: together no more than readingsPerCall. */
  cellsPerStudy: 2_000,
  repeatsPerCell: 25,
  /** Planned moves, and events, of a confirmation. */
  movesPerCall: 2_000,
  eventsPerCall: 10_000,
  /** Parts that all moves of a call together may be split into. */
  incrementsPerCall: 2_000,
  sectionsPerRotor: 500,
  massesPerRotor: 500,
  supportsPerRotor: 500,
  growthsPerStation: 50,
  /** Of a measurement plan: places that can be reached, readings at one, readings that may be added. */
  placesPerBore: 360,
  placesPerCall: 10_000,
  rangesPerBore: 20,
  readingsPerPlace: 100,
  addedPerBore: 1_000,
  idLength: 64,
  noteLength: 2_000,
  nameLength: 120,
  pageSizeDefault: 50,
  pageSizeMax: 200,
  faultsListed: 100,
  echoedTextLength: 100,
  idempotencyKeyLength: 255,
} as const;

/**
 * Bounds of measured quantities, the same number in whatever unit the caller chose.
 * They are far outside any machine: they keep arithmetic finite, they do not judge a reading.
 */
export const bounds = {
  coordinate: { min: -1e10, max: 1e10 },
  positiveLength: { min: 1e-6, max: 1e10 },
  offset: { min: -1e9, max: 1e9 },
  uncertainty: { min: 1e-12, max: 1e9 },
  /** Where 0 states that a value is exact. */
  uncertaintyOrExact: { min: 0, max: 1e9 },
  variance: { min: -1e18, max: 1e18 },
  thickness: { min: 0, max: 1e6 },
  /** One piece, or a step in which pieces can be had. */
  shim: { min: 1e-5, max: 1e6 },
  clockDeg: { min: -360, max: 360 },
  halfAngleDeg: { min: -89, max: 89 },
  level: { min: 0.5, max: 1 },
  stepDeg: { min: 0.1, max: 180 },
  /** Half-width of a tolerance over an expanded uncertainty. */
  toleranceRatio: { min: 1, max: 1_000 },
  /** A slope, offset units per axial unit. */
  tilt: { min: 1e-12, max: 1e9 },
  /** Beyond it a turn is no longer small. */
  rollRadians: { min: -0.05, max: 0.05 },
  weight: { min: 1e-12, max: 1e12 },
  diameterInside: { min: 0, max: 1e10 },
  temperature: { min: -460, max: 1e5 },
  /** Of expansion per degree: 12e-6 sent as 12 is refused. */
  expansion: { min: -1e-3, max: 1e-3 },
  mass: { min: 0, max: 1e9 },
  massAbove0: { min: 1e-9, max: 1e9 },
  force: { min: 1e-9, max: 1e9 },
  /** 0 is a shaft without weight of its own. */
  density: { min: 0, max: 1e6 },
  modulus: { min: 1e-6, max: 1e10 },
} as const;
