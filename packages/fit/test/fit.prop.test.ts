import {
  DAY,
  type HarmonicConstants,
  HOUR,
  type Series,
  sampledSeries,
  uniformSeries,
} from '@staithe/core';
import { makeBasis, projectInto, synthesizeInto } from '@staithe/basis';
import { constituent } from '@staithe/constituents';
import { expectAngleWithin, expectWithin } from '@staithe/test-vectors';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitHarmonics, type FitOptions, type HarmonicFit } from '../src/index.js';

const AMPLITUDE = 1e-9; // m
const PHASE = 1e-7; // degrees
const NAMES = ['M2', 'S2', 'N2', 'K1', 'O1', 'Mf', 'M4', 'MS4', 'M6'];

interface Truth {
  readonly level: number;
  readonly rows: readonly {
    readonly name: string;
    readonly amplitude: number;
    readonly phaseLag: number;
  }[];
}

/** Heights of a truth by the basis that the fit shares. */
function heights(truth: Truth, times: Float64Array, options: FitOptions): Float64Array {
  const basis = makeBasis({
    constituents: truth.rows.map(({ name }) => name),
    argumentModel: options.argumentModel,
    nodalModel: options.nodalModel,
    nodalHold: options.nodalHold === 'calendar-year' ? 'calendar-year' : 'continuous',
  });
  const coefficients = Float64Array.from([
    truth.level,
    ...truth.rows.flatMap(({ amplitude, phaseLag }) => {
      const angle = (phaseLag * Math.PI) / 180;
      return [amplitude * Math.cos(angle), amplitude * Math.sin(angle)];
    }),
  ]);
  const out = new Float64Array(times.length);
  synthesizeInto(out, basis, coefficients, { times });
  return out;
}

function expectTruth(fit: HarmonicFit, truth: Truth): void {
  expectWithin(fit.constants.meanLevel, truth.level, { abs: AMPLITUDE }, 'mean level');
  for (const { name, amplitude, phaseLag } of truth.rows) {
    const got = fit.constants.constituents.find((c) => c.name === name);
    expectWithin(got?.amplitude as number, amplitude, { abs: AMPLITUDE }, `H ${name}`);
    expectAngleWithin(got?.phaseLag as number, phaseLag, { abs: PHASE }, `G ${name}`);
  }
}

const truths = fc
  .array(
    fc.tuple(
      fc.double({ min: 0.01, max: 2, noNaN: true }),
      fc.double({ min: 0, max: 359.9, noNaN: true }),
    ),
    {
      minLength: NAMES.length,
      maxLength: NAMES.length,
    },
  )
  .map(
    (values): Truth => ({
      level: 2.5,
      rows: NAMES.map((name, i) => {
        const [amplitude, phaseLag] = values[i] as [number, number];
        return { name, amplitude, phaseLag };
      }),
    }),
  );

const models = fc.record({
  argumentModel: fc.constantFrom('iers2010' as const, 'schureman1940' as const),
  nodalModel: fc.constantFrom('potential' as const, 'schureman1940' as const, 'none' as const),
  nodalHold: fc.constantFrom('continuous' as const, 'calendar-year' as const),
});

