/** Where a stream of random numbers stands: i₁ … i₄, each from 1 to its modulus less 1. Changed by every draw. */
export type StreamState = Float64Array;

/** Moduli and multipliers of the four parts. Moduli are prime; a product of both stays below 2^53 and so is exact. */
export const moduli = [2_147_483_579, 2_147_483_543, 2_147_483_423, 2_147_483_123] as const;
export const multipliers = [11_600, 47_003, 23_000, 33_000] as const;

/**
 * The next number of the stream, uniform on [0, 1): the four-component generator of Wichmann and Hill (Computational
 * Statistics & Data Analysis 51 (2006) 1614), which JCGM 101:2008, C.3 gives. Each iⱼ becomes multiplier · iⱼ modulo
 * its modulus; the sum of the iⱼ over their moduli, less its whole part, is the number. Period 2^121. A pure function
 * of the state: the same state gives the same number on every machine.
 */
export function nextUniform(state: StreamState): number {
  const a = timesModulo(state[0]!, multipliers[0], moduli[0]);
  const b = timesModulo(state[1]!, multipliers[1], moduli[1]);
  const c = timesModulo(state[2]!, multipliers[2], moduli[2]);
  const d = timesModulo(state[3]!, multipliers[3], moduli[3]);
  state[0] = a;
  state[1] = b;
  state[2] = c;
  state[3] = d;
  const sum = a / moduli[0] + b / moduli[1] + c / moduli[2] + d / moduli[3];
  return sum - Math.floor(sum);
}

/** value · multiplier modulo modulus, whole numbers: the quotient of rounded numbers is off by one at most. */
function timesModulo(value: number, multiplier: number, modulus: number): number {
  const product = value * multiplier;
  const rest = product - Math.floor(product / modulus) * modulus;
  if (rest < 0) return rest + modulus;
  return rest >= modulus ? rest - modulus : rest;
}

/** First values of the hash, one a part, so that the parts of one name are unlike: digits of π, e, √2 and √3. */
const hashBases = [0x243f6a88, 0xb7e15162, 0x6a09e667, 0xbb67ae85] as const;

/**
 * The state at which the stream of `name` begins: of the seed (a whole number from 0 to 2^32 − 1) and the name alone,
 * so that neither the order of a list nor what else it holds changes anybody's numbers. Each part by FNV-1a over the
 * seed and the name's code units with the finish of MurmurHash3, both in the public domain.
 */
export function streamOf(seed: number, name: string): StreamState {
  return Float64Array.from(moduli, (modulus, part) => {
    let hash: number = hashBases[part]!;
    const take = (value: number) => {
      hash = Math.imul(hash ^ (value & 0xffff), 0x01000193);
      hash ^= hash >>> 15;
    };
    take(seed);
    take(seed >>> 16);
    for (let i = 0; i < name.length; i++) take(name.charCodeAt(i));
    return 1 + (finished(hash) % (modulus - 1));
  });
}

/** Every bit of the hash turns about half of the bits of this. */
function finished(hash: number): number {
  let mixed = hash ^ (hash >>> 16);
  mixed = Math.imul(mixed, 0x85ebca6b);
  mixed ^= mixed >>> 13;
  mixed = Math.imul(mixed, 0xc2b2ae35);
  return (mixed ^ (mixed >>> 16)) >>> 0;
}
