/** What is asked of the trials of one call. */
export interface TrialPlan {
  readonly trials: number;
  /** A whole number from 0 to 2^32 − 1. */
  readonly seed: number;
  /** Significant digits of an uncertainty that are taken to mean something: n_dig of JCGM 101. Null: as each asks. */
  readonly digits: number | null;
  /** Size of the unit in which those digits are counted, mm. */
  readonly unitMm: number;
}
