import {
  DAY,
  type HarmonicConstants,
  HOUR,
  MINUTE,
  parseConstants,
  sampledSeries,
  SECOND,
} from '@staithe/core';
import { tideCurve } from '@staithe/predict';
import { type Differences, expectWithin, mergeDifferences, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { fitHarmonics } from '../src/fit-harmonics.js';
import type { TurningPoint } from '../src/turning/read.js';
import {
  fitTurningPoints,
  fitTurningPointsAsync,
  type TurningPointFit,
} from '../src/turning-points.js';

const START = Date.UTC(2031, 0, 1);
const RECOVERY = 1e-7; // m; times are whole milliseconds, so 1e-10 m are lost
// Of the old tables: a year is one smooth function, which is quick to fit.
const TABLES = {
  argumentModel: 'schureman1940',
  nodalModel: 'schureman1940',
  nodalHold: 'calendar-year',
} as const;
const NAMES = ['M2', 'S2', 'N2', 'K1', 'O1', 'M4', 'MS4'];
const TIDE: HarmonicConstants['constituents'] = [
  { name: 'M2', amplitude: 1.2, phaseLag: 40 },
  { name: 'S2', amplitude: 0.4, phaseLag: 75 },
  { name: 'N2', amplitude: 0.25, phaseLag: 20 },
  { name: 'K1', amplitude: 0.2, phaseLag: 170 },
  { name: 'O1', amplitude: 0.15, phaseLag: 200 },
  { name: 'M4', amplitude: 0.06, phaseLag: 310 },
  { name: 'MS4', amplitude: 0.03, phaseLag: 350 },
];

function place(
  constituents: HarmonicConstants['constituents'],
  more: Partial<HarmonicConstants> = {},
): HarmonicConstants {
  return {
    format: 'staithe-constants',
    version: 1,
    unit: 'm',
    meanLevel: 1.5,
    argumentModel: 'iers2010',
    nodalModel: 'potential',
    constituents,
    ...more,
  };
}

const cache = new Map<string, TurningPoint[]>();

function pointsOf(days: number, truth = place(TIDE)): TurningPoint[] {
  const key = `${days} ${JSON.stringify(truth)}`;
  const known = cache.get(key);
  if (known) return known;
  const span = { from: START, to: START + days * DAY };
  const points = tideCurve(truth)
    .turningPoints(span)
    .map(({ time, height, kind }) => ({ time, height, kind }));
  cache.set(key, points);
  return points;
}

const pair = ({ amplitude, phaseLag }: { amplitude: number; phaseLag: number }): number[] => {
  const angle = (phaseLag * Math.PI) / 180;
  return [amplitude * Math.cos(angle), amplitude * Math.sin(angle)];
};

/** H cos G and H sin G of a fit against the truth. */
function expectTide(
  constants: HarmonicConstants,
  truth: HarmonicConstants['constituents'],
  abs: number,
): Differences {
  return mergeDifferences(
    truth.map((wanted) => {
      const got = constants.constituents.find(({ name }) => name === wanted.name);
      expect(got, wanted.name).toBeDefined();
      return expectWithin(pair(got as typeof wanted), pair(wanted), { abs }, wanted.name);
    }),
  );
}

/** Numbers of a normal distribution: sums of twelve of the minimal standard generator (S. Park and K. Miller 1988). */
function normals(seed: number): () => number {
  let state = seed;
  const uniform = (): number => (state = (state * 48271) % 2147483647) / 2147483647;
  return () => Array.from({ length: 12 }, uniform).reduce((a, b) => a + b, -6);
}

function noisy(
  points: readonly TurningPoint[],
  height: number,
  time: number,
  seed: number,
): TurningPoint[] {
  const normal = normals(seed);
  return points.map((point) => ({
    ...point,
    time: Math.round((point.time as number) + time * normal()),
    height: (point.height as number) + height * normal(),
  }));
}

const rounded = (points: readonly TurningPoint[]): TurningPoint[] =>
  points.map((point) => ({
    ...point,
    time: MINUTE * Math.round((point.time as number) / MINUTE),
    height: Math.round((point.height as number) * 100) / 100,
  }));

describe('exact high and low waters', () => {
  it('give back the tide that made them', () => {
    const fit = fitTurningPoints(pointsOf(60), { constituents: NAMES });
    expectTide(fit.constants, TIDE, RECOVERY);
    expectWithin(fit.constants.meanLevel, 1.5, { abs: RECOVERY });
    expect(fit.timing.rms).toBeLessThan(1); // ms: their rounding
    expect(fit.diagnostics.residual.rms).toBeLessThan(RECOVERY);
    expect(fit.sigmas).toEqual({ height: 1e-3, time: SECOND });
    expect([fit.timing.astray, fit.timing.contrary]).toEqual([[], []]);
    expect(parseConstants(structuredClone(fit).constants).constituents).toHaveLength(7);
  });

  it('give back M6 too, which has its crests where M2 has its own', () => {
    const truth = [...TIDE, { name: 'M6', amplitude: 0.04, phaseLag: 30 }];
    const points = pointsOf(60, place(truth));
    const { constants } = fitTurningPoints(points, { constituents: [...NAMES, 'M6'] });
    expectTide(constants, truth, 1e-5);
  });

  it('give back a diurnal tide, with a secular rate, in calendar years of the old tables', () => {
    const truth = [
      { name: 'K1', amplitude: 0.4, phaseLag: 10 },
      { name: 'O1', amplitude: 0.35, phaseLag: 350 },
      { name: 'M2', amplitude: 0.05, phaseLag: 120 },
    ];
    const rate = { metresPerYear: 0.1, at: '2031-02-01T00:00Z' };
    const points = pointsOf(80, place(truth, { ...TABLES, secularRate: rate }));
    const names = truth.map(({ name }) => name);
    const fit = fitTurningPoints(points, { ...TABLES, constituents: names, secularRate: true });
    expectTide(fit.constants, truth, RECOVERY);
    // A millisecond of the times is a slope of 6e-9 m/h, 5e-5 m a year.
    expectWithin(fit.constants.secularRate?.metresPerYear as number, 0.1, { abs: 5e-5 });
  });

  it('do with times alone for most points', () => {
    const points = pointsOf(60).map((point, i) => (i % 8 ? { ...point, height: null } : point));
    const fit = fitTurningPoints(points, { constituents: NAMES });
    expectTide(fit.constants, TIDE, RECOVERY);
    expect(fit.diagnostics.samples).toBe(Math.ceil(points.length / 8));
    expect(fit.residuals.values.filter(Number.isNaN)).toHaveLength(fit.diagnostics.missing);
    // Fewer heights than unknowns.
    const few = pointsOf(60).map((point, i) => (i % 24 ? { ...point, height: Number.NaN } : point));
    const lean = fitTurningPoints(few, { constituents: NAMES });
    expect(lean.diagnostics.samples).toBeLessThan(lean.diagnostics.unknowns);
    expectTide(lean.constants, TIDE, 1e-6);
  });

  it('are not told apart by heights alone: M2 sampled at its crests', () => {
    const single = [{ name: 'M2', amplitude: 1, phaseLag: 77 }];
    const points = pointsOf(30, place(single, { nodalModel: 'none' }));
    const options = { constituents: ['M2'], nodalModel: 'none' } as const;
    const times = points.map(({ time }) => time);
    const series = sampledSeries({ times, values: points.map(({ height }) => height) });
    expect(refusal(() => fitHarmonics(series, options)).code).toBe('RANK_DEFICIENT');
    expectTide(fitTurningPoints(points, options).constants, single, RECOVERY);
  });
});

describe('rounded high and low waters', () => {
  const points = rounded(pointsOf(60));

  it('show how they were rounded', () => {
    const { sigmas } = fitTurningPoints(points, { constituents: NAMES });
    // Errors of rounding are uniform: their size over √12.
    expectWithin(sigmas.height, 0.01 / Math.sqrt(12), { rel: 0.15 });
    expectWithin(sigmas.time, MINUTE / Math.sqrt(12), { rel: 0.15 });
  });

  it('hold the tide much better than their heights alone', () => {
    const series = sampledSeries({
      times: points.map(({ time }) => time),
      values: points.map(({ height }) => height),
    });
    const alone = fitHarmonics(series, { constituents: NAMES });
    const off = (constants: HarmonicConstants): number =>
      expectTide(constants, TIDE, Infinity).worst;
    const both = off(fitTurningPoints(points, { constituents: NAMES }).constants);
    expect(both).toBeLessThan(2e-3);
    expect(off(alone.constants) / both).toBeGreaterThan(4);
  });

  it('are weighed by what is stated of them', () => {
    const stated = { heightSigma: 0.02, timeSigma: 3 * MINUTE };
    const { sigmas } = fitTurningPoints(points, { constituents: NAMES, ...stated });
    expect(sigmas).toEqual({ height: 0.02, time: 3 * MINUTE });
    const one = fitTurningPoints(points, { constituents: NAMES, timeSigma: MINUTE }).sigmas;
    expect(one.time).toBe(MINUTE);
    expectWithin(one.height, 0.01 / Math.sqrt(12), { rel: 0.15 });
  });

  it('are left out where their weight is 0, with both their rows', () => {
    const bad = points.map((point, i) =>
      i % 10 === 3 ? { ...point, height: 9, time: (point.time as number) + HOUR } : point,
    );
    const weights = points.map((_, i) => (i % 10 === 3 ? 0 : 2));
    const fit = fitTurningPoints(bad, { constituents: NAMES, weights });
    expectTide(fit.constants, TIDE, 3e-3);
    expect(fit.timing.residuals.filter(Number.isNaN)).toHaveLength(
      weights.filter((weight) => weight === 0).length,
    );
    expect([fit.timing.astray, fit.timing.contrary]).toEqual([[], []]);
  });
});

describe('residuals', () => {
  it('are counted from the turning points of the fitted tide, in height and in time', () => {
    const points = rounded(pointsOf(60));
    const fit = fitTurningPoints(points, { constituents: NAMES });
    const span = { from: START - DAY, to: START + 61 * DAY };
    const turns = tideCurve(fit.constants).turningPoints(span);
    const beside = points.map(({ time }) => {
      const near = turns.find((turn) => Math.abs(turn.time - (time as number)) < HOUR);
      return near as (typeof turns)[number];
    });
    expectWithin(
      fit.residuals.values,
      points.map(({ height }, i) => (height as number) - (beside[i]?.height as number)),
      { abs: 1e-6 }, // m: second order in what the last turn changed
    );
    expectWithin(
      fit.timing.residuals,
      points.map(({ time }, i) => (time as number) - (beside[i]?.time as number)),
      { abs: 60 }, // ms: the curve is promised to 50, and rounded
    );
  });

  it('leave what a covariate and a step of the gauge explain', () => {
    const pressure = pointsOf(60).map((_, i) => 1000 + 15 * Math.sin(i / 9) + (i % 7));
    const at = START + 25 * DAY;
    const points = pointsOf(60).map((point, i) => ({
      ...point,
      height:
        (point.height as number) -
        0.01 * (pressure[i] as number) +
        ((point.time as number) >= at ? 0.3 : 0),
    }));
    const fit = fitTurningPoints(points, {
      constituents: NAMES,
      steps: [at],
      covariates: [{ name: 'pressure', values: pressure }],
    });
    expectTide(fit.constants, TIDE, RECOVERY);
    expectWithin(fit.covariates?.[0]?.coefficient as number, -0.01, { abs: RECOVERY });
    expectWithin(fit.constants.steps?.[0]?.change as number, 0.3, { abs: RECOVERY });
  });
});

describe('points that do not belong', () => {
  it('are named: a kind that the curve contradicts, a time without a turn near it', () => {
    const points = pointsOf(60).map((point, i) => {
      if (i === 20) return { ...point, kind: point.kind === 'high' ? 'low' : 'high' } as const;
      if (i === 50) return { ...point, time: (point.time as number) + 2 * HOUR };
      return point;
    });
    const { timing } = fitTurningPoints(points, { constituents: NAMES });
    expect(timing.contrary).toEqual([20]);
    expect(timing.astray).toEqual([50]);
    expect(timing.residuals[50]).toBeNaN();
  });

  it('are warned of where they are many', () => {
    const codesOf = (constituents: string[]): string[] =>
      fitTurningPoints(pointsOf(60), { constituents }).warnings.map(({ code }) => code);
    expect(codesOf(['K1', 'O1'])).toContain('TIMES_ASTRAY');
    expect(codesOf(NAMES)).not.toContain('TIMES_ASTRAY');
  });

  it('show by how much their time is off', () => {
    const points = pointsOf(60).map((point, i) =>
      i === 50 ? { ...point, time: (point.time as number) + 20 * MINUTE } : point,
    );
    const { timing } = fitTurningPoints(points, { constituents: NAMES });
    expectWithin(timing.largest, 20 * MINUTE, { rel: 0.05 });
    expectWithin(timing.residuals[50] as number, 20 * MINUTE, { rel: 0.05 });
    expect(timing.largestAt).toBe(points[50]?.time);
  });
});

describe('noise', () => {
  const names = ['M2', 'S2', 'N2', 'K1', 'O1', 'M4', 'MS4'];

  function coverage(errorModel: 'independent' | 'residual-spectrum'): number {
    let held = 0;
    let discs = 0;
    for (let seed = 1; seed <= 40; seed++) {
      const points = noisy(pointsOf(60), 0.05, 5 * MINUTE, 1000 + seed);
      const fit = fitTurningPoints(points, { constituents: names, errorModel });
      for (const wanted of TIDE) {
        const got = fit.constants.constituents.find(({ name }) => name === wanted.name);
        const [x, y] = pair(got as typeof wanted) as [number, number];
        const [a, b] = pair(wanted) as [number, number];
        if (Math.hypot(x - a, y - b) <= (got?.radius95 as number)) held++;
        discs++;
      }
    }
    return held / discs;
  }

  it.each(['independent', 'residual-spectrum'] as const)(
    'of heights and times is held by discs of 95 percent: %s',
    (errorModel) => {
      // 280 discs; those of long ellipses hold up to 98.6 %.
      const share = coverage(errorModel);
      expect(share).toBeGreaterThan(0.9);
      expect(share).toBeLessThan(0.99);
    },
  );

  it('as large as the tide does not shrink it', () => {
    // Slopes are 0 of no tide at all: were they to decide on its size, it would be none.
    const weak = TIDE.map((row) => ({ ...row, amplitude: row.amplitude / 10 }));
    const points = noisy(pointsOf(180, place(weak)), 0.1, 40 * MINUTE, 7);
    const fit = fitTurningPoints(points, { constituents: ['M2', 'S2', 'N2', 'K1', 'O1'] });
    const m2 = fit.constants.constituents[0];
    expectWithin(m2?.amplitude as number, 0.12, { abs: 0.02 });
    expectWithin(fit.sigmas.height, 0.1, { rel: 0.1 });
    expectWithin(fit.sigmas.time, 40 * MINUTE, { rel: 0.25 });
  });
});

describe('the choice of constituents', () => {
  const reasonOf = (fit: TurningPointFit, name: string): string =>
    fit.diagnostics.candidates.find((one) => one.name === name)?.reason ?? '';

  it('takes M4, which slopes tell, and leaves M6 in less than a year', () => {
    const fit = fitTurningPoints(rounded(pointsOf(60)));
    const taken = fit.constants.constituents.map(({ name }) => name);
    expect(taken).toEqual(expect.arrayContaining([...NAMES, 'MN4']));
    expect(taken).not.toContain('M6');
    expect(reasonOf(fit, 'M6')).toBe(
      'hides behind slower tides at high and low waters, and 354 days are needed to see it; name it to fit it',
    );
    expectTide(fit.constants, TIDE, 0.01);
  });

  it('keeps M6 in a year where it is known, and leaves the others that hide and are not seen', () => {
    const truth = [...TIDE, { name: 'M6', amplitude: 0.04, phaseLag: 30 }];
    const fit = fitTurningPoints(rounded(pointsOf(365, place(truth, TABLES))), TABLES);
    expectTide(fit.constants, truth, 2e-3);
    expect(reasonOf(fit, '2MS6')).toMatch(
      /^hides behind slower tides at high and low waters: [\d.]+ mm found, [\d.]+ mm its error$/,
    );
  });

  it('leaves M6 where noise hides it wholly', () => {
    const steady = TIDE.map((row) => (row.name === 'M2' ? row : { ...row, amplitude: 0.01 }));
    const points = noisy(pointsOf(365, place(steady, TABLES)), 0.2, 10 * MINUTE, 3);
    const fit = fitTurningPoints(points, TABLES);
    expect(fit.constants.constituents.map(({ name }) => name)).not.toContain('M6');
    expect(reasonOf(fit, 'M6')).toMatch(
      /where M6 (is known to \d+ mm only|cannot be told from M2)/,
    );
  });
});

describe('what is refused', () => {
  const good = pointsOf(30);
  const withOne = (at: number, change: object): TurningPoint[] =>
    good.map((point, i) => (i === at ? ({ ...point, ...change } as TurningPoint) : point));

  it.each([
    ['times that stand', withOne(5, { time: good[4]?.time }), 'NOT_RISING', 'points[5].time'],
    ['times that fall', withOne(5, { time: START }), 'NOT_RISING', 'points[5].time'],
    ['a time that is NaN', withOne(3, { time: Number.NaN }), 'NOT_FINITE', 'points[3].time'],
    [
      'a time without zone',
      withOne(0, { time: '2031-01-01T00:00' }),
      'NO_TIME_ZONE',
      'points[0].time',
    ],
    ['an infinite height', withOne(2, { height: Infinity }), 'NOT_FINITE', 'points[2].height'],
    ['a height in a wrong unit', withOne(2, { height: 2e6 }), 'OUT_OF_RANGE', 'points[2].height'],
    ['a height in words', withOne(2, { height: '1.2' }), 'WRONG_TYPE', 'points[2].height'],
    ['an unknown kind', withOne(1, { kind: 'ebb' }), 'UNKNOWN_CHOICE', 'points[1].kind'],
    ['a point that is none', [...good.slice(0, 2), null], 'WRONG_TYPE', 'points[2]'],
    ['no list', 'points', 'WRONG_TYPE', 'points'],
    ['all heights missing', good.map((p) => ({ ...p, height: null })), 'TOO_FEW_SAMPLES', ''],
    ['one height', good.map((p, i) => (i ? { ...p, height: null } : p)), 'TOO_FEW_SAMPLES', ''],
    ['no points', [], 'TOO_FEW_SAMPLES', ''],
    ['heights that are all the same', good.map((p) => ({ ...p, height: 1 })), 'NO_TIDE', ''],
  ])('%s', (_, points, code, path) => {
    const said = refusal(() =>
      fitTurningPoints(points as TurningPoint[], { constituents: ['M2', 'S2'] }),
    );
    expect([said.code, said.path]).toEqual([code, path]);
  });

  it.each([
    ['heightSigma', { heightSigma: 0 }, 'OUT_OF_RANGE', 'options.heightSigma'],
    ['heightSigma', { heightSigma: Number.NaN }, 'OUT_OF_RANGE', 'options.heightSigma'],
    ['timeSigma', { timeSigma: -1 }, 'OUT_OF_RANGE', 'options.timeSigma'],
    ['weighting', { weighting: 'resistant' }, 'UNKNOWN_CHOICE', 'options.weighting'],
    ['resistant', { resistant: {} }, 'UNKNOWN_CHOICE', 'options.resistant'],
    ['errorModel', { errorModel: 'redrawn' }, 'UNKNOWN_CHOICE', 'options.errorModel'],
    ['redraw', { redraw: {} }, 'UNKNOWN_CHOICE', 'options.redraw'],
    ['an unknown option', { heigthSigma: 1 }, 'UNKNOWN_CHOICE', 'options.heigthSigma'],
  ])('%s in options', (_, options, code, path) => {
    const said = refusal(() => fitTurningPoints(good, options as object));
    expect([said.code, said.path]).toEqual([code, path]);
  });

  it('too few points for a list', () => {
    const said = refusal(() => fitTurningPoints(good.slice(0, 6), { constituents: NAMES }));
    expect(said.code).toBe('TOO_FEW_SAMPLES');
  });

  it('a curve that turns near none of the points', () => {
    const said = refusal(() => fitTurningPoints(pointsOf(50), { constituents: ['Sa'] }));
    expect(said.code).toBe('NO_TIDE');
  });
});

describe('fitTurningPointsAsync', () => {
  it('gives the same, and can be aborted', async () => {
    const points = rounded(pointsOf(60));
    const options = { constituents: NAMES };
    const stages = new Set<string>();
    const slow = await fitTurningPointsAsync(points, {
      ...options,
      onProgress: ({ stage }) => stages.add(stage),
    });
    expect(slow).toEqual(fitTurningPoints(points, options));
    expect(stages).toContain('normal equations');
    const signal = { aborted: true, reason: new Error('enough') };
    await expect(fitTurningPointsAsync(points, { ...options, signal })).rejects.toThrow('enough');
  });
});
