/**
 * A record of currents as the fit sees it: two components at the same times, present together or not at all.
 * @module
 */
import {
  ComputationError,
  InputError,
  type InstantLike,
  type Sampling,
  sampledSeries,
  type Series,
  seriesTimes,
  uniformSeries,
} from '@staithe/core';
import { type FitRecord, readRecord } from '../record.js';

/**
 * A record of currents, metres per second: two series at the same times, or one array of pairs east, north (complex
 * numbers, as many libraries keep them).
 * @public
 */
export type CurrentRecord =
  | { readonly east: Series; readonly north: Series; readonly pairs?: never }
  | {
      readonly start: InstantLike;
      readonly step: number;
      /** East, north, east, north …: two numbers a time. */
      readonly pairs: ArrayLike<number>;
      readonly sampling?: Sampling | undefined;
      readonly east?: never;
    }
  | {
      readonly times: ArrayLike<InstantLike>;
      readonly pairs: ArrayLike<number>;
      readonly sampling?: Sampling | undefined;
      readonly east?: never;
    };

/** Both components. */
export interface CurrentFitRecord {
  readonly east: FitRecord;
  readonly north: FitRecord;
}

function component(record: Exclude<CurrentRecord, { east: Series }>, part: 0 | 1): Series {
  const { pairs, sampling } = record;
  const count = 'times' in record ? record.times.length : pairs.length / 2;
  if (pairs.length !== 2 * count || !Number.isInteger(count)) {
    const text = `expected two numbers a time, got ${pairs.length}`;
    throw new InputError('LENGTH_MISMATCH', 'pairs', text);
  }
  const values = Float64Array.from({ length: count }, (_, i) => pairs[2 * i + part] as number);
  return 'times' in record
    ? sampledSeries({ times: record.times, values, sampling })
    : uniformSeries({ start: record.start, step: record.step, values, sampling });
}

function inComponent<T>(name: string, run: () => T): T {
  try {
    return run();
  } catch (error) {
    if (!(error instanceof InputError) || error.path.startsWith('options')) throw error;
    const text = error.message.slice(error.path.length + 2);
    throw new InputError(error.code, `${name}.${error.path}`, text, error.details);
  }
}

const sameSampling = (a: Series, b: Series): boolean =>
  a.sampling?.meanOver === b.sampling?.meanOver && a.sampling?.stamp === b.sampling?.stamp;

/**
 * Reads a record of currents.
 *
 * @throws InputError as `readRecord`, path `east…` or `north…`; `LENGTH_MISMATCH`, `CONFLICT`, path `north`, for components at
 *   different times; ComputationError `NO_TIDE` where neither component changes.
 */
export function readCurrents(
  record: CurrentRecord,
  weights: ArrayLike<number> | undefined,
): CurrentFitRecord {
  const east = record.pairs ? component(record, 0) : record.east;
  const north = record.pairs ? component(record, 1) : record.north;
  const read = (name: string, series: Series): FitRecord =>
    inComponent(name, () => readRecord(series, weights, true));
  const first = read('east', east);
  const second = read('north', north);
  const [times, others] = [seriesTimes(first.series), seriesTimes(second.series)];
  if (times.length !== others.length) {
    const text = `expected the ${times.length} times of east, got ${others.length}`;
    throw new InputError('LENGTH_MISMATCH', 'north', text);
  }
  const odd = times.findIndex((t, i) => t !== others[i]);
  if (odd >= 0) {
    const text = `expected the times of east, got ${others[odd]} for ${times[odd]}`;
    throw new InputError('CONFLICT', `north.times[${odd}]`, text);
  }
  if (!sameSampling(first.series, second.series)) {
    throw new InputError(
      'CONFLICT',
      'north.sampling',
      'expected the sampling of east, got another',
    );
  }
  const together = (own: FitRecord, other: FitRecord): Series => ({
    ...own.series,
    values: own.series.values.map((v, i) => (Number.isNaN(other.values[i]) ? Number.NaN : v)),
  });
  const both = { east: together(first, second), north: together(second, first) };
  const out = { east: read('east', both.east), north: read('north', both.north) };
  const still = (values: Float64Array): boolean => {
    const kept = values.filter((v) => !Number.isNaN(v));
    return kept.every((v) => v === kept[0]);
  };
  if (still(out.east.values) && still(out.north.values)) {
    const text = 'expected values that change, got the same current at all samples';
    throw new ComputationError('NO_TIDE', text, { samples: out.east.samples });
  }
  return out;
}
