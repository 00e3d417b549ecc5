/**
 * Series of water levels: at a uniform step, or at times of their own. Missing is NaN, never 0 or 9999.
 * @module
 */
import { refuse } from './errors.js';
import { type Instant, type InstantLike, toInstant, toStep, YEAR } from './time.js';

/** Each value is a mean over this long, stamped there. Absent: instantaneous values. @public */
export interface Sampling {
  /** Milliseconds. */
  readonly meanOver: number;
  readonly stamp: 'start' | 'middle' | 'end';
}

/** Values at a uniform step. @public */
export interface UniformSeries {
  readonly start: Instant;
  /** Milliseconds, 1000 or more. */
  readonly step: number;
  /** NaN is a gap. */
  readonly values: Float64Array;
  readonly times?: never;
  readonly sampling?: Sampling | undefined;
}

/** Values at times of their own. @public */
export interface SampledSeries {
  /** Instants, strictly rising. */
  readonly times: Float64Array;
  /** NaN is a gap. */
  readonly values: Float64Array;
  readonly start?: never;
  readonly step?: never;
  readonly sampling?: Sampling | undefined;
}

/** A series of either kind. @public */
export type Series = UniformSeries | SampledSeries;

/** A series as JSON: gaps are null. @public */
export interface SeriesJson {
  readonly start?: Instant;
  readonly step?: number;
  readonly times?: readonly number[];
  readonly values: readonly (number | null)[];
  readonly sampling?: Sampling;
}

function readValues(values: ArrayLike<number | null>): Float64Array {
  const out = new Float64Array(values.length);
  for (let i = 0; i < out.length; i++) {
    const value = values[i];
    if (value !== null && typeof value !== 'number') {
      refuse('WRONG_TYPE', `values[${i}]`, 'a number or null', value);
    }
    if (value === Infinity || value === -Infinity) {
      refuse('NOT_FINITE', `values[${i}]`, 'a finite number', value);
    }
    out[i] = value ?? Number.NaN;
  }
  return out;
}

/**
 * Checks how samples were taken.
 *
 * @param sampling - Or nothing: instantaneous values.
 * @returns An object with a copy of it, or an empty one.
 * @throws InputError `OUT_OF_RANGE`, path `sampling.meanOver`; `UNKNOWN_CHOICE`, path `sampling.stamp`.
 * @example
 * readSampling(undefined); // {}
 * @public
 */
export function readSampling(sampling: Sampling | undefined): { sampling?: Sampling } {
  if (!sampling) return {};
  const { meanOver, stamp } = sampling;
  if (!(meanOver > 0 && meanOver <= YEAR)) {
    refuse('OUT_OF_RANGE', 'sampling.meanOver', 'milliseconds above 0, up to a year', meanOver);
  }
  if (!['start', 'middle', 'end'].includes(stamp)) {
    refuse('UNKNOWN_CHOICE', 'sampling.stamp', 'start, middle or end', stamp);
  }
  return { sampling: { meanOver, stamp } };
}

/**
 * Makes a uniform series. Values are copied.
 *
 * @param input - `start`, `step` in milliseconds (1000 or more), `values` in metres with NaN or null for gaps.
 * @returns The series.
 * @throws InputError of {@link toInstant}, `STEP_TOO_SHORT`, `NOT_FINITE`, `WRONG_TYPE`, `OUT_OF_RANGE`.
 * @example
 * uniformSeries({ start: '2031-06-01T00:00Z', step: 6 * MINUTE, values: [1.2, null] }).step; // 360000
 * @public
 */
export function uniformSeries(input: {
  readonly start: InstantLike;
  readonly step: number;
  readonly values: ArrayLike<number | null>;
  readonly sampling?: Sampling | undefined;
}): UniformSeries {
  const start = toInstant(input.start, 'start');
  const step = toStep(input.step);
  const values = readValues(input.values);
  if (values.length > 0) toInstant(start + step * (values.length - 1), 'end');
  return { start, step, values, ...readSampling(input.sampling) };
}

