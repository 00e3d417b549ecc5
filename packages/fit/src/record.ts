/**
 * A record as the fit sees it: times, values, what is missing, how long it is.
 * @module
 */
import {
  checkSeries,
  ComputationError,
  DAY,
  type Instant,
  refuse,
  type Series,
  seriesTimes,
} from '@staithe/core';

/** The record of a fit. */
export interface FitRecord {
  readonly series: Series;
  readonly times: Float64Array;
  readonly values: Float64Array;
  /** Milliseconds where times are uniform, else 0. */
  readonly step: number;
  readonly samples: number;
  readonly from: Instant;
  readonly to: Instant;
  /** From the first to the last sample, one (median) step included. */
  readonly days: number;
}

const LARGEST = 1e6; // m: beyond, squares lose what the tide is

function medianStep(times: Float64Array): number {
  const steps = Float64Array.from({ length: Math.max(0, times.length - 1) }, (_, i) => {
    return (times[i + 1] as number) - (times[i] as number);
  }).sort();
  return steps[steps.length >> 1] ?? 0;
}

/**
 * Reads a record.
 *
 * @throws InputError of `checkSeries`; ComputationError `TOO_FEW_SAMPLES` below two samples, `NO_TIDE` where all values
 *   are the same.
 */
export function readRecord(input: Series): FitRecord {
  const series = checkSeries(input);
  const times = seriesTimes(series);
  const { values } = series;
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
  if (samples < 2) {
    throw new ComputationError(
      'TOO_FEW_SAMPLES',
      `expected 2 samples or more that are not gaps, got ${samples}`,
      { samples, missing: values.length - samples },
    );
  }
  if (low === high) {
    throw new ComputationError(
      'NO_TIDE',
      `expected values that change, got ${low} at each of ${samples} samples`,
      {
        samples,
      },
    );
  }
  const step = series.times ? 0 : series.step;
  const [from, to] = [times[first] as number, times[last] as number];
  return {
    series,
    times,
    values,
    step,
    samples,
    from,
    to,
    days: (to - from + (step || medianStep(times))) / DAY,
  };
}
