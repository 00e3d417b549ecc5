import { makeBasis, synthesizeInto } from '@staithe/basis';
import { DAY, HOUR, sampledSeries, uniformSeries, type UniformSeries } from '@staithe/core';
import { expectAngleWithin, expectWithin, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { yearlyFits, yearlyFitsAsync } from '../src/diagnose/yearly-fits.js';
import { fitHarmonics } from '../src/index.js';

const NAMES = ['M2', 'S2', 'K1', 'O1'];
const PLAIN = { constituents: NAMES, nodalModel: 'none', errorModel: 'independent' } as const;
const FIRST = 2030;

/** Park and Miller (1988), minimal standard generator; sums of twelve for a normal number. */
function normals(seed: number): () => number {
  let state = seed;
  const uniform = (): number => (state = (state * 48271) % 2147483647) / 2147483647;
  return () => Array.from({ length: 12 }, uniform).reduce((a, b) => a + b, -6);
}

/** Hours of some years; M2 has an amplitude of its own in each, noise of 0.1 m. */
function record(m2: readonly number[], seed = 3, noise = 0.1): UniformSeries {
  const normal = normals(seed);
  const start = Date.UTC(FIRST, 0, 1);
  const count = (Date.UTC(FIRST + m2.length, 0, 1) - start) / HOUR;
  const values = new Float64Array(count);
  const basis = makeBasis({ constituents: NAMES, nodalModel: 'none' });
  m2.forEach((amplitude, i) => {
    const from = Date.UTC(FIRST + i, 0, 1);
    const hours = (Date.UTC(FIRST + i + 1, 0, 1) - from) / HOUR;
    const own = new Float64Array(hours);
    const coefficients = Float64Array.of(
      2,
      0.6 * amplitude,
      0.8 * amplitude,
      0.3,
      0,
      0.2,
      0,
      0,
      0.1,
    );
    synthesizeInto(own, basis, coefficients, { start: from, step: HOUR, count: hours });
    values.set(own, (from - start) / HOUR);
  });
  return uniformSeries({ start, step: HOUR, values: values.map((h) => h + noise * normal()) });
}

describe('fits of single years', () => {
  it('are the fits of these years', () => {
    const whole = record([1, 1, 1]);
    const { years, skipped } = yearlyFits(whole, PLAIN);
    expect(years.map(({ year, samples }) => [year, samples])).toEqual([
      [2030, 8760],
      [2031, 8760],
      [2032, 8784],
    ]);
    expect(skipped).toEqual([]);
    const second = uniformSeries({
      start: Date.UTC(2031, 0, 1),
      step: HOUR,
      values: whole.values.slice(8760, 2 * 8760),
    });
    expect(years[1]?.fit.constants).toEqual(fitHarmonics(second, PLAIN).constants);
    expect(years[1]?.fit.residuals).toBeUndefined();
  });

  it('scatter as their errors say where nothing changes', () => {
    const ratios: number[] = [];
    for (let seed = 1; seed <= 6; seed++) {
      const { changes } = yearlyFits(record([1, 1, 1, 1], seed), PLAIN);
      expect(changes.map(({ name }) => name)).toEqual(NAMES);
      for (const { scatter, sigma, ratio, largest, trend } of changes) {
        ratios.push(ratio);
        // White noise of 0.1 m: each coefficient √(2/8760)·0.1, the point √2 of it.
        expectWithin(sigma, 0.1 * Math.sqrt(4 / 8766), { rel: 0.03 });
        expect(scatter).toBeLessThan(2.5 * sigma);
        expect(largest.distance).toBeGreaterThanOrEqual(scatter);
        expect(trend).toBeDefined();
      }
    }
    // 24 of χ² over 6 degrees of freedom: the mean has a standard deviation of √(2/(24·6)) = 0.118.
    const mean = ratios.reduce((a, b) => a + b, 0) / ratios.length;
    expectWithin(mean, 1, { abs: 3 * 0.118 });
  });

  it('show a constituent that changes, and its trend', () => {
    const { changes } = yearlyFits(record([1, 1.01, 1.02, 1.03, 1.04]), PLAIN);
    const m2 = changes.find(({ name }) => name === 'M2');
    const { trend, ratio, largest, amplitude, phaseLag, scatter } = m2 as NonNullable<typeof m2>;
    expect(ratio).toBeGreaterThan(20);
    expect([2030, 2034]).toContain(largest.year);
    expectWithin(amplitude, 1.02, { abs: 3e-3 });
    // atan2(0.8, 0.6).
    expectAngleWithin(phaseLag, 53.1301, { abs: 0.2 });
    expectWithin(scatter, 0.01 * Math.SQRT2, { abs: 2e-3 });
    // σ of a coefficient of one year 1.5 mm, over √10 years.
    expectWithin(trend?.amplitudeSigma as number, 0.1 * Math.sqrt(2 / 8766 / 10), { rel: 0.6 });
    expectWithin(trend?.amplitudePerYear as number, 0.01, { abs: 3 * 4.8e-4 });
    expectWithin(trend?.phaseLagPerYear as number, 0, { abs: 3 * 0.027 });
    const rest = changes.filter(({ name }) => name !== 'M2');
    for (const one of rest) expect(one.ratio).toBeLessThan(3);
  });

  it('take one list for all: what the year with the fewest samples can hold', () => {
    const whole = record([1, 1, 1], 4, 0.01);
    // The second year ends in October: 82 % of it, too short for what needs a year.
    const values = whole.values.map((v, i) => (i >= 8760 + 7200 && i < 2 * 8760 ? Number.NaN : v));
    const { years } = yearlyFits({ ...whole, values }, { nodalModel: 'none' });
    const lists = years.map(({ fit }) => fit.constants.constituents.map(({ name }) => name));
    expect(lists[0]).toEqual(lists[1]);
    expect(lists[2]).toEqual(lists[1]);
    for (const name of NAMES) expect(lists[0]).toContain(name);
    expect(lists[0]).not.toContain('S1');
  });

  it('leave out years without enough samples, with the reason', () => {
    const whole = record([1, 1, 1]);
    const thin = whole.values.map((v, i) => (i < 8760 && i % 4 === 0 ? Number.NaN : v));
    const { years, skipped } = yearlyFits({ ...whole, values: thin }, PLAIN);
    expect(years.map(({ year }) => year)).toEqual([2031, 2032]);
    expect(skipped).toEqual([
      { year: 2030, reason: 'has 75.0 % of its samples, fewer than 80.0 %' },
    ]);
    expect(yearlyFits({ ...whole, values: thin }, { ...PLAIN, leastShare: 0.7 }).skipped).toEqual(
      [],
    );
    // A list of times without any of 2031.
    const kept = [...whole.values.keys()].filter((i) => i < 8760 || i >= 2 * 8760);
    const list = sampledSeries({
      times: kept.map((i) => whole.start + i * HOUR),
      values: kept.map((i) => whole.values[i] as number),
    });
    const gone = yearlyFits(list, PLAIN);
    expect(gone.years.map(({ year }) => year)).toEqual([2030, 2032]);
    expect(gone.skipped.map(({ year }) => year)).toEqual([2031]);
  });

  it('skip a year whose samples allow no fit', () => {
    const whole = record([1, 1]);
    const values = whole.values.map((v, i) => (i < 8760 ? 1.5 : v));
    const { years, skipped, changes } = yearlyFits({ ...whole, values }, PLAIN);
    expect(years.map(({ year }) => year)).toEqual([2031]);
    expect(skipped[0]?.reason).toMatch(/^expected values that change/);
    expect(changes).toEqual([]);
  });

  it('hand each year its weights, covariates and steps', () => {
    const whole = record([1, 1], 8, 0.01);
    const pressure = whole.values.map((_, i) => Math.sin(i / 31));
    const at = Date.UTC(2031, 5, 1);
    const values = whole.values.map((v, i) => {
      const moved = whole.start + i * HOUR >= at ? 0.5 : 0;
      return v + moved - 0.1 * (pressure[i] as number) + (i === 100 ? 1e3 : 0);
    });
    const { years } = yearlyFits(
      { ...whole, values },
      {
        ...PLAIN,
        weights: whole.values.map((_, i) => (i === 100 ? 0 : 1)),
        covariates: [{ name: 'pressure', values: pressure }],
        steps: [at],
      },
    );
    for (const { fit } of years) {
      expectWithin(fit.covariates?.[0]?.coefficient as number, -0.1, { abs: 1e-3 });
    }
    expect(years[0]?.samples).toBe(8759);
    expect(years[0]?.fit.constants.steps).toBeUndefined();
    expectWithin(years[1]?.fit.constants.steps?.[0]?.change as number, 0.5, { abs: 2e-3 });
  });
});

describe('the Async twin and refusals', () => {
  it('gives the same, and stops with the reason of the signal', async () => {
    const whole = record([1, 1]);
    expect(await yearlyFitsAsync(whole, PLAIN)).toEqual(yearlyFits(whole, PLAIN));
    const abort = new AbortController();
    const work = yearlyFitsAsync(whole, {
      ...PLAIN,
      signal: abort.signal,
      onProgress: () => abort.abort(new Error('enough')),
    });
    await expect(work).rejects.toThrow('enough');
  });

  it('says what it cannot take', () => {
    const whole = record([1]);
    const error = (run: () => unknown): string => {
      const { code, path } = refusal(run);
      return `${code} ${path}`.trim();
    };
    for (const leastShare of [0, 1.1, Number.NaN]) {
      expect(error(() => yearlyFits(whole, { ...PLAIN, leastShare }))).toBe(
        'OUT_OF_RANGE options.leastShare',
      );
    }
    expect(error(() => yearlyFits(whole, { ...PLAIN, sideLines: ['M2'] }))).toBe(
      'CONFLICT options.sideLines',
    );
    expect(error(() => yearlyFits(whole, { ...PLAIN, weights: [1] }))).toBe(
      'LENGTH_MISMATCH options.weights',
    );
    const covariates = [{ name: 'pressure', values: [1] }];
    expect(error(() => yearlyFits(whole, { ...PLAIN, covariates }))).toBe(
      'LENGTH_MISMATCH options.covariates[0].values',
    );
    const part = { ...whole, values: whole.values.slice(0, (100 * DAY) / HOUR) };
    expect(error(() => yearlyFits(part, PLAIN))).toBe('TOO_FEW_SAMPLES');
  });
});
