import { ComputeError } from "../compute-error.ts";
import { stirlingCorrection } from "./stirling-correction.ts";

const termsMax = 100_000;
/** Stands for a denominator of 0 in Lentz's method. */
const tiny = 1e-300;

/**
 * Regularised incomplete beta function I_x(a, b), a and b above 0, y = 1 − x passed beside x so that neither is found as
 * a difference: the continued fraction of Abramowitz & Stegun 26.5.8 by Lentz's method, on the side of the mean
 * (a + 1)/(a + b + 2) where it converges in about √max(a, b) terms.
 * @throws ComputeError not_converged — a or b beyond some 1e8
 */
export function incompleteBeta(a: number, b: number, x: number, y: number): number {
  if (x <= 0) return 0;
  if (y <= 0) return 1;
  if (x > (a + 1) / (a + b + 2)) return 1 - lowerBeta(b, a, y, x);
  return lowerBeta(a, b, x, y);
}

function lowerBeta(a: number, b: number, x: number, y: number): number {
  return (Math.exp(logPower(a, b, x, y)) * fraction(a, b, x)) / a;
}

/**
 * ln(xᵃ·yᵇ/B(a, b)), through the distance from the mode, x·b − y·a, and what Stirling's formula leaves out, so that
 * large a and b keep their digits.
 */
function logPower(a: number, b: number, x: number, y: number): number {
  const sum = a + b;
  const offset = x * b - y * a;
  return (
    a * logRatio(offset / a, (x * sum) / a) +
    b * logRatio(-offset / b, (y * sum) / b) +
    0.5 * Math.log((a / (2 * Math.PI)) * (b / sum)) +
    stirlingCorrection(sum) -
    stirlingCorrection(a) -
    stirlingCorrection(b)
  );
}

/** ln(ratio), from ratio − 1 where that is small. */
function logRatio(lessOne: number, ratio: number): number {
  return Math.abs(lessOne) < 0.5 ? Math.log1p(lessOne) : Math.log(ratio);
}

function fraction(a: number, b: number, x: number): number {
  const guarded = (value: number) => (Math.abs(value) < tiny ? tiny : value);
  let c = 1;
  let d = 1 / guarded(1 - ((a + b) * x) / (a + 1));
  let value = d;
  for (let m = 1; m < termsMax; m += 1) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / guarded(1 + even * d);
    c = guarded(1 + even / c);
    value *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / guarded(1 + odd * d);
    c = guarded(1 + odd / c);
    const factor = d * c;
    value *= factor;
    if (Math.abs(factor - 1) < Number.EPSILON) return value;
  }
  throw new ComputeError("not_converged", "The incomplete beta fraction did not converge.");
}
