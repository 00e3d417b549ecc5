/**
 * Fits against numpy on designs that were written out column by column with the slow functions.
 */
import { HOUR, MINUTE, type Series, toInstant, uniformSeries } from '@staithe/core';
import {
  decodeInt16,
  type Differences,
  expectWithin,
  loadVector,
  mergeDifferences,
  recordAccuracy,
} from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { fitHarmonics, type FitOptions } from '../src/index.js';

interface Case {
  readonly name: string;
  readonly options: FitOptions;
  readonly record: {
    readonly start: string;
    readonly stepMinutes?: number;
    /** Base64; the first counts from start. */
    readonly secondsSinceBefore?: readonly string[];
    /** First sample and number of each run of gaps. */
    readonly gaps?: string;
    readonly values?: readonly string[];
    readonly valuesOf?: string;
  };
  readonly covariate?: {
    readonly name: string;
    readonly start: string;
    readonly stepMinutes: number;
    readonly lags: readonly number[];
    readonly perUnit: number;
    readonly values: readonly string[];
  };
  readonly samples: number;
  readonly condition: number;
  readonly columns: readonly (readonly [name: string, coefficient: number, variance: number])[];
  readonly covariances: readonly (readonly [row: number, column: number, value: number])[];
}

const PER_METRE = 10000;
// Of the amplitude, of the level: the basis holds its functions to 1e-10 of the slow part (docs/basis.md).
const COEFFICIENTS = 1e-9;
// Of the standard errors: squares of the residuals, whose sums carry the same 1e-10.
const COVARIANCES = 1e-8;
// Of the condition: power iterations come near slowly where it is about 1, and there it does not matter.
const CONDITION = 1e-2;

const { cases } = loadVector<readonly Case[]>('numpy-lstsq');

function seriesOf({ record }: Case): Series {
  const from = cases.find(({ name }) => name === record.valuesOf)?.record ?? record;
  const values = Float64Array.from(decodeInt16(from.values ?? []), (value) => value / PER_METRE);
  for (const run of record.gaps?.split(', ') ?? []) {
    const [first, count] = run.split(' ').map(Number) as [number, number];
    values.fill(Number.NaN, first, first + count);
  }
  if (!record.secondsSinceBefore) {
    return uniformSeries({ start: record.start, step: HOUR, values });
  }
  let time = toInstant(record.start);
  const seconds = decodeInt16(record.secondsSinceBefore);
  return { times: Float64Array.from(seconds, (s) => (time += s * 1000)), values };
}

function optionsOf({ options, covariate }: Case): FitOptions {
  const independent: FitOptions = { ...options, errorModel: 'independent' };
  if (!covariate) return independent;
  const { name, start, stepMinutes, lags, perUnit, values } = covariate;
  const series = uniformSeries({
    start,
    step: stepMinutes * MINUTE,
    values: Float64Array.from(decodeInt16(values), (value) => value / perUnit),
  });
  return { ...independent, covariates: [{ name, series, lags }] };
}

/** Relative differences: values in units of a size each. */
function inUnitsOf(values: readonly number[], sizes: readonly number[]): number[] {
  return values.map((value, i) => value / (sizes[i] as number));
}

describe('fits on explicit designs', () => {
  const coefficients: Differences[] = [];
  const covariances: Differences[] = [];

  it.each(cases.map((one) => [one.name, one] as const))('%s', (name, one) => {
    const fit = fitHarmonics(seriesOf(one), optionsOf(one));
    expect(fit.covariance.order).toEqual(one.columns.map(([column]) => column));
    expect(fit.diagnostics.samples).toBe(one.samples);
    expectWithin(
      fit.diagnostics.condition,
      one.condition,
      { rel: CONDITION },
      `${name}: condition`,
    );

    const { meanLevel, secularRate, steps = [], constituents } = fit.constants;
    const got = [
      meanLevel,
      ...(secularRate ? [secularRate.metresPerYear] : []),
      ...steps.map(({ change }) => change),
      ...(fit.covariates ?? []).map(({ coefficient }) => coefficient),
      ...constituents
        .filter(({ standing }) => standing !== 'borrowed')
        .flatMap(({ amplitude, phaseLag }) => {
          const angle = (phaseLag * Math.PI) / 180;
          return [amplitude * Math.cos(angle), amplitude * Math.sin(angle)];
        }),
    ];
    const want = one.columns.map(([, coefficient]) => coefficient);
    // Components count against the amplitude of their constituent, all else against itself.
    const sizes = one.columns.map(([column, coefficient], i) => {
      if (!/\.(cos|sin)$/.test(column)) return Math.abs(coefficient);
      return Math.hypot(coefficient, want[column.endsWith('cos') ? i + 1 : i - 1] as number);
    });
    coefficients.push(
      expectWithin(
        inUnitsOf(got, sizes),
        inUnitsOf(want, sizes),
        { abs: COEFFICIENTS },
        `${name}: coefficients`,
      ),
    );

    const { matrix, order } = fit.covariance;
    const at = (row: number, column: number): number =>
      matrix[row * order.length + column] as number;
    const sigma = one.columns.map(([, , variance]) => Math.sqrt(variance));
    const wanted = [
      ...one.columns.map(([, , variance], i) => [i, i, variance] as const),
      ...one.covariances,
    ];
    const scales = wanted.map(([i, j]) => (sigma[i] as number) * (sigma[j] as number));
    covariances.push(
      expectWithin(
        inUnitsOf(
          wanted.map(([i, j]) => at(i, j)),
          scales,
        ),
        inUnitsOf(
          wanted.map(([, , value]) => value),
          scales,
        ),
        { abs: COVARIANCES },
        `${name}: covariances`,
      ),
    );
  });

  it('all together, for the record', () => {
    expect(coefficients.length).toBe(cases.length);
    recordAccuracy('numpy-lstsq', {
      capability: 'coefficients of a fit',
      compared:
        'share of the amplitude; a year whole and with 30 % gaps, irregular times, borrowing, rate, steps, covariate',
      ...mergeDifferences(coefficients),
      tolerance: COEFFICIENTS,
      unit: '1',
    });
    recordAccuracy('numpy-lstsq', {
      capability: 'covariance of a fit, independent errors',
      compared: 'share of the standard errors; variances and some covariances of the same fits',
      ...mergeDifferences(covariances),
      tolerance: COVARIANCES,
      unit: '1',
    });
  });
});
