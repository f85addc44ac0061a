/** Pairs held before all are let go: a few hundred kilobytes at most. */
const pairsMax = 4_096;

/**
 * The same function of two numbers, its answers kept: one call of a service asks for the same level and the same few
 * degrees of freedom again and again. `second` may be null. What throws is not kept. At most `pairsMax` answers are
 * held; then all are let go.
 */
export function rememberPairs<Second extends number | null>(
  compute: (first: number, second: Second) => number,
): (first: number, second: Second) => number {
  let held = 0;
  const byFirst = new Map<number, Map<Second, number>>();
  return (first, second) => {
    const known = byFirst.get(first)?.get(second);
    if (known !== undefined) return known;
    const value = compute(first, second);
    if (held >= pairsMax) {
      byFirst.clear();
      held = 0;
    }
    const bySecond = byFirst.get(first) ?? new Map<Second, number>();
    byFirst.set(first, bySecond.set(second, value));
    held++;
    return value;
  };
}
