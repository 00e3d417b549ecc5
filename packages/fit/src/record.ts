/**
 * A record as the fit sees it: times, values, weights, what is missing, how long it is, how it was sampled.
 * @module
 */
import {
  checkSeries,
  ComputationError,
  DAY,
  InputError,
  type Instant,
  refuse,
  type Series,
  seriesTimes,
} from '@staithe/core';
import { cadenceOf, usualStep } from './cadence.js';

/** What the results say of a record. Plain data. */
export interface RecordSummary {
  readonly samples: number;
  readonly missing: number;
  readonly from: Instant;
  readonly to: Instant;
  /** From the first to the last sample, one (usual) step included. */
  readonly days: number;
  /** Milliseconds of which all steps are whole multiples, as far as the sampling shows; 0: irregular. */
  readonly cadence: number;
}

/** The record of a fit. */
export interface FitRecord extends RecordSummary {
  readonly series: Series;
  readonly times: Float64Array;
  /** NaN where no sample takes part. */
  readonly values: Float64Array;
  /** Milliseconds where times are uniform, else 0. */
  readonly step: number;
  /** One a time, 0 or more; absent: all alike. */
  readonly weights?: Float64Array | undefined;
}

const LARGEST = 1e6; // m: beyond, squares lose what the tide is

/** Weights of the caller: one a sample of the record, 0 or more. */
function readWeights(
  weights: ArrayLike<number> | undefined,
  count: number,
): Float64Array | undefined {
  if (weights === undefined) return undefined;
  if (weights.length !== count) {
    throw new InputError(
      'LENGTH_MISMATCH',
      'options.weights',
      `expected ${count} numbers, one a time of the record, got ${weights.length}`,
    );
  }
  for (let i = 0; i < count; i++) {
    const weight = weights[i] as number;
    if (!(weight >= 0 && weight < Infinity)) {
      refuse('OUT_OF_RANGE', `options.weights[${i}]`, 'a finite number, 0 or more', weight);
    }
  }
  // Their unit says nothing: the largest first, so that none overflows, then a mean of 1 over those that count.
  const largest = Array.from(weights).reduce((most, weight) => Math.max(most, weight), 0);
  if (largest === 0) return new Float64Array(count);
  const scaled = Float64Array.from(weights, (weight) => weight / largest);
  const counted = scaled.filter((weight) => weight > 0);
  const mean = counted.reduce((sum, weight) => sum + weight, 0) / counted.length;
  return scaled.map((weight) => weight / mean);
}

/**
 * Reads a record. A sample of weight 0 is left out like a gap.
 *
 * @param input - Metres; NaN is a gap.
 * @param given - Weights of the caller.
 * @param mayStand - Whether all values may be the same.
 * @throws InputError of `checkSeries`; ComputationError `TOO_FEW_SAMPLES` below two samples, `NO_TIDE` where all values
 *   are the same.
 */
export function readRecord(input: Series, given?: ArrayLike<number>, mayStand = false): FitRecord {
  const series = checkSeries(input);
  const times = seriesTimes(series);
  const weights = readWeights(given, times.length);
  const values = weights
    ? series.values.map((value, i) => (weights[i] === 0 ? Number.NaN : value))
    : series.values;
  let samples = 0;
  let first = -1;
  let last = -1;
  let low = Infinity;
  let high = -Infinity;
  for (let i = 0; i < values.length; i++) {
    const value = values[i] as number;
    if (Number.isNaN(value)) continue;
    if (Math.abs(value) > LARGEST) {
      refuse('OUT_OF_RANGE', `values[${i}]`, `metres up to ${LARGEST}`, value);
    }
    if (first < 0) first = i;
    last = i;
    samples++;
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  const missing = values.length - samples;
  if (samples < 2) {
    throw new ComputationError(
      'TOO_FEW_SAMPLES',
      `expected 2 samples or more that are not gaps, got ${samples}`,
      { samples, missing },
    );
  }
  if (low === high && !mayStand) {
    throw new ComputationError(
      'NO_TIDE',
      `expected values that change, got ${low} at each of ${samples} samples`,
      { samples },
    );
  }
  const step = series.times ? 0 : series.step;
  const [from, to] = [times[first] as number, times[last] as number];
  return {
    series,
    times,
    values,
    step,
    ...(weights ? { weights } : {}),
    samples,
    missing,
    from,
    to,
    days: (to - from + (step || usualStep(times))) / DAY,
    cadence: step || cadenceOf(times.filter((_, i) => !Number.isNaN(values[i]))),
  };
}
