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
  /** Of a call for the fewest moves: every component doubles the choices. */
  componentsPerChoice: 40,
  stationsPerChoice: 200,
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
  /** Of a Monte Carlo propagation: trials, and trials × work of one of them (`trialWork`) over the whole call. */
  trialsMin: 1_000,
  trialsMax: 200_000,
  trialWorkPerCall: 30_000_000,
  /** Trials that must be left outside the coverage interval on each side. */
  trialsOutside: 20,
  stationsPerMachine: 500,
  cautionsPerMachine: 50,
  /** Of a job: people and instruments named, readings sent at once, entries of its log. */
  peoplePerJob: 50,
  instrumentsPerJob: 50,
  readingsPerPost: 200,
  entriesPerJob: 20_000,
  /** Of JSON in all entries of a job's log. */
  charactersPerJob: 64 * 1024 * 1024,
  /** Entries and indications together: what who watches a job can be told. */
  eventsPerJob: 500_000,
  readingFilesPerJob: 500,
  jobsPerHistory: 20,
  /** Streams that one credential may have open in one process. */
  watchersPerCredential: 8,
  readingFileBytes: 10 * 1024 * 1024,
  readingRowsPerFile: 50_000,
  /** Faults that a preview of a file lists; it says how many more there are. */
  faultsPerPreview: 500,
  workbookBytes: 10 * 1024 * 1024,
  attachmentBytes: 10 * 1024 * 1024,
  attachmentsPerJob: 200,
  webhooksPerOrganisation: 20,
  webhookUrlLength: 2_000,
  /** Hours that a replaced signing secret still signs beside the new one. */
  secretOverlapHours: 168,
  recipientsPerMail: 20,
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
  /** Of moving a part: no finer beside each other than a solver of programs tells apart. */
  cost: { min: 0.001, max: 1e6 },
  diameterInside: { min: 0, max: 1e10 },
  temperature: { min: -460, max: 1e5 },
  temperatureGradient: { min: -1e4, max: 1e4 },
  /** Of expansion per degree: 12e-6 sent as 12 is refused. */
  expansion: { min: -1e-3, max: 1e-3 },
  mass: { min: 0, max: 1e9 },
  massAbove0: { min: 1e-9, max: 1e9 },
  force: { min: 1e-9, max: 1e9 },
  /** 0 is a shaft without weight of its own. */
  density: { min: 0, max: 1e6 },
  modulus: { min: 1e-6, max: 1e10 },
} as const;

/**
 * Work of one Monte Carlo trial: `each` for a bore, or for an axis that is searched for, and `perReading` for a reading of
 * it, or a reference station. A unit is about the time that a least-squares circle takes for one reading.
 */
export const trialWork = {
  circle: { each: 10, perReading: 1 },
  /** Cone, tilted cylinder, arcs of a few degrees, and bores with an outlier rule. */
  surface: { each: 250, perReading: 4 },
  ellipse: { each: 1_000, perReading: 60 },
  minimum_zone: { each: 8_000, perReading: 50 },
  maximum_inscribed: { each: 4_000, perReading: 40 },
  minimum_circumscribed: { each: 1_500, perReading: 12 },
  /** Of a station, and again of one that sets the axis. */
  station: 4,
  /** An axis of minimum_zone or least_absolute. */
  searchedAxis: { each: 12_000, perReading: 200 },
} as const;
