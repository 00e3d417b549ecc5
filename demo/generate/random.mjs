/**
 * Seeded random numbers from exact integer arithmetic: the same on every machine.
 *
 * The generator is mulberry32 (T. Ettinger, public domain): one 32-bit word of state, 2^32 numbers before it repeats.
 * Each process draws from a stream of its own, seeded by its name, so that a change in one leaves the others alone.
 * @module
 */

/** The 32-bit FNV-1a hash of a text. @param {string} text */
function hash(text) {
  let word = 0x811c9dc5;
  for (let i = 0; i < text.length; i++) word = Math.imul(word ^ text.charCodeAt(i), 0x01000193);
  return word >>> 0;
}

/**
 * @param {string} name The stream's name, which is its seed.
 * @returns {() => number} Draws from [0, 1).
 */
export function uniformStream(name) {
  let state = hash(name);
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let word = Math.imul(state ^ (state >>> 15), 1 | state);
    word = (word + Math.imul(word ^ (word >>> 7), 61 | word)) ^ word;
    return ((word ^ (word >>> 14)) >>> 0) / 4294967296;
  };
}

/**
 * Nearly normal draws, mean 0 and standard deviation 1: the sum of twelve uniform ones, which needs no logarithm.
 *
 * @param {string} name
 * @returns {() => number}
 */
export function normalStream(name) {
  const draw = uniformStream(name);
  return () => {
    let sum = -6;
    for (let i = 0; i < 12; i++) sum += draw();
    return sum;
  };
}
