/**
 * Weights that gross errors cannot pull at: spikes and a stuck gauge on real records, spikes on a record without noise.
 * Twenty seeds and a second place: tools/slow/resistant.mjs.
 */
import { HOUR, uniformSeries } from '@staithe/core';
import { expectWithin, hourlySeries } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { fitHarmonics, type FitOptions, type RecordFit } from '../src/index.js';
import { componentsOf, madeLevel, type TrueConstituent } from './reference/made-level.js';
import { apart, FAR, JUDGED, NEAR, OLD, spoil, within, yearOf } from './reference/spoilt.js';

const RESISTANT = { ...OLD, weighting: 'resistant' } as const;
const clean = yearOf(hourlySeries('la-jolla-observed'), 2012);
const SHORT_LIST = 'M2 S2 N2 K2 K1 O1 P1 Q1 NU2 MU2 T2 J1 M4 MS4 Sa Ssa Mm Mf'.split(' ');

const weightsOf = (fit: RecordFit): NonNullable<RecordFit['resistant']> => {
  if (!fit.resistant) throw new Error('expected the weights of a resistant fit');
  return fit.resistant;
};

describe('La Jolla 2012', () => {
  const equal = fitHarmonics(clean, OLD);

  it('is nearly the same when it is clean', () => {
    const fit = fitHarmonics(clean, RESISTANT);
    for (const { name, amplitude, phaseLag } of apart(fit, equal, JUDGED)) {
      expect(amplitude, name).toBeLessThan(NEAR.amplitude / 2);
      expect(phaseLag, name).toBeLessThan(NEAR.phaseLag);
    }
    const { weights, scale, doubted, setAside, curve, cutoff } = weightsOf(fit);
    expect({ curve, cutoff, setAside }).toEqual({ curve: 'biweight', cutoff: 8, setAside: 0 });
    expect(doubted).toBe(weights.filter((w) => w < 0.5).length);
    expect(doubted).toBeLessThan(clean.values.length / 500);
    // The residual is 4 cm (fit.vectors.test.ts); storms make its rms larger than its middle.
    expect(scale).toBeGreaterThan(0.5 * equal.diagnostics.residual.rms);
    expect(scale).toBeLessThan(equal.diagnostics.residual.rms);
  });

  it.each([2, 3])('stands spikes of ±2 m on a tenth of it and a stuck day, seed %i', (seed) => {
    const { series, spikes } = spoil(clean, { seed });
    const fit = fitHarmonics(series, RESISTANT);
    const off = apart(fit, equal, JUDGED);
    for (const { name, amplitude, phaseLag } of off) {
      expect(amplitude, name).toBeLessThan(NEAR.amplitude);
      expect(phaseLag, name).toBeLessThan(NEAR.phaseLag);
    }
    expect(within(apart(fitHarmonics(series, OLD), equal, JUDGED), FAR)).toBe(false);
    const { weights, setAside } = weightsOf(fit);
    expect(weights.length).toBe(series.values.length);
    // ±2 m is 50 scales: no spike keeps any weight, and few others lose theirs.
    for (const i of spikes) expect(weights[i]).toBe(0);
    expect(setAside).toBeGreaterThanOrEqual(spikes.length);
    expect(setAside).toBeLessThan(spikes.length + 24);
  });

  it('shows its mean level where all spikes go up, with either curve', () => {
    const list: FitOptions = { ...OLD, constituents: SHORT_LIST };
    const truth = fitHarmonics(clean, list);
    const { series, spikes } = spoil(clean, { seed: 1, oneSided: true, stuck: false });
    const run = (options: FitOptions): RecordFit => fitHarmonics(series, { ...list, ...options });
    const rise = (fit: RecordFit): number => fit.constants.meanLevel - truth.constants.meanLevel;
    // 2 m on a tenth of the samples.
    expectWithin(rise(run({})), 0.2, { abs: 2e-3 }, 'equal');
    const biweight = run({ weighting: 'resistant' });
    expectWithin(rise(biweight), 0, { abs: 1e-3 }, 'biweight');
    expect(within(apart(biweight, truth, JUDGED), NEAR)).toBe(true);
    const huber = run({ weighting: 'resistant', resistant: { curve: 'huber' } });
    const { scale, weights, curve, cutoff } = weightsOf(huber);
    expect({ curve, cutoff }).toEqual({ curve: 'huber', cutoff: 1.345 });
    // By itself huber would keep (0.1·1.345·scale)/(0.9·0.82) of the rise, 8 mm: what it doubts is put back first.
    expectWithin(rise(huber), 0, { abs: 1e-3 }, 'huber');
    // Cutoff over size, and never 0.
    const sizes = spikes.map((i) => Math.abs(huber.residuals.values[i] as number) / scale);
    expectWithin(
      spikes.map((i) => weights[i] as number),
      sizes.map((size) => 1.345 / size),
      { rel: 0.02 },
      'weights',
    );
  });
});

describe('a record without noise', () => {
  const TRUTH: readonly TrueConstituent[] = [
    ['M2', 1, 60],
    ['S2', 0.4, 90],
    ['K1', 0.3, 200],
    ['O1', 0.2, 170],
    ['M4', 0.05, 10],
  ];
  const names = TRUTH.map(([name]) => name);
  const start = Date.UTC(2031, 0, 1);
  const level = madeLevel(TRUTH);
  const made = uniformSeries({
    start,
    step: HOUR,
    values: Float64Array.from({ length: 60 * 24 }, (_, i) => 2 + level(start + i * HOUR)),
  });
  /** Of a tide of metres: the scale of the residual ends at the nanometre, times the cutoff, times the share of spikes. */
  const RECOVERED = 1e-6; // m

  it.each([
    ['biweight', false, 1],
    ['biweight', true, 2],
    ['huber', false, 3],
    ['huber', true, 4],
  ] as const)('is found under spikes: %s, one-sided %s', (curve, oneSided, seed) => {
    const { series, spikes } = spoil(made, { seed, oneSided, stuck: false });
    const fit = fitHarmonics(series, {
      constituents: names,
      weighting: 'resistant',
      resistant: { curve },
    });
    expectWithin(componentsOf(fit, names), componentsOf(TRUTH, names), { abs: RECOVERED });
    expectWithin(fit.constants.meanLevel, 2, { abs: RECOVERED });
    const { weights } = weightsOf(fit);
    for (const i of spikes) expect(weights[i]).toBeLessThan(1e-6);
    expectWithin(fit.diagnostics.residual.largest, 2, { abs: RECOVERED });
  });
});
