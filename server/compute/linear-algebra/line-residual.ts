/** 2²⁷ + 1 halves the 53 bits of a double (Dekker, Numerische Mathematik 18 (1971) 224). */
const splitter = 134_217_729;

/** What the sum a + b lost to rounding: a + b = sum + lost, exactly (Knuth). */
function lostInSum(a: number, b: number, sum: number): number {
  const bAsAdded = sum - a;
  return a - (sum - bAsAdded) + (b - bAsAdded);
}

/** What the product a·b lost to rounding: a·b = product + lost, exactly (Dekker). */
function lostInProduct(a: number, b: number, product: number): number {
  const aWide = splitter * a;
  const aHigh = aWide - (aWide - a);
  const aLow = a - aHigh;
  const bWide = splitter * b;
  const bHigh = bWide - (bWide - b);
  const bLow = b - bHigh;
  return aLow * bLow - (product - aHigh * bHigh - aLow * bHigh - aHigh * bLow);
}

/**
 * y − at0 − slope·z with twice the working precision inside, rounded once: what iterative refinement of a line needs
 * (Björck, BIT 7 (1967) 257), since the three terms cancel almost wholly. Magnitudes below 1e140.
 */
export function lineResidual(y: number, at0: number, slope: number, z: number): number {
  const product = slope * z;
  const fromIntercept = y - at0;
  const difference = fromIntercept - product;
  return (
    difference +
    (lostInSum(y, -at0, fromIntercept) +
      lostInSum(fromIntercept, -product, difference) -
      lostInProduct(slope, z, product))
  );
}
