import type { Problem } from "../../../shared/schemas/problem.ts";

/** The service answered with a refusal. */
export class ProblemError extends Error {
  constructor(readonly problem: Problem) {
    super(problem.detail || problem.title);
    this.name = "ProblemError";
  }
}

/** No answer came, or none that the console can read. */
export class NoAnswerError extends Error {
  constructor(
    message: string,
    readonly requestId: string | null = null,
  ) {
    super(message);
    this.name = "NoAnswerError";
  }
}

/** Whoever sent the call did not wait for its answer. */
export class CancelledError extends Error {
  constructor() {
    super("The call was cancelled.");
    this.name = "CancelledError";
  }
}

/** The same call may succeed when it is sent again unchanged. */
export function isWorthRetrying(error: unknown): boolean {
  if (error instanceof NoAnswerError) return true;
  return error instanceof ProblemError && (error.problem.status >= 500 || error.problem.status === 429);
}
