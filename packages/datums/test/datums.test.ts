import { type HarmonicConstants, HOUR, MINUTE, type Series, uniformSeries } from '@staithe/core';
import { heightsOnGrid, makePlan, tideCurve } from '@staithe/predict';
import { expectWithin, refusal } from '@staithe/test-vectors';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { astronomicalTideLimits, harmonicLevels, tabulateTide, tidalDatums } from '../src/index.js';

const quay: HarmonicConstants = {
  format: 'staithe-constants',
  version: 1,
  unit: 'm',
  meanLevel: 2.5,
  argumentModel: 'iers2010',
  nodalModel: 'potential',
  constituents: [
    { name: 'M2', amplitude: 1.5, phaseLag: 140 },
    { name: 'S2', amplitude: 0.5, phaseLag: 185 },
    { name: 'N2', amplitude: 0.3, phaseLag: 120 },
    { name: 'K1', amplitude: 0.1, phaseLag: 20 },
    { name: 'O1', amplitude: 0.08, phaseLag: 350 },
  ],
};

function placeOf(names: Record<string, number>): HarmonicConstants {
  return {
    ...quay,
    constituents: Object.entries(names).map(([name, amplitude]) => ({
      name,
      amplitude,
      phaseLag: 0,
    })),
  };
}

describe('harmonicLevels', () => {
  it('follow from the constants (textbook relations)', () => {
    const { levels, absent, formFactor, tideClass, ranges } = harmonicLevels(quay);
    expect(levels).toEqual({
      MSL: 2.5,
      MHWS: 4.5,
      MHWN: 3.5,
      MLWN: 1.5,
      MLWS: 0.5,
      ISLW: 2.5 - 2.18,
    });
    expectWithin(formFactor as number, 0.09, { abs: 1e-12 });
    expect(tideClass).toBe('semidiurnal');
    expect(ranges).toEqual({ spring: 4, neap: 2 });
    expect(absent.map(({ level }) => level)).toEqual(['MHHW', 'MLLW']);
  });

  it('ages are phase differences over differences of speed, the short way round', () => {
    const { ages } = harmonicLevels(quay);
    expectWithin(ages.phase as number, 45 / 1.0158958, { abs: 1e-5 });
    expectWithin(ages.parallax as number, 20 / 0.5443747, { abs: 1e-4 });
    expectWithin(ages.diurnal as number, 30 / 1.0980331, { abs: 1e-5 });
  });

  it.each([
    [{ M2: 1, S2: 0.5, K1: 0.2, O1: 0.175 }, 'semidiurnal'],
    [{ M2: 1, S2: 0.5, K1: 0.8, O1: 0.7 }, 'mixed, mainly semidiurnal'],
    [{ M2: 0.5, S2: 0.1, K1: 0.8, O1: 0.7 }, 'mixed, mainly diurnal'],
    [{ M2: 0.1, S2: 0.05, K1: 0.8, O1: 0.7 }, 'diurnal'],
  ])('%o is %s', (names, expected) => {
    expect(harmonicLevels(placeOf(names)).tideClass).toBe(expected);
  });

  it.each<[string, string, HarmonicConstants]>([
    ['NOT_FINITE', 'constituents[0].amplitude', placeOf({ M2: Number.NaN })],
    ['OUT_OF_RANGE', 'constituents[0].amplitude', placeOf({ M2: -1 })],
    ['UNKNOWN_UNIT', 'unit', { ...quay, unit: 'ft' as 'm' }],
    ['UNKNOWN_VERSION', 'version', { ...quay, version: 2 as 1 }],
    ['UNKNOWN_CONSTITUENT', 'constituents[0].name', placeOf({ MX: 1 })],
  ])('refuse %s at %s', (code, path, constants) => {
    const error = refusal(() => harmonicLevels(constants));
    expect([error.code, error.path]).toEqual([code, path]);
    expect(error.message).toMatch(/expected .*got/);
  });

  it('class a tide of K1 and O1 alone as diurnal', () => {
    expect(harmonicLevels(placeOf({ K1: 1, O1: 0.7 })).tideClass).toBe('diurnal');
  });

  it('give no springs for a diurnal tide, and say why', () => {
    const { levels, absent } = harmonicLevels(placeOf({ M2: 0.1, S2: 0.05, K1: 0.8, O1: 0.7 }));
    expect(levels.MHWS).toBeUndefined();
    expectWithin(levels.MHHW as number, 2.5 + 1.6, { abs: 1e-12 });
    expect(absent.find(({ level }) => level === 'MHWS')?.reason).toContain(
      'form number 10.00 is over 1.5',
    );
    const poor = harmonicLevels(placeOf({ M2: 1 }));
    expect(poor.absent.find(({ level }) => level === 'MHWS')?.reason).toBe(
      'the constants hold no S2',
    );
    expect(poor.absent.find(({ level }) => level === 'ISLW')?.reason).toBe(
      'the constants hold no S2 and no K1 and no O1',
    );
  });
});

