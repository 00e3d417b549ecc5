/**
 * What the gaps of a record cost: the errors with them over those of the whole grid, gap by gap, and the samples that lean
 * most on the fit.
 * @module
 */
import { TILE } from '@staithe/basis/kernels';
import type { Instant, LongWork, Progress } from '@staithe/core';
import { runInSlices, runThrough } from '@staithe/core/long-work';
import { columnsBuffer, type Design, designTiles } from '../design.js';
import { addProducts, normalEquations, type Products } from '../normal.js';
import { triangularFactor } from '../orthogonal.js';
import type { Rows } from '../rows.js';
import { cholesky, inverseGram, type Scaled, scaleGram } from '../solve.js';
import type { HarmonicFit } from '../types.js';
import { posedAgain } from './design-of-fit.js';
import { type GapTimes, gapsOf } from './gaps-of.js';

/** What a gap costs. @public */
export interface GapCost {
  /** Times of the first and the last missing sample. */
  readonly from: Instant;
  readonly to: Instant;
  /** Missing ones. */
  readonly samples: number;
  /** By which share the errors of the constituents, on average, would be smaller without this gap. */
  readonly relief: number;
}

/** What {@link gapLeverage} gives. @public */
export interface GapLeverage {
  /** σ with the gaps over σ of the whole grid, for noise of the same density. */
  readonly constituents: readonly { readonly name: string; readonly inflation: number }[];
  /** The dearest gaps first, ten at most. */
  readonly gaps: readonly GapCost[];
  /** Largest share, 0 to 1, of its own noise that a sample puts into the curve there; on average unknowns over samples. */
  readonly largestLeverage: number;
  readonly largestLeverageAt: Instant;
}

const SHOWN = 10;

/** Rows at times that have no sample. */
function emptyRows(times: Float64Array): Rows {
  return { times, step: 0, sides: [new Float64Array(times.length)], given: [] };
}

/** A Gram matrix factored. */
interface Factored {
  readonly scaled: Scaled;
  readonly factor: Float64Array;
}

function* factored(
  design: Design,
  { matrix, size }: Products,
  blocks: readonly Rows[],
): Generator<Progress, Factored, void> {
  const scaled = scaleGram(matrix, design.order.length, size);
  const factor = cholesky(scaled) ?? (yield* triangularFactor(design, blocks, scaled.lengths));
  return { scaled, factor };
}

/** Standard errors of the fitted constituents for noise of variance 1. */
function sigmas({ order, fitted, free }: Design, { scaled, factor }: Factored): number[] {
  const inverse = inverseGram(factor, scaled);
  const head = order.length - 2 * fitted;
  const variance = (k: number): number => inverse[k * (order.length + 1)] as number;
  return Array.from({ length: fitted - free }, (_, j) =>
    Math.sqrt((variance(head + 2 * j) + variance(head + 2 * j + 1)) / 2),
  );
}

/** aᵀ(AᵀWA)⁻¹a of each row, times its weight. */
function* leverages(
  design: Design,
  rows: Rows,
  { scaled: { lengths, count }, factor }: Factored,
): Generator<Progress, Float64Array, void> {
  const columns = columnsBuffer(design);
  const out = new Float64Array(rows.times.length);
  const x = new Float64Array(count);
  let done = 0;
  for (const { indices, n } of designTiles(design, rows, columns)) {
    for (let i = 0; i < n; i++) {
      let leverage = 0;
      for (let k = 0; k < count; k++) {
        let sum = (columns[k * TILE + i] as number) / (lengths[k] as number);
        for (let j = 0; j < k; j++) sum -= (factor[k * count + j] as number) * (x[j] as number);
        const value = sum / (factor[k * count + k] as number);
        x[k] = value;
        leverage += value * value;
      }
      const index = indices[i] as number;
      out[index] = leverage * (rows.weights?.[index] ?? 1);
    }
    done += n;
    yield { done, total: rows.times.length, stage: 'leverage' };
  }
  return out;
}

/** All missing times, one gap after another. */
function joined(gaps: readonly GapTimes[]): Float64Array {
  const all = new Float64Array(gaps.reduce((sum, gap) => sum + gap.length, 0));
  let at = 0;
  for (const gap of gaps) {
    all.set(gap, at);
    at += gap.length;
  }
  return all;
}

