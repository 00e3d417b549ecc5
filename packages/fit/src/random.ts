/**
 * Random whole numbers from a seed, the same in every engine: xoshiro128** (D. Blackman and S. Vigna 2021), whose state
 * is filled by a counter through a mixing function (G. Steele, D. Lea and C. Flood 2014, with the multipliers of
 * MurmurHash3, A. Appleby).
 * @module
 */

const COUNTER = 0x9e3779b9; // 2^32 over the golden ratio
const TWO_32 = 4294967296;

function mixed(value: number): number {
  let x = value;
  x = Math.imul(x ^ (x >>> 16), 0x85ebca6b);
  x = Math.imul(x ^ (x >>> 13), 0xc2b2ae35);
  return x ^ (x >>> 16);
}

const rotated = (x: number, by: number): number => (x << by) | (x >>> (32 - by));

/** The state of a generator. Four numbers of 32 bits, written to at each call. */
export type RandomState = Int32Array;

/**
 * @param seed - Any safe integer.
 * @returns The state that it starts from.
 */
export function seeded(seed: number): RandomState {
  const high = Math.floor(seed / TWO_32);
  let counter = mixed(high) ^ (seed - high * TWO_32);
  return Int32Array.from({ length: 4 }, () => {
    counter = (counter + COUNTER) | 0;
    return mixed(counter);
  });
}

/** The next number, 0 to 2^32 − 1. */
export function nextWhole(state: RandomState): number {
  const a = state[0] as number;
  const b = state[1] as number;
  const out = Math.imul(rotated(Math.imul(b, 5), 7), 9) >>> 0;
  const e = (state[2] as number) ^ a;
  const f = (state[3] as number) ^ b;
  state[0] = a ^ f;
  state[1] = b ^ e;
  state[2] = e ^ (b << 9);
  state[3] = rotated(f, 11);
  return out;
}

/** The next number in [0, 1), a multiple of 2^−32. */
export function nextShare(state: RandomState): number {
  return nextWhole(state) / TWO_32;
}
