/**
 * The discrete Fourier transform of 2^m numbers, in place (J. Cooley and J. Tukey 1965): Σ x·e^{−2πikt/n}.
 * @module
 */
import type { Progress } from '@staithe/core';
import { sinCosInto } from '@staithe/core/trig';

/** What transforms of one length share. */
export interface Turns {
  /** cos 2πk/n, k below n/2. */
  readonly cosines: Float64Array;
  /** sin 2πk/n. */
  readonly sines: Float64Array;
}

const BLOCK = 16384; // numbers that stay near the processor; also what is done between two yields: about 1 ms
const STAGE = 'transform';

/** The smallest power of two that is not below a number. */
export function powerOfTwo(least: number): number {
  let length = 1;
  while (length < least) length *= 2;
  return length;
}

/** @param length - A power of two, 2 or more. */
export function* turnsOf(length: number): Generator<Progress, Turns, void> {
  const half = length / 2;
  const cosines = new Float64Array(half);
  const sines = new Float64Array(half);
  const pair = new Float64Array(2);
  for (let k = 0; k < half; k++) {
    sinCosInto((2 * Math.PI * k) / length, pair);
    sines[k] = pair[0] as number;
    cosines[k] = pair[1] as number;
    if (k % BLOCK === BLOCK - 1) yield { done: k, total: half, stage: STAGE };
  }
  return { cosines, sines };
}

/** Puts numbers [from, to) where their reversed binary places say. */
function reverse(re: Float64Array, im: Float64Array, from: number, to: number): void {
  const n = re.length;
  let j = 0;
  for (let bit = 1, mirror = n >> 1; bit < n; bit <<= 1, mirror >>= 1) if (from & bit) j |= mirror;
  for (let i = from; i < to; i++) {
    if (i < j) {
      const a = re[i] as number;
      const b = im[i] as number;
      re[i] = re[j] as number;
      im[i] = im[j] as number;
      re[j] = a;
      im[j] = b;
    }
    let bit = n >> 1;
    while (j & bit) {
      j ^= bit;
      bit >>= 1;
    }
    j |= bit;
  }
}

/** Joins two transforms of `half` numbers that lie one after the other, over k in [from, to). */
function join(
  re: Float64Array,
  im: Float64Array,
  { cosines, sines }: Turns,
  start: number,
  half: number,
  from: number,
  to: number,
): void {
  const stride = cosines.length / half;
  for (let k = from; k < to; k++) {
    const c = cosines[k * stride] as number;
    const s = sines[k * stride] as number;
    const i = start + k;
    const j = i + half;
    const x = re[j] as number;
    const y = im[j] as number;
    const a = x * c + y * s;
    const b = y * c - x * s;
    const u = re[i] as number;
    const v = im[i] as number;
    re[j] = u - a;
    im[j] = v - b;
    re[i] = u + a;
    im[i] = v + b;
  }
}

/**
 * Transforms numbers where they are.
 *
 * @param re - Real parts, a power of two of them; written to.
 * @param im - Imaginary parts; written to.
 * @param turns - Of {@link turnsOf} for their count.
 */
export function* transform(
  re: Float64Array,
  im: Float64Array,
  turns: Turns,
): Generator<Progress, void, void> {
  const n = re.length;
  const block = Math.min(n, BLOCK);
  for (let from = 0; from < n; from += block) {
    reverse(re, im, from, from + block);
    yield { done: from, total: n, stage: STAGE };
  }
  for (let from = 0; from < n; from += block) {
    for (let half = 1; half < block; half *= 2) {
      for (let start = from; start < from + block; start += 2 * half) {
        join(re, im, turns, start, half, 0, half);
      }
    }
    yield { done: from, total: n, stage: STAGE };
  }
  for (let half = block; half < n; half *= 2) {
    for (let start = 0; start < n; start += 2 * half) {
      for (let from = 0; from < half; from += block) {
        join(re, im, turns, start, half, from, from + block);
        yield { done: start, total: n, stage: STAGE };
      }
    }
  }
}