/** The gaps whose samples would tell most: the sum of what each would lean on the fit as it is. */
function* dearest(
  design: Design,
  gaps: readonly GapTimes[],
  now: Factored,
): Generator<Progress, GapTimes[], void> {
  const lean = yield* leverages(design, emptyRows(joined(gaps)), now);
  let at = 0;
  const sums = gaps.map((times) => {
    const sum = lean.subarray(at, at + times.length).reduce((a, b) => a + b, 0);
    at += times.length;
    return { times, sum };
  });
  return sums
    .sort((a, b) => b.sum - a.sum)
    .slice(0, SHOWN)
    .map(({ times }) => times);
}

function* steps(fit: HarmonicFit): Generator<Progress, GapLeverage, void> {
  const { design, record, rows } = posedAgain(fit);
  const gaps = gapsOf(record);
  const products = yield* normalEquations(design, [rows]);
  const now = yield* factored(design, products, [rows]);
  const own = sigmas(design, now);
  const filledWith = function* (times: Float64Array): Generator<Progress, number[], void> {
    const filled = { ...products, matrix: Float64Array.from(products.matrix) };
    const extra = emptyRows(times);
    yield* addProducts(design, extra, filled);
    return sigmas(design, yield* factored(design, filled, [rows, extra]));
  };
  const whole = gaps.length > 0 ? yield* filledWith(joined(gaps)) : own;
  const costs: GapCost[] = [];
  for (const times of yield* dearest(design, gaps, now)) {
    const filled = yield* filledWith(times);
    const ratio = filled.reduce((sum, sigma, j) => sum + sigma / (own[j] as number), 0);
    costs.push({
      from: times[0] as number,
      to: times[times.length - 1] as number,
      samples: times.length,
      relief: 1 - ratio / filled.length,
    });
    yield { done: costs.length, total: SHOWN, stage: 'gaps' };
  }
  const lean = yield* leverages(design, rows, now);
  const most = lean.reduce((best, value, i) => (value > (lean[best] as number) ? i : best), 0);
  return {
    constituents: own.map((sigma, j) => ({
      name: design.basis.names[j] as string,
      inflation: sigma / (whole[j] as number),
    })),
    gaps: costs.sort((a, b) => b.relief - a.relief),
    largestLeverage: lean[most] as number,
    largestLeverageAt: record.times[most] as number,
  };
}

/**
 * What the gaps of a record cost its fit: how much larger the errors are than those of the whole grid, which gaps cost
 * most, and the largest leverage of a sample.
 *
 * The whole grid is that of a uniform series, or one usual step after another where a list of times leaves more than one
 * and a half of them out. Noise is taken as of the same density with and without gaps, so that only their places count.
 *
 * @param fit - With residuals. Covariates are left out of the account.
 * @returns Inflation of each fitted constituent, 1 or more; the ten dearest gaps.
 * @throws InputError `MISSING`, path `fit.residuals`.
 * @example
 * const gap = record.values.map((h, i) => (i >= 240 && i < 480 ? NaN : h));
 * const fit = fitHarmonics({ ...record, values: gap }, { constituents: ['M2', 'S2'] });
 * gapLeverage(fit).constituents.map(({ name, inflation }) => `${name} ${inflation.toFixed(2)}`); // ['M2 1.10', 'S2 1.10']
 * @public
 */
export function gapLeverage(fit: HarmonicFit): GapLeverage {
  return runThrough(steps(fit));
}

/**
 * {@link gapLeverage} in slices: shows its progress, can be aborted, never blocks the host for long.
 *
 * @param fit - As there.
 * @param work - Signal and progress.
 * @returns The same; rejects with `signal.reason` after an abort.
 * @throws As there, by rejection.
 * @example
 * const fit = fitHarmonics(record, { constituents: ['M2', 'S2'] });
 * (await gapLeverageAsync(fit)).gaps.length; // 0
 * @public
 */
export function gapLeverageAsync(fit: HarmonicFit, work: LongWork = {}): Promise<GapLeverage> {
  return runInSlices(steps(fit), work);
}
