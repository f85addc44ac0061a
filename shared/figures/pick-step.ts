/** The largest of 1, 2, 5 × 10ⁿ that is not above `size`: what a scale is divided by. */
export function stepAtMost(size: number): number {
  const decade = 10 ** Math.floor(Math.log10(size));
  const lead = size / decade;
  // A hair of room, so that 4.999999999 counts as 5.
  const step = [10, 5, 2, 1].find((candidate) => lead >= candidate * (1 - 1e-12)) ?? 1;
  return step * decade;
}

/** Multiples of a 1, 2, 5 step inside [low, high], about `count` of them. */
export function ticksBetween(low: number, high: number, count: number): number[] {
  if (!(high > low)) return [];
  const step = stepAtMost(((high - low) / Math.max(1, count)) * 1.25);
  const first = Math.ceil(low / step - 1e-9);
  const last = Math.floor(high / step + 1e-9);
  return Array.from({ length: last - first + 1 }, (_, index) => (first + index) * step || 0);
}
