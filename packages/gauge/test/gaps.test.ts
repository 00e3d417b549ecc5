/**
 * Gaps do not make spikes: clean tides and real records with samples taken out, and spikes beside gaps still found.
 */
import { HOUR, MINUTE, uniformSeries } from '@staithe/core';
import { hourlySeries } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { checkRecord, type RecordCheck } from '../src/index.js';

type Line = readonly [amplitude: number, degreesPerHour: number, phaseLag: number];

// Speeds of M2, S2, N2, K1, O1, M4 in degrees an hour; amplitudes and lags are invented.
const TIDES: Readonly<Record<string, readonly Line[]>> = {
  semidiurnal: [
    [1.4, 28.984104, 10],
    [0.5, 30, 80],
  ],
  mixed: [
    [0.5, 28.984104, 142],
    [0.2, 30, 138],
    [0.33, 15.041069, 206],
    [0.21, 13.943036, 191],
  ],
  diurnal: [
    [0.4, 15.041069, 20],
    [0.25, 13.943036, 100],
    [0.05, 28.984104, 0],
  ],
  large: [
    [3.9, 28.984104, 10],
    [1.4, 30, 80],
    [0.7, 28.43973, 30],
    [0.2, 57.968208, 30],
  ],
};
const DAYS = 45;
const LENGTHS = [1, 2, 5, 50];

/** Numbers in [0, 1) from a fixed linear congruence. */
function numbersFrom(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 1664525 + 1013904223) % 4294967296;
    return state / 4294967296;
  };
}

function tide(lines: readonly Line[], step: number): Float64Array {
  return Float64Array.from({ length: Math.round((DAYS * 24 * HOUR) / step) }, (_, i) => {
    const height = lines.reduce((sum, [amplitude, speed, lag]) => {
      return sum + amplitude * Math.cos(((speed * i * step) / HOUR - lag) * (Math.PI / 180));
    }, 0);
    return Math.round(height * 1000) / 1000;
  });
}

/** Doubtful and failed samples, by flag. */
const blamed = ({ flags }: RecordCheck): readonly [doubtful: number, failed: number] => [
  flags.filter((flag) => flag === 3).length,
  flags.filter((flag) => flag === 4).length,
];

const cases = Object.entries(TIDES).flatMap(([kind, lines]) =>
  [6 * MINUTE, HOUR].flatMap((step) => LENGTHS.map((length) => ({ kind, lines, step, length }))),
);

describe('a clean tide with gaps', () => {
  it.each(cases)('$kind, every $step ms, one gap of $length samples', (own) => {
    for (const at of [1, 3, 501]) {
      const values = tide(own.lines, own.step);
      values.fill(Number.NaN, at, at + own.length);
      expect(blamed(checkRecord(uniformSeries({ start: 0, step: own.step, values })))).toEqual([
        0, 0,
      ]);
    }
  });

  it.each(cases)('$kind, every $step ms, many gaps of $length samples', (own) => {
    const next = numbersFrom(7);
    const values = tide(own.lines, own.step);
    for (let at = 2; at < values.length - 60; at += own.length + 1 + Math.floor(next() * 20)) {
      values.fill(Number.NaN, at, at + own.length);
    }
    expect(blamed(checkRecord(uniformSeries({ start: 0, step: own.step, values })))).toEqual([
      0, 0,
    ]);
  });

  it('at its own times, an hour apart give or take 3 minutes', () => {
    const next = numbersFrom(11);
    const [lines] = Object.values(TIDES) as [readonly Line[]];
    const times = Float64Array.from(
      { length: 1000 },
      (_, i) => i * HOUR + (i % 3 ? 0 : Math.round((next() - 0.5) * 6) * MINUTE),
    ).filter((_, i) => i % 40 > 4);
    const values = times.map((time) =>
      lines.reduce(
        (sum, [amplitude, speed, lag]) =>
          sum + amplitude * Math.cos(((speed * time) / HOUR - lag) * (Math.PI / 180)),
        0,
      ),
    );
    expect(blamed(checkRecord({ times, values }))).toEqual([0, 0]);
  });
});

describe('real records with samples taken out', () => {
  // As many as the whole record has, or fewer: what is doubted is there without gaps too.
  it.each([
    ['eastport-observed-2019', 3, 0],
    ['la-jolla-observed', 5, 0],
  ] as const)('%s', (id, doubtful, failed) => {
    const series = hourlySeries(id);
    for (const share of [0.02, 0.1, 0.3, 0.5]) {
      const next = numbersFrom(13);
      const values = series.values.map((value) => (next() < share ? Number.NaN : value));
      const [doubted, rejected] = blamed(checkRecord({ ...series, values }));
      expect(doubted).toBeLessThanOrEqual(doubtful);
      expect(rejected).toBeLessThanOrEqual(failed);
    }
    const values = series.values.slice();
    for (let at = 20, k = 0; at < values.length; at += 60, k++) {
      values.fill(Number.NaN, at, at + (LENGTHS[k % LENGTHS.length] as number));
    }
    const [doubted, rejected] = blamed(checkRecord({ ...series, values }));
    expect(doubted).toBeLessThanOrEqual(doubtful);
    expect(rejected).toBeLessThanOrEqual(failed);
  });
});

describe('spikes beside gaps', () => {
  it.each([
    [6 * MINUTE, 1, 0.25],
    [6 * MINUTE, 2, 0.25],
    [HOUR, 1, 2],
    [HOUR, 2, 0.5],
    [HOUR, 3, 0.25],
  ])('every %i ms, %i after the first beyond a gap of 50, %f m', (step, after, size) => {
    for (const lines of Object.values(TIDES).slice(0, 3)) {
      const values = tide(lines, step);
      values.fill(Number.NaN, 400, 450);
      values[450 + after] = (values[450 + after] as number) + size;
      const { tests } = checkRecord(uniformSeries({ start: 0, step, values }));
      expect([...tests.jump].flatMap((flag, i) => (flag === 4 ? [i] : []))).toEqual([450 + after]);
    }
  });

  it('the first beyond a long gap is not evaluated', () => {
    const values = tide(TIDES['semidiurnal'] as readonly Line[], HOUR);
    values.fill(Number.NaN, 400, 450);
    const { tests } = checkRecord(uniformSeries({ start: 0, step: HOUR, values }));
    expect([tests.jump[399], tests.jump[400], tests.jump[450], tests.jump[451]]).toEqual([
      2, 9, 2, 1,
    ]);
  });
});