/**
 * Makes a series at times of its own. Times and values are copied.
 *
 * @param input - `times` strictly rising, `values` in metres with NaN or null for gaps, of one length.
 * @returns The series.
 * @throws InputError `LENGTH_MISMATCH`, `NOT_RISING`, those of {@link toInstant}, `NOT_FINITE`, `WRONG_TYPE`.
 * @example
 * sampledSeries({ times: [0, 60000], values: [1, 2] }).values.length; // 2
 * @public
 */
export function sampledSeries(input: {
  readonly times: ArrayLike<InstantLike>;
  readonly values: ArrayLike<number | null>;
  readonly sampling?: Sampling | undefined;
}): SampledSeries {
  const n = input.times.length;
  if (input.values.length !== n) {
    refuse('LENGTH_MISMATCH', 'values', `${n} as in times`, input.values.length);
  }
  const times = toTimes(input.times);
  for (let i = 1; i < n; i++) {
    if ((times[i] as number) > (times[i - 1] as number)) continue;
    refuse('NOT_RISING', `times[${i}]`, `after ${times[i - 1]}`, times[i]);
  }
  return { times, values: readValues(input.values), ...readSampling(input.sampling) };
}

/**
 * Reads a list of instants, in any order.
 *
 * @param times - Instants.
 * @returns A new array of milliseconds.
 * @throws InputError of {@link toInstant}, path `times[i]`.
 * @example
 * toTimes(['1970-01-01T00:01Z'])[0]; // 60000
 * @public
 */
export function toTimes(times: ArrayLike<InstantLike>): Float64Array {
  const out = new Float64Array(times.length);
  for (let i = 0; i < out.length; i++) out[i] = toInstant(times[i] as InstantLike, `times[${i}]`);
  return out;
}

/**
 * The times of a series.
 *
 * @param series - Either kind.
 * @returns Instants: the series' own array where it has one, else a new one.
 * @example
 * seriesTimes({ start: 0, step: HOUR, values: new Float64Array(2) })[1]; // 3600000
 * @public
 */
export function seriesTimes(series: Series): Float64Array {
  if (series.times) return series.times;
  const out = new Float64Array(series.values.length);
  for (let i = 0; i < out.length; i++) out[i] = series.start + i * series.step;
  return out;
}

/**
 * Checks a series that came as plain data: finite rising times, a step of 1000 ms or more, no infinite value.
 *
 * @param series - Anything that claims to be a series; an existing one is not copied unless it has to be.
 * @returns The series.
 * @throws InputError as {@link uniformSeries} and {@link sampledSeries}.
 * @example
 * checkSeries({ start: 0, step: HOUR, values: new Float64Array(2) }).values.length; // 2
 * @public
 */
export function checkSeries(series: Series): Series {
  if (!ArrayBuffer.isView((series as Series | undefined)?.values)) {
    refuse('WRONG_TYPE', 'series', 'a series', series);
  }
  return series.times ? sampledSeries(series) : uniformSeries(series);
}

/**
 * A series as plain JSON; gaps become null.
 *
 * @param series - Either kind.
 * @returns Plain data.
 * @example
 * toJson({ start: 0, step: HOUR, values: new Float64Array([NaN]) }).values[0]; // null
 * @public
 */
export function toJson(series: Series): SeriesJson {
  const values = Array.from(series.values, (v) => (Number.isNaN(v) ? null : v));
  const sampling = series.sampling ? { sampling: series.sampling } : {};
  return series.times
    ? { times: Array.from(series.times), values, ...sampling }
    : { start: series.start, step: series.step, values, ...sampling };
}

/**
 * A series from plain JSON.
 *
 * @param json - What {@link toJson} gave.
 * @returns The series.
 * @throws InputError `WRONG_TYPE` where it is none, else as {@link uniformSeries} and {@link sampledSeries}.
 * @example
 * fromJson({ start: 0, step: 60000, values: [1, null] }).values.length; // 2
 * @public
 */
export function fromJson(json: SeriesJson): Series {
  if (typeof json !== 'object' || !json || !Array.isArray(json.values)) {
    refuse('WRONG_TYPE', 'series', 'an object with values', json);
  }
  const { times, values, sampling } = json;
  if (times) return sampledSeries({ times, values, sampling });
  return uniformSeries({
    start: json.start as number,
    step: json.step ?? Number.NaN,
    values,
    sampling,
  });
}