describe('astronomicalTideLimits', () => {
  it('are the extremes of the curve, year by year', () => {
    const { HAT, LAT, years } = astronomicalTideLimits(quay);
    expect(years.map(({ year }) => year)).toEqual(Array.from({ length: 19 }, (_, i) => 2020 + i));
    expect(Math.max(...years.map(({ highest }) => highest.height))).toBe(HAT.height);
    expect(Math.min(...years.map(({ lowest }) => lowest.height))).toBe(LAT.height);
    expectWithin(tideCurve(quay).height(HAT.time), HAT.height, { abs: 1e-9 });
    const hours = heightsOnGrid(makePlan(quay), {
      start: '2020-01-01T00:00Z',
      step: HOUR,
      count: 6940 * 24,
    }).values;
    expect(hours.reduce((a, b) => Math.max(a, b), -Infinity)).toBeLessThanOrEqual(HAT.height);
  });

  it('leave the secular rate out and stand on the zero after the last step, as predictions do', () => {
    const risen = {
      ...quay,
      secularRate: { metresPerYear: 0.1, at: '2000-01-01T00:00Z' },
      steps: [{ at: '2010-01-01T00:00Z', change: 5 }],
    };
    const [HAT, base] = [astronomicalTideLimits(risen).HAT, astronomicalTideLimits(quay).HAT];
    expect(HAT.time).toBe(base.time);
    expectWithin(HAT.height, base.height + 5, { abs: 1e-12 });
    const steady = tideCurve({ ...quay, steps: risen.steps });
    expectWithin(steady.height(HAT.time), HAT.height, { abs: 1e-9 });
    expectWithin(harmonicLevels(risen).levels.MSL, 7.5, { abs: 1e-12 });
  });

  it('refuse less than 19 years and a flat curve', () => {
    const short = refusal(() =>
      astronomicalTideLimits(quay, {
        span: { from: '2020-01-01T00:00Z', to: '2038-12-01T00:00Z' },
      }),
    );
    expect([short.code, short.path]).toEqual(['OUT_OF_RANGE', 'options.span']);
    expect(refusal(() => astronomicalTideLimits({ ...quay, constituents: [] })).code).toBe(
      'EMPTY_INPUT',
    );
  });
});

