/**
 * Weights of the caller: repeated samples, gaps, inverse variances, any unit.
 */
import { HOUR, type Series, uniformSeries } from '@staithe/core';
import { expectWithin, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { fitHarmonics } from '../src/index.js';
import { componentsOf, madeLevel, type TrueConstituent } from './reference/made-level.js';
import { generator } from './reference/spoilt.js';

const START = Date.UTC(2031, 0, 1);
const COUNT = 90 * 24;
const TIMES = Float64Array.from({ length: COUNT }, (_, i) => START + i * HOUR);
const TRUTH: readonly TrueConstituent[] = [
  ['M2', 1.2, 100],
  ['S2', 0.4, 140],
  ['K1', 0.2, 30],
  ['O1', 0.15, 350],
];
const NAMES = TRUTH.map(([name]) => name);
const TIDE = TIMES.map(madeLevel(TRUTH));

const hourly = (values: ArrayLike<number>): Series =>
  uniformSeries({ start: START, step: HOUR, values });

describe('weights', () => {
  const random = generator(3);
  const normal = (): number => Array.from({ length: 12 }, random).reduce((a, b) => a + b, -6);
  const noisy = TIDE.map((h) => h + 0.05 * normal());
  const weights = TIMES.map(() => 1 + Math.floor(3 * random()));
  const independent = { constituents: NAMES, errorModel: 'independent' } as const;

  it('count as samples that were taken so often', () => {
    const weighted = fitHarmonics(hourly(noisy), { ...independent, weights });
    // Half a microsecond apart, which turns M2 by 7e-11 rad.
    const APART = 2 ** -11; // ms: times of 2031 are doubles 2^-12 ms apart
    const taken = Array.from(TIMES).flatMap((time, i) =>
      Array.from({ length: weights[i] as number }, (_, k) => [time + k * APART, noisy[i]] as const),
    );
    const repeated = fitHarmonics(
      {
        times: Float64Array.from(taken, ([time]) => time),
        values: Float64Array.from(taken, ([, value]) => value as number),
      },
      independent,
    );
    expectWithin(componentsOf(weighted, NAMES), componentsOf(repeated, NAMES), { abs: 1e-9 });
    expectWithin(weighted.constants.meanLevel, repeated.constants.meanLevel, { abs: 1e-9 });
    // The variance of weight 1 is the sum of w·r² over samples less unknowns: fewer samples, the same sum.
    const unknowns = weighted.diagnostics.unknowns;
    const ratio = (taken.length - unknowns) / (COUNT - unknowns);
    expectWithin(
      Array.from(weighted.covariance.matrix),
      Array.from(repeated.covariance.matrix, (value) => value * ratio),
      { rel: 1e-6, abs: 1e-14 },
      'covariance',
    );
  });

  it('of 0 leave a sample out like a gap', () => {
    const out = (i: number): boolean => i % 9 === 4;
    const left = fitHarmonics(hourly(noisy), {
      ...independent,
      weights: TIMES.map((_, i) => (out(i) ? 0 : 1)),
    });
    const gappy = noisy.map((h, i) => (out(i) ? Number.NaN : h));
    const gaps = fitHarmonics(hourly(gappy), independent);
    expect(left.diagnostics.missing).toBe(gaps.diagnostics.missing);
    expect(left.residuals.values.filter(Number.isNaN).length).toBe(COUNT / 9);
    // Weights of 1 multiply by 1: the same arithmetic, so the same bits.
    expect(left.constants).toEqual(gaps.constants);
  });

  it('of the inverse variance give the textbook error, √(2/Σw) for a coefficient', () => {
    const sigma = (i: number): number => (i < COUNT / 2 ? 0.02 : 0.2);
    const values = TIDE.map((h, i) => h + sigma(i) * normal());
    const inverse = TIMES.map((_, i) => 1 / (sigma(i) * sigma(i)));
    const fit = fitHarmonics(hourly(values), { ...independent, weights: inverse });
    const want = Math.sqrt(2 / inverse.reduce((a, b) => a + b));
    const [m2] = fit.constants.constituents;
    // s² of 2160 samples is known to 3 %, its root to half of that; half the record tells the lines apart nearly.
    expectWithin(m2?.amplitudeSigma as number, want, { rel: 0.05 });
    const off = componentsOf(fit, ['M2']).map(
      (v, i) => v - (componentsOf(TRUTH, ['M2'])[i] as number),
    );
    for (const value of off) expect(Math.abs(value)).toBeLessThan(4 * want);
  });

  function expectUnitOf(unit: number): void {
    const plain = fitHarmonics(hourly(noisy), { weights });
    const scaled = fitHarmonics(hourly(noisy), { weights: weights.map((w) => w * unit) });
    const taken = plain.constants.constituents.map(({ name }) => name);
    expectWithin(componentsOf(scaled, taken), componentsOf(plain, taken), { abs: 1e-12 });
    expectWithin(
      Array.from(scaled.covariance.matrix),
      Array.from(plain.covariance.matrix),
      { rel: 1e-9, abs: 1e-18 },
      'covariance',
    );
  }

  it('in any unit: a million times as large changes nothing', () => {
    expectUnitOf(1e6);
  });

  it('in any unit: a millionth changes nothing', () => {
    expectUnitOf(1e-6);
  });

  it.each<[what: string, code: string, path: string, ArrayLike<number>]>([
    ['negative', 'OUT_OF_RANGE', 'options.weights[5]', TIMES.map((_, i) => (i === 5 ? -1 : 1))],
    ['NaN', 'OUT_OF_RANGE', 'options.weights[8]', TIMES.map((_, i) => (i === 8 ? Number.NaN : 1))],
    ['infinite', 'OUT_OF_RANGE', 'options.weights[0]', TIMES.map(() => Infinity)],
    ['too few', 'LENGTH_MISMATCH', 'options.weights', [1, 1]],
    ['all 0', 'TOO_FEW_SAMPLES', '', TIMES.map(() => 0)],
  ])('that are %s are refused', (_, code, path, faulty) => {
    const error = refusal(() => fitHarmonics(hourly(noisy), { ...independent, weights: faulty }));
    expect([error.code, error.path]).toEqual([code, path]);
    expect(error.message).toMatch(/expected .*, got /);
  });
});
