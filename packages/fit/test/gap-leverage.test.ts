import { gram, makeBasis } from '@staithe/basis';
import { equilibriumArgument } from '@staithe/constituents';
import { DAY, HOUR, sampledSeries, type Series, uniformSeries } from '@staithe/core';
import { nodalCorrection } from '@staithe/nodal';
import { expectWithin, hourlySeries, refusal } from '@staithe/test-vectors';
import { inverse, Matrix } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import { gapLeverage, gapLeverageAsync } from '../src/diagnose/gap-leverage.js';
import { fitHarmonics, type FitOptions, type HarmonicFit } from '../src/index.js';

const START = Date.UTC(2031, 0, 1);
const LIST = ['M2', 'S2', 'K1', 'O1'];
// The places of samples alone count: dense inverses of well-conditioned products agree to rounding.
const ROUNDING = 1e-9;

function record(days: number, isGap: (hour: number) => boolean): Series {
  const values = Float64Array.from({ length: 24 * days }, (_, i) =>
    isGap(i) ? Number.NaN : Math.sin(i * i) + Math.cos(i / 2),
  );
  return uniformSeries({ start: START, step: HOUR, values });
}

function fitOf(series: Series, options: FitOptions = {}): HarmonicFit {
  return fitHarmonics(series, { constituents: LIST, ...options });
}

/** Inverse products over the hours of a mask, by a dense inverse. */
function denseInverse(mask: Uint8Array): Matrix {
  const basis = makeBasis({ constituents: LIST });
  const products = gram(basis, { start: START, step: HOUR, count: mask.length }, mask);
  const count = 1 + 2 * LIST.length;
  return inverse(Matrix.from1DArray(count, count, Array.from(products)));
}

describe('what gaps cost', () => {
  it('is what the inverse products say', () => {
    const days = 40;
    const gaps = [
      [100, 260],
      [400, 420],
      [700, 850],
    ] as const;
    const isGap = (i: number): boolean => gaps.some(([from, to]) => i >= from && i < to);
    const series = record(days, isGap);
    const got = gapLeverage(fitOf(series));
    const mask = Uint8Array.from(series.values, (v) => (Number.isNaN(v) ? 0 : 1));
    const sigmas = (own: Uint8Array): number[] => {
      const dense = denseInverse(own);
      return LIST.map((_, j) =>
        Math.sqrt(dense.get(1 + 2 * j, 1 + 2 * j) + dense.get(2 + 2 * j, 2 + 2 * j)),
      );
    };
    const now = sigmas(mask);
    const whole = sigmas(mask.map(() => 1));
    expect(got.constituents.map(({ name }) => name)).toEqual(LIST);
    expectWithin(
      got.constituents.map(({ inflation }) => inflation),
      now.map((sigma, j) => sigma / (whole[j] as number)),
      { rel: ROUNDING },
    );
    expect(got.gaps.map(({ from, to, samples }) => [from, to, samples])).toEqual(
      [gaps[0], gaps[2], gaps[1]].map(([from, to]) => [
        START + from * HOUR,
        START + (to - 1) * HOUR,
        to - from,
      ]),
    );
    expectWithin(
      got.gaps.map(({ relief }) => relief),
      [gaps[0], gaps[2], gaps[1]].map(([from, to]) => {
        const filled = sigmas(mask.map((one, i) => (i >= from && i < to ? 1 : one)));
        return (
          1 - filled.reduce((sum, sigma, j) => sum + sigma / (now[j] as number), 0) / LIST.length
        );
      }),
      { rel: 1e-6 },
    );
  });

  it('is √2 where every second sample is missing, and nothing where none is', () => {
    const half = gapLeverage(fitOf(record(60, (i) => i % 2 === 1)));
    for (const { name, inflation } of half.constituents) {
      expectWithin(inflation, Math.SQRT2, { abs: 2e-3 }, name);
    }
    const none = gapLeverage(fitOf(record(60, () => false)));
    expect(none.gaps).toEqual([]);
    expect(none.constituents.map(({ inflation }) => inflation)).toEqual([1, 1, 1, 1]);
  });

  it('counts missing ends of a uniform series, and long steps in a list of times', () => {
    const series = record(60, (i) => i >= 1200 || (i >= 300 && i < 500));
    const uniform = gapLeverage(fitOf(series));
    expect(uniform.gaps.map(({ samples }) => samples).sort((a, b) => a - b)).toEqual([200, 240]);
    const kept = [...series.values.keys()].filter((i) => !Number.isNaN(series.values[i]));
    const list = sampledSeries({
      times: kept.map((i) => START + i * HOUR),
      values: kept.map((i) => series.values[i] as number),
    });
    const listed = gapLeverage(fitOf(list));
    expect(listed.gaps).toHaveLength(1);
    expect(listed.gaps[0]).toMatchObject({ from: START + 300 * HOUR, samples: 200 });
  });

  it('knows of secular rate, steps, borrowed constituents and holds', () => {
    const series = record(400, (i) => i > 2000 && i < 3000);
    const fit = fitOf(series, {
      secularRate: true,
      steps: [START + 200 * DAY],
      borrow: [{ name: 'P1', from: 'K1', amplitudeRatio: 0.33, phaseLagDifference: -8 }],
      nodalHold: 'span-middle',
      place: { name: 'Example Quay', latitude: 52 },
    });
    const { constituents, gaps } = gapLeverage(fit);
    expect(constituents.map(({ name }) => name)).toEqual(LIST);
    expect(gaps).toHaveLength(1);
    // 999 of 9600 hours: √(9600/8601) = 1.056 where nothing else is lost.
    const plain = constituents.filter(({ name }) => name !== 'K1');
    for (const { inflation } of plain) expectWithin(inflation, 1.0565, { abs: 5e-3 });
    // K1 swells and shrinks with P1 in half a year: the strength of its column in the hours that are there.
    const held = { latitude: 52 };
    const middle = START + 200 * DAY;
    const [k1, p1] = ['K1', 'P1'].map((name) => nodalCorrection(name, middle, held));
    const strength = (i: number): number => {
      const t = START + i * HOUR;
      const apart = equilibriumArgument('P1', t) - equilibriumArgument('K1', t);
      const turn = apart + (p1?.u as number) - (k1?.u as number) + 8;
      const [f, g] = [k1?.f as number, 0.33 * (p1?.f as number)];
      return f * f + g * g + 2 * f * g * Math.cos((turn * Math.PI) / 180);
    };
    let [all, there] = [0, 0];
    series.values.forEach((value, i) => {
      all += strength(i);
      if (!Number.isNaN(value)) there += strength(i);
    });
    const inflation = constituents.find(({ name }) => name === 'K1')?.inflation;
    expectWithin(inflation as number, Math.sqrt(all / there), { abs: 5e-3 });
  });

  it('of the month without data at Grand Isle is 5 to 9 %', () => {
    const { constituents, gaps } = gapLeverage(
      fitHarmonics(hourlySeries('grand-isle-observed-1990')),
    );
    expect(gaps.map(({ samples }) => samples)).toEqual([870]);
    // 870 of 8760 hours: √(8760/7890) = 1.0537 for a constituent with no neighbour.
    const least = Math.sqrt(8760 / 7890);
    const m8 = constituents.find(({ name }) => name === 'M8');
    expectWithin(m8?.inflation as number, least, { abs: 2e-3 });
    for (const { inflation } of constituents) {
      expect(inflation).toBeGreaterThan(least - 3e-3);
      expect(inflation).toBeLessThan(1.1);
    }
  });
});

