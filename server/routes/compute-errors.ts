import type { ProblemCode } from "../../shared/error-codes.ts";

/** What any computing operation may refuse with. */
export const computeErrors: readonly ProblemCode[] = [
  "units_missing",
  "duplicate_id",
  "number_not_finite",
  "rank_deficient",
  "not_converged",
  "result_overflow",
  "not_available",
];
