/**
 * Covariates: what else moves the level, such as air pressure, as columns of the design.
 *
 * A column holds the covariate at the time of each sample less its lag, less the reference, so that the mean level belongs
 * to the reference. Between samples of the covariate a straight line is taken; where it has a gap, the fit is refused.
 * @module
 */
import {
  checkSeries,
  DAY,
  formatInstant,
  InputError,
  refuse,
  sampledSeries,
  type Series,
  seriesTimes,
} from '@staithe/core';
import type { FitRecord } from './record.js';
import type { Covariate } from './types.js';

/** One column of a covariate, as plain data. */
export interface CovariateColumn {
  readonly name: string;
  /** Milliseconds. */
  readonly lag: number;
  /** In the unit of the covariate. */
  readonly reference: number;
}

/** Columns with their values, one a time of the record. */
export interface ReadCovariates {
  readonly columns: readonly CovariateColumn[];
  readonly values: readonly Float64Array[];
}

const LONGEST = 366 * DAY; // of a lag
// Of what is left beside the reference: beyond, its squares lose themselves.
const SMALLEST = 1e-100;
const LARGEST = 1e100;

/** The covariate as a series: its own, or values at the times of the record. */
function seriesOf({ values, series }: Covariate, path: string, record: FitRecord): Series {
  if ((values === undefined) === (series === undefined)) {
    const got = values ? 'both' : 'neither';
    throw new InputError('CONFLICT', path, `expected either series or values, got ${got}`);
  }
  if (series) return readAt(path, 'series', () => checkSeries(series));
  const given = values as ArrayLike<number>;
  const expected = record.times.length;
  if (given.length !== expected) {
    const text = `expected ${expected} numbers, one a time of the record, got ${given.length}`;
    throw new InputError('LENGTH_MISMATCH', `${path}.values`, text);
  }
  return readAt(path, 'values', () => sampledSeries({ times: record.times, values: given }));
}

/** Reads a series with the caller's path in the error. */
function readAt(path: string, key: 'series' | 'values', read: () => Series): Series {
  try {
    return read();
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    const text = error.message.slice(error.path.length + 2);
    const inside = error.path.startsWith(key) ? error.path : `${key}.${error.path}`;
    throw new InputError(error.code, `${path}.${inside}`, text, error.details);
  }
}

function readLags({ lags = [0] }: Covariate, path: string): readonly number[] {
  if (lags.length === 0) refuse('EMPTY_INPUT', `${path}.lags`, 'one lag or more', 'none');
  lags.forEach((lag, i) => {
    if (!(Math.abs(lag) <= LONGEST)) {
      refuse('OUT_OF_RANGE', `${path}.lags[${i}]`, 'milliseconds, a year at most', lag);
    }
    if (lags.indexOf(lag) !== i) {
      throw new InputError(
        'DUPLICATE',
        `${path}.lags[${i}]`,
        `expected each once, got ${lag} again`,
      );
    }
  });
  return lags;
}

/** The value of a series at an instant, on the straight line between its neighbours; NaN where it has none. */
function makeReader(series: Series): (t: number) => number {
  const times = seriesTimes(series);
  const { values } = series;
  let k = 0;
  return (t) => {
    while (k > 0 && (times[k] as number) > t) k--;
    while (k + 1 < times.length && (times[k + 1] as number) <= t) k++;
    const before = times[k] as number;
    if (before === t) return values[k] as number;
    const after = times[k + 1];
    if (after === undefined || before > t) return Number.NaN;
    const share = (t - before) / (after - before);
    return (values[k] as number) * (1 - share) + (values[k + 1] as number) * share;
  };
}

/** From the stamp of a sample to the middle of what it is the mean of, milliseconds. */
function middleAfter({ series: { sampling } }: FitRecord): number {
  if (!sampling) return 0;
  return { start: 0.5, middle: 0, end: -0.5 }[sampling.stamp] * sampling.meanOver;
}

function columnOf(
  { series: given }: Covariate,
  series: Series,
  lag: number,
  record: FitRecord,
  path: string,
): Float64Array {
  const read = makeReader(series);
  // Values that come with the samples are of the same stretch of time.
  const delay = given ? middleAfter(record) : 0;
  return record.times.map((t, i) => {
    if (Number.isNaN(record.values[i])) return 0;
    const value = read(t + delay - lag);
    if (Number.isFinite(value)) return value;
    const got = `a gap ${lag === 0 ? '' : `or an end ${lag} ms before `}at the sample of ${formatInstant(t)}`;
    throw new InputError(
      'MISSING',
      path,
      `expected a value for each sample of the record, got ${got}`,
    );
  });
}

/**
 * Reads the covariates of a fit against its record.
 *
 * @throws InputError `CONFLICT`, `LENGTH_MISMATCH`, `MISSING`, `DUPLICATE`, `OUT_OF_RANGE`, `NOT_FINITE` …, path
 *   `options.covariates[i]…`.
 */
export function readCovariates(
  covariates: readonly Covariate[] | undefined,
  record: FitRecord,
): ReadCovariates {
  const columns: CovariateColumn[] = [];
  const values: Float64Array[] = [];
  (covariates ?? []).forEach((covariate, i) => {
    const path = `options.covariates[${i}]`;
    const { name } = covariate;
    if (typeof name !== 'string' || name === '') refuse('MISSING', `${path}.name`, 'a name', name);
    if (columns.some((column) => column.name === name)) {
      throw new InputError('DUPLICATE', `${path}.name`, `expected each once, got ${name} again`);
    }
    const series = seriesOf(covariate, path, record);
    for (const lag of readLags(covariate, path)) {
      const column = columnOf(
        covariate,
        series,
        lag,
        record,
        `${path}.${covariate.series ? 'series' : 'values'}`,
      );
      const reference = covariate.reference ?? meanOf(column, record);
      if (!Number.isFinite(reference)) {
        refuse('NOT_FINITE', `${path}.reference`, 'a finite number', reference);
      }
      const seen = column.filter((_, k) => !Number.isNaN(record.values[k]));
      if (seen.every((value) => value === seen[0])) {
        const got = `${seen[0]} at each sample`;
        throw new InputError('OUT_OF_RANGE', path, `expected values that change, got ${got}`);
      }
      const centred = column.map((value, k) =>
        Number.isNaN(record.values[k]) ? 0 : value - reference,
      );
      const largest = centred.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
      if (!(largest >= SMALLEST && largest <= LARGEST)) {
        refuse('OUT_OF_RANGE', path, `values ${SMALLEST} to ${LARGEST} from ${reference}`, largest);
      }
      columns.push({ name, lag, reference });
      values.push(centred);
    }
  });
  return { columns, values };
}

/** Mean over the samples that take part. */
function meanOf(column: Float64Array, { values, samples }: FitRecord): number {
  return (
    column.reduce((sum, value, k) => (Number.isNaN(values[k]) ? sum : sum + value), 0) / samples
  );
}
