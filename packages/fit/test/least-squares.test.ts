import { expectWithin, loadVector, refusal } from '@staithe/test-vectors';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { leastSquares } from '../src/least-squares.js';

/** What whole-number arithmetic says of a problem whose numbers are doubles: each figure rounded once or twice. */
interface Exact {
  readonly coefficients: number[];
  readonly sigmas: number[];
  readonly residuals: number[];
}

/** numerator / denominator · 2^−shift, rounded from 100 bits. */
function ratio(numerator: bigint, denominator: bigint, shift = 0): number {
  const bits = numerator.toString(2).length - denominator.toString(2).length;
  const up = Math.max(0, 100 - bits);
  return (Number((numerator << BigInt(up)) / denominator) / 2 ** up) * 2 ** -shift;
}

/** Doubles as whole numbers of units of 2^−shift. */
function whole(values: ArrayLike<number>): { units: bigint[]; shift: number } {
  let shift = 0;
  for (const value of Array.from(values)) {
    while (!Number.isInteger(value * 2 ** shift)) shift++;
  }
  return { units: Array.from(values, (value) => BigInt(value * 2 ** shift)), shift };
}

/** Normal equations solved without fractions (E. H. Bareiss 1968), beside the unit matrix. */
function exactly(columns: readonly Float64Array[], y: Float64Array, w?: Float64Array): Exact {
  const lists = columns.map(whole);
  const right = whole(y);
  const weights = whole(w ?? new Float64Array(y.length).fill(1));
  const k = columns.length;
  const sum = (a: readonly bigint[], b: readonly bigint[]): bigint =>
    a.reduce(
      (total, value, i) => total + value * (b[i] as bigint) * (weights.units[i] as bigint),
      0n,
    );
  const rows = lists.map((a, i) => [
    ...lists.map((b) => sum(a.units, b.units)),
    sum(a.units, right.units),
    ...lists.map((_, j) => (i === j ? 1n : 0n)),
  ]);
  let pivot = 1n;
  for (let c = 0; c < k; c++) {
    const at = (rows[c] as bigint[])[c] as bigint; // positive definite: no exchange is needed
    rows.forEach((row, i) => {
      if (i === c) return;
      const factor = row[c] as bigint;
      row.forEach((value, j) => {
        row[j] = (value * at - factor * ((rows[c] as bigint[])[j] as bigint)) / pivot;
      });
    });
    pivot = at;
  }
  const determinant = pivot;
  const solution = rows.map((row) => row[k] as bigint);
  const left = right.units.map((value, i) => {
    return (
      value * determinant -
      lists.reduce((t, a, j) => t + (a.units[i] as bigint) * (solution[j] as bigint), 0n)
    );
  });
  const squares = sum(left, left);
  const freedom = BigInt(weights.units.filter((value) => value > 0n).length - k);
  return {
    coefficients: solution.map((value, j) => {
      return ratio(value, determinant, right.shift - (lists[j]?.shift as number));
    }),
    sigmas: rows.map((row, j) => {
      const variance = squares * (row[k + 1 + j] as bigint);
      const shift = 2 * (right.shift - (lists[j]?.shift as number));
      return freedom > 0n ? Math.sqrt(ratio(variance, determinant ** 3n * freedom, shift)) : 0;
    }),
    residuals: left.map((value) => ratio(value, determinant, right.shift)),
  };
}

const ROUNDED = 2 ** -52; // relative: a unit in the last place
const SQUARED = 5e-16; // relative: the root of a product of rounded numbers

/** Every number of the result against exact arithmetic. */
function expectExact(
  columns: readonly Float64Array[],
  y: Float64Array,
  weights?: Float64Array,
): void {
  const got = leastSquares(columns, y, { weights });
  const wanted = exactly(columns, y, weights);
  const largest = y.reduce((top, value) => Math.max(top, Math.abs(value)), 0);
  expectWithin(got.coefficients, wanted.coefficients, { rel: ROUNDED, abs: 1e-25 }, 'coefficients');
  expectWithin(got.sigmas, wanted.sigmas, { rel: SQUARED, abs: largest * 1e-18 }, 'sigmas');
  expectWithin(got.residuals, wanted.residuals, { rel: 1e-14, abs: largest * 1e-18 }, 'residuals');
}

const list = (...values: number[]): Float64Array => Float64Array.from(values);
const ones = (n: number): Float64Array => new Float64Array(n).fill(1);
const LINE = [ones(4), list(0, 1, 2, 3)];
const OFF = list(1, 3, 4, 8);

