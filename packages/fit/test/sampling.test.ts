/**
 * How a record was sampled: means over an hour, and samples so far apart that the tides show themselves at other speeds.
 */
import { constituent } from '@staithe/constituents';
import { DAY, HOUR, MINUTE, type Sampling, uniformSeries, type UniformSeries } from '@staithe/core';
import { expectWithin, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { fitHarmonics } from '../src/index.js';
import { componentsOf, madeLevel, type TrueConstituent } from './reference/made-level.js';

const START = Date.UTC(2031, 0, 1);

describe('values that are means', () => {
  const TRUTH: readonly TrueConstituent[] = [
    ['M2', 1, 60],
    ['K1', 0.3, 200],
    ['M4', 0.2, 310],
    ['M8', 0.05, 20],
  ];
  const NAMES = TRUTH.map(([name]) => name);
  const COUNT = 40 * 24;
  const level = madeLevel(TRUTH);
  // C. F. Gauss (1814), five points: exact to 1e-13 for the fastest of these over an hour.
  const NODES = [0, 0.538469310105683, 0.906179845938664];
  const WEIGHTS = [128 / 225, 0.478628670499366, 0.236926885056189];
  const meanAbout = (middle: number): number =>
    NODES.reduce((sum, node, k) => {
      const half = (node * HOUR) / 2;
      const both = k === 0 ? level(middle) : level(middle - half) + level(middle + half);
      return sum + ((WEIGHTS[k] as number) * both) / 2;
    }, 0);
  const means = Float64Array.from({ length: COUNT }, (_, i) => meanAbout(START + i * HOUR));
  const seriesFrom = (start: number, sampling?: Sampling): UniformSeries =>
    uniformSeries({ start, step: HOUR, values: means, sampling });
  /** f and u of the potential drift by 1e-8 within an hour, which the response does not follow. */
  const RECOVERED = 1e-6; // m

  it.each<[Sampling['stamp'], number]>([
    ['start', -HOUR / 2],
    ['middle', 0],
    ['end', HOUR / 2],
  ])('over an hour, stamped at its %s, give the true constants', (stamp, shift) => {
    const series = seriesFrom(START + shift, { meanOver: HOUR, stamp });
    const fit = fitHarmonics(series, { constituents: NAMES });
    expectWithin(componentsOf(fit, NAMES), componentsOf(TRUTH, NAMES), { abs: RECOVERED });
    expectWithin(fit.diagnostics.residual.largest, 0, { abs: RECOVERED });
  });

  it('weaken the tides where nothing is said: M2 by 1.06 %, M4 by 4.2 %, M8 by 16 %', () => {
    const fit = fitHarmonics(seriesFrom(START), { constituents: NAMES });
    const lost = TRUTH.map(([name, amplitude]) => {
      const found = fit.constants.constituents.find((c) => c.name === name);
      return 100 * (1 - (found?.amplitude as number) / amplitude);
    });
    // Convention 11 of the project, from the trade: half a unit of the last digit.
    expectWithin(lost[0] as number, 1.06, { abs: 0.005 }, 'M2, %');
    expectWithin(lost[2] as number, 4.2, { abs: 0.05 }, 'M4, %');
    expectWithin(lost[3] as number, 16, { abs: 0.5 }, 'M8, %');
    // 1 − sin(x)/x, x the half turn of an hour.
    const half = TRUTH.map(([name]) => (constituent(name).speed * Math.PI) / 360);
    const known = half.map((x) => 100 * (1 - Math.sin(x) / x));
    expectWithin(lost, known, { abs: 1e-4 }, '%');
  });

  it('of ten values of six minutes weaken M2 by 1.05 %', () => {
    const tens = means.map((_, i) => {
      const values = Array.from({ length: 10 }, (__, k) =>
        level(START + i * HOUR + 6 * k * MINUTE),
      );
      return values.reduce((a, b) => a + b) / 10;
    });
    const series = uniformSeries({ start: START + 27 * MINUTE, step: HOUR, values: tens });
    const fit = fitHarmonics(series, { constituents: NAMES });
    const [m2] = fit.constants.constituents;
    expectWithin(100 * (1 - (m2?.amplitude as number)), 1.05, { abs: 0.005 }, '%');
    expectWithin(m2?.phaseLag as number, 60, { abs: 1e-3 }, 'degrees');
  });
});

describe('a satellite that passes each 9.9156 days', () => {
  const PASS = 9.9156; // days
  /** Days in which each shows itself: common knowledge of altimetry, from memory, to 0.1 day. */
  const SHOWN: Readonly<Record<string, number>> = {
    M2: 62.1,
    S2: 58.7,
    N2: 49.5,
    K2: 86.6,
    K1: 173.2,
    O1: 45.7,
    P1: 88.9,
    Q1: 69.4,
  };
  const TRUTH: readonly TrueConstituent[] = [
    ['M2', 1, 60],
    ['S2', 0.4, 90],
    ['N2', 0.2, 30],
    ['K2', 0.1, 95],
    ['K1', 0.3, 200],
    ['O1', 0.2, 170],
    ['P1', 0.1, 195],
    ['Q1', 0.04, 150],
    ['Ssa', 0.03, 40],
  ];
  const level = madeLevel(TRUTH);
  const passes = (days: number, noise = 0.01): UniformSeries =>
    uniformSeries({
      start: START,
      step: PASS * DAY,
      values: Array.from(
        { length: Math.round(days / PASS) },
        (_, i) => level(START + i * PASS * DAY) + noise * Math.sin(i * i),
      ),
    });

  const SSA = 360 / constituent('Ssa').speed / 24; // days: slow enough to be seen as it is

  /** The turns of a pass beyond whole ones, either way round. */
  function foldedDays(name: string): number {
    const turns = (constituent(name).speed * 24 * PASS) / 360;
    return PASS / Math.abs(turns - Math.round(turns));
  }

  it('shows the tides in 45 to 173 days', () => {
    const { candidates } = fitHarmonics(passes(366)).diagnostics;
    for (const [name, days] of Object.entries(SHOWN)) {
      const candidate = candidates.find((one) => one.name === name);
      const shown = candidate?.shownEveryDays as number;
      expectWithin(shown, days, { abs: 0.05 }, name);
      expectWithin(shown, foldedDays(name), { rel: 1e-9 }, name);
      expect(candidate?.reason).toContain(`seen once in ${shown.toFixed(1)} days`);
    }
    expect(candidates.find(({ name }) => name === 'Ssa')?.shownEveryDays).toBeUndefined();
    expectWithin(SSA, 182.6, { abs: 0.05 });
  });

  it('leaves in a year what it shows beside a larger one', () => {
    const { candidates } = fitHarmonics(passes(366)).diagnostics;
    const k2 = candidates.find(({ name }) => name === 'K2');
    expect(k2?.decision).toBe('left');
    expect(k2?.reason).toContain('record too short beside');
  });

  it.each<[string, string, number]>([
    ['K1', 'Ssa', 366],
    ['M2', 'S2', 100],
    ['K2', 'P1', 366],
  ])('%s beside %s is refused in %d days', (one, other, days) => {
    const error = refusal(() => fitHarmonics(passes(days), { constituents: [one, other] }));
    expect(error.code).toBe('RANK_DEFICIENT');
    const pair = error.details?.['pair'] as string[];
    expect([...pair].sort()).toEqual([one, other].sort());
    expect(error.message).toContain(one);
    expect(error.message).toContain(other);
    const seen = [one, other].map((name) => (name === 'Ssa' ? SSA : foldedDays(name)));
    const turn = 1 / Math.abs(1 / (seen[0] as number) - 1 / (seen[1] as number));
    expect(error.message).toContain(`a turn takes ${turn.toFixed(1)} days`);
  });

  it('tells all of them apart in ten years', () => {
    const names = TRUTH.map(([name]) => name);
    const fit = fitHarmonics(passes(3652.5, 0), { constituents: names });
    expectWithin(componentsOf(fit, names), componentsOf(TRUTH, names), { abs: 1e-9 });
    const ours = fitHarmonics(passes(3652.5)).constants.constituents.map(({ name }) => name);
    for (const name of ['M2', 'S2', 'N2', 'K1', 'O1', 'P1']) expect(ours).toContain(name);
  });

  it('has the same aliases where passes are lost', () => {
    const whole = passes(3652.5);
    const kept = Array.from(whole.values.keys()).filter((i) => i % 7 !== 3);
    const { candidates } = fitHarmonics({
      times: Float64Array.from(kept, (i) => whole.start + i * whole.step),
      values: Float64Array.from(kept, (i) => whole.values[i] as number),
    }).diagnostics;
    const m2 = candidates.find(({ name }) => name === 'M2');
    expectWithin(m2?.shownEveryDays as number, foldedDays('M2'), { rel: 1e-6 });
  });
});
