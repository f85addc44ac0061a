/** Where a smooth function with one greatest value between `from` and `to` takes it (golden-section search). */
export function placeOfGreatest(value: (at: number) => number, from: number, to: number): number {
  const share = (Math.sqrt(5) - 1) / 2;
  let [low, high] = [from, to];
  for (let i = 0; i < 80; i++) {
    const inner = high - share * (high - low);
    const outer = low + share * (high - low);
    if (value(inner) < value(outer)) low = inner;
    else high = outer;
  }
  return (low + high) / 2;
}

/** Where a function that grows from below 0 to above it crosses 0 (bisection to the last digit). */
export function crossing(value: (at: number) => number, from: number, to: number): number {
  let [low, high] = [from, to];
  for (let i = 0; i < 200; i++) {
    const middle = (low + high) / 2;
    if (value(middle) < 0) low = middle;
    else high = middle;
  }
  return high;
}
