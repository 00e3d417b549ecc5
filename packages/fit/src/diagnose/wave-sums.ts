/**
 * Sums of samples with a wave, Σ v·e^{−iωt}, and waves taken off samples: in blocks, by rotation where times are uniform.
 * @module
 */
import { degreesToRadians, wrapDegrees } from '@staithe/core';
import { sinCosInto } from '@staithe/core/trig';

const BLOCK = 512; // samples between two restarts of the rotation

/** Times of samples. */
export interface Clock {
  readonly hours: Float64Array;
  /** Hours where they are uniform, else 0. */
  readonly step: number;
}

/** Buffers of a block. */
interface Wave {
  readonly cosines: Float64Array;
  readonly sines: Float64Array;
  readonly pair: Float64Array;
}

function makeWave(): Wave {
  return {
    cosines: new Float64Array(BLOCK),
    sines: new Float64Array(BLOCK),
    pair: new Float64Array(2),
  };
}

/** Writes cosine and sine of speed·hours for the times [from, to). */
function waveInto(
  { cosines, sines, pair }: Wave,
  { hours, step }: Clock,
  speed: number,
  from: number,
  to: number,
): void {
  sinCosInto(degreesToRadians(wrapDegrees(speed * step)), pair);
  const turnSin = pair[0] as number;
  const turnCos = pair[1] as number;
  let s = 0;
  let c = 1;
  for (let i = from; i < to; i++) {
    if (step === 0 || i === from) {
      sinCosInto(degreesToRadians(wrapDegrees(speed * (hours[i] as number))), pair);
      s = pair[0] as number;
      c = pair[1] as number;
    }
    cosines[i - from] = c;
    sines[i - from] = s;
    const turned = c * turnCos - s * turnSin;
    s = c * turnSin + s * turnCos;
    c = turned;
  }
}

/**
 * @param out - Written to: Σ v·cos ωt, Σ v·sin ωt.
 * @param values - One a time; 0 at gaps.
 * @param clock - Times.
 * @param speed - Degrees per hour.
 */
export function waveSumInto(
  out: Float64Array,
  values: Float64Array,
  clock: Clock,
  speed: number,
): void {
  const wave = makeWave();
  const { cosines, sines } = wave;
  let re = 0;
  let im = 0;
  for (let from = 0; from < values.length; from += BLOCK) {
    const to = Math.min(values.length, from + BLOCK);
    waveInto(wave, clock, speed, from, to);
    for (let i = from; i < to; i++) {
      re += (values[i] as number) * (cosines[i - from] as number);
      im += (values[i] as number) * (sines[i - from] as number);
    }
  }
  out[0] = re;
  out[1] = im;
}

/**
 * Adds weight·(a·cos ωt + b·sin ωt) to values.
 *
 * @param values - Written to.
 * @param weights - One a time: 1 at samples, 0 at gaps.
 * @param clock - Times.
 * @param speed - Degrees per hour.
 * @param a - Metres.
 * @param b - Metres.
 */
export function addWave(
  values: Float64Array,
  weights: Float64Array,
  clock: Clock,
  speed: number,
  a: number,
  b: number,
): void {
  const wave = makeWave();
  const { cosines, sines } = wave;
  for (let from = 0; from < values.length; from += BLOCK) {
    const to = Math.min(values.length, from + BLOCK);
    waveInto(wave, clock, speed, from, to);
    for (let i = from; i < to; i++) {
      const height = a * (cosines[i - from] as number) + b * (sines[i - from] as number);
      values[i] = (values[i] as number) + (weights[i] as number) * height;
    }
  }
}
