/** Coefficients B₂ₖ / (2k(2k − 1)) of Stirling's series, k = 1 … 8 (Abramowitz & Stegun 6.1.40). */
const series = [
  1 / 12,
  -1 / 360,
  1 / 1260,
  -1 / 1680,
  1 / 1188,
  -691 / 360360,
  1 / 156,
  -3617 / 122400,
] as const;
/** From here on the eight terms are good to the last bit. */
const seriesFrom = 10;

/**
 * What Stirling's formula leaves out of the logarithm of the gamma function:
 * δ(a) = ln Γ(a) − [(a − ½)·ln a − a + ½·ln 2π], a > 0. Kept apart so that quotients of gamma functions of large
 * arguments do not lose their digits in the difference of two large logarithms.
 */
export function stirlingCorrection(a: number): number {
  let shifted = a;
  let shift = 0;
  while (shifted < seriesFrom) {
    // δ(a) = δ(a + 1) + (a + ½)·ln(1 + 1/a) − 1
    shift += (shifted + 0.5) * Math.log1p(1 / shifted) - 1;
    shifted += 1;
  }
  const inverse = 1 / shifted;
  const inverseSquare = inverse * inverse;
  return shift + inverse * series.reduceRight((sum, coefficient) => sum * inverseSquare + coefficient, 0);
}