describe('leastSquares', () => {
  it('fits a line by hand', () => {
    // Normal equations 4 6 | 16 and 6 14 | 35, determinant 20; residuals 0.3 0.1 −1.1 0.7, squares 1.8 over 2.
    const fit = leastSquares(LINE, OFF);
    expectWithin(fit.coefficients, [0.7, 2.2], { rel: ROUNDED });
    expectWithin(fit.residuals, [0.3, 0.1, -1.1, 0.7], { rel: 4 * ROUNDED });
    expectWithin(fit.residualSigma, Math.sqrt(0.9), { rel: ROUNDED });
    expectWithin(fit.covariance, [0.63, -0.27, -0.27, 0.18], { rel: 4 * ROUNDED });
    expectWithin(fit.sigmas, [Math.sqrt(0.63), Math.sqrt(0.18)], { rel: 4 * ROUNDED });
    expect(fit).toMatchObject({ degreesOfFreedom: 2, rank: 2, solver: 'cholesky' });
    expect(structuredClone(fit)).toEqual(fit);
  });

  it('gives the condition of the design with columns of unit length, whatever their units', () => {
    // cos of the angle 24/25: √((1 + 24/25) / (1 − 24/25)) = 7.
    for (const unit of [1, 1e-30, 1e30]) {
      const { condition } = leastSquares([list(3 * unit, 4 * unit), list(4, 3)], list(1, 2));
      expectWithin(condition, 7, { rel: 1e-13 });
    }
    expect(leastSquares([list(5, 5)], list(1, 2)).condition).toBe(1);
  });

  it('is exact for a polynomial whose terms cancel, by either factor', () => {
    const rows = Array.from({ length: 25 }, (_, i) => i);
    for (const [degree, solver] of [
      [3, 'cholesky'],
      [9, 'orthogonal'],
    ] as const) {
      const columns = Array.from({ length: degree + 1 }, (_, k) => {
        return Float64Array.from(rows, (row) => (row - 3) ** k);
      });
      const y = Float64Array.from(rows, (row) => (row % 3) - row * row + (row === 7 ? 1e5 : 0));
      expect(leastSquares(columns, y).solver).toBe(solver);
      expectExact(columns, y);
    }
  });

  it('is exact for Filip as the doubles have it: condition 5e9, and digits that the data take, not the solver', () => {
    const { cases } =
      loadVector<readonly { name: string; y: number[]; predictors: number[][] }[]>(
        'nist-strd-linear',
      );
    const filip = cases.find(({ name }) => name === 'Filip');
    const x = Float64Array.from(filip?.predictors[0] ?? []);
    const columns = [ones(x.length)];
    for (let k = 0; k < 10; k++) {
      columns.push((columns[k] as Float64Array).map((value, i) => value * (x[i] as number)));
    }
    expectExact(columns, Float64Array.from(filip?.y ?? []));
  });

  it('is exact up to the condition that it refuses, for thousands of samples', () => {
    const n = 3000;
    const noise = (i: number, seed: number): number =>
      ((i * i * 31 + i * seed * 17 + seed) % 1009) / 1024;
    const first = Float64Array.from({ length: n }, (_, i) => noise(i, 1));
    for (const apart of [2 ** -10, 2 ** -20, 2 ** -30, 2 ** -40]) {
      const columns = [
        first,
        ones(n),
        first.map((value, i) => value + apart * noise(i, 5)),
        Float64Array.from({ length: n }, (_, i) => noise(i, 7)),
      ];
      const y = Float64Array.from({ length: n }, (_, i) => noise(i, 11) + 1000 * noise(i, 3));
      expectExact(columns, y);
    }
  });

  it('agrees with exact arithmetic on small whole numbers', () => {
    const whole = fc.integer({ min: -20, max: 20 });
    const problems = fc
      .tuple(fc.integer({ min: 1, max: 4 }), fc.integer({ min: 0, max: 6 }))
      .chain(([k, more]) => {
        const column = fc.array(whole, { minLength: k + more, maxLength: k + more });
        const weights = fc.array(fc.integer({ min: 1, max: 9 }), {
          minLength: k + more,
          maxLength: k + more,
        });
        return fc.tuple(fc.array(column, { minLength: k, maxLength: k }), column, weights);
      });
    let solved = 0;
    fc.assert(
      fc.property(problems, ([columns, y, weights]) => {
        const design = columns.map((column) => Float64Array.from(column));
        const w = Float64Array.from(weights);
        let exact: Exact;
        try {
          exact = exactly(design, Float64Array.from(y), w);
        } catch (error) {
          // A determinant of zero: whole numbers are not divided by it.
          if (!(error instanceof RangeError)) throw error;
          const refused = refusal(() => leastSquares(design, Float64Array.from(y), { weights: w }));
          expect(refused.code).toBe('RANK_DEFICIENT');
          return;
        }
        expect(exact.coefficients.every(Number.isFinite)).toBe(true);
        expectExact(design, Float64Array.from(y), w);
        solved++;
      }),
      { numRuns: 300 },
    );
    expect(solved).toBeGreaterThan(200);
  });

  it('leaves its input as it was and finds nothing in nothing', () => {
    const columns = LINE.map((column) => column.slice());
    const y = new Float64Array(4);
    const weights = list(1, 0, 2, 1);
    const fit = leastSquares(columns, y, { weights });
    expect(columns).toEqual(LINE);
    expect(weights).toEqual(list(1, 0, 2, 1));
    expect(fit.coefficients).toEqual(new Float64Array(2));
    expect(fit.residuals).toEqual(new Float64Array(4));
    expect(fit).toMatchObject({ residualSigma: 0, degreesOfFreedom: 1, refinements: 0 });
  });

  it('claims no error bars where no sample is left over', () => {
    const fit = leastSquares([ones(2), list(0, 4)], list(1, 9));
    expect(fit.coefficients).toEqual(list(1, 2));
    expect(fit.sigmas).toEqual(new Float64Array(2));
    expect(fit.covariance).toEqual(new Float64Array(4));
    expect(fit).toMatchObject({ degreesOfFreedom: 0, residualSigma: 0 });
  });

  it('stays finite at the magnitudes that it takes', () => {
    for (const [column, value, weight] of [
      [1e40, 1e-40, 1e-40],
      [1e-40, 1e40, 1e40],
      [1e-40, 1e40, 1e-40],
      [1e40, 1e40, 1e40],
    ] as const) {
      const columns = [list(column, -column, column / 2), list(1e-300, column, 0)];
      const y = list(value, 0, value);
      const fit = leastSquares(columns, y, { weights: list(weight, weight, weight / 4) });
      for (const numbers of [fit.coefficients, fit.sigmas, fit.covariance, fit.residuals]) {
        expect(numbers.every(Number.isFinite)).toBe(true);
      }
      expect(fit.sigmas[0]).toBeGreaterThan(0);
      expect(Number.isFinite(fit.residualSigma)).toBe(true);
    }
  });
});

