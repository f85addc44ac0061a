/**
 * A stream of standard normal numbers, the same for one seed in every run: mulberry32 (T. Ettinger, public domain)
 * through Box and Muller. What is made of it is rounded as an instrument rounds, so the last bits of sine and
 * logarithm, which platforms may differ in, do not show.
 */
export function seededNormal(seed: number): () => number {
  let state = seed >>> 0;
  const uniform = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
  return () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
}
