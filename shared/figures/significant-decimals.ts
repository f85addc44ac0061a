const figuresSeen = 3;
const mostDecimals = 15;

/** Decimals at which three figures of the smallest of `values` that is not 0 are seen, never fewer than `least`. */
export function decimalsForSmallest(values: readonly (number | null | undefined)[], least: number): number {
  const sizes = values.map((value) => Math.abs(value ?? 0)).filter((size) => size > 0);
  if (sizes.length === 0) return least;
  const needed = figuresSeen - 1 - Math.floor(Math.log10(Math.min(...sizes)));
  return Math.min(mostDecimals, Math.max(least, needed));
}
