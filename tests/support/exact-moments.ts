/** A double as a whole number of 2^-1074. */
function exact(value: number): bigint {
  const view = new DataView(new ArrayBuffer(8));
  view.setFloat64(0, value);
  const bits = view.getBigUint64(0);
  const exponent = Number((bits >> 52n) & 0x7ffn);
  const fraction = bits & 0xfffffffffffffn;
  const size = exponent === 0 ? fraction : (fraction | 0x10000000000000n) << BigInt(exponent - 1);
  return bits >> 63n ? -size : size;
}

const guardBits = 200n;

/** numerator/denominator to the last bit or two of a double. */
function quotient(numerator: bigint, denominator: bigint): number {
  const length = (value: bigint) => BigInt((value < 0n ? -value : value).toString(2).length);
  const shift = length(denominator) - length(numerator) + guardBits;
  const scaled = shift >= 0n ? (numerator << shift) / denominator : numerator / (denominator << -shift);
  return Number(scaled) * 2 ** -Number(shift);
}

/** Mean, standard deviation (n − 1) and lag-1 autocorrelation of the doubles as they are held, by whole numbers alone. */
export function exactMoments(readings: readonly number[]): {
  mean: number;
  sd: number;
  autocorrelation_lag1: number;
} {
  const n = BigInt(readings.length);
  const held = readings.map(exact);
  const sum = held.reduce((total, value) => total + value, 0n);
  const off = held.map((value) => n * value - sum);
  const squares = off.reduce((total, value) => total + value * value, 0n);
  const lagged = off.slice(1).reduce((total, value, i) => total + value * (off[i] ?? 0n), 0n);
  const unit = 1n << 1074n;
  return {
    mean: quotient(sum, n * unit),
    sd: Math.sqrt(quotient(squares, n * n * (n - 1n) * unit * unit)),
    autocorrelation_lag1: quotient(lagged, squares),
  };
}
