/** Why a computation refuses. Closed: every code has its entry in shared/error-codes.ts (a test compares the two). */
export type ComputeErrorCode =
  | "too_few_points"
  | "points_collinear"
  | "points_coincident"
  | "arc_too_flat"
  | "no_inscribed_circle"
  | "coverage_insufficient"
  | "angles_insufficient"
  | "uncertainty_incomplete"
  | "radius_not_positive"
  | "rank_deficient"
  | "not_converged"
  | "result_overflow"
  | "covariance_not_positive"
  | "stations_coincident"
  | "reference_count"
  | "tolerance_invalid"
  | "weights_incomplete"
  | "supports_insufficient"
  | "shaft_unsupported"
  | "out_of_range"
  | "too_many_choices"
  | "combination_invalid"
  | "not_available";

export interface ComputeErrorDetails {
  /** Where in the input of the function that threw: property names and indices. */
  readonly at?: readonly (string | number)[];
  /** The number reached and the limit it broke, where there is one. */
  readonly reached?: number;
  readonly limit?: number;
}

/** A computation that cannot be done honestly. Thrown, never returned: a flag can be overlooked, an error cannot. */
export class ComputeError extends Error {
  constructor(
    readonly code: ComputeErrorCode,
    message: string,
    readonly details: ComputeErrorDetails = {},
  ) {
    super(message);
    this.name = "ComputeError";
  }
}

/**
 * Returns `value` when it is finite.
 * @throws ComputeError result_overflow — JSON would print NaN and Infinity as null, silently.
 */
export function assertFinite(value: number, what: string): number {
  if (!Number.isFinite(value)) throw new ComputeError("result_overflow", `${what} is not a finite number.`);
  return value;
}
