/**
 * Errors from redrawn residuals. A hundred years of noise like a gauge's: tools/slow/redrawn-errors.mjs.
 */
import { makeBasis, synthesizeInto } from '@staithe/basis';
import { DAY, HOUR, type Series, sampledSeries, uniformSeries } from '@staithe/core';
import { runThrough } from '@staithe/core/long-work';
import { expectWithin, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { estimate } from '../src/estimate.js';
import { fitHarmonics, fitHarmonicsAsync, type FitOptions, type RecordFit } from '../src/index.js';
import { allLines, lineNoiseOf } from '../src/noise-of.js';
import { pose } from '../src/problem.js';
import { projectionsOf } from '../src/project.js';
import { nextShare, type RandomState, seeded } from '../src/random.js';
import { readRecord } from '../src/record.js';
import { redrawnCovariance } from '../src/redrawn.js';
import { type Rows, rowsOf } from '../src/rows.js';
import { studentFactor } from '../src/student.js';
import { heightsOf, laJolla, noiseOf, only, recordOf } from './reference/coloured-noise.js';
import { count, emptyCoverage, pooled } from './reference/coverage.js';

const START = Date.UTC(2031, 0, 1);
const YEAR = 8766; // hours
const NAMES = ['M2', 'S2', 'N2', 'K1', 'O1', 'K2', 'P1', 'Q1', 'M4', 'MS4', 'M6', 'Mf', 'Mm'];
const SD = 0.05; // m, of the white noise
const WAYS = ['phases', 'blocks'] as const;

/** The sum of twelve uniform numbers less six: normal enough, variance 1. */
function normal(state: RandomState): number {
  let sum = -6;
  for (let i = 0; i < 12; i++) sum += nextShare(state);
  return sum;
}

/** A tide and white noise. */
function record(count: number, seed: number): Float64Array {
  const values = new Float64Array(count);
  const coefficients = Float64Array.from([2, 0.5, 0.1, 0.3, -0.2]);
  const basis = makeBasis({ constituents: ['M2', 'K1'] });
  synthesizeInto(values, basis, coefficients, { start: START, step: HOUR, count });
  const state = seeded(seed);
  return values.map((h) => h + SD * normal(state));
}

const hourly = (values: Float64Array): Series =>
  uniformSeries({ start: START, step: HOUR, values });
const year = hourly(record(YEAR, 1));
const half = hourly(record(190 * 24, 2)); // K2 beside S2 and P1 beside K1 need 183 days

function redrawn(series: Series, redraw: FitOptions['redraw'], more: FitOptions = {}): RecordFit {
  return fitHarmonics(series, { constituents: NAMES, ...more, errorModel: 'redrawn', redraw });
}

function variances({ covariance: { order, matrix } }: RecordFit): number[] {
  return order.map((_, i) => matrix[i * (order.length + 1)] as number);
}

const sigmas = (fit: RecordFit): number[] => variances(fit).map(Math.sqrt);

/** A fit before its errors. */
function found(series: Series, options: FitOptions): Parameters<typeof redrawnCovariance> {
  const at = readRecord(series);
  const result = runThrough(estimate(pose(options, at, [], undefined), [rowsOf(at)]));
  const { design } = result.solved;
  const [rows] = result.blocks as [Rows];
  const [[residual]] = result.residuals as [[Float64Array]];
  const steps = lineNoiseOf(design, rows, residual, SD * SD, allLines(design), undefined);
  return [result, { by: 'phases', seed: 1, draws: 8 }, runThrough(steps)];
}

describe.each(WAYS)('redrawn by %s', (by) => {
  it('gives the same for the same seed, and a little else for another', () => {
    const first = redrawn(half, { by, seed: 5, draws: 60 });
    expect(redrawn(half, { by, seed: 5, draws: 60 })).toEqual(first);
    const other = redrawn(half, { by, seed: 6, draws: 60 });
    expect(other.constants.constituents.map(({ amplitude }) => amplitude)).toEqual(
      first.constants.constituents.map(({ amplitude }) => amplitude),
    );
    const ratios = sigmas(other).map((sigma, i) => sigma / (sigmas(first)[i] as number));
    expect(ratios.length).toBe(2 * NAMES.length + 1);
    expect(ratios.every((ratio) => ratio === 1)).toBe(false);
    // σ of 60 draws, or of 30 and their quarter turns, is known to 9 %, a ratio of two to 13 %: four of these.
    expectWithin(
      ratios,
      ratios.map(() => 1),
      { abs: 0.52 },
    );
  });

  it('gives what the textbook says where the noise is white', () => {
    // Each line's noise is read from 9 bins: over 3 records and 13 lines the variance is known to 1/√(9·3·13), 5 %, σ
    // to half of that. Student's factor for an estimate from so few bins is in the variance and taken out here.
    const records = [1, 2, 3];
    let seen = 0;
    for (const seed of records) {
      const fit = redrawn(hourly(record(YEAR, seed)), { by, draws: 60 });
      const all = variances(fit);
      fit.diagnostics.noise.forEach(({ bins }, line) => {
        if (line === 0) return;
        const pair = (all[2 * line - 1] as number) + (all[2 * line] as number);
        seen += pair / studentFactor(bins) / (2 * records.length * NAMES.length);
      });
    }
    const textbook = (2 * SD * SD) / YEAR; // of a cosine or a sine of constant size 1
    expectWithin(Math.sqrt(seen / textbook), 1, { abs: 0.1 });
  });

  it('scales with the heights, and not with the weights', () => {
    const first = sigmas(redrawn(half, { by, draws: 40 }));
    const weights = new Float64Array(half.values.length).fill(7);
    const weighed = redrawn(half, { by, draws: 40 }, { weights });
    expectWithin(sigmas(weighed), first, { abs: 0, rel: 1e-9 });
    const doubled = redrawn(hourly(half.values.map((h) => 2 * h)), { by, draws: 40 });
    expectWithin(
      sigmas(doubled),
      first.map((sigma) => 2 * sigma),
      { abs: 0, rel: 1e-9 },
    );
  });

  it('takes few samples, gaps, steps, covariates and resistant weights', () => {
    const gapped = half.values.map((h, i) => (i % 700 < 150 || i % 11 === 3 ? Number.NaN : h));
    const state = seeded(3);
    const cases: [Series, FitOptions][] = [
      [hourly(half.values.slice(0, 9)), { constituents: ['M2'] }],
      [hourly(gapped), { secularRate: true, steps: [START + 100 * DAY] }],
      [half, { covariates: [{ name: 'pressure', values: half.values.map(() => normal(state)) }] }],
      [hourly(gapped), { weighting: 'resistant' }],
    ];
    for (const [series, options] of cases) {
      const all = variances(redrawn(series, { by, draws: 40 }, options));
      expect(all.every((v) => v > 0 && v < 1)).toBe(true);
    }
  });
});

describe('what is drawn', () => {
  it('projects as curves are made', () => {
    const options: FitOptions = { constituents: ['M2', 'K1'] };
    const [{ solved, blocks }] = found(hourly(year.values.slice(0, 2000)), options);
    const state = seeded(4);
    const sides = Array.from({ length: 4 }, () => new Float64Array(2000).map(() => normal(state)));
    const coefficients = Float64Array.of(0.3, 1, -0.5, 0.25, 2);
    const curve = new Float64Array(2000);
    synthesizeInto(curve, solved.design.basis, coefficients, {
      start: START,
      step: HOUR,
      count: 2000,
    });
    const projections = runThrough(projectionsOf(solved.design, (blocks as [Rows])[0], sides));
    const got = projections.map((p) =>
      p.reduce((sum, v, i) => sum + v * (coefficients[i] as number), 0),
    );
    const wanted = sides.map((side) =>
      side.reduce((sum, v, i) => sum + v * (curve[i] as number), 0),
    );
    expectWithin(got, wanted, { abs: 1e-9 });
  });

  it('knows what a rate costs in slow noise, in which neighbours are alike', () => {
    // Noise that keeps 99 % of itself from hour to hour: correlation 0.99^lag about a variance of a²/(1 − 0.99²).
    const [kept, push] = [0.99, 0.01];
    const state = seeded(9);
    let level = 0;
    const slow = year.values.map((h) => h + (level = kept * level + push * normal(state)));
    const fit = redrawn(hourly(slow), { draws: 60 }, { secularRate: true });
    const got = sigmas(fit)[fit.covariance.order.indexOf('secularRate')] as number;
    // The rate is Σ c·h, c = t/Σt² about the middle: Σ c c′ 0.99^|lag| by two running sums. A year has 8,766 hours.
    let [squares, sum, past] = [0, 0, 0];
    for (let i = 0; i < YEAR; i++) {
      const t = i - (YEAR - 1) / 2;
      past *= kept;
      sum += t * (t + 2 * past);
      past += t;
      squares += t * t;
    }
    const wanted = (YEAR * Math.sqrt((push * push * sum) / (1 - kept * kept))) / squares;
    // The slowest noise is read from a handful of bins, and Student's factor makes up for that.
    expect(got / wanted).toBeGreaterThan(0.6);
    expect(got / wanted).toBeLessThan(2.5);
  });
});

describe('noise like that of La Jolla', () => {
  const { density, tide } = laJolla();
  const main = only(tide, NAMES);
  const heights = heightsOf(main, START, YEAR);
  const noise = noiseOf(density, seeded(20310101));
  const years = [noise.next().value, noise.next().value].flatMap((whole) =>
    [0, 3, 6, 9, 12].map((k) => whole.subarray(k * YEAR, (k + 1) * YEAR)),
  );

  it.each(WAYS)('by %s: the truth lies in the regions as often as they say', (by) => {
    const rows = emptyCoverage(main);
    years.forEach((values, i) => {
      const redraw = { by, seed: 1 + i, draws: 40 };
      count(rows, redrawn(recordOf(START, heights, values), redraw), main);
    });
    const { trials, discs } = pooled(rows, 'spectrum');
    expect(trials).toBe(10 * NAMES.length);
    // 130 trials of 95 %: 123.5 with a spread of 2.5; four of these below. What is too wide only the long run can tell.
    expect(discs).toBeGreaterThanOrEqual(113);
  });
});

describe('the Async twin', () => {
  it('gives the same, shows progress, and stops with the reason of the signal', async () => {
    const options: FitOptions = {
      constituents: NAMES,
      errorModel: 'redrawn',
      redraw: { draws: 20 },
    };
    const stages = new Set<string>();
    const slow = await fitHarmonicsAsync(year, {
      ...options,
      onProgress: ({ stage }) => void stages.add(stage),
    });
    expect(slow).toEqual(fitHarmonics(year, options));
    expect([...stages]).toEqual(
      expect.arrayContaining(['spectrum of the residual', 'transform', 'redrawn residuals']),
    );
    const abort = new AbortController();
    const work = fitHarmonicsAsync(year, {
      ...options,
      signal: abort.signal,
      onProgress: ({ stage }) => {
        if (stage === 'redrawn residuals') abort.abort(new Error('enough'));
      },
    });
    await expect(work).rejects.toThrow('enough');
  });

  it.each(WAYS)('takes no step of more than 20 ms by %s', (by) => {
    const [at, redraw, noise] = found(year, {});
    // Time of the processor, the shortest of three runs for each step: the machine may be busy with other things.
    const shortest: number[] = [];
    for (let run = 0; run < 3; run++) {
      let step = 0;
      let began = process.cpuUsage();
      for (const { done, total } of redrawnCovariance(at, { ...redraw, by }, noise)) {
        const { user, system } = process.cpuUsage(began);
        expect(done).toBeLessThanOrEqual(total);
        shortest[step] = Math.min(shortest[step] ?? Infinity, (user + system) / 1000);
        step++;
        began = process.cpuUsage();
      }
    }
    expect(shortest.length).toBeGreaterThan(100);
    expect(Math.max(...shortest)).toBeLessThan(20);
  });
});

describe('options', () => {
  const times = Float64Array.from(
    { length: 900 },
    (_, i) => START + i * 3.7 * HOUR + ((i * 7919) % 997) * 1000,
  );
  const irregular = sampledSeries({ times, values: record(900, 2) });

  it('draws phases at a uniform step and blocks at times of their own', () => {
    expect(sigmas(redrawn(half, {}))).toEqual(
      sigmas(redrawn(half, { by: 'phases', seed: 1, draws: 200 })),
    );
    const list: FitOptions = { constituents: ['M2', 'K1', 'O1'] };
    expect(sigmas(redrawn(irregular, {}, list))).toEqual(
      sigmas(redrawn(irregular, { by: 'blocks' }, list)),
    );
  });

  it.each<[string, Series, FitOptions]>([
    ['CONFLICT options.redraw.by', irregular, { redraw: { by: 'phases' } }],
    ['UNKNOWN_CHOICE options.redraw.by', year, { redraw: { by: 'chance' as 'blocks' } }],
    ['OUT_OF_RANGE options.redraw.seed', year, { redraw: { seed: 0.5 } }],
    ['OUT_OF_RANGE options.redraw.seed', year, { redraw: { seed: 2 ** 53 } }],
    ['OUT_OF_RANGE options.redraw.draws', year, { redraw: { draws: 19 } }],
    ['OUT_OF_RANGE options.redraw.draws', year, { redraw: { draws: 10001 } }],
    ['OUT_OF_RANGE options.redraw.draws', year, { redraw: { draws: 100.5 } }],
    ['CONFLICT options.redraw', year, { errorModel: 'independent', redraw: {} }],
  ])('refuses: %s', (expected, series, options) => {
    const { code, path } = refusal(() =>
      fitHarmonics(series, { errorModel: 'redrawn', ...options }),
    );
    expect(`${code} ${path}`).toBe(expected);
  });
});
