/**
 * Dense least squares to the last digits that doubles can hold: min Σ w (y − A·x)² by a factor of the design with
 * columns of unit length, and refinement of residual and solution together in doubled precision.
 *
 * Sources: Å. Björck (1967), Solving linear least squares problems by Gram–Schmidt orthogonalization and Iterative
 * refinement of linear least squares solutions I, BIT 7, 1 and 257; J. Demmel, Y. Hida, E. J. Riedy and X. S. Li (2009),
 * ACM Trans. Math. Softw. 35, 28, for keeping the solution itself in doubled precision.
 * @module
 */
import { rankUpdate, TILE } from '@staithe/basis/kernels';
import { ComputationError, refuse } from '@staithe/core';
import { EigenvalueDecomposition, Matrix, SingularValueDecomposition } from 'ml-matrix';
import {
  addInto,
  changesNothing,
  choleskyUpper,
  defectOf,
  dot,
  dotPairs,
  doubledGram,
  inverseBy,
  orthonormalise,
  type Pairs,
  settle,
  solveTransposed,
  solveUpper,
  subtractInto,
  timesPairs,
  zeroPairs,
} from './internal/arithmetic.js';

// Largest magnitude of a column, of y, of the weights, and its inverse the least: squares of products stay doubles.
const LARGEST = 1e40;
const NOTHING = 1e-70; // length of a column once it is weighted: below, no sample shows it
// Condition of the design with unit columns. One step multiplies the error by about ε·κ² after Cholesky, ε·κ beyond.
const CHOLESKY = 1e5;
const TOLD_APART = 1e13;

/** Options of {@link leastSquares}. @public */
export interface LeastSquaresOptions {
  /**
   * Inverse variances up to a common factor, 0 or more, one a sample; 0 leaves a sample out. Default: all alike. Weight
   * 2 gives the coefficients of a sample that stands there twice, but counts as one degree of freedom.
   */
  readonly weights?: Float64Array | undefined;
}

/** What {@link leastSquares} gives. @public */
export interface LeastSquares {
  /** x, one a column. */
  readonly coefficients: Float64Array;
  /** Standard errors: square roots of the diagonal of `covariance`. */
  readonly sigmas: Float64Array;
  /** residualSigma²·(AᵀWA)⁻¹, row-major, k × k. */
  readonly covariance: Float64Array;
  /** y − A·x before x is rounded, one a sample, those of weight 0 too. */
  readonly residuals: Float64Array;
  /** Square root of Σ w·r² over `degreesOfFreedom`: of a sample of weight 1. */
  readonly residualSigma: number;
  /** Samples of positive weight less columns. At 0 nothing is known of the errors, and all of them are given as 0. */
  readonly degreesOfFreedom: number;
  /** Of the design: the number of columns, as a lower one is refused. */
  readonly rank: number;
  /** Largest over smallest singular value of the weighted design with columns of unit length. */
  readonly condition: number;
  /** Gram matrix up to a condition of 1e5, orthogonal factor beyond. */
  readonly solver: 'cholesky' | 'orthogonal';
  /** Corrections made after the first solution. */
  readonly refinements: number;
}

/** What was given; square roots of the weights, lengths of the weighted columns. */
interface Problem {
  readonly columns: readonly Float64Array[];
  readonly y: Float64Array;
  readonly weights: Float64Array;
  readonly roots: Float64Array;
  readonly lengths: Float64Array;
}

/** Of the weighted design B with unit columns: R (`upper`, row-major) with B where RᵀR = BᵀB, with Q where B = Q·R. */
interface Factor {
  readonly solver: 'cholesky' | 'orthogonal';
  readonly upper: Float64Array;
  readonly basis: readonly Float64Array[];
  readonly condition: number;
}

function checkMagnitudes(path: string, values: Float64Array): void {
  let peak = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i] as number;
    if (!Number.isFinite(value)) refuse('NOT_FINITE', `${path}[${i}]`, 'a finite number', value);
    peak = Math.max(peak, Math.abs(value));
    if (peak > LARGEST) refuse('OUT_OF_RANGE', `${path}[${i}]`, `at most ±${LARGEST}`, value);
  }
  if (peak > 0 && peak < 1 / LARGEST) {
    refuse('OUT_OF_RANGE', path, `a largest magnitude of ${1 / LARGEST} or more`, peak);
  }
}

