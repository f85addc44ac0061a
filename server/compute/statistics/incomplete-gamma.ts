import { ComputeError } from "../compute-error.ts";
import type { LogTail } from "./newton-on-log-tail.ts";
import { stirlingCorrection } from "./stirling-correction.ts";

const termsMax = 100_000;

/**
 * Regularised incomplete gamma functions P(a, x) (lower) and Q(a, x) = 1 − P (upper) at x = exp(logX), as logarithms
 * with their slopes in ln x: the power series (Abramowitz & Stegun 6.5.29) below a + 1, the even part of Legendre's
 * continued fraction (6.5.31) above, so that neither tail is found as a difference where it is small. About √a terms.
 * @throws ComputeError not_converged — a beyond some 1e8
 */
export function incompleteGamma(
  a: number,
  logX: number,
): { readonly lower: LogTail; readonly upper: LogTail } {
  const x = Math.exp(logX);
  const logFront = logPower(a, x, logX);
  if (x < a + 1) {
    const series = lowerSeries(a, x);
    const logLower = logFront + Math.log(series);
    const logUpper = Math.log(-Math.expm1(logLower));
    return {
      lower: { value: logLower, slope: 1 / series },
      upper: { value: logUpper, slope: -Math.exp(logFront - logUpper) },
    };
  }
  const fraction = upperFraction(a, x);
  const logUpper = logFront - Math.log(fraction);
  const logLower = Math.log1p(-Math.exp(logUpper));
  return {
    lower: { value: logLower, slope: Math.exp(logFront - logLower) },
    upper: { value: logUpper, slope: -fraction },
  };
}

/** ln(xᵃ·e⁻ˣ/Γ(a)) = ln(x × density of the gamma distribution), through x/a so that large a keeps its digits. */
function logPower(a: number, x: number, logX: number): number {
  const relative = (x - a) / a;
  const exponent =
    Math.abs(relative) < 0.5 ? a * (Math.log1p(relative) - relative) : a * (logX - Math.log(a)) - (x - a);
  return exponent + 0.5 * Math.log(a / (2 * Math.PI)) - stirlingCorrection(a);
}

/** P(a, x)·Γ(a)/(xᵃ·e⁻ˣ) = Σ xᵏ/(a(a + 1)…(a + k)). */
function lowerSeries(a: number, x: number): number {
  let term = 1 / a;
  let sum = term;
  for (let k = 1; k < termsMax; k += 1) {
    term *= x / (a + k);
    sum += term;
    if (term < sum * Number.EPSILON * 0.25) return sum;
  }
  throw new ComputeError("not_converged", "The incomplete gamma series did not converge.");
}

/** xᵃ·e⁻ˣ/(Γ(a)·Q(a, x)) = x + 1 − a − 1(1 − a)/(x + 3 − a − …), by Lentz's method. */
function upperFraction(a: number, x: number): number {
  let value = x + 1 - a;
  let c = value;
  let d = 0;
  for (let m = 1; m < termsMax; m += 1) {
    const numerator = -m * (m - a);
    const denominator = x + 2 * m + 1 - a;
    d = 1 / (denominator + numerator * d);
    c = denominator + numerator / c;
    const factor = c * d;
    value *= factor;
    if (Math.abs(factor - 1) < Number.EPSILON) return value;
  }
  throw new ComputeError("not_converged", "The incomplete gamma fraction did not converge.");
}
