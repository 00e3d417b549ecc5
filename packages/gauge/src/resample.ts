/**
 * Fewer samples: at the hour, hourly means, every so often.
 * @module
 */
import {
  describe,
  HOUR,
  InputError,
  sampledSeries,
  type Series,
  seriesTimes,
  toStep,
  type UniformSeries,
} from '@staithe/core';

function refuse(code: 'OUT_OF_RANGE' | 'UNKNOWN_CHOICE', path: string, text: string): never {
  throw new InputError(code, path, text);
}

/**
 * Hourly heights.
 *
 * `at-the-hour` takes the samples that stand on whole hours UTC. `mean` takes the mean from half an hour before to half
 * an hour after by Simpson's rule, so that it is centred on the hour (a plain mean of ten values is 3 minutes off) and
 * weakens the tide as a true mean does, to 1e-6 for M2 from 6-minute samples. The series then says
 * `sampling: { meanOver: 3600000, stamp: 'middle' }`, which fits and predictions take into account. A missing sample
 * in the hour makes a gap.
 *
 * @param series - Metres; `mean` needs a uniform series whose step divides half an hour and that has whole hours.
 * @param options - `how`, default `at-the-hour`.
 * @returns A uniform series at a step of an hour, from the first whole hour in the series to the last.
 * @throws InputError `OUT_OF_RANGE`, paths `series.step`, `series.sampling`, `series`; `UNKNOWN_CHOICE`, path `how`.
 * @example
 * const values = new Float64Array([1, 2, 3, 4, 5]);
 * hourlyFrom({ start: 0, step: 1800000, values }, { how: 'mean' }).values[1]; // 3
 * @public
 */
export function hourlyFrom(
  series: Series,
  options: { readonly how?: 'at-the-hour' | 'mean' | undefined } = {},
): UniformSeries {
  const { how = 'at-the-hour' } = options;
  if (how !== 'at-the-hour' && how !== 'mean') {
    refuse('UNKNOWN_CHOICE', 'how', `expected at-the-hour or mean, got ${describe(how)}`);
  }
  const times = seriesTimes(series);
  const first = Math.ceil((times[0] ?? Number.NaN) / HOUR) * HOUR;
  const count = Math.floor(((times[times.length - 1] ?? Number.NaN) - first) / HOUR) + 1;
  if (!(count > 0))
    return refuse('OUT_OF_RANGE', 'series', 'expected a whole hour in it, got none');
  const values = new Float64Array(count).fill(Number.NaN);
  if (how === 'mean') {
    meansInto(values, series, first);
    return { start: first, step: HOUR, values, sampling: { meanOver: HOUR, stamp: 'middle' } };
  }
  times.forEach((time, i) => {
    if (time % HOUR === 0) values[(time - first) / HOUR] = series.values[i] as number;
  });
  const { sampling } = series;
  return { start: first, step: HOUR, values, ...(sampling ? { sampling } : {}) };
}

function meansInto(out: Float64Array, series: Series, first: number): void {
  const { step, start, values, sampling } = series;
  const each = step === undefined ? Number.NaN : HOUR / 2 / step;
  if (step === undefined || !Number.isInteger(each) || (first - start) % step !== 0) {
    const got = step === undefined ? 'times of their own' : `${step} ms from ${start}`;
    refuse('OUT_OF_RANGE', 'series.step', `expected a step that divides half an hour, got ${got}`);
    return;
  }
  if (sampling && sampling.meanOver > step) {
    const got = `means over ${sampling.meanOver} ms`;
    refuse('OUT_OF_RANGE', 'series.sampling', `expected means no longer than the step, got ${got}`);
  }
  for (let hour = 0; hour < out.length; hour++) {
    const middle = (first - start) / step + hour * 2 * each;
    let sum = 0;
    for (let k = -each; k <= each; k++) {
      const inner = (k + each) % 2 === 1 ? 4 : 2;
      const weight = k === -each || k === each ? 1 : inner;
      sum += weight * (values[middle + k] ?? Number.NaN);
    }
    out[hour] = sum / (6 * each);
  }
}

/**
 * Keeps the samples whose time is a whole multiple of a step, counted from 1970 UTC.
 *
 * @param series - Either kind; not changed.
 * @param every - Milliseconds, 1000 or more; for a uniform series a multiple of its step.
 * @returns A series of the same kind.
 * @throws InputError of `toStep`; `OUT_OF_RANGE`, path `every` or `series`.
 * @example
 * thin({ start: 0, step: 360000, values: new Float64Array(21) }, 3600000).values.length; // 3
 * @public
 */
export function thin<S extends Series>(series: S, every: number): S;
export function thin(series: Series, every: number): Series {
  toStep(every);
  if (series.times) {
    const { times, values, sampling } = series;
    const stays = (_: number, i: number): boolean => (times[i] as number) % every === 0;
    return sampledSeries({ times: times.filter(stays), values: values.filter(stays), sampling });
  }
  const { start, step, values } = series;
  const stride = every / step;
  if (!Number.isInteger(stride)) {
    refuse('OUT_OF_RANGE', 'every', `expected a multiple of the step of ${step} ms, got ${every}`);
  }
  const first = (Math.ceil(start / every) * every - start) / step;
  if (!Number.isInteger(first)) {
    const text = `expected samples at multiples of ${every} ms, got a start of ${start}`;
    refuse('OUT_OF_RANGE', 'series', text);
  }
  const count = Math.max(0, Math.ceil((values.length - first) / stride));
  const kept = Float64Array.from({ length: count }, (_, k) => values[first + k * stride] as number);
  return { ...series, start: start + first * step, step: every, values: kept };
}
