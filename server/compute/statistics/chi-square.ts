import { incompleteGamma } from "./incomplete-gamma.ts";
import { newtonOnLogTail } from "./newton-on-log-tail.ts";
import { requireDof, requireProbability } from "./probability.ts";

/** |ln x| stays below this, so that exp of it can be held. */
const logLimit = 700;

/**
 * P(χ² ≤ value) for `dof` degrees of freedom (any positive number): the regularised incomplete gamma function
 * P(dof/2, value/2).
 */
export function chiSquareCumulative(value: number, dof: number): number {
  requireDof(dof);
  if (!(value >= 0)) throw new RangeError(`A chi-square is not negative; ${value} is.`);
  if (value === 0) return 0;
  if (value === Infinity) return 1;
  return Math.exp(incompleteGamma(dof / 2, Math.log(value / 2)).lower.value);
}

/**
 * The value that χ² with `dof` degrees of freedom stays below with the given probability. Solved on the smaller of
 * the two tails, to about 1e-14 relative.
 * @throws ComputeError result_overflow — dof so small that the quantile underflows
 */
export function chiSquareQuantile(probability: number, dof: number): number {
  requireProbability(probability);
  requireDof(dof);
  const a = dof / 2;
  const upper = probability > 0.5;
  // 1 − p is exact for p in [0.5, 1].
  const target = Math.log(upper ? 1 - probability : probability);
  const logX = newtonOnLogTail(
    (u) => (upper ? incompleteGamma(a, u).upper : incompleteGamma(a, u).lower),
    target,
    Math.log(a),
    logLimit,
  );
  return 2 * Math.exp(logX);
}
