/** A stream of random numbers that is the same in every run. */
export interface SeededRandom {
  /** Uniform in [0, 1). */
  uniform(): number;
  /** Standard normal, by Box and Muller. */
  normal(): number;
  /** Chi-square with a whole number of degrees of freedom. */
  chiSquare(dof: number): number;
}

/** Mulberry32 (T. Ettinger, public domain): 32 bits of state, good enough for a check at three standard errors. */
export function seededRandom(seed: number): SeededRandom {
  let state = seed >>> 0;
  const uniform = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
  const normal = () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
  const chiSquare = (dof: number) => Array.from({ length: dof }, normal).reduce((sum, z) => sum + z * z, 0);
  return { uniform, normal, chiSquare };
}
