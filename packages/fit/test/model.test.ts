/**
 * What stands in the design beside the tide: rate, steps, covariates. Truths without noise are given back to
 * rounding; the levels come from the slow functions.
 */
import { DAY, HOUR, type Series, uniformSeries, YEAR } from '@staithe/core';
import { expectWithin, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { fitHarmonics, type FitOptions, type HarmonicFit } from '../src/index.js';
import { componentsOf, madeLevel, type TrueConstituent } from './reference/made-level.js';

const START = Date.UTC(2031, 0, 1);
const COUNT = 120 * 24;
const TIMES = Float64Array.from({ length: COUNT }, (_, i) => START + i * HOUR);
const TRUTH: readonly TrueConstituent[] = [
  ['M2', 1.2, 100],
  ['S2', 0.4, 140],
  ['N2', 0.25, 80],
  ['K1', 0.2, 30],
  ['O1', 0.15, 350],
  ['Mf', 0.02, 210],
  ['M4', 0.1, 5],
];
const NAMES = TRUTH.map(([name]) => name);
const TIDE = TIMES.map(madeLevel(TRUTH));
// The basis holds its functions to 1e-10 of the slow part's amplitude (docs/basis.md).
const RECOVERED = 1e-9; // m, m a year, m a unit of the covariate

const hourly = (values: ArrayLike<number>): Series =>
  uniformSeries({ start: START, step: HOUR, values });

/** Pressure in hectopascals with weather in it, as a function that a series of any step can be taken of. */
function pressureAt(time: number): number {
  const days = (time - START) / DAY;
  return (
    1013 + 9 * Math.sin(days / 1.7) + 5 * Math.sin(days / 0.61 + 1) + 3 * Math.cos(days * days)
  );
}
const RIVER = TIMES.map((time) => 40 + 30 * Math.exp(-(((time - START) / DAY - 50) ** 2) / 200));

/** Pressure three-hourly from two days before the record to two days after, and the straight line between. */
const PRESSURE = uniformSeries({
  start: START - 2 * DAY,
  step: 3 * HOUR,
  values: Float64Array.from({ length: 124 * 8 }, (_, i) =>
    pressureAt(START - 2 * DAY + 3 * i * HOUR),
  ),
});
function pressureBetween(time: number): number {
  const place = (time - PRESSURE.start) / PRESSURE.step;
  const below = Math.floor(place);
  const [low, high] = [PRESSURE.values[below], PRESSURE.values[below + 1]] as [number, number];
  return low + (place - below) * (high - low);
}

function expectTide(fit: HarmonicFit, label: string): void {
  expectWithin(componentsOf(fit, NAMES), componentsOf(TRUTH, NAMES), { abs: RECOVERED }, label);
}

describe('a record without noise gives back', () => {
  it('a rate and two steps, which may be named in any order', () => {
    const steps = [START + 70 * DAY + 5 * HOUR, START + 30 * DAY + 1];
    const middle = (START + (TIMES[COUNT - 1] as number)) / 2;
    const values = TIDE.map((h, i) => {
      const time = TIMES[i] as number;
      const [late, early] = steps as [number, number];
      const moved = (time >= early ? 0.05 : 0) + (time >= late ? -0.12 : 0);
      return h + 3 + (0.4 * (time - middle)) / YEAR + moved;
    });
    const fit = fitHarmonics(hourly(values), { constituents: NAMES, secularRate: true, steps });
    expectTide(fit, 'tide');
    expectWithin(fit.constants.meanLevel, 3, { abs: RECOVERED });
    expectWithin(fit.constants.secularRate?.metresPerYear as number, 0.4, { abs: RECOVERED });
    expect(fit.constants.secularRate?.at).toBe('2031-03-01T23:30Z');
    expect(fit.constants.steps?.map(({ at }) => at)).toEqual([
      '2031-01-31T00:00:00.001Z',
      '2031-03-12T05:00Z',
    ]);
    const changes = fit.constants.steps?.map(({ change }) => change) as number[];
    expectWithin(changes, [0.05, -0.12], { abs: RECOVERED });
    expect(fit.covariance.order.slice(0, 4)).toEqual([
      'meanLevel',
      'secularRate',
      'step[0]',
      'step[1]',
    ]);
  });

  it('covariates: a series at lags before and after, values with a reference', () => {
    const lags = [0, 5 * HOUR, -2.5 * HOUR];
    const effects = [-0.008, -0.003, 0.001];
    const means = lags.map(
      (lag) => TIMES.reduce((sum, time) => sum + pressureBetween(time - lag), 0) / COUNT,
    );
    const values = TIDE.map((h, i) => {
      const pushed = lags.reduce((sum, lag, k) => {
        const pressure = pressureBetween((TIMES[i] as number) - lag);
        return sum + (effects[k] as number) * (pressure - (means[k] as number));
      }, 0);
      return h + 2 + pushed + 0.002 * ((RIVER[i] as number) - 25);
    });
    const fit = fitHarmonics(hourly(values), {
      constituents: NAMES,
      covariates: [
        { name: 'pressure', series: PRESSURE, lags },
        { name: 'river', values: RIVER, reference: 25 },
      ],
    });
    expectTide(fit, 'tide');
    expectWithin(fit.constants.meanLevel, 2, { abs: RECOVERED });
    const found = fit.covariates as NonNullable<HarmonicFit['covariates']>;
    expect(found.map(({ name, lag }) => [name, lag])).toEqual([
      ['pressure', 0],
      ['pressure', 5 * HOUR],
      ['pressure', -2.5 * HOUR],
      ['river', 0],
    ]);
    expectWithin(
      found.map(({ coefficient }) => coefficient),
      [...effects, 0.002],
      { abs: RECOVERED },
      'effects',
    );
    // Sums of 2880 values of about 1000 carry rounding of 1e-12 of them.
    expectWithin(
      found.map(({ reference }) => reference),
      [...means, 25],
      { rel: 1e-12 },
      'references',
    );
    expect(fit.covariance.order.filter((name) => name.startsWith('covariate')).length).toBe(4);
    for (const { sigma } of found) expect(sigma).toBeGreaterThan(0);
  });

  it('covariates across gaps that both have', () => {
    const gap = (i: number): boolean => i > 500 && i < 700;
    const values = TIDE.map((h, i) => (gap(i) ? Number.NaN : h + 0.002 * (RIVER[i] as number)));
    const river = RIVER.map((value, i) => (gap(i) ? Number.NaN : value));
    const covariates = [{ name: 'river', values: river, reference: 0 }];
    const fit = fitHarmonics(hourly(values), { constituents: NAMES, covariates });
    expectTide(fit, 'tide');
    expectWithin(fit.covariates?.[0]?.coefficient as number, 0.002, { abs: RECOVERED });
    expectWithin(fit.constants.meanLevel, 0, { abs: RECOVERED });
  });
});

describe('a covariate is refused', () => {
  const list = { constituents: NAMES };
  const record = hourly(TIDE.map((h, i) => (i === 0 ? Number.NaN : h)));
  const river = { name: 'river', values: RIVER };
  const with1 = (at: number, value: number | null): number[] =>
    Array.from(RIVER, (v, i) => (i === at ? (value as number) : v));
  const constant = RIVER.map(() => 0.1);
  it.each<[what: string, code: string, path: string, FitOptions['covariates']]>([
    ['of another length', 'LENGTH_MISMATCH', '[0].values', [{ name: 'river', values: [1, 2] }]],
    ['with a gap', 'MISSING', '[0].values', [{ name: 'river', values: with1(7, Number.NaN) }]],
    ['with null for a gap', 'MISSING', '[0].values', [{ name: 'river', values: with1(7, null) }]],
    [
      'with an infinite value',
      'NOT_FINITE',
      '[0].values[7]',
      [{ name: 'river', values: with1(7, -Infinity) }],
    ],
    [
      'whose series has a gap',
      'MISSING',
      '[1].series',
      [
        river,
        {
          name: 'pressure',
          series: {
            ...PRESSURE,
            values: PRESSURE.values.map((v, i) => (i === 99 ? Number.NaN : v)),
          },
        },
      ],
    ],
    [
      'whose series is none',
      'WRONG_TYPE',
      '[0].series',
      [{ name: 'pressure', series: 1013 as unknown as Series }],
    ],
    [
      'whose series is faulty',
      'STEP_TOO_SHORT',
      '[0].series.step',
      [{ name: 'pressure', series: { ...PRESSURE, step: 60 } }],
    ],
    ['with both', 'CONFLICT', '[0]', [{ ...river, series: PRESSURE }]],
    ['with neither', 'CONFLICT', '[0]', [{ name: 'river' }]],
    ['that does not change', 'OUT_OF_RANGE', '[0]', [{ name: 'river', values: constant }]],
    [
      'that does not change, reference or not',
      'OUT_OF_RANGE',
      '[0]',
      [{ name: 'river', values: constant, reference: 0 }],
    ],
    [
      'that changes where the record has its gap alone',
      'OUT_OF_RANGE',
      '[0]',
      [{ name: 'river', values: constant.map((v, i) => (i === 0 ? 5 : v)) }],
    ],
    [
      'beyond what squares hold',
      'OUT_OF_RANGE',
      '[0]',
      [{ name: 'river', values: RIVER.map((v) => v * 1e160) }],
    ],
    [
      'whose lag leads before its beginning',
      'MISSING',
      '[0].series',
      [{ name: 'pressure', series: PRESSURE, lags: [0, 3 * DAY] }],
    ],
    [
      'whose lag leads beyond its end',
      'MISSING',
      '[0].series',
      [{ name: 'pressure', series: PRESSURE, lags: [-3 * DAY] }],
    ],
    ['with values and a lag', 'MISSING', '[0].values', [{ ...river, lags: [2 * HOUR] }]],
    ['with no lags', 'EMPTY_INPUT', '[0].lags', [{ ...river, lags: [] }]],
    ['with a lag twice', 'DUPLICATE', '[0].lags[2]', [{ ...river, lags: [0, 5, 0] }]],
    ['with a lag of NaN', 'OUT_OF_RANGE', '[0].lags[0]', [{ ...river, lags: [Number.NaN] }]],
    ['with a lag of two years', 'OUT_OF_RANGE', '[0].lags[0]', [{ ...river, lags: [2 * YEAR] }]],
    ['under a name taken', 'DUPLICATE', '[1].name', [river, { name: 'river', series: PRESSURE }]],
    ['without a name', 'MISSING', '[0].name', [{ ...river, name: '' }]],
    [
      'with a reference of NaN',
      'NOT_FINITE',
      '[0].reference',
      [{ ...river, reference: Number.NaN }],
    ],
  ])('%s', (_, code, path, covariates) => {
    const error = refusal(() => fitHarmonics(record, { ...list, covariates }));
    expect([error.code, error.path]).toEqual([code, `options.covariates${path}`]);
    expect(error.message).toMatch(/expected .*, got /);
    expect(error.message).not.toMatch(/NaN at|undefined/);
  });

  it('where another says the same', () => {
    const covariates = [river, { name: 'rain', values: RIVER.map((v) => 3 - 2 * v) }];
    const error = refusal(() => fitHarmonics(record, { ...list, covariates }));
    expect(error.code).toBe('RANK_DEFICIENT');
    expect(error.details?.['pair']).toEqual(['covariate[0]', 'covariate[1]']);
  });
});

describe('columns that are nearly alike', () => {
  const waves = TIMES.map((time) => pressureAt(time) - 1013);
  const other = TIMES.map((_, i) => 5 * Math.sin(i * 1.3) + 3 * Math.cos(i * i * 0.7));
  /** A second gauge of the pressure that differs by so large a share. */
  const near = (share: number): Float64Array =>
    waves.map((v, i) => v + share * (other[i] as number));
  const made = (share: number): Float64Array => {
    const second = near(share);
    return TIDE.map((h, i) => h - 0.01 * (waves[i] as number) + 0.004 * (second[i] as number));
  };
  const fitWith = (share: number): HarmonicFit =>
    fitHarmonics(hourly(made(share)), {
      constituents: NAMES,
      covariates: [
        { name: 'one gauge', values: waves, reference: 0 },
        { name: 'another', values: near(share), reference: 0 },
      ],
    });

  it('at 1e-6 go through the orthogonal reduction and come out right to 1e-6', () => {
    const fit = fitWith(1e-6);
    expect(fit.diagnostics.solver).toBe('orthogonal');
    expect(fit.diagnostics.rank).toBe(fit.diagnostics.unknowns);
    // Two columns of unit length that differ by a share s have a condition of about 2/s.
    expect(fit.diagnostics.condition).toBeGreaterThan(1e6);
    expect(fit.diagnostics.condition).toBeLessThan(1e7);
    expect(fit.warnings.map(({ code }) => code)).toContain('POORLY_CONDITIONED');
    const found = (fit.covariates ?? []).map(({ coefficient }) => coefficient);
    expectWithin(found, [-0.01, 0.004], { rel: 1e-6 }, 'effects');
    expectTide(fit, 'tide');
  });

  it('at 1e-3 need no more than the products', () => {
    const fit = fitWith(1e-3);
    expect(fit.diagnostics.solver).toBe('cholesky');
    const found = (fit.covariates ?? []).map(({ coefficient }) => coefficient);
    expectWithin(found, [-0.01, 0.004], { rel: 1e-6 }, 'effects');
  });

  it('at 1e-9 are refused by name', () => {
    const error = refusal(() => fitWith(1e-9));
    expect(error.code).toBe('RANK_DEFICIENT');
    expect(error.details?.['pair']).toEqual(['covariate[0]', 'covariate[1]']);
  });
});
