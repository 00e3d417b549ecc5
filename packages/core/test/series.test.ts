import { describe, expect, it } from 'vitest';
import {
  checkSeries,
  fromJson,
  HOUR,
  isStaitheError,
  MINUTE,
  sampledSeries,
  type Series,
  seriesTimes,
  toJson,
  uniformSeries,
} from '../src/index.js';

function code(run: () => unknown): string {
  try {
    run();
  } catch (error) {
    if (isStaitheError(error)) return `${error.code} ${'path' in error ? error.path : ''}`;
    throw error;
  }
  return 'accepted';
}

describe('series', () => {
  it('copies, keeps gaps as NaN and survives structuredClone and JSON', () => {
    const values = [1, null, Number.NaN, 4];
    const series = uniformSeries({
      start: '2031-06-01T00:00Z',
      step: 6 * MINUTE,
      values,
      sampling: { meanOver: 6 * MINUTE, stamp: 'middle' },
    });
    expect(Array.from(series.values)).toEqual([1, Number.NaN, Number.NaN, 4]);
    expect(structuredClone(series)).toEqual(series);
    expect(fromJson(JSON.parse(JSON.stringify(toJson(series))))).toEqual(series);
    const sampled = sampledSeries({
      times: ['2031-06-01T00:00Z', '2031-06-01T00:07Z'],
      values: [1, null],
    });
    expect(fromJson(JSON.parse(JSON.stringify(toJson(sampled))))).toEqual(sampled);
    expect(seriesTimes(sampled)).toBe(sampled.times);
    expect(Array.from(seriesTimes(series)).map((t) => t - series.start)).toEqual([
      0, 360000, 720000, 1080000,
    ]);
  });

  it.each<[string, () => unknown]>([
    ['STEP_TOO_SHORT step', () => uniformSeries({ start: 0, step: 6, values: [1] })],
    ['NOT_FINITE values[1]', () => uniformSeries({ start: 0, step: HOUR, values: [1, Infinity] })],
    [
      'WRONG_TYPE values[0]',
      () => uniformSeries({ start: 0, step: HOUR, values: ['1' as unknown as number] }),
    ],
    [
      'OUT_OF_RANGE end',
      () => uniformSeries({ start: '2200-12-31T23:00Z', step: 1000 * HOUR, values: [1, 2] }),
    ],
    [
      'OUT_OF_RANGE sampling.meanOver',
      () =>
        uniformSeries({
          start: 0,
          step: HOUR,
          values: [1],
          sampling: { meanOver: 0, stamp: 'start' },
        }),
    ],
    [
      'UNKNOWN_CHOICE sampling.stamp',
      () =>
        uniformSeries({
          start: 0,
          step: HOUR,
          values: [1],
          sampling: { meanOver: 1, stamp: 'begin' as 'start' },
        }),
    ],
    ['LENGTH_MISMATCH values', () => sampledSeries({ times: [0, 1], values: [1] })],
    ['NOT_RISING times[1]', () => sampledSeries({ times: [5, 5], values: [1, 2] })],
    ['NOT_FINITE times[0]', () => sampledSeries({ times: [Number.NaN], values: [1] })],
    ['WRONG_TYPE series', () => checkSeries({} as Series)],
    ['WRONG_TYPE series', () => fromJson(null as unknown as { values: [] })],
    ['NOT_FINITE step', () => fromJson({ start: 0, values: [] })],
  ])('refuses with %s', (expected, run) => {
    expect(code(run)).toBe(expected);
  });
});