describe('weights', () => {
  const repeats = [1, 3, 2, 5];
  const repeat = (column: Float64Array): Float64Array => {
    return Float64Array.from(
      repeats.flatMap((times, i) => new Array<number>(times).fill(column[i] as number)),
    );
  };

  it('weigh as samples that stand there as often', () => {
    const once = leastSquares(LINE, OFF, { weights: list(...repeats) });
    const often = leastSquares(LINE.map(repeat), repeat(OFF));
    expectWithin(once.coefficients, often.coefficients, { rel: ROUNDED });
    expectWithin(repeat(once.residuals), often.residuals, { rel: 4 * ROUNDED });
    expectWithin(once.condition, often.condition, { rel: 1e-14 });
    // But count once: the sums of squares are the same, what they are divided by is not.
    expect([once.degreesOfFreedom, often.degreesOfFreedom]).toEqual([2, 9]);
    const scale = Math.sqrt(9 / 2);
    expectWithin(once.residualSigma, often.residualSigma * scale, { rel: 4 * ROUNDED });
    expectWithin(
      once.sigmas,
      often.sigmas.map((sigma) => sigma * scale),
      { rel: 4 * ROUNDED },
    );
  });

  it('matter only in proportion', () => {
    const one = leastSquares(LINE, OFF, { weights: list(...repeats) });
    const other = leastSquares(LINE, OFF, { weights: list(...repeats).map((w) => w * 2 ** -40) });
    expect(other.coefficients).toEqual(one.coefficients);
    expect(other.sigmas).toEqual(one.sigmas);
    expect(other.residualSigma).toBe(one.residualSigma * 2 ** -20);
  });

  it.each([1, 2 ** -30])(
    'of 0 leave a sample out but give its residual (columns %d apart)',
    (apart) => {
      const columns = [ones(6), list(9, 0, 1, 2, 3, 7), list(9, 0, 1, 2 + apart, 3, 7)];
      const y = list(50, 1, 3, 4, 8, 9);
      const weights = list(0, 1, 1, 1, 1, 1);
      const all = leastSquares(columns, y, { weights });
      const some = leastSquares(
        columns.map((column) => column.slice(1)),
        y.slice(1),
      );
      expectWithin(all.coefficients, some.coefficients, { rel: ROUNDED });
      expectWithin(all.sigmas, some.sigmas, { rel: SQUARED });
      expectExact(columns, y, weights);
      expect(all.degreesOfFreedom).toBe(2);
      expect(all.residuals[0]).toBeGreaterThan(1);
    },
  );

  it('may differ by many orders', () => {
    const columns = [ones(7), list(0, 1, 2, 3, 4, 5, 6), list(1, 0, 4, 1, 9, 2, 7)];
    const y = list(3, 1, 4, 1, 5, 9, 2);
    expectExact(columns, y, list(1, 2 ** 40, 2 ** -40, 1, 2 ** 20, 3, 2 ** -9));
  });
});