function readProblem(
  columns: readonly Float64Array[],
  y: Float64Array,
  weights: Float64Array,
): Problem {
  if (columns.length === 0) refuse('EMPTY_INPUT', 'columns', 'one column or more', columns);
  const lists: [string, Float64Array][] = columns.map((column, j) => [`columns[${j}]`, column]);
  lists.push(['y', y], ['weights', weights]);
  for (const [path, list] of lists) {
    if (list.length === y.length) checkMagnitudes(path, list);
    else refuse('LENGTH_MISMATCH', path, `${y.length} as in y`, list.length);
  }
  const below = weights.findIndex((weight) => weight < 0);
  if (below >= 0) refuse('OUT_OF_RANGE', `weights[${below}]`, '0 or more', weights[below]);
  const roots = weights.map((weight) => Math.sqrt(weight));
  const lengths = Float64Array.from(columns, (column) => {
    const weighted = column.map((value, i) => value * (roots[i] as number));
    return Math.sqrt(dot(weighted, weighted));
  });
  return { columns, y, weights, roots, lengths };
}

function inseparable(columns: readonly number[], ratio: number): never {
  const got = columns.length > 1 ? 'alike' : 'without a value';
  throw new ComputationError(
    'RANK_DEFICIENT',
    `expected columns that can be told apart, got ${columns.join(' and ')} ${got} in these samples`,
    { columns, ratio },
  );
}

function factorise({ columns, roots, lengths }: Problem): Factor {
  const n = roots.length;
  const count = columns.length;
  const design = new Float64Array(count * n);
  columns.forEach((column, j) => {
    const length = lengths[j] as number;
    if (length < NOTHING) inseparable([j], 0);
    for (let i = 0; i < n; i++) {
      design[j * n + i] = ((column[i] as number) * (roots[i] as number)) / length;
    }
  });
  const basis = columns.map((_, j) => design.subarray(j * n, (j + 1) * n));
  const gram = new Float64Array(count * count);
  for (let from = 0; from < n; from += TILE) {
    rankUpdate(gram, design.subarray(from), count, n, Math.min(TILE, n - from));
  }
  const squares = columns.map((_, i) => {
    return columns.map((_, j) => gram[Math.max(i, j) * count + Math.min(i, j)] as number);
  });
  // ml-matrix: eigenvalues and singular values of small matrices, outside what this project exists for.
  const values = new EigenvalueDecomposition(squares, { assumeSymmetric: true }).realEigenvalues;
  const condition = Math.sqrt(Math.max(...values) / Math.max(0, Math.min(...values)));
  if (condition <= CHOLESKY) {
    return { solver: 'cholesky', upper: choleskyUpper(gram, count), basis, condition };
  }
  const upper = orthonormalise(basis);
  return { solver: 'orthogonal', upper, basis, condition: conditionOf(upper, count) };
}

/** Largest over smallest singular value; refused where the smallest is rounding. */
function conditionOf(upper: Float64Array, count: number): number {
  const { diagonal, rightSingularVectors } = new SingularValueDecomposition(
    Matrix.from1DArray(count, count, upper),
  );
  const last = diagonal.length - 1; // they fall
  const ratio = (diagonal[last] as number) / (diagonal[0] as number);
  if (!(ratio >= 1 / TOLD_APART)) {
    const weakest = rightSingularVectors.getColumn(last).map((value) => Math.abs(value));
    const order = weakest.map((_, j) => j);
    order.sort((a, b) => (weakest[b] as number) - (weakest[a] as number));
    inseparable(
      order.slice(0, 2).sort((a, b) => a - b),
      ratio,
    );
  }
  return 1 / ratio;
}

/** Solves r + A·x = y, AᵀW·r = −c for x in doubled precision, starting from nothing. */
function solveAugmented(
  { columns, weights, roots, lengths }: Problem,
  { solver, upper, basis }: Factor,
  y: Float64Array,
  c: Float64Array,
): { x: Pairs; solutions: number } {
  const x = zeroPairs(columns.length);
  const r = zeroPairs(y.length);
  const solutions = settle(() => {
    const pull = timesPairs(weights, r);
    const h = Float64Array.from(columns, (column, j) => {
      const [hi, lo] = dotPairs(column, pull);
      return -((c[j] as number) + hi + lo) / (lengths[j] as number);
    });
    if (solver === 'orthogonal') solveTransposed(upper, h);
    const g = defectOf(y, columns, x, r).map((value, i) => value * (roots[i] as number));
    const t = Float64Array.from(basis, (column, j) => dot(column, g) - (h[j] as number));
    if (solver === 'cholesky') {
      solveTransposed(upper, t);
      solveUpper(upper, t);
    }
    basis.forEach((column, j) => subtractInto(g, t[j] as number, column));
    if (solver === 'orthogonal') solveUpper(upper, t);
    const dx = t.map((value, j) => value / (lengths[j] as number));
    // A sample of weight 0 pulls at nothing: its residual is of no use here.
    const dr = g.map((value, i) => (roots[i] === 0 ? 0 : value / (roots[i] as number)));
    return {
      size: Math.sqrt(dot(t, t) + dot(g, g)),
      settled: changesNothing(dx, x.hi),
      make: () => {
        addInto(x, dx);
        addInto(r, dr);
      },
    };
  });
  return { x, solutions };
}

