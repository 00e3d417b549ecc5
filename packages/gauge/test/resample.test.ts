/**
 * Filters and resampling on series whose answer is known.
 */
import { degreesToRadians, HOUR, MINUTE, uniformSeries } from '@staithe/core';
import { cos, sin } from '@staithe/core/trig';
import { expectWithin } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import {
  applyFlags,
  doodsonWeights,
  filterResponse,
  filterSeries,
  godinWeights,
  hourlyFrom,
  thin,
} from '../src/index.js';

const M2 = 28.9841042;
const wave = (hours: number): number => cos(degreesToRadians(M2 * hours));
const start = Date.UTC(2031, 0, 1);

describe('filterSeries', () => {
  const values = Array.from({ length: 200 }, (_, i) => 3 + wave(i));
  it.each([
    ['X0', doodsonWeights()],
    ['Godin', godinWeights()],
  ] as const)('%s leaves what its response says', (_title, weights) => {
    const left = filterSeries(uniformSeries({ start, step: HOUR, values }), weights);
    const share = filterResponse(weights, 1, M2);
    const middle = (weights.length - 1) / 2;
    const expected = values.map((_, i) =>
      i < middle || i >= 200 - middle ? Number.NaN : 3 + share * wave(i),
    );
    expectWithin(left.values, expected, { abs: 1e-12 });
  });
  it('makes a gap where a sample with a weight is missing, and only there', () => {
    const holed = uniformSeries({ start, step: HOUR, values });
    holed.values[100] = Number.NaN;
    const { values: left } = filterSeries(holed, doodsonWeights());
    expect(left[100]).toBe(
      filterSeries(uniformSeries({ start, step: HOUR, values }), doodsonWeights()).values[100],
    );
    expect(left[101]).toBeNaN(); // X0 has no weight at its middle, but has beside it
  });
  it('refuses another step and an even number of weights', () => {
    const series = uniformSeries({ start, step: 6 * MINUTE, values });
    const step = { code: 'OUT_OF_RANGE', path: 'series.step' };
    expect(() => filterSeries(series, doodsonWeights())).toThrow(expect.objectContaining(step));
    const even = { code: 'OUT_OF_RANGE', path: 'weights' };
    expect(() => filterResponse([0.5, 0.5], 1, M2)).toThrow(expect.objectContaining(even));
  });
});

describe('hourlyFrom', () => {
  const values = Array.from({ length: 241 }, (_, i) => wave(i / 10));
  const series = uniformSeries({ start: start - 12 * MINUTE, step: 6 * MINUTE, values });
  it('takes the samples at the hour', () => {
    const hourly = hourlyFrom(series);
    expect(hourly.start).toBe(start);
    expect([...hourly.values]).toEqual(values.filter((_, i) => i % 10 === 2));
  });
  it('means are centred on the hour and weaken M2 by about 1 %', () => {
    const { values: means, sampling } = hourlyFrom(series, { how: 'mean' });
    expect(sampling).toEqual({ meanOver: HOUR, stamp: 'middle' });
    expect(means[0]).toBeNaN();
    // A mean over an hour leaves sin(x) / x of a wave, x half its turn in the hour: M2 loses 1.06 %.
    const half = degreesToRadians(M2 / 2);
    const share = sin(half) / half;
    expectWithin(share, 0.9894, { abs: 0.00005 });
    const expected = [...means].slice(1).map((_, h) => share * wave(h + 1 + 0.2));
    expectWithin(means.slice(1), expected, { abs: 1e-6 });
  });
  it('refuses what has no such hours', () => {
    const steps = uniformSeries({ start, step: 7 * MINUTE, values });
    const none = uniformSeries({ start: start + MINUTE, step: MINUTE, values: [1, 2] });
    const times = Float64Array.of(start, start + HOUR);
    const sampled = { times, values: Float64Array.of(1, 2) };
    const long = { ...series, sampling: { meanOver: HOUR, stamp: 'middle' as const } };
    const mean = { how: 'mean' as const };
    const path = (text: string): unknown =>
      expect.objectContaining({ code: 'OUT_OF_RANGE', path: text });
    expect(() => hourlyFrom(steps, mean)).toThrow(path('series.step') as Error);
    expect(() => hourlyFrom(sampled, mean)).toThrow(path('series.step') as Error);
    expect(() => hourlyFrom(long, mean)).toThrow(path('series.sampling') as Error);
    expect(() => hourlyFrom(none)).toThrow(path('series') as Error);
    expect(() => hourlyFrom(series, { how: 'median' as 'mean' })).toThrow(
      expect.objectContaining({ code: 'UNKNOWN_CHOICE', path: 'how' }),
    );
  });
});

describe('thin', () => {
  it('keeps multiples of the step asked for, in both kinds', () => {
    const uniform = uniformSeries({
      start: start - 6 * MINUTE,
      step: 6 * MINUTE,
      values: [0, 1, 2, 3, 4, 5, 6],
    });
    expect(thin(uniform, 12 * MINUTE)).toEqual({
      start,
      step: 12 * MINUTE,
      values: Float64Array.of(1, 3, 5),
    });
    const times = Float64Array.of(start, start + MINUTE, start + HOUR);
    const sampled = { times, values: Float64Array.of(1, 2, 3) };
    expect([...thin(sampled, HOUR).values]).toEqual([1, 3]);
  });
  it('refuses what is no multiple', () => {
    const series = uniformSeries({ start, step: 6 * MINUTE, values: [1, 2] });
    const every = { code: 'OUT_OF_RANGE', path: 'every' };
    expect(() => thin(series, 10 * MINUTE)).toThrow(expect.objectContaining(every));
    const off = { code: 'OUT_OF_RANGE', path: 'series' };
    expect(() => thin({ ...series, start: start + MINUTE }, 12 * MINUTE)).toThrow(
      expect.objectContaining(off),
    );
  });
});

describe('applyFlags', () => {
  const series = uniformSeries({ start, step: HOUR, values: [1, 2, 3, 4, null] });
  it('leaves out what failed', () => {
    const { values } = applyFlags(series, [1, 2, 3, 4, 9]);
    expect([...values]).toEqual([1, 2, 3, Number.NaN, Number.NaN]);
    expect(series.values[3]).toBe(4);
  });
  it('keeps what is asked', () => {
    const { values } = applyFlags(series, [1, 2, 3, 4, 9], { keep: [1] });
    expect([...values].filter((v) => !Number.isNaN(v))).toEqual([1]);
  });
  it('refuses flags of another length', () => {
    const wrong = { code: 'LENGTH_MISMATCH', path: 'flags' };
    expect(() => applyFlags(series, [1])).toThrow(expect.objectContaining(wrong));
  });
});
