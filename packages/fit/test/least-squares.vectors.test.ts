import {
  type Differences,
  expectWithin,
  loadVector,
  mergeDifferences,
  recordAccuracy,
} from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { type LeastSquares, leastSquares } from '../src/least-squares.js';

interface Dataset {
  readonly name: string;
  readonly constant?: true;
  readonly powers?: readonly [number, number];
  readonly y: readonly number[];
  readonly predictors: readonly (readonly number[])[];
  readonly coefficients: readonly number[];
  readonly sigmas: readonly number[];
  readonly residualSigma: number;
  readonly degreesOfFreedom: number;
}

const VECTOR = 'nist-strd-linear';
const { cases } = loadVector<readonly Dataset[]>(VECTOR);
const CAPABILITY = 'linear least squares, relative error';

function designOf({ constant, powers, y, predictors }: Dataset): Float64Array[] {
  const columns = predictors.map((values) => Float64Array.from(values));
  const ones = new Float64Array(y.length).fill(1);
  if (!powers) return constant ? [ones, ...columns] : columns;
  const all = [ones];
  for (let k = 1; k <= powers[1]; k++) {
    const last = all[k - 1] as Float64Array;
    all.push(last.map((value, i) => value * ((columns[0] as Float64Array)[i] as number)));
  }
  return all.slice(powers[0]);
}

const rounded = 2 ** -52;
// Relative; absolute where 0 is certified. What rounding the decimals of a dataset to doubles does to the exact answer
// (notes of the vector) bounds what any solver reaches: half of it more is left to the last bits of ours.
const TOLERANCE: Readonly<
  Record<string, { readonly coefficients: number; readonly sigmas: number }>
> = {
  Longley: { coefficients: 3e-15, sigmas: 1e-15 },
  Norris: { coefficients: 1.6e-14, sigmas: 1.5e-14 },
  Pontius: { coefficients: 4.6e-14, sigmas: 2.2e-14 },
  Wampler1: { coefficients: rounded, sigmas: 1e-20 },
  Wampler2: { coefficients: 9.5e-14, sigmas: 1e-15 },
  Wampler3: { coefficients: rounded, sigmas: rounded },
  Wampler4: { coefficients: rounded, sigmas: rounded },
  Wampler5: { coefficients: rounded, sigmas: rounded },
  Filip: { coefficients: 2e-8, sigmas: 5.1e-9 },
  NoInt1: { coefficients: rounded, sigmas: rounded },
  NoInt2: { coefficients: rounded, sigmas: rounded },
};

/** Relative errors; absolute ones where 0 is expected. */
function expectDigits(
  actual: ArrayLike<number>,
  expected: readonly number[],
  abs: number,
  label: string,
): Differences {
  const errors = expected.map((value, i) => {
    const off = (actual[i] as number) - value;
    return value === 0 ? off : off / value;
  });
  expect(actual.length, label).toBe(expected.length);
  return expectWithin(errors, new Float64Array(errors.length), { abs }, label);
}

function compare(name: string): {
  fit: LeastSquares;
  coefficients: Differences;
  sigmas: Differences;
} {
  const dataset = cases.find((of) => of.name === name) as Dataset;
  const allowed = TOLERANCE[name] as { coefficients: number; sigmas: number };
  const fit = leastSquares(designOf(dataset), Float64Array.from(dataset.y));
  expect(fit.degreesOfFreedom).toBe(dataset.degreesOfFreedom);
  return {
    fit,
    coefficients: expectDigits(
      fit.coefficients,
      dataset.coefficients,
      allowed.coefficients,
      `${name}: coefficients`,
    ),
    sigmas: expectDigits(
      [...fit.sigmas, fit.residualSigma],
      [...dataset.sigmas, dataset.residualSigma],
      allowed.sigmas,
      `${name}: standard errors`,
    ),
  };
}

describe('the Statistical Reference Datasets', () => {
  it.each([
    ['Longley', ['Longley']],
    ['Norris and Pontius', ['Norris', 'Pontius']],
    ['Wampler 1 to 5', ['Wampler1', 'Wampler2', 'Wampler3', 'Wampler4', 'Wampler5']],
    ['NoInt 1 and 2', ['NoInt1', 'NoInt2']],
    [
      'Filip, the powers multiplied up in doubles, which moves the exact answer by 1.3e-8',
      ['Filip'],
    ],
  ])('%s', (label, names) => {
    const all = names.map(compare);
    for (const what of ['coefficients', 'sigmas'] as const) {
      recordAccuracy(VECTOR, {
        capability: CAPABILITY,
        compared: `${label}: ${what === 'sigmas' ? 'standard errors' : what}`,
        ...mergeDifferences(all.map((one) => one[what])),
        tolerance: Math.max(
          ...names.map(
            (name) => (TOLERANCE[name] as { coefficients: number; sigmas: number })[what],
          ),
        ),
        unit: '1',
      });
    }
  });

  it('names every dataset of the vector', () => {
    expect(Object.keys(TOLERANCE)).toEqual(cases.map(({ name }) => name));
  });

  it('takes the factor that the condition allows', () => {
    expect(compare('Longley').fit.solver).toBe('cholesky');
    const { fit: filip } = compare('Filip');
    expect(filip.solver).toBe('orthogonal');
    expect(filip.refinements).toBeGreaterThan(0);
  });
});