describe('fit after predict', () => {
  it('returns what went in: uniform with gaps, and irregular times', () => {
    fc.assert(
      fc.property(
        truths,
        models,
        fc.boolean(),
        fc.integer({ min: Date.UTC(1800, 0, 1), max: Date.UTC(2150, 0, 1) }),
        (truth, model, irregular, start) => {
          const options: FitOptions = { ...model, constituents: NAMES };
          const count = 60 * 24;
          const times = Float64Array.from(
            { length: count },
            (_, i) => start + i * HOUR + (irregular ? ((i * 7919) % 1800) * 1000 : 0),
          );
          const values = heights(truth, times, options);
          for (let i = 0; i < count; i++)
            if (i % 11 === 3 || (i > 400 && i < 520)) values[i] = Number.NaN;
          const series: Series = irregular
            ? sampledSeries({ times, values })
            : uniformSeries({ start, step: HOUR, values });
          expectTruth(fitHarmonics(series, options), truth);
        },
      ),
      { numRuns: 20 },
    );
  });

  it('recovers borrowed constituents, a secular rate and a step with the rest', () => {
    const start = Date.UTC(2031, 0, 1);
    const times = Float64Array.from({ length: 40 * 24 }, (_, i) => start + i * HOUR);
    const truth: Truth = {
      level: 1,
      rows: [
        { name: 'M2', amplitude: 1, phaseLag: 100 },
        { name: 'S2', amplitude: 0.4, phaseLag: 140 },
        { name: 'K1', amplitude: 0.2, phaseLag: 30 },
        { name: 'O1', amplitude: 0.15, phaseLag: 350 },
        { name: 'K2', amplitude: 0.4 * 0.272, phaseLag: 137 },
        { name: 'T2', amplitude: 0.4 * 0.059, phaseLag: 140 },
        { name: 'P1', amplitude: 0.2 * 0.331, phaseLag: 28 },
      ],
    };
    const values = heights(truth, times, {});
    const step = start + 20 * DAY;
    const middle = (start + (times[times.length - 1] as number)) / 2;
    const year = 365.25 * DAY;
    const faulty = values.map((h, i) => {
      const t = times[i] as number;
      return h + (0.5 * (t - middle)) / year + (t >= step ? 0.08 : 0);
    });
    const fit = fitHarmonics(uniformSeries({ start, step: HOUR, values: faulty }), {
      constituents: ['M2', 'S2', 'K1', 'O1'],
      borrow: [
        { name: 'K2', from: 'S2', amplitudeRatio: 0.272, phaseLagDifference: -3 },
        { name: 'T2', from: 'S2', amplitudeRatio: 0.059, phaseLagDifference: 0 },
        { name: 'P1', from: 'K1', amplitudeRatio: 0.331, phaseLagDifference: -2 },
      ],
      secularRate: true,
      steps: [step],
    });
    expectTruth(fit, truth);
    expectWithin(fit.constants.secularRate?.metresPerYear as number, 0.5, { abs: 1e-9 });
    expectWithin(fit.constants.steps?.[0]?.change as number, 0.08, { abs: 1e-9 });
    expect(
      fit.constants.constituents
        .filter((c) => c.standing === 'borrowed')
        .map((c) => c.borrowedFrom),
    ).toEqual(['S2', 'S2', 'K1']);
  });

  it('applies the stated sampling: hourly means give the true amplitudes', () => {
    const start = Date.UTC(2031, 0, 1);
    const minute = Float64Array.from(
      { length: 40 * 24 * 12 },
      (_, i) => start + (i + 0.5) * 300000,
    );
    const truth: Truth = {
      level: 0,
      rows: [
        { name: 'M2', amplitude: 1, phaseLag: 60 },
        { name: 'M4', amplitude: 0.2, phaseLag: 200 },
      ],
    };
    const fine = heights(truth, minute, {});
    const means = Array.from(
      { length: 40 * 24 },
      (_, i) => fine.slice(i * 12, i * 12 + 12).reduce((sum, h) => sum + h, 0) / 12,
    );
    const options: FitOptions = { constituents: ['M2', 'M4'] };
    const series = uniformSeries({
      start,
      step: HOUR,
      values: means,
      sampling: { meanOver: HOUR, stamp: 'start' },
    });
    const amplitude = (s: Series, name: string): number =>
      fitHarmonics(s, options).constants.constituents.find((c) => c.name === name)
        ?.amplitude as number;
    // Twelve instants stand for the mean: their response differs from the continuous one by 1/144.
    expectWithin(amplitude(series, 'M2'), 1, { abs: 1e-4 });
    expectWithin(amplitude(series, 'M4'), 0.2, { abs: 1e-4 });
    const unstated = uniformSeries({ start, step: HOUR, values: means });
    expectWithin(amplitude(unstated, 'M2'), 1 - 0.0106, { abs: 2e-4 });
  });
});

