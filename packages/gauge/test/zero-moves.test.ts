/**
 * Steps of the zero under weather: found in invented red weather of 5 cm, and none invented there or in real records.
 */
import { HOUR, MINUTE, type UniformSeries } from '@staithe/core';
import { hourlySeries } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { findZeroMoves } from '../src/internal/checks/zero-moves.js';
import type { ZeroMoved } from '../src/index.js';

const STEP = 6 * MINUTE;
const COUNT = 365 * 240;
const CHANGE = 0.08;

/** Normal deviates, as sums of twelve numbers of a fixed linear congruence. */
function normalsFrom(seed: number): () => number {
  let state = seed;
  return () => {
    let sum = -6;
    for (let k = 0; k < 12; k++) {
      state = (state * 1664525 + 1013904223) % 4294967296;
      sum += state / 4294967296;
    }
    return sum;
  };
}

/** Red noise of standard deviation 1 whose memory fades in so many hours, smoothed over others. */
function weather(normal: () => number, memory: number, smoothing: number): Float64Array {
  const kept = Math.exp(-STEP / (memory * HOUR));
  const held = smoothing > 0 ? Math.exp(-STEP / (smoothing * HOUR)) : 0;
  const size = Math.sqrt((memory + smoothing) / memory);
  let red = normal();
  let smooth = red;
  return Float64Array.from({ length: COUNT }, () => {
    red = kept * red + Math.sqrt(1 - kept * kept) * normal();
    smooth = held * smooth + (1 - held) * red;
    return size * smooth;
  });
}

/** A year of weather of 5 cm, a harbour's unrest of 12 mm, an instrument's 3 mm; a step of the zero at sample `at`. */
function year(seed: number, at: number, change: number): UniformSeries {
  const normal = normalsFrom(seed);
  const slow = weather(normal, 60, 10);
  const wind = weather(normal, 30, 4);
  const harbour = weather(normal, 1.5, 0);
  const values = slow.map((height, i) => {
    const level = 0.045 * height + 0.02 * (wind[i] as number) + 0.012 * (harbour[i] as number);
    return level + 0.003 * normal() + (i >= at ? change : 0);
  });
  return { start: 0, step: STEP, values };
}

/** The moves in what is left of a record after its tide. */
function movesIn(
  { start, step, values }: UniformSeries,
  tide?: (times: Float64Array) => Float64Array,
): readonly ZeroMoved[] {
  const isKept = (_: number, i: number): boolean => !Number.isNaN(values[i]);
  const times = values.map((_, i) => start + i * step).filter(isKept);
  const heights = values.filter(isKept);
  const curve = tide?.(times) ?? new Float64Array(times.length);
  const residual = heights.map((height, i) => height - (curve[i] as number));
  return findZeroMoves({ times, residual, step });
}

describe('a year every 6 minutes under weather of 5 cm', () => {
  it('finds 8 cm in nine years of ten at least, and nothing else', () => {
    let found = 0;
    for (let seed = 1; seed <= 10; seed++) {
      const at = Math.round((0.1 + 0.08 * seed) * COUNT);
      const moves = movesIn(year(seed, at, CHANGE));
      expect(moves.length).toBeLessThanOrEqual(1);
      const [moved] = moves;
      if (!moved) continue;
      found++;
      expect(Math.abs(moved.at - at * STEP)).toBeLessThanOrEqual(HOUR);
      expect(Math.abs(moved.change - CHANGE)).toBeLessThan(4 * moved.sigma);
    }
    expect(found).toBeGreaterThanOrEqual(9);
  });
  it('invents none in ten years', () => {
    for (let seed = 11; seed <= 20; seed++) {
      expect(movesIn(year(seed, COUNT, 0))).toEqual([]);
    }
  });
});

// Speeds, degrees an hour: Sa, Ssa, Q1, O1, P1, K1, 2N2, MU2, N2, NU2, M2, L2, S2, K2, MN4, M4, MS4, M6.
const SPEEDS = [
  0.0410686, 0.0821373, 13.3986609, 13.9430356, 14.9589314, 15.0410686, 27.8953548, 27.9682084,
  28.4397295, 28.5125831, 28.9841042, 29.5284789, 30, 30.0821373, 57.4238337, 57.9682084,
  58.9841042, 86.9523127,
];

/** The tide of a whole hourly record by plain least squares, for a test that has no other. */
function tideOf({ start, values }: UniformSeries): (times: Float64Array) => Float64Array {
  const row = (hours: number): number[] => {
    const angles = SPEEDS.map((speed) => (speed * hours * Math.PI) / 180);
    return [1, ...angles.map(Math.cos), ...angles.map(Math.sin)];
  };
  const size = 2 * SPEEDS.length + 1;
  const matrix = Array.from({ length: size }, () => new Float64Array(size + 1));
  values.forEach((value, i) => {
    if (Number.isNaN(value)) return;
    const own = [...row(i), value];
    matrix.forEach((line, k) => {
      for (let j = 0; j <= size; j++) line[j] = (line[j] as number) + (own[k] ?? 0) * (own[j] ?? 0);
    });
  });
  // Gauss and Jordan; the normal matrix needs no exchange of rows.
  matrix.forEach((pivot, k) => {
    const scale = pivot[k] as number;
    for (let j = 0; j <= size; j++) pivot[j] = (pivot[j] as number) / scale;
    matrix.forEach((line, other) => {
      const share = line[k] as number;
      if (other === k) return;
      for (let j = 0; j <= size; j++) line[j] = (line[j] as number) - share * (pivot[j] as number);
    });
  });
  const solution = matrix.map((line) => line[size] as number);
  return (times) =>
    times.map((time) =>
      row((time - start) / HOUR).reduce((sum, term, k) => sum + term * (solution[k] as number), 0),
    );
}

describe('real records without a step', () => {
  it('invents none in nine years of La Jolla', () => {
    const predicted = hourlySeries('la-jolla-predicted-2010-2020');
    const lookUp = (times: Float64Array): Float64Array =>
      times.map((time) => predicted.values[(time - predicted.start) / HOUR] as number);
    expect(movesIn(hourlySeries('la-jolla-observed'), lookUp)).toEqual([]);
  });
  it('invents none in Eastport 2019', () => {
    const series = hourlySeries('eastport-observed-2019');
    expect(movesIn(series, tideOf(series))).toEqual([]);
  });
  it('takes squalls of Grand Isle for moves, three a year at most', () => {
    const years = [1990, 2001, 2010, 2012].map((year) =>
      hourlySeries(`grand-isle-observed-${year}`),
    );
    const moves = years.flatMap((series) => movesIn(series, tideOf(series)));
    expect(moves.length).toBeLessThanOrEqual(12);
  });
});
