/**
 * Noise with the amplitudes of a spectrum and phases of chance (J. Theiler and others 1992).
 * @module
 */
import type { Progress } from '@staithe/core';
import { sinCosInto } from '@staithe/core/trig';
import { nextShare, type RandomState } from './random.js';
import type { Spectrum } from './spectrum.js';
import { transform } from './transform.js';

const SLICE = 16384; // phases between two yields: about a millisecond

/**
 * Draws two series: one, and the same with each wave a quarter turn on. The two tell the same of cosine and sine of a
 * line, so that chance makes neither look surer.
 *
 * @param spectrum - Of `spectrumOf`.
 * @param random - Moves on.
 * @param first - Written to.
 * @param second - Written to.
 */
export function* drawPhases(
  { amplitudes, turns, re, im }: Spectrum,
  random: RandomState,
  first: Float64Array,
  second: Float64Array,
): Generator<Progress, void, void> {
  const count = amplitudes.length;
  re.fill(0, count);
  im.fill(0, count);
  const pair = new Float64Array(2);
  for (let k = 0; k < count; k++) {
    sinCosInto(2 * Math.PI * nextShare(random), pair);
    const size = amplitudes[k] as number;
    re[k] = size * (pair[1] as number);
    im[k] = size * (pair[0] as number);
    if (k % SLICE === SLICE - 1) yield { done: k, total: count, stage: 'phases' };
  }
  yield* transform(re, im, turns);
  first.set(re.subarray(0, first.length));
  second.set(im.subarray(0, second.length));
}