describe('a fit', () => {
  const start = Date.UTC(2031, 0, 1);
  const times = Float64Array.from({ length: 50 * 24 }, (_, i) => start + i * HOUR);
  const truth: Truth = {
    level: 3,
    rows: NAMES.map((name, i) => ({ name, amplitude: 1 / (1 + i), phaseLag: 40 * i })),
  };
  const noisy = heights(truth, times, {}).map((h, i) => h + 0.02 * Math.sin(i * i));
  const options: FitOptions = { constituents: NAMES };
  const whole = fitHarmonics(uniformSeries({ start, step: HOUR, values: noisy }), options);
  const pairs = (constants: HarmonicConstants): number[] =>
    constants.constituents.flatMap(({ amplitude, phaseLag }) => [
      amplitude * Math.cos((phaseLag * Math.PI) / 180),
      amplitude * Math.sin((phaseLag * Math.PI) / 180),
    ]);

  it('turns each raw phase by speed times the shift when the record is moved', () => {
    const hours = 7;
    const moved = fitHarmonics(
      uniformSeries({ start: start + hours * HOUR, step: HOUR, values: noisy }),
      { ...options, nodalModel: 'none' },
    );
    const still = fitHarmonics(uniformSeries({ start, step: HOUR, values: noisy }), {
      ...options,
      nodalModel: 'none',
    });
    moved.constants.constituents.forEach(({ name, phaseLag }, i) => {
      const was = still.constants.constituents[i]?.phaseLag as number;
      expectAngleWithin(phaseLag, was + constituent(name).speed * hours, { abs: 1e-5 }, name);
    });
  });

  it('is the same whether a sample is deleted or marked as a gap', () => {
    const gappy = noisy.map((h, i) => (i % 6 === 1 ? Number.NaN : h));
    const marked = fitHarmonics(uniformSeries({ start, step: HOUR, values: gappy }), options);
    const kept = Array.from(gappy.keys()).filter((i) => !Number.isNaN(gappy[i] as number));
    const deleted = fitHarmonics(
      sampledSeries({
        times: kept.map((i) => times[i] as number),
        values: kept.map((i) => gappy[i] as number),
      }),
      options,
    );
    expectWithin(pairs(deleted.constants), pairs(marked.constants), { abs: 1e-11 });
  });

  it('scales with the heights and shifts with their zero', () => {
    const scaled = fitHarmonics(
      uniformSeries({ start, step: HOUR, values: noisy.map((h) => 3 * h + 10) }),
      options,
    );
    expectWithin(
      pairs(scaled.constants),
      pairs(whole.constants).map((v) => 3 * v),
      { abs: 1e-11 },
    );
    expectWithin(scaled.constants.meanLevel, 3 * whole.constants.meanLevel + 10, { abs: 1e-11 });
  });

  it('leaves residuals that no column explains any more', () => {
    const basis = makeBasis({ constituents: NAMES });
    const sums = new Float64Array(1 + 2 * NAMES.length);
    projectInto(sums, basis, whole.residuals.values, { start, step: HOUR, count: times.length });
    // 1200 samples of residuals of centimetres: rounding of the sums is far below this.
    for (const sum of sums) expect(Math.abs(sum)).toBeLessThan(1e-10);
  });

  it('has a symmetric covariance in its stated order, and the document holds it packed', () => {
    const { order, matrix } = whole.covariance;
    expect(order[0]).toBe('meanLevel');
    const n = order.length;
    for (let i = 0; i < n; i++)
      for (let j = 0; j < i; j++)
        expectWithin(matrix[i * n + j] as number, matrix[j * n + i] as number, {
          rel: 1e-9,
          abs: 1e-18,
        });
    expect(whole.constants.uncertainty?.covariance.length).toBe((n * (n + 1)) / 2);
    expect(structuredClone(whole)).toEqual(whole);
  });
});