describe('tabulateTide', () => {
  const start = Date.UTC(2031, 0, 1);
  const curve = tideCurve(quay);
  const span = { from: start, to: start + 60 * 24 * HOUR };
  const exact = curve.turningPoints(span);

  it.each([
    ['6 minutes', 6 * MINUTE, 0.002, 1],
    ['hourly', HOUR, 0.01, 3],
  ])('finds the tides of a %s record', (_, step, height, minutes) => {
    const series = curve.heights({ start, step, count: (60 * 24 * HOUR) / step });
    const { tides, dropped } = tabulateTide(series);
    expect(dropped).toEqual({ small: 0, gaps: 0 });
    // A turn within half an hour of either end may be out of reach of the samples.
    const inner = exact.filter((p) => p.time > start + HOUR && p.time < span.to - 2 * HOUR);
    expect(tides.length).toBeGreaterThanOrEqual(inner.length);
    expect(tides.length).toBeLessThanOrEqual(exact.length);
    for (const tide of tides) {
      const twin = exact.find((p) => p.kind === tide.kind && Math.abs(p.time - tide.time) < HOUR);
      expectWithin(tide.height, twin?.height as number, { abs: height });
      expectWithin(tide.time, twin?.time as number, { abs: minutes * MINUTE });
    }
  });

  it('does not count wavelets: seiches of 2 cm and 20 minutes leave the tides alone', () => {
    const series = curve.heights({ start, step: 6 * MINUTE, count: 30 * 240 });
    const values = series.values.map((h, i) => h + 0.02 * Math.sin((i * 2 * Math.PI) / (20 / 6)));
    const calm = tabulateTide(series).tides;
    const rough = tabulateTide(uniformSeries({ start, step: 6 * MINUTE, values })).tides;
    expect(rough.length).toBe(calm.length);
    for (let i = 0; i < calm.length; i++) {
      expect(rough[i]?.kind).toBe(calm[i]?.kind);
      expectWithin(rough[i]?.height as number, calm[i]?.height as number, { abs: 0.025 });
    }
  });

  it('classes each tidal day: the higher of the highs, the lower of the lows', () => {
    const series = curve.heights({ start, step: 6 * MINUTE, count: 60 * 240 });
    const { tides } = tabulateTide(series);
    const days = new Map<string, typeof tides>();
    for (const tide of tides)
      days.set(`${tide.kind} ${tide.tidalDay}`, [
        ...(days.get(`${tide.kind} ${tide.tidalDay}`) ?? []),
        tide,
      ]);
    let pairs = 0;
    for (const list of days.values()) {
      if (list.length !== 2 || list[0]?.class === 'unclassed') continue;
      const [a, b] = [...list].sort((x, y) => x.height - y.height);
      expect([a?.class, b?.class]).toEqual(['lower', 'higher']);
      pairs++;
    }
    expect(pairs).toBeGreaterThan(100);
  });

  it('leaves the tides of a gap unclassed and says so', () => {
    const series = curve.heights({ start, step: 6 * MINUTE, count: 60 * 240 });
    const values = series.values.map((h, i) => (i > 5000 && i < 5100 ? Number.NaN : h));
    const { tides, dropped, warnings } = tabulateTide(
      uniformSeries({ start, step: 6 * MINUTE, values }),
    );
    expect(dropped.gaps).toBe(1);
    expect(warnings[0]?.code).toBe('GAPS_LEFT_OUT');
    const near = tides.filter((t) => Math.abs(t.time - (start + 5050 * 6 * MINUTE)) < 8 * HOUR);
    expect(near.every((t) => t.class === 'unclassed')).toBe(true);
  });

  it('ends mid-rise without a false high water', () => {
    const series = curve.heights({ start, step: 6 * MINUTE, count: 10 * 240 });
    for (let cut = 2200; cut < 2400; cut += 7) {
      const { tides } = tabulateTide(
        uniformSeries({ start, step: 6 * MINUTE, values: series.values.slice(0, cut) }),
      );
      for (const tide of tides) {
        expect(
          exact.some((p) => p.kind === tide.kind && Math.abs(p.time - tide.time) < 10 * MINUTE),
        ).toBe(true);
      }
    }
  });

  it('keeps MHHW ≥ MHW ≥ MLW ≥ MLLW, and moves with the zero, at random places', () => {
    const size = fc.double({ min: 0.05, max: 1, noNaN: true });
    const lag = fc.double({ min: 0, max: 360, noNaN: true });
    fc.assert(
      fc.property(
        fc.array(fc.tuple(size, lag), { minLength: 4, maxLength: 4 }),
        fc.double({ min: -5, max: 5, noNaN: true }),
        (waves, shift) => {
          const names = ['M2', 'S2', 'K1', 'O1'];
          const sizes = [2, 0.5, 0.2, 0.2]; // two tides a day, unequal ones
          const constituents = waves.map(([amplitude, phaseLag], i) => ({
            name: names[i] as string,
            amplitude: (i === 0 ? 0.5 + amplitude / 2 : amplitude) * (sizes[i] as number),
            phaseLag,
          }));
          const series = tideCurve({ ...quay, constituents }).heights({
            start,
            step: HOUR,
            count: 45 * 24,
          });
          const { levels, ranges } = tidalDatums(tabulateTide(series));
          const heights = [levels.MHHW, levels.MHW, levels.MLW, levels.MLLW].map(
            (level) => level.height,
          );
          for (let i = 1; i < 4; i++)
            expect(heights[i - 1] as number).toBeGreaterThanOrEqual(heights[i] as number);
          const moved = tidalDatums(
            tabulateTide(uniformSeries({ ...series, values: series.values.map((h) => h + shift) })),
          );
          for (const name of ['MHHW', 'MHW', 'DTL', 'MTL', 'MSL', 'MLW', 'MLLW'] as const) {
            expectWithin(
              moved.levels[name].height,
              levels[name].height + shift,
              { abs: 1e-9 },
              name,
            );
            expect(Number.isFinite(levels[name].sigma)).toBe(true);
          }
          expectWithin(moved.ranges.GT, ranges.GT, { abs: 1e-9 });
        },
      ),
      { numRuns: 25 },
    );
  });

  it.each<[string, () => unknown]>([
    ['NO_TIDE', () => tabulateTide(uniformSeries({ start, step: HOUR, values: [1, 2, 3, 4] }))],
    ['NO_TIDE', () => tabulateTide(uniformSeries({ start, step: HOUR, values: [] }))],
    [
      'NO_TIDE',
      () =>
        tabulateTide(
          uniformSeries({ start, step: HOUR, values: new Float64Array(100).fill(Number.NaN) }),
        ),
    ],
    [
      'OUT_OF_RANGE',
      () => tabulateTide(uniformSeries({ start, step: HOUR, values: [1] }), { smallestRange: -1 }),
    ],
    [
      'OUT_OF_RANGE',
      () =>
        tabulateTide(uniformSeries({ start, step: HOUR, values: [1] }), {
          shortestHours: Number.NaN,
        }),
    ],
    ['WRONG_TYPE', () => tabulateTide({} as Series)],
    [
      'TOO_FEW_SAMPLES',
      () => tidalDatums(tabulateTide(curve.heights({ start, step: HOUR, count: 15 }))),
    ],
  ])('refuses with %s', (code, run) => {
    expect(refusal(run).code).toBe(code);
  });
});