/** (AᵀWA)⁻¹, row-major. Beyond 1e5 the Gram matrix has a condition that costs digits even in doubled precision. */
function inverseOf(problem: Problem, factor: Factor): Float64Array {
  const { columns, y, weights, lengths } = problem;
  if (factor.solver === 'cholesky') {
    return inverseBy(factor.upper, lengths, doubledGram(columns, weights));
  }
  const inverse = new Float64Array(columns.length * columns.length);
  columns.forEach((_, j) => {
    const c = Float64Array.from(columns, (_, i) => (i === j ? 1 : 0));
    const { x } = solveAugmented(problem, factor, new Float64Array(y.length), c);
    inverse.set(x.hi, j * columns.length);
  });
  return inverse;
}

/**
 * Solves min Σ w_i (y_i − Σ_j A_ij x_j)² as well as doubles can.
 *
 * Coefficients, standard errors and residuals come out as those of the numbers handed in, rounded: what is left is what
 * rounding the data to doubles did to them. Inputs are read, never kept or written to.
 *
 * @param columns - A, one array a column, k of length n; largest magnitude of each from 1e-40 to 1e40.
 * @param y - Observations, length n, of such magnitudes or all 0.
 * @param options - `weights`.
 * @returns Coefficients and their errors, in units of y over those of the columns.
 * @throws InputError `EMPTY_INPUT`, `LENGTH_MISMATCH`, `NOT_FINITE` or `OUT_OF_RANGE`, path `columns[i][j]` (column i,
 *   sample j), `y[i]` or `weights[i]`; ComputationError `TOO_FEW_SAMPLES` (of positive weight) or, beyond a condition of
 *   1e13, `RANK_DEFICIENT` with `columns`: the two that weigh most in the weakest direction, or one that is all zeros.
 * @example
 * leastSquares([Float64Array.of(1, 1, 1), Float64Array.of(0, 1, 2)], Float64Array.of(1, 3, 8)).coefficients; // [0.5, 3.5]
 * @public
 */
export function leastSquares(
  columns: readonly Float64Array[],
  y: Float64Array,
  options?: LeastSquaresOptions,
): LeastSquares {
  const weights = options?.weights ?? new Float64Array(y.length).fill(1);
  const problem = readProblem(columns, y, weights);
  const count = columns.length;
  const samples = weights.reduce((sum, weight) => sum + (weight > 0 ? 1 : 0), 0);
  if (samples < count) {
    throw new ComputationError(
      'TOO_FEW_SAMPLES',
      `expected ${count} samples or more for ${count} unknowns, got ${samples}`,
      { samples, unknowns: count },
    );
  }
  const factor = factorise(problem);
  const { x, solutions } = solveAugmented(problem, factor, y, new Float64Array(count));
  const residuals = defectOf(y, columns, x, zeroPairs(y.length));
  const degreesOfFreedom = samples - count;
  const pull = timesPairs(weights, { hi: residuals, lo: new Float64Array(y.length) });
  const variance = degreesOfFreedom > 0 ? dotPairs(residuals, pull)[0] / degreesOfFreedom : 0;
  const covariance = inverseOf(problem, factor).map((value, at, inverse) => {
    const [i, j] = [Math.floor(at / count), at % count]; // both halves from one
    return variance * (i > j ? (inverse[j * count + i] as number) : value) + 0; // no -0
  });
  return {
    coefficients: x.hi,
    sigmas: Float64Array.from(columns, (_, j) => Math.sqrt(covariance[j * count + j] as number)),
    covariance,
    residuals,
    residualSigma: Math.sqrt(variance),
    degreesOfFreedom,
    rank: count,
    condition: factor.condition,
    solver: factor.solver,
    refinements: solutions - 1,
  };
}
