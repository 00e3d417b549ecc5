/**
 * Odd and bad records: whatever comes in, either the fit refuses it with an error of the family, or all that it says is finite.
 */
import { DAY, HOUR, isStaitheError, type Series } from '@staithe/core';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitHarmonics, type FitOptions } from '../src/index.js';

const START = Date.UTC(2031, 0, 1);
const APART = 87660; // steps: ten years of hours
/** Gaps of the record are NaN here too; a candidate that stands still is shown every Infinity days. */
const MAY_HOLD =
  /^\.(residuals\.values|resistant\.weights)$|^\.diagnostics\.candidates\[\d+\]\.shownEveryDays$/;

/** Paths of all numbers that are not finite. */
function notFinite(value: unknown, path = ''): string[] {
  if (MAY_HOLD.test(path)) return [];
  if (typeof value === 'number') return Number.isFinite(value) ? [] : [`${path} ${value}`];
  if (typeof value !== 'object' || value === null) return [];
  if (ArrayBuffer.isView(value) || Array.isArray(value)) {
    return Array.from(value as ArrayLike<unknown>, (item, i) =>
      notFinite(item, `${path}[${i}]`),
    ).flat();
  }
  return Object.entries(value).flatMap(([key, item]) => notFinite(item, `${path}.${key}`));
}

/** What is wrong with the outcome of a fit: nothing, as it should be. */
function faults(series: Series, options: FitOptions): string[] {
  try {
    const fit = fitHarmonics(series, options);
    const weighted = options.weights ?? series.values.map(() => 1);
    const largest = Math.max(...Array.from(weighted));
    const misplaced = Array.from(series.values.keys()).filter((i) => {
      const weight = weighted[i] as number;
      if (weight > 0 && weight / largest === 0) return false; // as good as 0, and may count as a gap
      const gap = Number.isNaN(series.values[i]) || weight === 0;
      return Number.isNaN(fit.residuals.values[i]) !== gap;
    });
    const negative = fit.covariance.order.filter(
      (_, i, { length }) => !((fit.covariance.matrix[i * length + i] as number) >= 0),
    );
    return [
      ...notFinite(fit),
      ...misplaced.map((i) => `residual ${i}`),
      ...negative.map((name) => `variance of ${name}`),
    ];
  } catch (error) {
    if (!isStaitheError(error)) return [String(error)];
    const said = notFinite(error.details).map((text) => `details${text}`);
    return /expected .*got /.test(error.message) && !/NaN|undefined/.test(error.message)
      ? said
      : [...said, error.message];
  }
}

const tides = (time: number): number => {
  const hours = (time - START) / HOUR;
  return (
    Math.cos((hours / 12.4206) * 2 * Math.PI) + 0.4 * Math.cos((hours / 23.9345) * 2 * Math.PI)
  );
};

/** Values at times: a tide of any size, wild numbers, nothing but one sample, steps, a line. */
const levels = fc.oneof(
  fc
    .constantFrom(1e-300, 1e-160, 1e-9, 1, 1e5, 1e6 / 2)
    .map((size) => (t: number) => size * tides(t)),
  fc
    .constantFrom(1e-6, 1, 1e5, 9e5)
    .map((size) => (_: number, i: number) => size * Math.sin(i * i * 1.7)),
  fc.nat(40).map((at) => (_: number, i: number) => (i === at ? 1 : 0)),
  fc.nat(40).map((at) => (_: number, i: number) => (i < at ? 1e5 : -1e5)),
  fc.constant((t: number) => (t - START) / DAY),
  fc.constant((_: number, i: number) => (i % 2 ? 1e5 : -1e5)),
  fc.double({ min: -1e5, max: 1e5, noNaN: true }).map((v) => () => v),
);

/** Which samples are missing. */
const gaps = fc.oneof(
  { weight: 4, arbitrary: fc.constant(() => false) },
  fc.constant(() => true),
  fc.integer({ min: 2, max: 40 }).map((keep) => (i: number) => i % keep !== 0),
  fc.tuple(fc.nat(60), fc.nat(300)).map(
    ([from, count]) =>
      (i: number) =>
        i >= from && i < from + count,
  ),
  fc.nat(12).map((keep) => (i: number) => i >= keep),
);

const steps = fc.oneof(
  { weight: 3, arbitrary: fc.constantFrom(HOUR, 3 * HOUR) },
  { weight: 2, arbitrary: fc.constantFrom(1000, 60000, 12 * HOUR, DAY, 9.9156 * DAY) },
);

