/**
 * Published water levels in metres: hourly heights, high and low waters.
 * @module
 */
import {
  HOUR,
  InputError,
  metresFromFeet,
  toInstant,
  uniformSeries,
  type UniformSeries,
} from '@staithe/core';
import { decodeInt16 } from './encoding.js';
import { loadVector, type Vector } from './vector.js';

const MISSING = -32768;

interface HourlyCases {
  readonly start: string;
  readonly stepHours: number;
  readonly count: number;
  readonly missing: number;
  readonly perUnit: number;
  readonly values: readonly string[];
}

interface HighLowCases {
  readonly first: string;
  readonly count: number;
  readonly firstKind: 'high' | 'low';
  readonly sameKindAsBefore: readonly number[];
  readonly minutesSinceBefore: readonly string[];
  readonly heights: readonly string[];
}

/** Published high and low waters, in order of time. @public */
export interface HighLowRows {
  /** Instants, whole minutes. */
  readonly times: Float64Array;
  /** Metres. */
  readonly heights: Float64Array;
  readonly kinds: readonly ('high' | 'low')[];
}

function expectCount(vector: Vector, name: string, count: number, wanted: number): void {
  if (count === wanted) return;
  throw new InputError(
    'LENGTH_MISMATCH',
    `${vector.id}.${name}`,
    `expected ${wanted}, got ${count}`,
  );
}

/**
 * Hourly heights of a vector.
 *
 * @param id - The vector.
 * @returns Metres; a missing hour is NaN.
 * @throws InputError of {@link loadVector}, `UNKNOWN_UNIT`, `LENGTH_MISMATCH`.
 * @public
 */
export function hourlySeries(id: string): UniformSeries {
  const vector = loadVector<HourlyCases>(id);
  const { start, stepHours, count, missing, perUnit, values } = vector.cases;
  if (vector.unit !== 'm' && vector.unit !== 'ft') {
    throw new InputError('UNKNOWN_UNIT', `${id}.unit`, `expected m or ft, got ${vector.unit}`);
  }
  const integers = decodeInt16(values);
  const metres = Float64Array.from(integers, (integer) => {
    if (integer === MISSING) return Number.NaN;
    return vector.unit === 'ft' ? metresFromFeet(integer / perUnit) : integer / perUnit;
  });
  expectCount(vector, 'count', metres.length, count);
  expectCount(vector, 'missing', metres.filter(Number.isNaN).length, missing);
  return uniformSeries({ start, step: stepHours * HOUR, values: metres });
}

/**
 * High and low waters of a vector.
 *
 * @param id - The vector.
 * @returns Columns of one length.
 * @throws InputError of {@link loadVector}, `LENGTH_MISMATCH`.
 * @public
 */
export function highLowRows(id: string): HighLowRows {
  const vector = loadVector<HighLowCases>(id);
  const { first, count, firstKind, sameKindAsBefore, minutesSinceBefore, heights } = vector.cases;
  const minutes = decodeInt16(minutesSinceBefore);
  const centimetres = decodeInt16(heights);
  expectCount(vector, 'minutesSinceBefore', minutes.length, count);
  expectCount(vector, 'heights', centimetres.length, count);
  const repeated = new Set(sameKindAsBefore);
  const times = new Float64Array(count);
  const kinds: ('high' | 'low')[] = [];
  let time = toInstant(first);
  let kind = firstKind;
  for (let i = 0; i < count; i++) {
    time += (minutes[i] as number) * 60000;
    if (i > 0 && !repeated.has(i)) kind = kind === 'high' ? 'low' : 'high';
    times[i] = time;
    kinds.push(kind);
  }
  return { times, heights: Float64Array.from(centimetres, (cm) => cm / 100), kinds };
}
