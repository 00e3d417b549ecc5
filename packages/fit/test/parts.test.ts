import { DAY, type Series, sampledSeries, uniformSeries } from '@staithe/core';
import { expectWithin, hourlySeries, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import {
  accumulate,
  accumulateAsync,
  finishErrors,
  finishFit,
  fitHarmonics,
  type FitPartial,
  type HarmonicFit,
  mergePartials,
  mergeResidualPartials,
  planFit,
  residualPass,
  residualPassAsync,
} from '../src/index.js';

const ERRORS = 1e-6; // of the error bars, asked for; seen: 1e-11
const RELATIVE = 1e-10; // of the constants: the sums are the same but for their order
const record = hourlySeries('eastport-observed-2019');
const OPTIONS = {
  constituents: ['M2', 'S2', 'N2', 'K1', 'O1', 'Mf', 'M4'],
  borrow: [{ name: 'K2', from: 'S2', amplitudeRatio: 0.27, phaseLagDifference: 0 }],
  secularRate: true,
  steps: ['2019-05-01T00:00Z'],
};

/** The record in pieces of some days, in another order. */
function chunks(days: number, series = record): Series[] {
  const length = (days * DAY) / series.step;
  const out: Series[] = [];
  for (let at = 0; at < series.values.length; at += length) {
    const values = series.values.slice(at, at + length);
    out.push(uniformSeries({ start: series.start + at * series.step, step: series.step, values }));
  }
  return out.map((_, i) => out[(i * 5) % out.length] as Series);
}

/** All numbers that a fit found. */
function numbersOf({ constants, covariance }: HarmonicFit): number[] {
  return [
    constants.meanLevel,
    constants.secularRate?.metresPerYear ?? 0,
    ...(constants.steps ?? []).map(({ change }) => change),
    ...constants.constituents.flatMap((c) => [c.amplitude, c.amplitudeSigma as number]),
    ...covariance.matrix,
  ];
}

describe('a fit in parts', () => {
  it('equals the fit in one piece, whatever the order of parts and sums', () => {
    const plan = planFit(OPTIONS);
    const parts = chunks(31).map((chunk) => accumulate(plan, chunk));
    const half = parts.length >> 1;
    const sum = (list: readonly FitPartial[]): FitPartial => list.reduce(mergePartials);
    const travelled = JSON.parse(JSON.stringify(sum(parts.slice(half)))) as FitPartial;
    const whole = mergePartials(travelled, sum(parts.slice(0, half)));
    expect(whole).toMatchObject({ samples: 8760, missing: 0 });
    expect(whole.runs).toHaveLength(1);
    const fit = finishFit(JSON.parse(JSON.stringify(plan)) as typeof plan, whole);
    const alone = fitHarmonics(record, { ...OPTIONS, errorModel: 'independent' });
    expectWithin(numbersOf(fit), numbersOf(alone), { rel: RELATIVE, abs: 1e-15 });
    expect(fit.warnings.map(({ code }) => code)).toContain('ERRORS_PROVISIONAL');
    expect(fit.constants.secularRate?.at).toBe(alone.constants.secularRate?.at);
    expect(fit.constants.record).toEqual(alone.constants.record);
    expectWithin(fit.diagnostics.residual.rms, alone.diagnostics.residual.rms, { rel: 1e-9 });
    expectWithin(fit.diagnostics.condition, alone.diagnostics.condition, { rel: 1e-6 });
  });

  it('knows gaps, and times of their own', async () => {
    const values = record.values.map((v, i) =>
      i % 7 === 0 || (i > 900 && i < 1500) ? Number.NaN : v,
    );
    const gapped = uniformSeries({ start: record.start, step: record.step, values });
    const plan = planFit({ ...OPTIONS, errorModel: 'independent' });
    const parts = chunks(10, gapped).map((chunk) => accumulate(plan, chunk));
    const fit = finishFit(plan, parts.reduce(mergePartials));
    const alone = fitHarmonics(gapped, { ...OPTIONS, errorModel: 'independent' });
    expectWithin(numbersOf(fit), numbersOf(alone), { rel: RELATIVE, abs: 1e-15 });
    expect(fit.diagnostics.missing).toBe(alone.diagnostics.missing);
    expect(fit.warnings).toEqual(alone.warnings);
    const times = Float64Array.from(
      values,
      (_, i) => record.start + i * record.step + (i % 13) * 7000,
    );
    const own = sampledSeries({ times, values });
    const split = [0, 4000].map((at, i) =>
      accumulateAsync(
        plan,
        sampledSeries({
          times: times.slice(at, i ? undefined : 4000),
          values: values.slice(at, i ? undefined : 4000),
        }),
      ),
    );
    const both = (await Promise.all(split)).reduce(mergePartials);
    const alike = fitHarmonics(own, { ...OPTIONS, errorModel: 'independent' });
    expectWithin(numbersOf(finishFit(plan, both)), numbersOf(alike), { rel: RELATIVE, abs: 1e-15 });
  });

  it('has the errors of the one piece after the second pass, cut in another way', async () => {
    const values = record.values.map((v, i) => (i > 3000 && i < 3900 ? Number.NaN : v));
    const gapped = uniformSeries({ start: record.start, step: record.step, values });
    const plan = planFit(OPTIONS);
    const first = chunks(31, gapped).map((chunk) => accumulate(plan, chunk));
    const provisional = finishFit(plan, first.reduce(mergePartials));
    const travelled = JSON.parse(JSON.stringify(provisional)) as typeof provisional;
    const second = chunks(45, gapped).map((chunk) => residualPass(plan, travelled, chunk));
    const [again] = chunks(45, gapped);
    expect(await residualPassAsync(plan, travelled, again as Series)).toEqual(second[0]);
    const sum = second.reduce(mergeResidualPartials);
    const fit = finishErrors(plan, travelled, JSON.parse(JSON.stringify(sum)) as typeof sum);
    const alone = fitHarmonics(gapped, OPTIONS);
    expect(fit.constants.constituents.map(({ name }) => name)).toEqual(
      alone.constants.constituents.map(({ name }) => name),
    );
    const errors = (of: HarmonicFit): number[] =>
      of.constants.constituents.flatMap((c) => [
        c.amplitudeSigma as number,
        c.phaseLagSigma as number,
        c.radius95 as number,
      ]);
    expectWithin(errors(fit), errors(alone), { rel: ERRORS });
    expectWithin(fit.constants.meanLevel, alone.constants.meanLevel, { rel: RELATIVE });
    expect(fit.diagnostics.noise.map(({ bins }) => bins)).toEqual(
      alone.diagnostics.noise.map(({ bins }) => bins),
    );
    expectWithin(fit.diagnostics.residual.largest as number, alone.diagnostics.residual.largest, {
      abs: 1e-12,
    });
    expect(fit.diagnostics.residual.largestAt).toBe(alone.diagnostics.residual.largestAt);
    expect(fit.warnings).toEqual(alone.warnings);
    const missing = refusal(() => finishErrors(plan, travelled, second[0] as typeof sum));
    expect([missing.code, missing.path]).toEqual(['MISSING', 'partial.samples']);
    const other = finishFit(plan, first.slice(1).reduce(mergePartials));
    const foreign = refusal(() => finishErrors(plan, other, sum));
    expect([foreign.code, foreign.path]).toEqual(['CONFLICT', 'partial.fit']);
  });

  it('equal plans have one fingerprint, others another', () => {
    const { fingerprint } = planFit(OPTIONS);
    expect(fingerprint).toMatch(/^[0-9a-f]{16}$/);
    const turned = Object.fromEntries(Object.entries(OPTIONS).reverse()) as typeof OPTIONS;
    expect(planFit(turned).fingerprint).toBe(fingerprint);
    expect(planFit({ ...OPTIONS, secularRate: false }).fingerprint).not.toBe(fingerprint);
    expect(planFit({ ...OPTIONS, nodalModel: 'none' }).fingerprint).not.toBe(fingerprint);
  });
});

describe('bad parts', () => {
  const list = { constituents: ['M2'] };
  const plan = planFit(list);
  const [first, second] = chunks(100) as [Series, Series];
  const part = accumulate(plan, first);
  it.each<[string, () => unknown]>([
    ['UNKNOWN_CHOICE options.constituents', () => planFit({} as never)],
    ['UNKNOWN_CHOICE options.constituents', () => planFit({ constituents: 'resolvable' } as never)],
    ['CONFLICT options.weighting', () => planFit({ ...list, weighting: 'resistant' })],
    ['CONFLICT options.nodalHold', () => planFit({ ...list, nodalHold: 'span-middle' })],
    ['CONFLICT options.errorModel', () => planFit({ ...list, errorModel: 'redrawn' })],
    ['CONFLICT options.weights', () => planFit({ ...list, weights: [1] })],
    ['CONFLICT options.covariates', () => planFit({ ...list, covariates: [] })],
    ['CONFLICT options.sideLines', () => planFit({ ...list, sideLines: ['M2'] })],
    ['UNKNOWN_CONSTITUENT options.constituents[0]', () => planFit({ constituents: ['M2x'] })],
    ['CONFLICT partial.runs', () => mergePartials(part, part)],
    [
      'CONFLICT b.plan',
      () => mergePartials(part, accumulate(planFit({ constituents: ['S2'] }), second)),
    ],
    ['CONFLICT partial.plan', () => finishFit(planFit({ constituents: ['S2'] }), part)],
    [
      'INVALID_DOCUMENT plan.fingerprint',
      () => accumulate({ ...plan, options: { constituents: ['S2'] } }, first),
    ],
    ['UNKNOWN_FORMAT plan.format', () => accumulate({ ...plan, format: 'x' as never }, first)],
    ['UNKNOWN_VERSION plan.version', () => accumulate({ ...plan, version: 2 as never }, first)],
    [
      'CONFLICT chunk.sampling',
      () =>
        accumulate(plan, { ...first, sampling: { meanOver: 60000, stamp: 'middle' } } as Series),
    ],
    [
      'TOO_FEW_SAMPLES',
      () =>
        finishFit(plan, accumulate(plan, uniformSeries({ start: 0, step: 60000, values: [1, 2] }))),
    ],
    [
      'OUT_OF_RANGE options.steps[0]',
      () => {
        const stepped = planFit({ ...list, steps: ['1990-01-01T00:00Z'] });
        return finishFit(stepped, accumulate(stepped, first));
      },
    ],
  ])('are refused with %s', (expected, run) => {
    const error = refusal(run);
    expect(`${error.code} ${error.path}`.trim()).toBe(expected);
    expect(error.message).toMatch(/expected /);
  });
});
