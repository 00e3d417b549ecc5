import { makeBasis, synthesizeInto } from '@staithe/basis';
import {
  DAY,
  HOUR,
  MINUTE,
  sampledSeries,
  type Series,
  uniformSeries,
  type UniformSeries,
} from '@staithe/core';
import { runThrough } from '@staithe/core/long-work';
import { nodalCorrection } from '@staithe/nodal';
import { expectWithin, hourlySeries, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { levelOf, levelOfLargest, rootOf } from '../src/diagnose/false-alarm.js';
import { leftOver, leftOverAsync } from '../src/diagnose/left-over.js';
import { periodogramOf } from '../src/diagnose/periodogram.js';
import { samplesOf } from '../src/diagnose/residual-samples.js';
import { waveSumInto } from '../src/diagnose/wave-sums.js';
import { fitHarmonics } from '../src/index.js';

const START = Date.UTC(2031, 0, 1);
const FITTED = ['M2', 'S2', 'N2', 'K1', 'O1'];
const PARAMETERS = { constituents: FITTED, nodalModel: 'none', errorModel: 'independent' } as const;

/** Park and Miller (1988), minimal standard generator; sums of twelve for a normal number. */
function generator(seed: number): { uniform: () => number; normal: () => number } {
  let state = seed;
  const uniform = (): number => (state = (state * 48271) % 2147483647) / 2147483647;
  const normal = (): number => Array.from({ length: 12 }, uniform).reduce((a, b) => a + b, -6);
  return { uniform, normal };
}

/** Red noise: each value keeps a share of the one before. */
function redNoise(count: number, share: number, size: number, normal: () => number): Float64Array {
  let weather = 0;
  for (let i = 0; i < 300; i++) weather = share * weather + size * normal();
  return Float64Array.from({ length: count }, () => (weather = share * weather + size * normal()));
}

/** Amplitudes of lines that the fit leaves out, metres. */
const LEFT = { K2: 0.05, P1: 0.03, M4: 0.008, MS4: 0.004 };

function record(days: number, seed: number, step = HOUR): UniformSeries {
  const count = Math.round((days * DAY) / step);
  const { normal } = generator(seed);
  const values = redNoise(count, 0.95, 0.006, normal);
  const tide = new Float64Array(count);
  const basis = makeBasis({
    constituents: [...FITTED, ...Object.keys(LEFT)],
    nodalModel: 'none',
  });
  const left = Object.values(LEFT).flatMap((size) => [0.6 * size, 0.8 * size]);
  const coefficients = Float64Array.of(
    0,
    1,
    0.5,
    0.3,
    0.2,
    0.2,
    -0.1,
    0.1,
    0.1,
    0.1,
    -0.05,
    ...left,
  );
  synthesizeInto(tide, basis, coefficients, { start: START, step, count });
  return uniformSeries({
    start: START,
    step,
    values: values.map((v, i) => v + (tide[i] as number)),
  });
}

function names(series: Series): string[] {
  return leftOver(fitHarmonics(series, PARAMETERS)).lines.map(({ likely }) => likely ?? '');
}

describe('lines left over', () => {
  it('are those that the fit left out, with their amplitudes within their errors', () => {
    let within = 0;
    for (let seed = 1; seed <= 6; seed++) {
      const { lines } = leftOver(fitHarmonics(record(366, seed), PARAMETERS));
      expect(lines.slice(0, 4).map(({ likely }) => likely)).toEqual(Object.keys(LEFT));
      Object.values(LEFT).forEach((size, i) => {
        const { amplitude, radius95 } = lines[i] as (typeof lines)[number];
        if (Math.abs(amplitude - size) <= radius95) within++;
        // Three times the radius leaves no room for a wrong scale: it is 2 to 6 % of these amplitudes.
        expectWithin(amplitude, size, { abs: 3 * radius95 });
        expect(radius95 / size).toBeLessThan(0.3);
      });
      expect(lines.length).toBeLessThanOrEqual(5);
    }
    // An amplitude alone lies within the radius of the pair in 98 % of cases: of 24 three may fail.
    expect(within).toBeGreaterThanOrEqual(21);
  });

  it('are found through gaps, at irregular times, and from a list of times on a grid', () => {
    const whole = record(366, 3);
    const { uniform } = generator(9);
    const gappy = whole.values.map((v, i) => (i % 1000 < 250 || i > 7000 ? Number.NaN : v));
    expect(names({ ...whole, values: gappy }).slice(0, 3)).toEqual(['K2', 'P1', 'M4']);
    const kept = [...whole.values.keys()].filter((i) => !Number.isNaN(gappy[i]));
    const times = kept.map((i) => START + i * HOUR);
    const onGrid = sampledSeries({ times, values: kept.map((i) => whole.values[i] as number) });
    const [first] = leftOver(fitHarmonics(onGrid, PARAMETERS)).lines;
    const [same] = leftOver(fitHarmonics({ ...whole, values: gappy }, PARAMETERS)).lines;
    expectWithin(first?.amplitude as number, same?.amplitude as number, { abs: 1e-9 });
    // Six minutes thinned to one in eight: no grid.
    const fine = record(366, 3, 6 * MINUTE);
    const some = [...fine.values.keys()].filter(() => uniform() < 0.125);
    const irregular = sampledSeries({
      times: some.map((i) => START + i * 6 * MINUTE + Math.round(60000 * uniform())),
      values: some.map((i) => fine.values[i] as number),
    });
    expect(names(irregular).slice(0, 3)).toEqual(['K2', 'P1', 'M4']);
  });

  it('are found beside gross errors where these were set aside', () => {
    const whole = record(366, 3);
    const values = whole.values.map((h, i) => (i % 900 === 450 ? h + 20 : h));
    const plain = leftOver(fitHarmonics({ ...whole, values }, PARAMETERS)).lines;
    expect(plain.map(({ likely }) => likely)).not.toContain('M4');
    const fit = fitHarmonics({ ...whole, values }, { ...PARAMETERS, weighting: 'resistant' });
    expect(fit.resistant?.setAside).toBeGreaterThanOrEqual(9);
    const { lines } = leftOver(fit);
    expect(lines.slice(0, 4).map(({ likely }) => likely)).toEqual(Object.keys(LEFT));
    Object.values(LEFT).forEach((size, i) => {
      const { amplitude, radius95 } = lines[i] as (typeof lines)[number];
      expectWithin(amplitude, size, { abs: 2 * radius95 });
    });
  });

  it('come from chance in one record of twenty, white or red, whole or with gaps', () => {
    const { normal, uniform } = generator(77);
    let found = 0;
    const records = 120;
    for (let run = 0; run < records; run++) {
      const values = redNoise(60 * 24, run % 2 ? 0.97 : 0, 0.02, normal);
      if (run % 3 === 0) values.fill(Number.NaN, 200 + Math.floor(300 * uniform()), 700);
      const fit = fitHarmonics(uniformSeries({ start: START, step: HOUR, values }), PARAMETERS);
      if (leftOver(fit).lines.length > 0) found++;
    }
    // 6 expected at most; three standard deviations of a count of 6 are 7.
    expect(found).toBeLessThanOrEqual(13);
  });

  it('of Eastport without N2 and S2 are these', () => {
    const fit = fitHarmonics(hourlySeries('eastport-observed-2019'), {
      constituents: ['M2', 'K1', 'O1'],
      argumentModel: 'schureman1940',
      nodalModel: 'schureman1940',
    });
    const [first, second] = leftOver(fit, { most: 40 }).lines;
    expect([first?.likely, second?.likely]).toEqual(['N2', 'S2']);
    // Independent fit of the source, times f of the year: a line in the residual is the wave of that year.
    const year = (name: string, amplitude: number): number =>
      amplitude * nodalCorrection(name, '2019-07-02T00:00Z', { model: 'schureman1940' }).f;
    expectWithin(first?.amplitude as number, year('N2', 0.567), { abs: first?.radius95 as number });
    expectWithin(second?.amplitude as number, year('S2', 0.412), {
      abs: second?.radius95 as number,
    });
    expect(first?.radius95).toBeLessThan(0.02);
  });

  it('are as many as asked for', () => {
    const fit = fitHarmonics(record(366, 1), PARAMETERS);
    const { lines } = leftOver(fit, { most: 2 });
    expect(lines.map(({ likely }) => likely)).toEqual(['K2', 'P1']);
  });
});

describe('the spectrum of the residual', () => {
  it('adds up to the variance, and has one value a turn of the record', () => {
    const fit = fitHarmonics(record(366, 2), PARAMETERS);
    const { speeds, density } = leftOver(fit).spectrum;
    const width = speeds[0] as number;
    expectWithin(width, 360 / (366 * 24), { rel: 1e-12 });
    expect(speeds.length).toBe(366 * 12);
    const variance = density.reduce((sum, value) => sum + value * width, 0);
    const { rms } = fit.diagnostics.residual;
    // The triangle at both ends of the range leaves out half a bin.
    expectWithin(variance, rms * rms, { rel: 0.01 });
  });

  it('at irregular times is within 0.1 % of the sums themselves', () => {
    const { uniform, normal } = generator(4);
    let t = START;
    const times = Float64Array.from(
      { length: 900 },
      () => (t += Math.round(HOUR * (0.5 + uniform()))),
    );
    const samples = samplesOf({ times, values: times.map(normal), step: 0, weights: undefined });
    expect(samples.step).toBe(0);
    const { spacing, power } = runThrough(periodogramOf(samples));
    const sum = new Float64Array(2);
    const exact = power.map((_, k) => {
      waveSumInto(sum, samples.values, samples, k * spacing);
      return Math.hypot(sum[0] as number, sum[1] as number) / 30;
    });
    const largest = Math.max(...exact);
    expectWithin(power.map(Math.sqrt), exact, { abs: 1e-3 * largest });
  });
});

describe('false alarms', () => {
  it('roots are roots', () => {
    for (const [value, r] of [
      [20, 1],
      [20, 2],
      [4, 2],
      [87600, 21],
      [1e9, 40],
      [1, 7],
    ] as const) {
      expectWithin(rootOf(value, r) ** r, value, { rel: 1e-12 });
    }
  });

  it('the level of the largest is that which chance exceeds once in twenty', () => {
    // (1 + x/r)^−r = 0.05/n.
    expectWithin((1 + levelOfLargest(500, 16) / 16) ** -16, 0.05 / 500, { rel: 1e-10 });
    expectWithin(levelOfLargest(1, 1), 19, { rel: 1e-12 });
  });

  it('the mean of bins is that of all, and of three quarters of them moved by none of the rest', () => {
    const { uniform } = generator(12);
    const exponential = (): number => -Math.log(uniform());
    const plain: number[] = [];
    const withLines: number[] = [];
    let exceeded = 0;
    const limit = levelOfLargest(1, 21);
    for (let run = 0; run < 4000; run++) {
      const bins = Float64Array.from({ length: 28 }, exponential);
      const { level, bins: kept } = levelOf(Float64Array.from(bins));
      expect(kept).toBe(21);
      plain.push(level);
      if (exponential() > limit * level) exceeded++;
      bins.fill(1e6, 0, 4);
      withLines.push(levelOf(bins).level);
    }
    const mean = (list: number[]): number => list.reduce((a, b) => a + b, 0) / list.length;
    // σ of a mean of 4000 levels, each of 21 bins: 0.0035.
    expectWithin(mean(plain), 1, { abs: 0.011 });
    expect(mean(withLines)).toBeLessThan(1.4);
    // 5 % of 4000, three standard deviations: 41.
    expectWithin(exceeded, 200, { abs: 41 });
  });
});

describe('the Async twin and refusals', () => {
  it('gives the same, shows progress, stops with the reason of the signal', async () => {
    const fit = fitHarmonics(record(120, 5), PARAMETERS);
    const stages = new Set<string>();
    const slow = await leftOverAsync(fit, { onProgress: ({ stage }) => void stages.add(stage) });
    expect(slow).toEqual(leftOver(fit));
    expect([...stages]).toContain('transform');
    const abort = new AbortController();
    const work = leftOverAsync(fit, {
      signal: abort.signal,
      onProgress: () => abort.abort(new Error('enough')),
    });
    await expect(work).rejects.toThrow('enough');
  });

  it('says what it cannot take', () => {
    const fit = fitHarmonics(record(40, 1), { ...PARAMETERS, constituents: ['M2'] });
    const error = (run: () => unknown): string => {
      const { code, path } = refusal(run);
      return `${code} ${path}`;
    };
    expect(error(() => leftOver({ ...fit, residuals: undefined }))).toBe('MISSING fit.residuals');
    for (const most of [0, 1.5, 101, Number.NaN]) {
      expect(error(() => leftOver(fit, { most }))).toBe('OUT_OF_RANGE options.most');
    }
  });

  it('has nothing to say of a few samples', () => {
    const few = uniformSeries({ start: START, step: HOUR, values: [1, 2, 0, 3, 1, 2, 0.5] });
    const fit = fitHarmonics(few, { constituents: ['M2'], nodalModel: 'none' });
    expect(leftOver(fit).lines).toEqual([]);
  });
});