const series = fc
  .record({
    count: fc.oneof(
      { weight: 1, arbitrary: fc.integer({ min: 0, max: 30 }) },
      { weight: 3, arbitrary: fc.integer({ min: 30, max: 900 }) },
    ),
    step: steps,
    kind: fc.constantFrom('uniform', 'uniform', 'jitter', 'jitter', 'clusters', 'crowded'),
    level: levels,
    missing: gaps,
  })
  .map(({ count, step, kind, level, missing }): Series => {
    const times = Float64Array.from({ length: count }, (_, i) => {
      if (kind === 'jitter') return START + i * step + ((i * 7919) % 997);
      // Two clusters up to ten years apart; times so near that all is one instant to the tide.
      if (kind === 'clusters') return START + i * step + (i < count / 2 ? 0 : APART * step);
      return START + i * (kind === 'crowded' ? 1 : step);
    });
    const values = times.map((t, i) => (missing(i) ? Number.NaN : level(t, i)));
    return kind === 'uniform' ? { start: START, step, values } : { times, values };
  });

const NAMES = ['M2', 'S2', 'N2', 'K1', 'O1', 'K2', 'Ssa', 'Mf', 'M4', 'M8'];
const lists = fc.oneof(
  { weight: 2, arbitrary: fc.constantFrom(['M2'], ['M2', 'K1'], ['M2', 'S2', 'O1', 'M4']) },
  { weight: 2, arbitrary: fc.subarray(NAMES, { minLength: 0, maxLength: 6 }) },
  { weight: 1, arbitrary: fc.constant('resolvable' as const) },
);

type WeightOf = ((index: number) => number) | undefined;
const WEIGHTS: readonly WeightOf[] = [
  () => 1e-100,
  () => 1e100,
  (i) => (i % 37 ? 0 : 1),
  (i) => (i % 5 ? 1e-12 : 1),
  (i) => (i < 5 ? 1 : 1e-30),
  () => 0,
];
/** Whose squares and sums do not fit into numbers as they are. */
const EXTREME_WEIGHTS: readonly WeightOf[] = [
  () => 1e-300,
  () => 1e300,
  () => Number.MIN_VALUE,
  () => Number.MAX_VALUE,
  (i) => (i % 2 ? 1e-300 : 1e300),
];

const options = fc.record({
  constituents: lists,
  secularRate: fc.boolean(),
  weighting: fc.constantFrom('equal' as const, 'equal' as const, 'resistant' as const),
  errors: fc.constantFrom<FitOptions>(
    { errorModel: 'residual-spectrum' },
    { errorModel: 'independent' },
    { errorModel: 'redrawn', redraw: { draws: 20 } },
    { errorModel: 'redrawn', redraw: { draws: 20, by: 'blocks' } },
  ),
  nodalModel: fc.constantFrom('potential' as const, 'none' as const),
  moved: fc.constantFrom([], [], [], [0.5], [0.3, 0.6]),
  covariate: fc.oneof(
    { weight: 3, arbitrary: fc.constant(undefined) },
    { weight: 1, arbitrary: fc.constantFrom(1e-300, 1e-90, 1, 1, 1e90, 1e300) },
  ),
});

function expectSound(runs: number, weights: fc.Arbitrary<WeightOf>): void {
  fc.assert(
    fc.property(series, options, weights, (record, chosen, weightOf) => {
      const { moved, covariate, errors, ...rest } = chosen;
      const { values } = record;
      const times = record.times ?? values.map((_, i) => START + i * record.step);
      const [first, last] = [times[0] ?? START, times[times.length - 1] ?? START];
      const given: FitOptions = {
        ...rest,
        ...errors,
        steps: moved.map((share) => Math.round(first + share * (last - first))),
        ...(covariate === undefined
          ? {}
          : { covariates: [{ name: 'a', values: values.map((_, i) => covariate * Math.sin(i)) }] }),
        ...(weightOf ? { weights: Array.from(values, (_, i) => weightOf(i)) } : {}),
      };
      expect(faults(record, given)).toEqual([]);
    }),
    { numRuns: runs },
  );
}

describe('odd records are refused, or fitted with finite numbers alone', () => {
  it('with and without weights', () => {
    expectSound(200, fc.constantFrom(undefined, undefined, ...WEIGHTS));
  });

  it('with weights at the ends of the range', () => {
    expectSound(150, fc.constantFrom(...EXTREME_WEIGHTS));
  });
});