describe('what leastSquares refuses', () => {
  const swap = (at: number, value: number): Float64Array =>
    OFF.map((v, i) => (i === at ? value : v));
  const y = OFF;

  it.each([
    ['no column', () => leastSquares([], y), 'EMPTY_INPUT', 'columns'],
    ['a short column', () => leastSquares([ones(4), ones(3)], y), 'LENGTH_MISMATCH', 'columns[1]'],
    [
      'short weights',
      () => leastSquares(LINE, y, { weights: ones(5) }),
      'LENGTH_MISMATCH',
      'weights',
    ],
    [
      'a gap in a column',
      () => leastSquares([y, swap(2, Number.NaN)], y),
      'NOT_FINITE',
      'columns[1][2]',
    ],
    ['a gap in y', () => leastSquares(LINE, swap(3, Infinity)), 'NOT_FINITE', 'y[3]'],
    [
      'a gap in the weights',
      () => leastSquares(LINE, y, { weights: swap(0, Number.NaN) }),
      'NOT_FINITE',
      'weights[0]',
    ],
    [
      'a negative weight',
      () => leastSquares(LINE, y, { weights: swap(1, -1) }),
      'OUT_OF_RANGE',
      'weights[1]',
    ],
    [
      'what is too large to square',
      () => leastSquares(LINE, swap(1, 1e41)),
      'OUT_OF_RANGE',
      'y[1]',
    ],
    [
      'what is too small to square',
      () => leastSquares([list(0, 1e-50, 0, 0)], y),
      'OUT_OF_RANGE',
      'columns[0]',
    ],
  ])('%s', (_, run, code, path) => {
    const refused = refusal(run);
    expect(refused).toMatchObject({ code, path });
    expect(refused.message).toMatch(/expected .+, got /);
  });

  it('fewer samples than unknowns, those without weight not counted', () => {
    for (const run of [
      () => leastSquares([list(1), list(2)], list(3)),
      () => leastSquares(LINE, y, { weights: list(0, 0, 1, 0) }),
    ]) {
      const { code, details } = refusal(run);
      expect(code).toBe('TOO_FEW_SAMPLES');
      expect(details).toEqual({ samples: 1, unknowns: 2 });
    }
  });

  it.each([
    ['the same twice', [ones(4), OFF, list(0, 1, 0, 1), OFF], [1, 3]],
    ['the same to rounding', [OFF.map((v) => v / 3), ones(4), OFF.map((v) => v * 0.7)], [0, 2]],
    ['alike to 15 digits', [ones(4), list(1, 1, 1, 1 + 2e-15)], [0, 1]],
    ['a column of zeros', [ones(4), new Float64Array(4)], [1]],
    ['one column, of zeros', [new Float64Array(4)], [0]],
  ])('columns that cannot be told apart: %s', (_, columns, pair) => {
    const { code, details } = refusal(() => leastSquares(columns, y));
    expect(code).toBe('RANK_DEFICIENT');
    expect(details?.['columns']).toEqual(pair);
    expect(details?.['ratio']).toBeLessThan(1e-13);
  });

  it('a column that only samples without weight show', () => {
    const columns = [ones(4), list(0, 0, 0, 5)];
    const refused = refusal(() => leastSquares(columns, y, { weights: list(1, 1, 1, 0) }));
    expect(refused).toMatchObject({ code: 'RANK_DEFICIENT', details: { columns: [1] } });
  });
});
