/**
 * Samples of a series for drawing: times, step, and what runs cover.
 * @module
 */
import { ComputationError, type Instant, type Series, seriesTimes } from '@staithe/core';
import { bisectRight, median } from 'd3-array';
import type { FlaggedRun } from '../types.js';

export interface Samples {
  readonly times: Float64Array;
  readonly values: Float64Array;
  /** The usual time between samples, milliseconds. */
  readonly step: number;
  /** First sample, and one step after the last. */
  readonly from: Instant;
  readonly to: Instant;
}

export function readSamples(series: Series): Samples {
  const times = seriesTimes(series);
  const { values } = series;
  if (values.length < 2) {
    throw new ComputationError(
      'TOO_FEW_SAMPLES',
      `expected 2 samples or more, got ${values.length}`,
    );
  }
  const step = series.step ?? usualStep(times);
  const from = times[0] as number;
  return { times, values, step, from, to: (times[times.length - 1] as number) + step };
}

function usualStep(times: Float64Array): number {
  const first = times.subarray(0, Math.min(times.length, 2001));
  return median(Array.from(first.subarray(1), (t, i) => t - (first[i] as number))) as number;
}

/** Tells whether an instant lies within one of the runs. */
export function covering(runs: readonly FlaggedRun[]): (t: Instant) => boolean {
  const spans = [...runs].sort((a, b) => a.from - b.from);
  const starts = spans.map(({ from }) => from);
  const reach: number[] = [];
  for (const { to } of spans) reach.push(Math.max(to, reach[reach.length - 1] ?? to));
  return (t) => {
    const i = bisectRight(starts, t) - 1;
    return i >= 0 && t <= (reach[i] as number);
  };
}
