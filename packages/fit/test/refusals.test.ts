/**
 * What a fit refuses, each with code, path, and what was expected and got. Covariates: model.test.ts; weights:
 * weights.test.ts; whatever else may come in: odd.prop.test.ts.
 */
import { DAY, HOUR, type Series, uniformSeries } from '@staithe/core';
import { expectWithin, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { fitHarmonics, type FitOptions } from '../src/index.js';
import { madeLevel } from './reference/made-level.js';

const START = Date.UTC(2031, 0, 1);
const COUNT = 40 * 24;
const level = madeLevel([
  ['M2', 1, 60],
  ['S2', 0.3, 90],
  ['K1', 0.2, 200],
  ['O1', 0.15, 170],
]);
const VALUES = Float64Array.from({ length: COUNT }, (_, i) => level(START + i * HOUR));
const NAMES = ['M2', 'S2', 'K1', 'O1'];
const hourly = (values: ArrayLike<number>): Series =>
  uniformSeries({ start: START, step: HOUR, values });
const good = hourly(VALUES);
const times = Float64Array.from(VALUES, (_, i) => START + i * HOUR);
const changed = (array: Float64Array, at: number, value: number): Float64Array =>
  array.map((v, i) => (i === at ? value : v));
const gone = (missing: (i: number) => boolean): Float64Array =>
  VALUES.map((v, i) => (missing(i) ? Number.NaN : v));

type Row = [what: string, codeAndPath: string, said: string, series: Series, options?: FitOptions];

function check(
  _: string,
  codeAndPath: string,
  said: string,
  series: Series,
  options?: FitOptions,
): void {
  const { code, path, message } = refusal(() => fitHarmonics(series, options));
  expect(`${code} ${path}`.trim()).toBe(codeAndPath);
  expect(message).toContain(said);
  expect(message).toMatch(/expected .*, got /);
}

describe('a record is refused', () => {
  it.each<Row>([
    ['without samples', 'TOO_FEW_SAMPLES', 'got 0', hourly([])],
    ['of one sample', 'TOO_FEW_SAMPLES', 'got 1', hourly([1])],
    ['of gaps alone', 'TOO_FEW_SAMPLES', 'got 0', hourly(gone(() => true))],
    ['of one sample among gaps', 'TOO_FEW_SAMPLES', 'got 1', hourly(gone((i) => i !== 7))],
    [
      'of as many samples as unknowns',
      'TOO_FEW_SAMPLES',
      'expected more than 9 samples for 9 unknowns, got 9 samples',
      hourly(gone((i) => i % 100 !== 0 || i >= 900)),
      { constituents: NAMES },
    ],
    [
      'too short for any constituent',
      'TOO_FEW_SAMPLES',
      'expected a record that holds one turn of a constituent, got 2 samples over 0.083 days',
      hourly(VALUES.slice(0, 2)),
    ],
    [
      'that never changes',
      'NO_TIDE',
      'got 1.5 at each of 960 samples',
      hourly(VALUES.map(() => 1.5)),
    ],
    [
      'that changes at weight 0 alone',
      'NO_TIDE',
      'got 2 at each of 959 samples',
      hourly(VALUES.map((_, i) => (i === 3 ? 7 : 2))),
      { weights: VALUES.map((_, i) => (i === 3 ? 0 : 1)) },
    ],
    [
      'whose times stand',
      'NOT_RISING times[5]',
      `got ${times[4]}`,
      { times: changed(times, 5, times[4] as number), values: VALUES },
    ],
    [
      'whose times fall',
      'NOT_RISING times[5]',
      `got ${START}`,
      { times: changed(times, 5, START), values: VALUES },
    ],
    [
      'with a time of NaN',
      'NOT_FINITE times[5]',
      'got NaN',
      { times: changed(times, 5, Number.NaN), values: VALUES },
    ],
    [
      'with an infinite time',
      'NOT_FINITE times[959]',
      'got Infinity',
      { times: changed(times, COUNT - 1, Infinity), values: VALUES },
    ],
    [
      'with more values than times',
      'LENGTH_MISMATCH values',
      'got 960',
      { times: times.slice(1), values: VALUES },
    ],
    [
      'with an infinite value',
      'NOT_FINITE values[5]',
      'got Infinity',
      { start: START, step: HOUR, values: changed(VALUES, 5, Infinity) },
    ],
    [
      'with an infinite value at a time of its own',
      'NOT_FINITE values[5]',
      'got -Infinity',
      { times, values: changed(VALUES, 5, -Infinity) },
    ],
    [
      'with a value of another unit',
      'OUT_OF_RANGE values[5]',
      'got 2000000',
      hourly(changed(VALUES, 5, 2e6)),
    ],
    [
      'with a step of seconds',
      'STEP_TOO_SHORT step',
      'got 3',
      { start: START, step: 3, values: VALUES },
    ],
    [
      'with a start of NaN',
      'NOT_FINITE start',
      'got NaN',
      { start: Number.NaN, step: HOUR, values: VALUES },
    ],
    [
      'of means over nothing',
      'OUT_OF_RANGE sampling.meanOver',
      'got 0',
      { ...good, sampling: { meanOver: 0, stamp: 'middle' } } as Series,
    ],
    ['that is a list', 'WRONG_TYPE series', 'expected a series', [1, 2, 3] as unknown as Series],
  ])('%s', check);
});

describe('options are refused', () => {
  const borrow = { name: 'P1', from: 'K1', amplitudeRatio: 0.3, phaseLagDifference: 0 };
  const hour = (i: number): number => START + i * HOUR;
  it.each<Row>([
    [
      'a parent that is not in the list',
      'MISSING options.borrow[0].from',
      'got K1',
      good,
      { constituents: ['M2'], borrow: [borrow] },
    ],
    [
      'borrowing in a circle',
      'CONFLICT options.borrow[0].from',
      'got K1, which is borrowed',
      good,
      { constituents: ['M2'], borrow: [borrow, { ...borrow, name: 'K1', from: 'P1' }] },
    ],
    [
      'borrowing from itself',
      'CONFLICT options.borrow[0].from',
      'got K1, which is borrowed',
      good,
      { constituents: ['M2', 'K1'], borrow: [{ ...borrow, name: 'K1' }] },
    ],
    [
      'borrowing in a chain',
      'CONFLICT options.borrow[1].from',
      'got P1, which is borrowed',
      good,
      { constituents: ['M2', 'K1'], borrow: [borrow, { ...borrow, name: 'PI1', from: 'P1' }] },
    ],
    [
      'a ratio below 0',
      'OUT_OF_RANGE options.borrow[0].amplitudeRatio',
      'got -0.1',
      good,
      { constituents: NAMES, borrow: [{ ...borrow, amplitudeRatio: -0.1 }] },
    ],
    [
      'a step at the first sample',
      'OUT_OF_RANGE options.steps[0]',
      'got 2031-01-01T00:00Z',
      good,
      { constituents: NAMES, steps: [START] },
    ],
    [
      'a step before the first sample, in a gap',
      'OUT_OF_RANGE options.steps[0]',
      'expected within the record (2031-01-01T12:00Z',
      hourly(gone((i) => i < 12)),
      { constituents: NAMES, steps: [hour(6)] },
    ],
    [
      'a step after the last sample',
      'OUT_OF_RANGE options.steps[1]',
      'got 2031-03-02T00:00Z',
      good,
      { constituents: NAMES, steps: [hour(100), START + 60 * DAY] },
    ],
    [
      'a step at no time',
      'NOT_FINITE options.steps[0]',
      'got NaN',
      good,
      { constituents: NAMES, steps: [Number.NaN] },
    ],
    [
      'an option that is misspelt',
      'UNKNOWN_CHOICE options.constituent',
      'got "constituent"',
      good,
      { constituent: ['M2'] } as FitOptions,
    ],
    [
      'a curve beside equal weighting',
      'CONFLICT options.resistant',
      'say weighting: resistant',
      good,
      { resistant: { curve: 'huber' } },
    ],
    [
      'an unknown curve',
      'UNKNOWN_CHOICE options.resistant.curve',
      'got ',
      good,
      { weighting: 'resistant', resistant: { curve: 'flat' as 'huber' } },
    ],
    [
      'a cutoff of 0',
      'OUT_OF_RANGE options.resistant.cutoff',
      'got 0',
      good,
      { weighting: 'resistant', resistant: { cutoff: 0 } },
    ],
    [
      'a cutoff of NaN',
      'OUT_OF_RANGE options.resistant.cutoff',
      'got NaN',
      good,
      { weighting: 'resistant', resistant: { cutoff: Number.NaN } },
    ],
  ])('%s', check);
});

describe('two steps in one gap', () => {
  const steps = [START + 310 * HOUR, START + 330 * HOUR];
  const gappy = hourly(gone((i) => i > 300 && i < 400));

  it.each<[string, FitOptions]>([
    ['of a list', { constituents: NAMES, steps }],
    ['of our own choice', { steps }],
  ])('are refused with both named, beside constituents %s', (_, options) => {
    const error = refusal(() => fitHarmonics(gappy, options));
    expect(error.message).toMatch(/expected .*, got /);
    expect(error.message).toMatch(/step/);
    expect(JSON.stringify([error.path, error.message, error.details])).toContain('step[0]');
    expect(JSON.stringify([error.path, error.message, error.details])).toContain('step[1]');
  });

  it('are fitted as soon as one sample stands between', () => {
    const between = gappy.values.map((v, i) => (i === 320 ? (VALUES[i] as number) + 0.5 : v));
    const moved = between.map((v, i) => (i >= 330 ? v + 0.2 : v));
    const fit = fitHarmonics(hourly(moved), { constituents: NAMES, steps });
    const changes = fit.constants.steps?.map(({ change }) => change) as number[];
    expectWithin(changes, [0.5, -0.3], { abs: 1e-9 });
  });
});
