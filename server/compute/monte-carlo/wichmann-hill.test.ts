import { describe, expect, it } from "vitest";
import { moduli, multipliers, nextUniform, streamOf } from "./wichmann-hill.ts";

/**
 * The same generator as one (H. Zeisel, "A remark on Algorithm AS 183", Applied Statistics 35 (1986) 89): the sum of
 * the iⱼ/mⱼ is X/M with M the product of the moduli, and X ← A·X modulo M, where A leaves each multiplier modulo its
 * modulus. Whole numbers throughout.
 */
function asOneGenerator(seeds: readonly number[]) {
  const m = moduli.map(BigInt);
  const product = m.reduce((a, b) => a * b);
  const power = (base: bigint, exponent: bigint, modulus: bigint): bigint => {
    if (exponent === 0n) return 1n;
    const half = power((base * base) % modulus, exponent / 2n, modulus);
    return exponent % 2n === 1n ? (half * base) % modulus : half;
  };
  const multiplier = multipliers
    .map(BigInt)
    .map((a, j) => {
      const others = product / m[j]!;
      return a * others * power(others, m[j]! - 2n, m[j]!); // Fermat's inverse: the modulus is prime
    })
    .reduce((a, b) => (a + b) % product);
  let state = seeds.map((seed, j) => (BigInt(seed) * product) / m[j]!).reduce((a, b) => (a + b) % product);
  return () => {
    state = (multiplier * state) % product;
    return Number((state * 2n ** 60n) / product) / 2 ** 60;
  };
}

/** The algorithm as JCGM 101:2008, Table C.1 prints it, for whole numbers of 32 bits: constants from memory. */
function asPrinted(seeds: readonly number[]) {
  const i = [...seeds];
  const c = [185_127, 45_688, 93_368, 65_075];
  const d = [10_379, 10_479, 19_423, 8_123];
  return () => {
    let w = 0;
    for (let j = 0; j < 4; j++) {
      i[j] = multipliers[j]! * (i[j]! % c[j]!) - d[j]! * Math.floor(i[j]! / c[j]!);
      if (i[j]! < 0) i[j]! += moduli[j]!;
      w += i[j]! / moduli[j]!;
    }
    return w - Math.floor(w);
  };
}

describe("nextUniform", () => {
  const starts = [
    [1, 1, 1, 1],
    [123_456_789, 345_678_901, 567_890_123, 789_012_345],
    moduli.map((modulus) => modulus - 1),
    [...streamOf(7, "brg-1")],
  ];

  it.each(starts)("is the one generator of its product of moduli, from %i, %i, %i, %i", (...seeds) => {
    const state = Float64Array.from(seeds);
    const one = asOneGenerator(seeds);
    for (let k = 0; k < 2_000; k++) {
      const gap = Math.abs(nextUniform(state) - one());
      expect(Math.min(gap, 1 - gap)).toBeLessThan(1e-15);
    }
  });

  it.each(starts)("is the algorithm of Table C.1 to the last bit, from %i, %i, %i, %i", (...seeds) => {
    const state = Float64Array.from(seeds);
    const printed = asPrinted(seeds);
    for (let k = 0; k < 2_000; k++) expect(nextUniform(state)).toBe(printed());
  });

  it("has moduli whose remainders are those of Table C.1", () => {
    // m = multiplier · c + d
    const c = [185_127, 45_688, 93_368, 65_075];
    const d = [10_379, 10_479, 19_423, 8_123];
    expect(moduli.map((m, j) => [Math.floor(m / multipliers[j]!), m % multipliers[j]!])).toEqual(
      c.map((quotient, j) => [quotient, d[j]]),
    );
    // Their product, as an implementation of the 2006 paper in another language states it.
    expect(moduli.map(BigInt).reduce((a, b) => a * b)).toBe(21267638781707063560975648195455661513n);
  });

  it("has the moments of a uniform distribution, and no memory of the number before", () => {
    const state = streamOf(20_261_201, "moments");
    const n = 400_000;
    const values = Float64Array.from({ length: n }, () => nextUniform(state) - 0.5);
    const mean = values.reduce((sum, value) => sum + value, 0) / n;
    const square = values.reduce((sum, value) => sum + value * value, 0) / n;
    const lagged = values.reduce((sum, value, k) => sum + value * values[(k + 1) % n]!, 0) / n;
    // Standard errors: √(1/12n), √(1/180n), 1/(12·√n); four of each.
    expect(Math.abs(mean)).toBeLessThan(4 * Math.sqrt(1 / (12 * n)));
    expect(Math.abs(square - 1 / 12)).toBeLessThan(4 * Math.sqrt(1 / (180 * n)));
    expect(Math.abs(lagged)).toBeLessThan(4 / (12 * Math.sqrt(n)));
  });

  it("fills squares of successive pairs evenly", () => {
    const state = streamOf(3, "pairs");
    const side = 20;
    const n = 200_000;
    const counts = new Float64Array(side * side);
    for (let k = 0; k < n; k++) {
      const [x, y] = [nextUniform(state), nextUniform(state)];
      counts[Math.floor(x * side) * side + Math.floor(y * side)]! += 1;
    }
    const expected = n / counts.length;
    const chiSquare = counts.reduce((sum, count) => sum + (count - expected) ** 2 / expected, 0);
    // 399 degrees of freedom: mean 399, standard deviation √798.
    expect(Math.abs(chiSquare - 399)).toBeLessThan(4 * Math.sqrt(798));
  });
});

describe("streamOf", () => {
  it("begins every part between 1 and its modulus less 1", () => {
    for (let seed = 0; seed < 2_000; seed++) {
      const state = streamOf(seed * 2_147_483, `cas-${seed}`);
      expect(state.every((part, j) => Number.isInteger(part) && part >= 1 && part < moduli[j]!)).toBe(true);
    }
  });

  it("begins elsewhere for another seed, another name, or the same letters in another order", () => {
    const first = (seed: number, name: string) => streamOf(seed, name).join(" ");
    const starts = ["brg-1", "brg-2", "1-brg", "", "é", "brg-1 "].flatMap((name) =>
      [0, 1, 65_536, 4_294_967_295].map((seed) => first(seed, name)),
    );
    expect(new Set(starts).size).toBe(starts.length);
    expect(first(5, "brg-1")).toBe(first(5, "brg-1"));
  });

  it("gives neighbours that know nothing of each other", () => {
    const n = 20_000;
    const pairs = [
      [streamOf(1, "brg-1"), streamOf(1, "brg-2")],
      [streamOf(1, "brg-1"), streamOf(2, "brg-1")],
    ] as const;
    for (const [left, right] of pairs) {
      let sum = 0;
      for (let k = 0; k < n; k++) sum += (nextUniform(left) - 0.5) * (nextUniform(right) - 0.5);
      expect(Math.abs(sum / n)).toBeLessThan(4 / (12 * Math.sqrt(n)));
    }
  });
});
