/** Ranks (the smallest value has 1) of the ends of a coverage interval among M sorted values. */
export interface CoverageRanks {
  readonly low: number;
  readonly high: number;
}

/**
 * The probabilistically symmetric coverage interval of M sorted trials (JCGM 101:2008, 7.7): q is the whole number
 * nearest to level·M, the low end has rank r, (M − q)/2 taken up to a whole number, the high end r + q. Null where M is
 * too small to leave a value outside on either side.
 */
export function coverageRanks(count: number, level: number): CoverageRanks | null {
  const inside = Math.floor(level * count + 0.5);
  const low = Math.floor((count - inside + 1) / 2);
  return low >= 1 && low + inside <= count ? { low, high: low + inside } : null;
}

/** A numerical tolerance, and the significant digits that it was taken from. */
export interface NumericalTolerance {
  readonly tolerance: number;
  readonly digits: number;
}

/**
 * The numerical tolerance δ of a standard uncertainty (JCGM 101:2008, 7.9.2): u = c·10^l, c a whole number of n_dig
 * decimal digits; δ = 10^l/2, half a unit of the last digit. `unit` is the size of the unit in which the digits are
 * counted, in the unit of u. n_dig is `digits`; where that is null, 2 for a u that begins with 1, else 1: so δ lies between
 * 0.025·u and 0.25·u. One digit of 1 would allow half of u; two digits of 9 ask for ends known to 0.001·u (clause 8.2),
 * some 10^7 trials, and for more than the few dozen readings behind u can tell. 0 where u is 0, which has no digit.
 */
export function numericalTolerance(
  standard: number,
  digits: number | null,
  unit: number,
): NumericalTolerance {
  const [first = "0", exponent] = (standard / unit).toExponential().split("e");
  const taken = digits ?? (first.startsWith("1") ? 2 : 1);
  if (!(standard > 0)) return { tolerance: 0, digits: taken };
  return { tolerance: Number(`5e${Number(exponent) - taken}`) * unit, digits: taken };
}
