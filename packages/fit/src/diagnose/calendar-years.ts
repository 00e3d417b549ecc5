/**
 * A record cut into calendar years of UTC, with what the options say of each of them.
 * @module
 */
import {
  checkSeries,
  InputError,
  type Instant,
  refuse,
  type Series,
  seriesTimes,
  toInstant,
} from '@staithe/core';
import { usualStep } from '../cadence.js';
import type { Covariate, FitOptions } from '../types.js';

/** A calendar year of a record. */
export interface RecordYear {
  readonly year: number;
  readonly series: Series;
  readonly options: FitOptions;
  readonly samples: number;
  /** Of the samples that a whole year would have. */
  readonly share: number;
}

const yearOf = (t: Instant): number => new Date(t).getUTCFullYear();

/** The covariates of samples [from, to). */
function partOf(covariate: Covariate, from: number, to: number): Covariate {
  const { values } = covariate;
  return values ? { ...covariate, values: Array.from(values).slice(from, to) } : covariate;
}

/** What the options say of samples [from, to), the first and last of which are at these times. */
function optionsOf(options: FitOptions, times: Float64Array, from: number, to: number): FitOptions {
  const { weights, covariates, steps } = options;
  const [first, last] = [times[from] as number, times[to - 1] as number];
  return {
    ...options,
    ...(weights ? { weights: Array.from(weights).slice(from, to) } : {}),
    ...(covariates ? { covariates: covariates.map((one) => partOf(one, from, to)) } : {}),
    ...(steps
      ? {
          steps: steps.filter((step, i) => {
            const at = toInstant(step, `options.steps[${i}]`);
            return at > first && at <= last;
          }),
        }
      : {}),
  };
}

/** Lists of one value a time must fit the record before it is cut. */
function checkLengths({ weights, covariates = [] }: FitOptions, count: number): void {
  const check = (got: number | undefined, path: string): void => {
    if (got === undefined || got === count) return;
    const text = `expected ${count} numbers, one a time of the record, got ${got}`;
    throw new InputError('LENGTH_MISMATCH', path, text);
  };
  check(weights?.length, 'options.weights');
  covariates.forEach(({ values }, i) => {
    check(values?.length, `options.covariates[${i}].values`);
  });
}

/** A year in which a list of times has none. */
function emptyYear(year: number, options: FitOptions): RecordYear {
  const none = new Float64Array(0);
  return { year, series: { times: none, values: none }, options, samples: 0, share: 0 };
}

/**
 * The years of a record, from its first time to its last.
 *
 * @throws InputError of `checkSeries`; `CONFLICT`, path `options.sideLines`; `LENGTH_MISMATCH`.
 */
export function yearsOf(input: Series, options: FitOptions): RecordYear[] {
  const series = checkSeries(input);
  const times = seriesTimes(series);
  if (options.sideLines !== undefined) {
    refuse('CONFLICT', 'options.sideLines', 'nothing for single years', options.sideLines);
  }
  checkLengths(options, times.length);
  const isSample = (i: number): boolean =>
    !Number.isNaN(series.values[i]) && options.weights?.[i] !== 0;
  const step = series.times ? usualStep(times.filter((_, i) => isSample(i))) : series.step;
  const { sampling } = series;
  const out: RecordYear[] = [];
  for (let from = 0; from < times.length; ) {
    const year = yearOf(times[from] as number);
    for (let before = out[out.length - 1]?.year ?? year; ++before < year; ) {
      out.push(emptyYear(before, options));
    }
    const [begin, end] = [Date.UTC(year, 0, 1), Date.UTC(year + 1, 0, 1)];
    let to = from;
    let samples = 0;
    for (; to < times.length && (times[to] as number) < end; to++) if (isSample(to)) samples++;
    const values = series.values.slice(from, to);
    const part: Series = series.times
      ? { times: times.slice(from, to), values }
      : { start: times[from] as number, step: series.step, values };
    out.push({
      year,
      series: sampling ? { ...part, sampling } : part,
      options: optionsOf(options, times, from, to),
      samples,
      share: Math.min(1, (samples * step) / (end - begin)),
    });
    from = to;
  }
  return out;
}
