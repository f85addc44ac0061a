import { ComputeError } from "../compute-error.ts";

/** A tail probability on logarithmic scales: its logarithm at u = ln x, and the slope of that logarithm in u. */
export interface LogTail {
  readonly value: number;
  readonly slope: number;
}

/** Iterations are quadratic near the root, so one step this small (in ln x) leaves an error of its square. */
const lastStep = 1e-9;
const iterationsMax = 200;

/**
 * Solves logTail(u) = target by Newton's method. Where the density of ln x is log-concave (chi-square, Student) both
 * tails are concave on these scales, so that after the first step the iteration approaches its root from one side
 * and cannot run away. `limit` keeps |u| where exp(u) can be held.
 * @throws ComputeError result_overflow — the root lies beyond `limit`; not_converged
 */
export function newtonOnLogTail(
  logTail: (u: number) => LogTail,
  target: number,
  start: number,
  limit: number,
): number {
  let u = start;
  for (let iteration = 0; iteration < iterationsMax; iteration += 1) {
    const { value, slope } = logTail(u);
    const step = (target - value) / slope;
    const next = Math.min(limit, Math.max(-limit, u + step));
    if (next === u && Math.abs(u) === limit) {
      throw new ComputeError("result_overflow", "The quantile is too large or too small for a number.");
    }
    if (Math.abs(step) < lastStep) return next;
    u = next;
  }
  throw new ComputeError("not_converged", "The quantile did not converge.");
}
