/**
 * The gap test: where samples are missing.
 * @module
 */
import type { Series } from '@staithe/core';
import type { Run } from './record.js';

const WIDE = 3; // a hole between samples at their own times is this many usual steps or more

/** The usual step of a series: its own, or the median difference; 0 with fewer than two samples. */
export function usualStep(series: Series): number {
  if (series.step !== undefined) return series.step;
  const { times } = series;
  if (times.length < 2) return 0;
  const stride = Math.max(1, Math.floor(times.length / 100000));
  const steps: number[] = [];
  for (let i = 1; i < times.length; i += stride) {
    steps.push((times[i] as number) - (times[i - 1] as number));
  }
  steps.sort((a, b) => a - b);
  return steps[Math.floor(steps.length / 2)] as number;
}

/**
 * Missing samples as runs: flag 9, reason `gap`, `measured` in milliseconds. In a series at its own times a hole of
 * three usual steps or more is a run of 0 samples from the sample before to the sample after.
 *
 * @param series - Either kind.
 * @returns Runs in order of time.
 * @example
 * gapRuns({ start: 0, step: 3600000, values: new Float64Array([1, NaN, 2]) })[0].measured; // 3600000
 * @public
 */
export function gapRuns(series: Series): readonly Run[] {
  const { values } = series;
  const step = usualStep(series);
  const timeOf = (i: number): number =>
    series.times ? (series.times[i] as number) : series.start + i * series.step;
  const runs: Run[] = [];
  for (let i = 0; i < values.length; i++) {
    if (series.times && i > 0) {
      const hole = timeOf(i) - timeOf(i - 1);
      if (hole >= WIDE * step) {
        const ends = { from: timeOf(i - 1), to: timeOf(i) };
        runs.push({ ...ends, samples: 0, flag: 9, reason: 'gap', measured: hole });
      }
    }
    if (!Number.isNaN(values[i])) continue;
    const first = i;
    while (i + 1 < values.length && Number.isNaN(values[i + 1])) i++;
    runs.push({
      from: timeOf(first),
      to: timeOf(i),
      samples: i - first + 1,
      flag: 9,
      reason: 'gap',
      measured: timeOf(i) - timeOf(first) + step,
    });
  }
  return runs;
}
