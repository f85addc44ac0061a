/** Columns of `count` numbers out of one allocation: for a few dozen readings that costs more than a whole fit does. */
export function columns(count: number, many: number): Float64Array[] {
  const buffer = new ArrayBuffer(count * many * Float64Array.BYTES_PER_ELEMENT);
  return Array.from(
    { length: many },
    (_, k) => new Float64Array(buffer, k * count * Float64Array.BYTES_PER_ELEMENT, count),
  );
}
