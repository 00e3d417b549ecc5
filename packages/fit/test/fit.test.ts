import { DAY, HOUR, MINUTE, sampledSeries, type Series, uniformSeries } from '@staithe/core';
import { makeBasis, synthesizeInto } from '@staithe/basis';
import { expectWithin, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { fitHarmonics, fitHarmonicsAsync, type FitOptions } from '../src/index.js';

const START = Date.UTC(2031, 0, 1);

function tide(days: number, step = HOUR, names = ['M2', 'S2', 'K1', 'O1']): Float64Array {
  const count = Math.round((days * DAY) / step);
  const basis = makeBasis({ constituents: names });
  const out = new Float64Array(count);
  const coefficients = Float64Array.from([2, ...names.flatMap((_, i) => [1 / (1 + i), 0.3])]);
  synthesizeInto(out, basis, coefficients, { start: START, step, count });
  return out;
}

function record(days: number, step = HOUR): Series {
  return uniformSeries({
    start: START,
    step,
    values: tide(days, step).map((h, i) => h + 0.01 * Math.sin(i * i)),
  });
}

describe('choosing constituents', () => {
  it('takes what the record can hold and says why the rest is left', () => {
    const fit = fitHarmonics(record(30));
    const taken = fit.constants.constituents.map(({ name }) => name);
    expect(taken).toEqual(
      expect.arrayContaining(['M2', 'S2', 'N2', 'K1', 'O1', 'M4', 'MS4', 'Mf']),
    );
    for (const name of ['K2', 'P1', 'T2', 'NU2', 'Sa', 'Ssa']) expect(taken).not.toContain(name);
    const k2 = fit.diagnostics.candidates.find(({ name }) => name === 'K2');
    expect(k2).toMatchObject({ decision: 'left', beside: 'S2' });
    expect(k2?.reason).toBe('record too short beside S2 by 152.6 days');
    expectWithin(k2?.separationDays as number, 182.62, { abs: 0.005 });
  });

  it('leaves what turns too fast for the sampling', () => {
    const fit = fitHarmonics(record(40, 4 * HOUR));
    const m8 = fit.diagnostics.candidates.find(({ name }) => name === 'M8');
    expect(m8?.decision).toBe('left');
    expect(m8?.reason).toContain('between samples');
  });

  it('leaves what stands still at its step, and names it', () => {
    const daily = uniformSeries({
      start: START,
      step: DAY,
      values: tide(400, DAY, ['M2', 'O1']).map((v, i) => v + 0.01 * Math.sin(i * i)),
    });
    const { candidates } = fitHarmonics(daily).diagnostics;
    const s2 = candidates.find(({ name }) => name === 'S2');
    expect(s2).toMatchObject({ decision: 'left', shownEveryDays: Infinity });
    expect(s2?.reason).toBe('same speed as mean level, stands still at this step');
    // M2 turns 24.38° a day beyond two whole turns: 14.765 days.
    const m2 = candidates.find(({ name }) => name === 'M2');
    expect(m2?.decision).toBe('taken');
    expectWithin(m2?.shownEveryDays as number, 14.7653, { abs: 1e-4 });
  });

  it('leaves what aliases onto a larger constituent, also at irregular times', () => {
    // A few minutes about noon: the solar tides hardly move, and cannot be told from the mean level.
    const times = Float64Array.from(
      { length: 400 },
      (_, i) => START + i * DAY + ((i * 7919) % 13) * MINUTE,
    );
    const basis = makeBasis({ constituents: ['M2'] });
    const values = new Float64Array(400);
    synthesizeInto(values, basis, Float64Array.of(0, 1, 0), { times });
    const fit = fitHarmonics(
      sampledSeries({ times, values: values.map((v, i) => v + 0.01 * Math.sin(i * i)) }),
    );
    const left = fit.diagnostics.candidates.filter(({ reason }) =>
      /^(cannot be told from|stands still)/.test(reason),
    );
    expect(left.length).toBeGreaterThan(0);
    expect(fit.diagnostics.candidates.find(({ name }) => name === 'S2')?.decision).toBe('left');
  });

  it('obeys a list, warns of a close pair, refuses an inseparable one by name', () => {
    const close = fitHarmonics(record(60), { constituents: ['M2', 'S2', 'K2', 'K1', 'P1'] });
    expect(close.constants.constituents.map(({ name }) => name)).toEqual([
      'M2',
      'S2',
      'K2',
      'K1',
      'P1',
    ]);
    expect(close.warnings.map(({ code }) => code)).toContain('CLOSE_PAIR');
    const same = refusal(() => fitHarmonics(record(60), { constituents: ['M2', '2MK3', 'MO3'] }));
    expect([same.code, same.path]).toEqual(['INSEPARABLE', 'options.constituents[2]']);
    expect(same.message).toContain('2MK3 and MO3');
    const daily = uniformSeries({ start: START, step: DAY, values: tide(400, DAY) });
    const still = refusal(() => fitHarmonics(daily, { constituents: ['M2', 'S2'] }));
    expect(still.code).toBe('RANK_DEFICIENT');
    expect(still.details?.['pair']).toEqual(expect.arrayContaining(['meanLevel', 'S2']));
  });
});

describe('error bars', () => {
  it('of white noise are the textbook ones: √(2/n)·s for each coefficient', () => {
    let seed = 7;
    // Park and Miller (1988), minimal standard generator; sums of twelve for a normal number.
    const uniform = (): number => (seed = (seed * 48271) % 2147483647) / 2147483647;
    const normal = (): number => Array.from({ length: 12 }, uniform).reduce((a, b) => a + b, -6);
    const values = tide(365).map((h) => h + 0.1 * normal());
    const series = uniformSeries({ start: START, step: HOUR, values });
    const want = 0.1 * Math.sqrt(2 / values.length);
    for (const errorModel of ['independent', 'residual-spectrum'] as const) {
      const { constituents } = fitHarmonics(series, { errorModel, nodalModel: 'none' }).constants;
      const mean =
        constituents.reduce((sum, c) => sum + (c.amplitudeSigma as number), 0) /
        constituents.length;
      // A sigma from some bins carries Student's factor: 1.06 at 15 bins, 1.14 at 7.
      const [least, most] = errorModel === 'independent' ? [0.95, 1.05] : [1, 1.2];
      expect(mean / want).toBeGreaterThan(least as number);
      expect(mean / want).toBeLessThan(most as number);
      // With nothing there but noise, 95 of 100 stay within their disc: of 50 at most 8 stand out.
      const truth = new Set(['M2', 'S2', 'K1', 'O1']);
      const firm = constituents.filter((c) => c.standing === 'firm' && !truth.has(c.name));
      expect(firm.length).toBeLessThanOrEqual(8);
      for (const name of truth)
        expect(constituents.find((c) => c.name === name)?.standing).toBe('firm');
    }
  });

  it('of red noise grow towards low speeds, which the independent model does not see', () => {
    let seed = 11;
    const uniform = (): number => (seed = (seed * 48271) % 2147483647) / 2147483647 - 0.5;
    let weather = 0;
    const values = tide(365).map((h) => h + (weather = 0.98 * weather + 0.03 * uniform()));
    const series = uniformSeries({ start: START, step: HOUR, values });
    const sigma = (errorModel: FitOptions['errorModel'], name: string): number =>
      fitHarmonics(series, { errorModel, nodalModel: 'none' }).constants.constituents.find(
        (c) => c.name === name,
      )?.amplitudeSigma as number;
    expect(sigma('residual-spectrum', 'Mf') / sigma('residual-spectrum', 'M4')).toBeGreaterThan(5);
    expect(sigma('independent', 'Mf') / sigma('independent', 'M4')).toBeLessThan(1.1);
    const fit = fitHarmonics(series);
    expect(fit.diagnostics.effectiveSamples).toBeLessThan(fit.diagnostics.samples / 20);
  });
});

describe('records that cannot show a constituent', () => {
  it.each([
    [6, ['S2'], 'S2'],
    [3, ['M2', 'S2', 'S4'], 'S4'],
    [12, ['M2', 'S1'], 'S1'],
  ])('each %i h: %o is refused for %s', (hours, constituents, name) => {
    const series = record(300, hours * HOUR);
    const error = refusal(() => fitHarmonics(series, { constituents, nodalModel: 'none' }));
    expect(error.code).toBe('RANK_DEFICIENT');
    expect(error.message).toContain(`${name}, which stands still`);
  });

  it('means over half a day leave the semidiurnal tides out', () => {
    const series = uniformSeries({
      ...record(120),
      sampling: { meanOver: 12 * HOUR, stamp: 'middle' },
    } as never);
    const { candidates } = fitHarmonics(series).diagnostics;
    expect(candidates.find(({ name }) => name === 'S2')?.reason).toContain('stands still');
    expect(candidates.every(({ reason }) => !/Infinity|NaN/.test(reason))).toBe(true);
  });
});

describe('error bars of records in pieces', () => {
  it('cover the truth in two months a year apart, and in a year with a long gap', () => {
    let seed = 5;
    const uniform = (): number => (seed = (seed * 48271) % 2147483647) / 2147483647;
    const normal = (): number => Array.from({ length: 12 }, uniform).reduce((a, b) => a + b, -6);
    for (const [days, apart] of [
      [30, 365],
      [150, 240],
    ] as const) {
      let inside = 0;
      let all = 0;
      for (let run = 0; run < 4; run++) {
        const hours = days * 24;
        const times = Float64Array.from(
          { length: 2 * hours },
          (_, i) => START + (i % hours) * HOUR + (i < hours ? 0 : apart * DAY),
        );
        // Nothing but noise: every constituent's truth is 0.
        const fit = fitHarmonics(
          sampledSeries({ times, values: times.map(() => 0.02 * normal()) }),
          { nodalModel: 'none' },
        );
        for (const { amplitude, radius95 } of fit.constants.constituents) {
          all++;
          if (amplitude < (radius95 as number)) inside++;
        }
      }
      // docs/fitting.md: 89 % in separate months. Three standard deviations of a share of 190 are 7 %.
      expect(inside / all).toBeGreaterThan(0.82);
    }
  });
});

describe('the document', () => {
  it('carries its models, place, record and hold', () => {
    const fit = fitHarmonics(record(40), {
      constituents: ['M2', 'S2', 'K1', 'O1'],
      place: { name: 'Example Quay', latitude: 50, longitude: -4 },
      datum: 'chart datum',
      source: 'made for a test',
      nodalHold: 'span-middle',
    });
    expect(fit.constants).toMatchObject({
      format: 'staithe-constants',
      version: 1,
      argumentModel: 'iers2010',
      nodalModel: 'potential',
      nodalLatitude: 50,
      nodalHold: { heldAt: '2031-01-20T23:30Z' },
      datum: 'chart datum',
      record: { from: '2031-01-01T00:00Z', to: '2031-02-09T23:00Z', samples: 960 },
    });
    expect(
      fitHarmonics(record(40), {
        constituents: ['M2'],
        nodalModel: 'schureman1940',
        place: { name: 'x', latitude: 50 },
      }).constants.nodalLatitude,
    ).toBeUndefined();
    const weak = fitHarmonics(record(40), {
      constituents: ['K1', 'O1'],
      place: { name: 'x', latitude: 0.2 },
    });
    expect(weak.warnings.map(({ code }) => code)).toContain('WEAK_DEGREE_2');
  });
});

describe('the Async twin', () => {
  it('gives the same, shows progress, and stops with the reason of the signal', async () => {
    const series = record(60, 6 * MINUTE);
    const stages = new Set<string>();
    const slow = await fitHarmonicsAsync(series, {
      onProgress: ({ stage }) => void stages.add(stage),
    });
    expect(slow).toEqual(fitHarmonics(series));
    expect([...stages]).toEqual([
      'normal equations',
      'condition',
      'residuals',
      'noise beside each line',
    ]);
    const abort = new AbortController();
    const work = fitHarmonicsAsync(series, {
      signal: abort.signal,
      onProgress: () => abort.abort(new Error('enough')),
    });
    await expect(work).rejects.toThrow('enough');
  });
});

describe('bad input', () => {
  const hourly = (values: ArrayLike<number | null>): Series =>
    uniformSeries({ start: START, step: HOUR, values });
  const good = record(40);
  const borrow = { name: 'P1', from: 'K1', amplitudeRatio: 0.3, phaseLagDifference: 0 };
  it.each<[string, () => unknown]>([
    ['TOO_FEW_SAMPLES', () => fitHarmonics(hourly([1]))],
    ['TOO_FEW_SAMPLES', () => fitHarmonics(hourly(new Float64Array(500).fill(Number.NaN)))],
    ['TOO_FEW_SAMPLES', () => fitHarmonics(hourly([]))],
    ['TOO_FEW_SAMPLES', () => fitHarmonics(record(1 / 24, MINUTE))],
    ['TOO_FEW_SAMPLES', () => fitHarmonics(hourly([1, 2, 3, 4]), { constituents: ['M2', 'S2'] })],
    ['NO_TIDE', () => fitHarmonics(hourly(new Float64Array(2000).fill(1.5)))],
    [
      'NOT_FINITE values[1]',
      () => fitHarmonics({ start: START, step: HOUR, values: Float64Array.of(1, Infinity) }),
    ],
    [
      'NOT_RISING times[1]',
      () => fitHarmonics({ times: Float64Array.of(5, 4), values: Float64Array.of(1, 2) }),
    ],
    [
      'NOT_FINITE times[0]',
      () => fitHarmonics({ times: Float64Array.of(Number.NaN, 4), values: Float64Array.of(1, 2) }),
    ],
    ['WRONG_TYPE series', () => fitHarmonics([1, 2, 3] as unknown as Series)],
    [
      'UNKNOWN_CONSTITUENT options.constituents[1]',
      () => fitHarmonics(good, { constituents: ['M2', 'M2x'] }),
    ],
    ['DUPLICATE options.constituents[1]', () => fitHarmonics(good, { constituents: ['M2', 'M2'] })],
    [
      'UNKNOWN_CONSTITUENT options.borrow[0].from',
      () => fitHarmonics(good, { borrow: [{ ...borrow, from: 'Kx' }] }),
    ],
    [
      'MISSING options.borrow[0].from',
      () => fitHarmonics(good, { constituents: ['M2'], borrow: [borrow] }),
    ],
    [
      'CONFLICT options.constituents[1]',
      () => fitHarmonics(good, { constituents: ['K1', 'P1'], borrow: [borrow] }),
    ],
    [
      'CONFLICT options.borrow[0].from',
      () => fitHarmonics(good, { borrow: [borrow, { ...borrow, name: 'K1', from: 'P1' }] }),
    ],
    ['DUPLICATE options.borrow[1].name', () => fitHarmonics(good, { borrow: [borrow, borrow] })],
    [
      'OUT_OF_RANGE options.borrow[0].amplitudeRatio',
      () => fitHarmonics(good, { borrow: [{ ...borrow, amplitudeRatio: -1 }] }),
    ],
    [
      'NOT_FINITE options.borrow[0].phaseLagDifference',
      () => fitHarmonics(good, { borrow: [{ ...borrow, phaseLagDifference: Number.NaN }] }),
    ],
    ['OUT_OF_RANGE options.steps[0]', () => fitHarmonics(good, { steps: [START - DAY] })],
    [
      'UNKNOWN_CHOICE options.weighting',
      () => fitHarmonics(good, { weighting: 'heavy' as 'equal' }),
    ],
    [
      'UNKNOWN_CHOICE argumentModel',
      () => fitHarmonics(good, { constituents: ['M2'], argumentModel: 'x' as 'iers2010' }),
    ],
    [
      'RANK_DEFICIENT',
      () =>
        fitHarmonics(uniformSeries({ start: START, step: DAY, values: tide(400, DAY) }), {
          borrow: [{ name: 'K2', from: 'S2', amplitudeRatio: 0.27, phaseLagDifference: 0 }],
        }),
    ],
    ['NO_TIME_ZONE options.steps[0]', () => fitHarmonics(good, { steps: ['2031-01-05T00:00'] })],
    [
      'RANK_DEFICIENT',
      () =>
        fitHarmonics(good, {
          constituents: ['M2'],
          steps: [START + 10 * DAY + 1, START + 10 * DAY + 2],
        }),
    ],
    [
      'UNKNOWN_CHOICE options.errorModel',
      () => fitHarmonics(good, { errorModel: 'none' as 'independent' }),
    ],
    [
      'UNKNOWN_CHOICE options.nodalHold',
      () => fitHarmonics(good, { nodalHold: 'monthly' as 'span-middle' }),
    ],
    [
      'UNKNOWN_CHOICE nodalModel',
      () => fitHarmonics(good, { nodalModel: 'x' as 'none', constituents: ['M2'] }),
    ],
    [
      'NO_NODAL_FORMULA nodalModel',
      () => fitHarmonics(good, { nodalModel: 'schureman1940', constituents: ['M2', 'ETA2'] }),
    ],
  ])('is refused with %s', (expected, run) => {
    const error = refusal(run);
    expect(`${error.code} ${error.path}`.trim()).toBe(expected);
    expect(error.message).toMatch(/expected .*got/);
  });
});
