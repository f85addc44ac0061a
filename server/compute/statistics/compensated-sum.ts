/**
 * Sum of numbers with what every addition loses to rounding carried along (Neumaier, ZAMM 54 (1974) 39): exact to
 * twice the working precision, rounded once.
 */
export function compensatedSum(values: ArrayLike<number>): number {
  let sum = 0;
  let lost = 0;
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i]!;
    const next = sum + value;
    lost += Math.abs(sum) >= Math.abs(value) ? sum - next + value : value - next + sum;
    sum = next;
  }
  return sum + lost;
}
