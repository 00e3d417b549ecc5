/**
 * Error bars of a fit of two kinds of rows, each with its own noise at each line.
 *
 * With G = G₁ + G₂ the products of weighted heights and slopes, white noise of either gives the coefficients the covariances
 * G⁻¹G₁G⁻¹ and G⁻¹G₂G⁻¹. Each is taken times the noise that its kind of row feels at the lines of the two columns.
 * @module
 */
import type { Progress } from '@staithe/core';
import { type Design, headCount } from '../design.js';
import type { Estimate } from '../estimate.js';
import type { LineNoise } from '../noise.js';
import { allLines, lineNoiseOf } from '../noise-of.js';
import type { Rows } from '../rows.js';
import { type Shares, varianceOf } from './turn.js';

/** Noise of heights at each line, and the covariance of the coefficients. */
export interface TurningErrors {
  readonly noise: readonly LineNoise[];
  readonly covariance: Float64Array;
}

/** √density of the line of each column. */
function sigmasOf(design: Design, noise: readonly LineNoise[]): Float64Array {
  const head = headCount(design);
  return Float64Array.from(design.order, (_, k) => {
    const line = k < head ? 0 : 1 + ((k - head) >> 1);
    return Math.sqrt((noise[line] as LineNoise).density);
  });
}

function* product(
  a: Float64Array,
  b: Float64Array,
  count: number,
): Generator<Progress, Float64Array, void> {
  const out = new Float64Array(count * count);
  for (let i = 0; i < count; i++) {
    for (let k = 0; k < count; k++) {
      const factor = a[i * count + k] as number;
      for (let j = 0; j < count; j++) {
        const at = i * count + j;
        out[at] = (out[at] as number) + factor * (b[k * count + j] as number);
      }
    }
  }
  yield { done: 1, total: 1, stage: 'errors' };
  return out;
}

/**
 * The errors of a fit of heights and slopes.
 *
 * @param found - The fit.
 * @param shares - Of its rows.
 * @param times - As they were read: those of the rows may cross.
 * @param spectral - Whether the noise beside each line counts, or that of all.
 * @param wanted - Lines to listen beside; the others are taken to feel white noise.
 */
export function* turningErrors(
  { solved: { design }, blocks, residuals }: Estimate,
  { inverse, heights, parameters }: Shares,
  times: Float64Array,
  spectral: boolean,
  wanted: readonly number[] = allLines(design),
): Generator<Progress, TurningErrors, void> {
  const count = design.order.length;
  const noiseOf = function* (kind: 0 | 1): Generator<Progress, readonly LineNoise[], void> {
    const rows = blocks[kind] as Rows;
    const residual = (residuals[kind] as readonly Float64Array[])[0] as Float64Array;
    const density = varianceOf(rows.weights, residual, parameters[kind]);
    const noise = allLines(design).map((): LineNoise => ({ density, bins: 0 }));
    if (!spectral) return noise;
    const at = { ...rows, times };
    const found = yield* lineNoiseOf(design, at, residual, density, wanted, undefined);
    wanted.forEach((line, i) => {
      noise[line] = found[i] as LineNoise;
    });
    return noise;
  };
  const ofHeights = yield* noiseOf(0);
  const ofSlopes = yield* noiseOf(1);
  const [high, flat] = [sigmasOf(design, ofHeights), sigmasOf(design, ofSlopes)];
  // G⁻¹ − G⁻¹G₁G⁻¹ is what the slopes leave.
  const half = yield* product(inverse, heights, count);
  const own = yield* product(half, inverse, count);
  const covariance = inverse.map((all, at) => {
    const [i, j] = [Math.floor(at / count), at % count];
    const ofHigh = (high[i] as number) * (high[j] as number);
    const ofFlat = (flat[i] as number) * (flat[j] as number);
    return (own[at] as number) * ofHigh + (all - (own[at] as number)) * ofFlat;
  });
  // A variance that rests on both is as sure as the less sure of them, or surer.
  const noise = ofHeights.map(({ density, bins }, line) => {
    const other = (ofSlopes[line] as LineNoise).bins;
    return { density, bins: bins && other ? Math.min(bins, other) : Math.max(bins, other) };
  });
  return { noise, covariance };
}