describe('leverage', () => {
  it('is largest where the products say', () => {
    const series = record(30, (i) => i > 300 && i < 500 && i !== 400);
    const { largestLeverage, largestLeverageAt } = gapLeverage(fitOf(series));
    const mask = Uint8Array.from(series.values, (v) => (Number.isNaN(v) ? 0 : 1));
    const dense = denseInverse(mask);
    const one = (i: number): number => {
      const basis = makeBasis({ constituents: LIST });
      const at = new Uint8Array(mask.length);
      at[i] = 1;
      const own = Matrix.from1DArray(
        9,
        9,
        Array.from(gram(basis, { start: START, step: HOUR, count: mask.length }, at)),
      );
      return dense.mmul(own).trace();
    };
    const at = (largestLeverageAt - START) / HOUR;
    expectWithin(largestLeverage, one(at), { rel: ROUNDING });
    for (let i = 0; i < mask.length; i += 7) {
      if (mask[i]) expect(one(i)).toBeLessThanOrEqual(largestLeverage * (1 + ROUNDING));
    }
    expect(largestLeverage).toBeGreaterThan(9 / mask.filter(Boolean).length);
  });
});

describe('the Async twin and refusals', () => {
  it('gives the same', async () => {
    const fit = fitOf(record(60, (i) => i > 300 && i < 500));
    const stages = new Set<string>();
    const slow = await gapLeverageAsync(fit, { onProgress: ({ stage }) => void stages.add(stage) });
    expect(slow).toEqual(gapLeverage(fit));
    expect([...stages]).toEqual(['normal equations', 'leverage', 'gaps']);
  });

  it('needs a residual', () => {
    const fit = { ...fitOf(record(60, () => false)), residuals: undefined };
    const { code, path } = refusal(() => gapLeverage(fit));
    expect([code, path]).toEqual(['MISSING', 'fit.residuals']);
  });
});
