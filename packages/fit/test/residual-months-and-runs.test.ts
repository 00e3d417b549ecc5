import { DAY, HOUR, sampledSeries, type Series, uniformSeries } from '@staithe/core';
import { expectWithin, hourlySeries, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { residualByMonth } from '../src/diagnose/residual-by-month.js';
import { residualRuns } from '../src/diagnose/residual-runs.js';
import { fitHarmonics, type HarmonicFit } from '../src/index.js';

/** A fit that left this residual: what these functions read of it. */
function fitLeaving(residuals: Series): HarmonicFit {
  const values = Float64Array.from({ length: 100 }, (_, i) => Math.sin(i));
  const any = fitHarmonics(uniformSeries({ start: 0, step: HOUR, values }), {
    constituents: ['M2'],
    nodalModel: 'none',
  });
  return { ...any, residuals };
}

/** Park and Miller (1988), minimal standard generator; sums of twelve for a normal number. */
function normals(seed: number): () => number {
  let state = seed;
  const uniform = (): number => (state = (state * 48271) % 2147483647) / 2147483647;
  return () => Array.from({ length: 12 }, uniform).reduce((a, b) => a + b, -6);
}

describe('the residual by month', () => {
  it('has mean, standard deviation and largest size of each month that has samples', () => {
    const times = [
      '2031-01-31T23:00Z',
      '2031-02-01T00:00Z',
      '2031-02-15T00:00Z',
      '2031-04-01T00:00Z',
    ];
    const residuals = sampledSeries({ times, values: [0.5, 0.1, -0.3, Number.NaN] });
    const rows = residualByMonth(fitLeaving(residuals));
    expect(rows.map(({ month, samples }) => [month, samples])).toEqual([
      ['2031-01', 1],
      ['2031-02', 2],
    ]);
    expect(rows[0]).toMatchObject({ mean: 0.5, sigma: 0, largest: 0.5 });
    // −0.1 ± √(2·0.2²).
    expectWithin([rows[1]?.mean, rows[1]?.sigma] as number[], [-0.1, 0.28284271247], {
      abs: 1e-11,
    });
    expect(rows[1]?.largest).toBe(0.3);
    expect(rows[1]?.largestAt).toBe(Date.UTC(2031, 1, 15));
  });

  it('of a record adds up to the whole', () => {
    const fit = fitHarmonics(hourlySeries('grand-isle-observed-1990'));
    const rows = residualByMonth(fit);
    expect(rows.map(({ month }) => month)).toEqual(
      Array.from({ length: 12 }, (_, i) => `1990-${String(i + 1).padStart(2, '0')}`),
    );
    const { samples, residual } = fit.diagnostics;
    expect(rows.reduce((sum, row) => sum + row.samples, 0)).toBe(samples);
    // Its source counts 870 missing hours, all in June and July: 720 and 744 hours less these.
    expect((rows[5]?.samples as number) + (rows[6]?.samples as number)).toBe(720 + 744 - 870);
    const squares = rows.reduce((sum, row) => {
      return sum + (row.samples - 1) * row.sigma ** 2 + row.samples * row.mean ** 2;
    }, 0);
    expectWithin(Math.sqrt(squares / samples), residual.rms, { rel: 1e-12 });
    expect(Math.max(...rows.map(({ largest }) => largest))).toBe(residual.largest);
  });

  it('needs a residual', () => {
    const fit = { ...fitLeaving(uniformSeries({ start: 0, step: HOUR, values: [1] })) };
    const { code, path } = refusal(() => residualByMonth({ ...fit, residuals: undefined }));
    expect([code, path]).toEqual(['MISSING', 'fit.residuals']);
  });
});

describe('runs of the residual', () => {
  it('are counted, and end at gaps', () => {
    const signs = [1, 1, -1, -1, -1, 1, Number.NaN, 1, -1];
    const residuals = uniformSeries({ start: 0, step: HOUR, values: signs });
    const { count, expected, longest, longestFrom } = residualRuns(fitLeaving(residuals));
    expect([count, longest, longestFrom]).toEqual([5, 3, 2 * HOUR]);
    // Four above, four below: a change with the chance 2·4·4/(8·7) at each of 6 neighbours, in two pieces.
    expectWithin(expected, 2 + (6 * 32) / 56, { abs: 1e-12 });
  });

  it('of white noise are as many as chance makes, with half a step to remember', () => {
    const normal = normals(5);
    const n = 20000;
    const values = Float64Array.from({ length: n }, normal);
    const runs = residualRuns(fitLeaving(uniformSeries({ start: 0, step: HOUR, values })));
    // A. Wald and J. Wolfowitz 1940: 1 + n/2 with a standard deviation of √n/2 = 71.
    expectWithin(runs.expected, 1 + n / 2, { abs: 5 });
    expectWithin(runs.count, runs.expected, { abs: 3 * 71 });
    expectWithin(runs.correlationTime, 0.5, { abs: 0.03 });
  });

  it('of red noise are few, and it remembers itself for step/(1 − share) less half a step', () => {
    const normal = normals(6);
    const share = 0.9;
    let weather = 0;
    const n = 200000;
    const values = Float64Array.from({ length: n }, () => (weather = share * weather + normal()));
    const gappy = values.map((v, i) => (i % 977 < 300 ? Number.NaN : v));
    for (const list of [values, gappy]) {
      const fit = fitLeaving(uniformSeries({ start: 0, step: 2 * HOUR, values: list }));
      const { correlationTime, count, expected } = residualRuns(fit);
      // Σ share^k − ½ in steps of two hours: 19 h; up to the first zero, to 10 % in so long a record.
      expectWithin(correlationTime, 19, { rel: 0.1 });
      // A change with the chance arccos(0.9)/π = 0.144 (W. Sheppard 1899) in place of a half.
      expectWithin(count / expected, 2 * 0.14357, { rel: 0.05 });
    }
  });

  it('at irregular times end where more than one and a half steps are left out', () => {
    const times = [0, 1, 2.1, 2.9, 6, 7].map((days) => days * DAY);
    const fit = fitLeaving(sampledSeries({ times, values: [1, 2, 1, 2, 3, -1] }));
    expect(residualRuns(fit)).toMatchObject({ count: 3, longest: 4, longestFrom: 0 });
  });

  it('of nothing but zeros are one, without a memory', () => {
    const fit = fitLeaving(uniformSeries({ start: 0, step: HOUR, values: new Float64Array(50) }));
    expect(residualRuns(fit)).toMatchObject({ count: 1, expected: 1, correlationTime: 0 });
  });
});
