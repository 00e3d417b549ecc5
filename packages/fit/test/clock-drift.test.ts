import { makeBasis, synthesizeInto } from '@staithe/basis';
import { HOUR, MINUTE, uniformSeries, type UniformSeries } from '@staithe/core';
import { expectWithin, hourlySeries, recordAccuracy, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { clockDrift, clockDriftAsync } from '../src/diagnose/clock-drift.js';
import { joinSpecies } from '../src/diagnose/drift-verdict.js';
import { fitHarmonics, type FitOptions } from '../src/index.js';
import { drifted } from './reference/drifted.js';

const START = Date.UTC(2031, 0, 1);
const NAMES = ['M2', 'S2', 'N2', 'K1', 'O1', 'M4', 'M6'];
const TIDE = [1.2, 0.3, 0.4, 0.2, 0.25, 0.1, 0.2, 0.1, 0.05, 0.15, 0.03, 0.04, 0.02, 0.02];
const OPTIONS: FitOptions = { constituents: NAMES };

/** Park and Miller (1988), minimal standard generator; sums of twelve for a normal number. */
function normals(seed: number): () => number {
  let state = seed;
  const uniform = (): number => (state = (state * 48271) % 2147483647) / 2147483647;
  return () => Array.from({ length: 12 }, uniform).reduce((a, b) => a + b, -6);
}

/** Hourly heights of days: those of the tide at the times that the clock should have shown, and noise of a centimetre. */
function year(minutes: number, seed: number, noise = 0.01, days = 366): UniformSeries {
  const count = 24 * days;
  const times = Float64Array.from({ length: count }, (_, i) => {
    return START + i * HOUR + minutes * MINUTE * (i / (count - 1) - 0.5);
  });
  const values = new Float64Array(count);
  const basis = makeBasis({ constituents: NAMES });
  synthesizeInto(values, basis, Float64Array.of(2, ...TIDE), { times });
  const normal = normals(seed);
  return uniformSeries({
    start: START,
    step: HOUR,
    values: values.map((h) => h + noise * normal()),
  });
}

describe('a drift of the clock in a synthetic year', () => {
  // Size of what is looked for: five minutes in a year, to be found within 0.2.
  const WITHIN = 0.2;

  it.each([5, -5, 0.9])('of %d minutes is found', (minutes) => {
    const got = clockDrift(year(minutes, 3), OPTIONS);
    expectWithin(got.minutes, minutes, { abs: WITHIN });
    expect(got).toMatchObject({ found: true, agree: true, annual: true });
    expect(got.species.map(({ species }) => species)).toEqual([1, 2, 4, 6]);
    expect(got.sigma).toBeLessThan(WITHIN);
    for (const one of got.species) expectWithin(one.minutes, minutes, { abs: 4 * one.sigma });
  });

  it('of an hour is found within 2 %, through gaps and gross errors', () => {
    const series = year(60, 4);
    const spoilt = series.values.map((h, i) =>
      i % 700 < 200 ? Number.NaN : h + (i % 997 === 500 ? 5 : 0),
    );
    const got = clockDrift({ ...series, values: spoilt }, { ...OPTIONS, weighting: 'resistant' });
    expectWithin(got.minutes, 60, { rel: 0.02 });
    expect(got.found).toBe(true);
  });

  it('of none is not, and lies within its errors as often as they say', () => {
    const over = Array.from({ length: 16 }, (_, i) => {
      const { minutes, sigma, found } = clockDrift(year(0, 20 + i), OPTIONS);
      expect(found).toBe(false);
      return (minutes / sigma) ** 2;
    });
    // χ² of 16: its mean has a standard deviation of √(2/16) = 0.35.
    const mean = over.reduce((a, b) => a + b, 0) / over.length;
    expectWithin(mean, 1, { abs: 3 * 0.35 });
  });

  it('is no seasonal change of M2, which H1 and H2 take', () => {
    const series = year(0, 5);
    const lines = makeBasis({ constituents: ['H1', 'H2'] });
    const side = new Float64Array(series.values.length);
    const grid = { start: START, step: HOUR, count: side.length };
    synthesizeInto(side, lines, Float64Array.of(0, 0.02, 0.01, -0.01, 0.02), grid);
    const values = series.values.map((h, i) => h + (side[i] as number));
    const got = clockDrift({ ...series, values }, OPTIONS);
    expectWithin(got.minutes, 0, { abs: WITHIN });
    expect(got.found).toBe(false);
  });

  it('is no change of one species alone', () => {
    // K1 and O1 drift by 20 minutes, the rest does not.
    const basis = makeBasis({ constituents: NAMES });
    const diurnal = Float64Array.of(2, ...TIDE.map((h, k) => (k >= 6 && k < 10 ? h : 0)));
    const series = year(0, 6);
    const count = series.values.length;
    const [slow, right] = [20, 0].map((minutes) => {
      const times = Float64Array.from({ length: count }, (_, i) => {
        return START + i * HOUR + minutes * MINUTE * (i / (count - 1) - 0.5);
      });
      const out = new Float64Array(count);
      synthesizeInto(out, basis, diurnal, { times });
      return out;
    }) as [Float64Array, Float64Array];
    const values = series.values.map((h, i) => h + (slow[i] as number) - (right[i] as number));
    const got = clockDrift({ ...series, values }, OPTIONS);
    expect(got).toMatchObject({ agree: false, found: false });
    expectWithin(got.species[0]?.minutes as number, 20, { abs: 1 });
  });

  it('of a record that is too short for H1 and H2 says so', () => {
    expect(clockDrift(year(0, 7, 0.01, 120), OPTIONS).annual).toBe(false);
    expect(clockDrift(year(0, 7, 0.01, 200), OPTIONS).annual).toBe(true);
    const old = {
      ...OPTIONS,
      nodalModel: 'schureman1940',
      argumentModel: 'schureman1940',
    } as const;
    expectWithin(clockDrift(year(5, 7), old).minutes, 5, { abs: WITHIN });
  });
});

describe('the clocks of real gauges', () => {
  // Injected drift: what of it comes back, less what the clean record shows, in minutes.
  const INJECTED = 5;
  const BACK = 0.1;

  it('Eastport 2019 is clean, and five minutes put into it come out', () => {
    const series = hourlySeries('eastport-observed-2019');
    const clean = clockDrift(series);
    const late = clockDrift(drifted(series, INJECTED));
    expectWithin(clean.minutes, 0, { abs: 1 });
    expectWithin(late.minutes, INJECTED, { abs: 1 });
    const seen = expectWithin(late.minutes - clean.minutes, INJECTED, { abs: BACK });
    expect(clean.found).toBe(false);
    expect(clean.annual).toBe(true);
    recordAccuracy('eastport-observed-2019', {
      capability: 'drift of the clock',
      compared: 'five minutes put into Eastport 2019, less what the clean record shows',
      ...seen,
      tolerance: BACK,
      unit: 'min',
    });
  });

  it('La Jolla: what is put in comes out, and no year is taken for a drift', () => {
    const record = hourlySeries('la-jolla-observed');
    const over: number[] = [];
    for (let y = 2011; y <= 2019; y++) {
      const [from, to] = [y, y + 1].map((one) => (Date.UTC(one, 0, 1) - record.start) / HOUR);
      const start = Date.UTC(y, 0, 1);
      const series = uniformSeries({ start, step: HOUR, values: record.values.slice(from, to) });
      const clean = clockDrift(series);
      expect(clean.found, `${y}`).toBe(false);
      over.push((clean.minutes / clean.sigma) ** 2);
      if (y !== 2012) continue;
      const late = clockDrift(drifted(series, INJECTED));
      const seen = expectWithin(late.minutes - clean.minutes, INJECTED, { abs: BACK });
      expectWithin(clean.minutes, 0, { abs: 2.5 });
      expect(clean.sigma).toBeGreaterThan(Math.abs(clean.minutes) / 3);
      recordAccuracy('la-jolla-observed', {
        capability: 'drift of the clock',
        compared: 'five minutes put into La Jolla 2012, less what the clean record shows',
        ...seen,
        tolerance: BACK,
        unit: 'min',
      });
    }
    // χ² of nine years: mean 1 with a standard deviation of 0.47 where the errors are right.
    expect(over.reduce((a, b) => a + b, 0) / over.length).toBeLessThan(1 + 3 * 0.47);
  });
});

describe('the verdict', () => {
  it('is the mean by weight of those that can tell, with χ² for its agreement', () => {
    const list = [
      { species: 1, minutes: 6, sigma: 2 },
      { species: 2, minutes: 4, sigma: 1 },
      { species: 3, minutes: 9, sigma: 3.1 },
    ];
    const got = joinSpecies(list);
    expect(got.species.map(({ counts }) => counts)).toEqual([true, true, false]);
    // (6/4 + 4)/(1/4 + 1), 1/√1.25; χ² = 0.8, with the third 3.0.
    expectWithin([got.minutes, got.sigma], [4.4, 0.894427191], { abs: 1e-9 });
    expect(got).toMatchObject({ agree: true, found: true });
    // χ² 7.2 over one degree of freedom is beyond 6.635: the error grows by √7.2.
    const far = joinSpecies([
      { species: 1, minutes: 10, sigma: 2 },
      { species: 2, minutes: 4, sigma: 1 },
    ]);
    expectWithin(far.sigma, Math.sqrt(7.2 / 1.25), { abs: 1e-9 });
    expect(far).toMatchObject({ agree: false, found: false });
    // What does not count may still speak against the others.
    const third = { species: 3, minutes: 90, sigma: 3.1 };
    expect(joinSpecies([...list.slice(0, 2), third])).toMatchObject({ agree: false, found: false });
    // One species has nothing to agree with.
    expect(joinSpecies([{ species: 2, minutes: 9, sigma: 1 }])).toMatchObject({
      minutes: 9,
      sigma: 1,
      agree: false,
      found: false,
    });
    const exact = joinSpecies([
      { species: 1, minutes: 5, sigma: 0 },
      { species: 2, minutes: 5, sigma: 0 },
    ]);
    expect(exact).toMatchObject({ minutes: 5, sigma: 0, agree: true, found: true });
  });
});

describe('the Async twin and refusals', () => {
  it('gives the same, and stops with the reason of the signal', async () => {
    const series = year(5, 9, 0.01, 90);
    const stages = new Set<string>();
    const slow = await clockDriftAsync(series, {
      ...OPTIONS,
      onProgress: ({ stage }) => void stages.add(stage),
    });
    expect(slow).toEqual(clockDrift(series, OPTIONS));
    expect([...stages]).toEqual(expect.arrayContaining(['slopes', 'noise of the drift']));
    const abort = new AbortController();
    const work = clockDriftAsync(series, {
      ...OPTIONS,
      signal: abort.signal,
      onProgress: () => abort.abort(new Error('enough')),
    });
    await expect(work).rejects.toThrow('enough');
  });

  it('says what it cannot take', () => {
    const normal = normals(31);
    const noise = Float64Array.from({ length: 3000 }, normal);
    const series = uniformSeries({ start: START, step: HOUR, values: noise });
    const none = refusal(() => clockDrift(series, { constituents: ['Mf'] }));
    expect(none.code).toBe('NO_TIDE');
    const bad = refusal(() => clockDrift(series, { weighting: 'heavy' as 'equal' }));
    expect([bad.code, bad.path]).toEqual(['UNKNOWN_CHOICE', 'options.weighting']);
    const same = refusal(() => clockDrift(series, { constituents: ['M2', 'M2'] }));
    expect(same).toEqual(refusal(() => fitHarmonics(series, { constituents: ['M2', 'M2'] })));
  });
});
