import { ComputeError } from "../compute-error.ts";
import { chiSquareQuantile } from "./chi-square.ts";
import { newtonOnLogTail, type LogTail } from "./newton-on-log-tail.ts";
import { requireDof, requireProbability } from "./probability.ts";
import { stirlingCorrection } from "./stirling-correction.ts";

/** |ln t| stays below this, so that t²/dof can be held. */
const logLimit = 300;
const termsMax = 100_000;
/** Below t² = 3 the central probability has the quicker expansion, above it the tail. */
const tailFromSquare = 3;

/**
 * Two-sided Student factor t: P(|T| < t) = level. `dof` is any positive number (Welch–Satterthwaite gives fractions);
 * null is infinite, the normal factor. Solves I_y(dof/2, ½) = 1 − level, y = dof/(dof + t²), I the regularised
 * incomplete beta function (Abramowitz & Stegun 26.7.1), to about 1e-14 relative from dof 0.1 to infinity.
 * @throws ComputeError result_overflow — dof so small that the factor cannot be held
 */
export function studentFactor(level: number, dof: number | null): number {
  requireProbability(level);
  if (dof === null) return Math.sqrt(chiSquareQuantile(level, 1));
  requireDof(dof);
  const logScale = logDensityScale(dof);
  return Math.exp(newtonOnLogTail((u) => logTwoTails(u, dof, logScale), Math.log1p(-level), 0, logLimit));
}

/** ln of √(2π)·(density at 0): c = ln[Γ((n + 1)/2)/(Γ(n/2)·√(n/2))], small for large n and without cancellation. */
function logDensityScale(dof: number): number {
  const a = dof / 2;
  return a * Math.log1p(1 / (2 * a)) - 0.5 + stirlingCorrection(a + 0.5) - stirlingCorrection(a);
}

/** ln P(|T| > t) and its slope, at u = ln t. */
function logTwoTails(u: number, dof: number, logScale: number): LogTail {
  const square = Math.exp(2 * u);
  // y^(n/2)·(1 − y)^½/B(n/2, ½) = t × density(t)
  const logFront = u + logScale - 0.5 * Math.log(2 * Math.PI) - ((dof + 1) / 2) * Math.log1p(square / dof);
  if (square < tailFromSquare) {
    const value = Math.log1p(-2 * Math.exp(logFront) * centralSeries(square, dof));
    return { value, slope: -2 * Math.exp(logFront - value) };
  }
  const fraction = tailFraction(square, dof);
  return { value: logFront - Math.log(fraction), slope: -2 * fraction };
}

/** P(|T| < t)/(2t × density(t)): the hypergeometric series of I_x(½, n/2), x = t²/(n + t²); every term is positive. */
function centralSeries(square: number, dof: number): number {
  const x = square / (dof + square);
  let term = 1;
  let sum = 1;
  for (let k = 0; k < termsMax; k += 1) {
    term *= ((0.5 + dof / 2 + k) / (1.5 + k)) * x;
    sum += term;
    if (term < sum * Number.EPSILON * 0.25) return sum;
  }
  throw new ComputeError("not_converged", "The Student series did not converge.");
}

/**
 * t × density(t)/P(|T| > t): the even part of the continued fraction of I_y(n/2, ½) (Didonato & Morris, ACM TOMS 18
 * (1992) 360, eq. 9), by Lentz's method. For dof → ∞ it becomes the fraction of the normal tail, so that it converges
 * alike for all dof. a(1 − y) − y/2 is written out, since its terms cancel.
 */
function tailFraction(square: number, dof: number): number {
  const a = dof / 2;
  const y = dof / (dof + square);
  const offset = (y * (square - 1)) / 2 + 1;
  const partialDenominator = (m: number) =>
    m + ((m * (0.5 - m)) / (a + 2 * m - 1)) * y + ((a + m) / (a + 2 * m + 1)) * (offset + m * (2 - y));
  let value = (a / (a + 1)) * offset;
  let c = value;
  let d = 0;
  for (let m = 1; m < termsMax; m += 1) {
    const shared = y / (a + 2 * m - 1);
    const numerator = (a + m - 1) * shared * ((a + m - 0.5) * shared) * m * (0.5 - m);
    const denominator = partialDenominator(m);
    d = 1 / (denominator + numerator * d);
    c = denominator + numerator / c;
    const factor = c * d;
    value *= factor;
    if (Math.abs(factor - 1) < Number.EPSILON) return value;
  }
  throw new ComputeError("not_converged", "The Student fraction did not converge.");
}
