/**
 * Weights that gross errors cannot pull at: iteratively reweighted least squares (P. Huber 1964; A. Beaton and J. Tukey 1974).
 *
 * First Huber's curve, whose criterion has one minimum, with the scale found anew at each turn: from there the answer does
 * not hang on the start. Then the curve that was asked for, with that scale held. Residuals are counted in scales,
 * 1.4826 times their median size, over √(1 − leverage): a sample that pulls the curve to itself leaves a residual too
 * small, and must not gain trust by it.
 * @module
 */
import { TILE } from '@staithe/basis/kernels';
import { ComputationError, type Progress } from '@staithe/core';
import { columnsBuffer, type Design, designTiles } from './design.js';
import { normalEquations, residualsOf } from './normal.js';
import type { Rows } from './rows.js';
import { cholesky, type Scaled, scaleGram, solveScaled } from './solve.js';

/** The curve of the weights and where it turns down, in scales of the residual. */
export interface Curve {
  readonly curve: 'huber' | 'biweight';
  readonly cutoff: number;
}

/** Weights found for rows. */
export interface Resistant {
  /** From 0 to 1 for each time (NaN where no sample takes part); 1: as good as any. */
  readonly trust: Float64Array;
  /** What is told of each sample: the least that it was trusted, before it was put back where its neighbours say. */
  readonly shown?: Float64Array | undefined;
  /** Of each right-hand side, metres: 1.4826 times the median size of its residuals. */
  readonly scales: readonly number[];
  /** (mean w / mean ψ′)²: what the curve adds to the variance of a coefficient (P. Huber 1981, ch. 7). */
  readonly inflation: number;
}

const START: Curve = { curve: 'huber', cutoff: 1.345 };
const MAD = 1.482602218505602; // of a normal distribution: 1 / its third quartile
const SMALLEST_SCALE = 1e-9; // m: below, the record is free of noise
const SMALLEST_SHARE = 1e-3; // of a residual's variance that its leverage may leave
const MOST_TURNS = 60;
// Scales by which no coefficient moves any more: near enough for a start, and at the end.
const NEAR = 0.03;
const SETTLED = 1e-4;

/**
 * The default cutoffs: Huber's for 95 % efficiency (common practice); the biweight's so wide that storms keep most of their
 * weight, since weather is no gross error, and what stands out by decimetres keeps none.
 */
export function usualCutoff(curve: Curve['curve']): number {
  return curve === 'huber' ? 1.345 : 8;
}

function weightOf({ curve, cutoff }: Curve, size: number): number {
  if (curve === 'huber') return size <= cutoff ? 1 : cutoff / size;
  if (size >= cutoff) return 0;
  const left = 1 - (size / cutoff) * (size / cutoff);
  return left * left;
}

/** ψ′ = (w·u)′. */
function slopeOf({ curve, cutoff }: Curve, size: number): number {
  if (curve === 'huber') return size <= cutoff ? 1 : 0;
  if (size >= cutoff) return 0;
  const x = (size / cutoff) * (size / cutoff);
  return (1 - x) * (1 - 5 * x);
}

/** √(1 − h) of each row, h its leverage: what of its own noise is left in its residual. */
function* sharesLeft(
  design: Design,
  rows: Rows,
  { lengths, count }: Scaled,
  factor: Float64Array,
): Generator<Progress, Float64Array, void> {
  const columns = columnsBuffer(design);
  const out = new Float64Array(rows.times.length).fill(1);
  const x = new Float64Array(count);
  let done = 0;
  for (const { indices, n } of designTiles(design, rows, columns)) {
    for (let i = 0; i < n; i++) {
      const index = indices[i] as number;
      let leverage = 0;
      for (let k = 0; k < count; k++) {
        let sum = (columns[k * TILE + i] as number) / (lengths[k] as number);
        for (let j = 0; j < k; j++) sum -= (factor[k * count + j] as number) * (x[j] as number);
        const value = sum / (factor[k * count + k] as number);
        x[k] = value;
        leverage += value * value;
      }
      leverage *= rows.weights?.[index] ?? 1;
      out[index] = Math.sqrt(Math.max(SMALLEST_SHARE, 1 - leverage));
    }
    done += n;
    yield { done, total: rows.times.length, stage: 'leverage' };
  }
  return out;
}

