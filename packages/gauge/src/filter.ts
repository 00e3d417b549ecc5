/**
 * Filters that take the tide out of hourly heights, with published weights.
 * @module
 */
import { degreesToRadians, HOUR, InputError, type UniformSeries } from '@staithe/core';
import { cos } from '@staithe/core/trig';

/**
 * The X0 filter of Doodson: 39 weights for hourly heights.
 *
 * Source: A. T. Doodson (1928), as in the trade; weights from memory, checked through their response.
 *
 * @returns Float64Array, length 39, symmetrical, of sum 1.
 * @example
 * doodsonWeights()[0]; // 0.03333333333333333
 * @public
 */
export function doodsonWeights(): Float64Array {
  const half = [1, 0, 1, 0, 0, 1, 0, 1, 1, 0, 2, 0, 1, 1, 0, 2, 1, 1, 2];
  return Float64Array.from([...half, 0, ...half.slice().reverse()], (weight) => weight / 30);
}

/**
 * Running means of 24, 24 and 25 hourly heights, one after the other, as one filter of 71 weights.
 *
 * Source: G. Godin (1972), The Analysis of Tides.
 *
 * @returns Float64Array, length 71, symmetrical, of sum 1.
 * @example
 * godinWeights().length; // 71
 * @public
 */
export function godinWeights(): Float64Array {
  let weights = Float64Array.of(1);
  for (const length of [24, 24, 25]) {
    const next = new Float64Array(weights.length + length - 1);
    weights.forEach((weight, i) => {
      for (let k = 0; k < length; k++) next[i + k] = (next[i + k] as number) + weight;
    });
    weights = next;
  }
  return weights.map((weight) => weight / (24 * 24 * 25));
}

function checkWeights(weights: ArrayLike<number>): void {
  if (weights.length % 2 === 1) return;
  const text = `expected an odd number of weights about a middle one, got ${weights.length}`;
  throw new InputError('OUT_OF_RANGE', 'weights', text);
}

/**
 * Filters a uniform series by symmetrical weights. Where a sample with a weight is missing, or the ends are too near,
 * the result is a gap: filling up would change the response.
 *
 * @param series - Metres; not changed.
 * @param weights - An odd number of them; the middle one stands at the sample itself.
 * @param options - `step`: the step that the weights are made for, milliseconds; default an hour.
 * @returns A series of the same start, step and length.
 * @throws InputError `OUT_OF_RANGE`, path `weights` or `series.step` where the series has another step.
 * @example
 * const level = { start: 0, step: 3600000, values: new Float64Array(71).fill(2) };
 * filterSeries(level, doodsonWeights()).values[35].toFixed(6); // '2.000000'
 * @public
 */
export function filterSeries(
  series: UniformSeries,
  weights: ArrayLike<number>,
  options: { readonly step?: number | undefined } = {},
): UniformSeries {
  checkWeights(weights);
  const { step = HOUR } = options;
  if (series.step !== step) {
    const text = `expected ${step} ms as the weights are made for, got ${series.step}`;
    throw new InputError('OUT_OF_RANGE', 'series.step', text);
  }
  const { values } = series;
  const middle = (weights.length - 1) / 2;
  const out = new Float64Array(values.length).fill(Number.NaN);
  for (let i = middle; i < values.length - middle; i++) {
    let sum = 0;
    for (let k = 0; k < weights.length; k++) {
      const weight = weights[k] as number;
      if (weight !== 0) sum += weight * (values[i - middle + k] as number);
    }
    out[i] = sum;
  }
  return { ...series, values: out };
}

/**
 * What a filter leaves of an oscillation: 1 all, 0 nothing, below 0 turned over.
 *
 * @param weights - Symmetrical, an odd number.
 * @param stepHours - Hours between weights.
 * @param speed - Degrees per hour.
 * @returns The factor of the amplitude.
 * @throws InputError `OUT_OF_RANGE`, path `weights`.
 * @example
 * filterResponse(doodsonWeights(), 1, 1.0980331).toFixed(3); // '0.983'
 * @public
 */
export function filterResponse(
  weights: ArrayLike<number>,
  stepHours: number,
  speed: number,
): number {
  checkWeights(weights);
  const middle = (weights.length - 1) / 2;
  let sum = weights[middle] as number;
  for (let k = 1; k <= middle; k++) {
    const both = (weights[middle - k] as number) + (weights[middle + k] as number);
    sum += both * cos(degreesToRadians(k * stepHours * speed));
  }
  return sum;
}
