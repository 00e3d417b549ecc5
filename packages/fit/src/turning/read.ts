/**
 * High and low waters as the fit sees them: times, heights, what is missing.
 * @module
 */
import {
  ComputationError,
  DAY,
  InputError,
  type Instant,
  type InstantLike,
  type Metres,
  refuse,
  sampledSeries,
  toInstant,
} from '@staithe/core';
import { usualStep } from '../cadence.js';
import { type FitRecord, readRecord } from '../record.js';

/** A high or low water of a tide book. @public */
export interface TurningPoint {
  readonly time: InstantLike;
  /** Metres; null or NaN: the time alone is known. */
  readonly height: Metres | null;
  /** Where it is stated, it is held against the fitted curve. */
  readonly kind?: 'high' | 'low' | undefined;
}

/** Points that were read. */
export interface ReadPoints {
  /** Of the heights; its span is that of all points that take part. */
  readonly record: FitRecord;
  /** The slope at each point: 0; NaN where a point takes no part. */
  readonly level: Float64Array;
  readonly kinds: readonly TurningPoint['kind'][];
}

const LARGEST = 1e6; // m

function readHeight(height: unknown, path: string): number {
  if (height === null || height === undefined) return Number.NaN;
  if (typeof height !== 'number') refuse('WRONG_TYPE', path, 'metres or null', height);
  if (Math.abs(height) === Infinity) refuse('NOT_FINITE', path, 'metres or null', height);
  if (Math.abs(height) > LARGEST) refuse('OUT_OF_RANGE', path, `metres up to ${LARGEST}`, height);
  return height;
}

function readTime(time: InstantLike, before: Instant | undefined, path: string): Instant {
  const at = toInstant(time, path);
  if (before !== undefined && at <= before) {
    throw new InputError('NOT_RISING', path, `expected times that rise, got ${at} after ${before}`);
  }
  return at;
}

/**
 * Reads high and low waters. A point of weight 0 is left out with both its rows.
 *
 * @param points - In order of time.
 * @param weights - Of the caller, one a point.
 * @throws InputError of `toInstant`; `WRONG_TYPE`, `NOT_FINITE`, `OUT_OF_RANGE`, `NOT_RISING`, `UNKNOWN_CHOICE`, path
 *   `points[i]…`; ComputationError `TOO_FEW_SAMPLES` below two heights, `NO_TIDE` where all are the same.
 */
export function readPoints(
  points: readonly TurningPoint[],
  weights: ArrayLike<number> | undefined,
): ReadPoints {
  const list: unknown = points;
  if (!Array.isArray(list)) refuse('WRONG_TYPE', 'points', 'a list of points', list);
  const times = new Float64Array(points.length);
  const values = new Float64Array(points.length);
  points.forEach((point: TurningPoint | undefined, i) => {
    const path = `points[${i}]`;
    if (typeof point !== 'object' || !point) {
      refuse('WRONG_TYPE', path, 'an object with time and height', point);
    }
    times[i] = readTime(point.time, i > 0 ? times[i - 1] : undefined, `${path}.time`);
    values[i] = readHeight(point.height, `${path}.height`);
    if (point.kind !== undefined && point.kind !== 'high' && point.kind !== 'low') {
      refuse('UNKNOWN_CHOICE', `${path}.kind`, 'high or low', point.kind);
    }
  });
  const heights = values.filter((value) => !Number.isNaN(value)).length;
  if (heights < 2) {
    throw new ComputationError(
      'TOO_FEW_SAMPLES',
      `expected 2 heights or more, got ${heights} among ${points.length} points: times alone leave all amplitudes open`,
      { samples: heights, missing: points.length - heights },
    );
  }
  const record = readRecord(sampledSeries({ times, values }), weights);
  const level = times.map((_, i) => (record.weights?.[i] === 0 ? Number.NaN : 0));
  const taking = times.filter((_, i) => level[i] === 0);
  const [from, to] = [taking[0] as number, taking[taking.length - 1] as number];
  return {
    // No cadence: what aliases in the heights shows its other phase in the slopes.
    record: { ...record, from, to, days: (to - from + usualStep(taking)) / DAY, cadence: 0 },
    level,
    kinds: points.map(({ kind }) => kind),
  };
}