function median(sizes: Float64Array): number {
  const sorted = sizes.filter((size) => !Number.isNaN(size)).sort();
  const half = sorted.length >> 1;
  const upper = sorted[half] as number;
  return sorted.length % 2 ? upper : ((sorted[half - 1] as number) + upper) / 2;
}

/** Coefficients and residuals of each right-hand side. */
interface State {
  readonly solutions: readonly Float64Array[];
  readonly residuals: readonly Float64Array[];
}

/** The rows with trust beside the weights of the caller. */
export function trusted(rows: Rows, trust: Float64Array): Rows {
  const { weights } = rows;
  return { ...rows, weights: weights ? trust.map((t, i) => t * (weights[i] as number)) : trust };
}

/** One turn: solves with the trust that the residuals earn. */
function* turn(design: Design, rows: Rows, trust: Float64Array): Generator<Progress, State, void> {
  const { matrix, size } = yield* normalEquations(design, [trusted(rows, trust)]);
  const count = design.order.length;
  const scaled = scaleGram(matrix, count, size);
  const factor = cholesky(scaled);
  if (!factor) {
    throw new ComputationError(
      'RANK_DEFICIENT',
      'expected enough samples that can be trusted, got too few to tell the columns apart',
      { unknowns: count },
    );
  }
  const solutions = rows.sides.map((_, k) => {
    const at = (count + k) * size;
    return solveScaled(factor, scaled, matrix.slice(at, at + count));
  });
  return { solutions, residuals: (yield* residualsOf(design, rows, solutions)).residuals };
}

/**
 * @param design - Of the fit.
 * @param rows - Weights of the caller stand beside those found here. A time is trusted as its worst component earns.
 * @param start - The fit with the rows as they are.
 * @param scaled - Gram matrix of the rows as they are.
 * @param factor - Its factor.
 * @param asked - Curve and cutoff.
 */
export function* resistantWeights(
  design: Design,
  rows: Rows,
  start: State,
  scaled: Scaled,
  factor: Float64Array,
  asked: Curve,
): Generator<Progress, Resistant, void> {
  const left = yield* sharesLeft(design, rows, scaled, factor);
  const own = left.map((share, i) => Math.sqrt(rows.weights?.[i] ?? 1) / share);
  let state = start;
  let scales: number[] = [];
  const sizes = (): Float64Array =>
    own.map((weight, i) =>
      state.residuals.reduce((most, residual, k) => {
        const size = (Math.abs(residual[i] as number) * weight) / (scales[k] as number);
        return size <= most ? most : size;
      }, 0),
    );
  const settle = function* (curve: Curve, free: boolean): Generator<Progress, Float64Array, void> {
    const still = free ? NEAR : SETTLED;
    let trust = new Float64Array(0);
    for (let k = 0; k < MOST_TURNS; k++) {
      if (free) {
        scales = state.residuals.map((residual) => {
          const scale = MAD * median(residual.map((r, i) => Math.abs(r) * (own[i] as number)));
          return Math.max(SMALLEST_SCALE, scale);
        });
      }
      trust = sizes().map((size) => weightOf(curve, size));
      const next = yield* turn(design, rows, trust);
      const settled = next.solutions.every((solution, side) =>
        solution.every((value, i) => {
          const before = (state.solutions[side] as Float64Array)[i] as number;
          return Math.abs(value - before) <= still * (scales[side] as number);
        }),
      );
      state = next;
      if (settled) break;
    }
    return trust;
  };
  yield* settle(START, true);
  const trust = yield* settle(asked, false);
  let w = 0;
  let slope = 0;
  for (const size of sizes()) {
    if (Number.isNaN(size)) continue;
    w += weightOf(asked, size);
    slope += slopeOf(asked, size);
  }
  return { trust, scales, inflation: slope > 0 ? (w / slope) * (w / slope) : 1 };
}
