/**
 * Many series over the same times: the design is factored once for all that have the same gaps, and they share the passes.
 * @module
 */
import {
  ComputationError,
  type ComputationErrorCode,
  InputError,
  type InstantLike,
  type LongWork,
  type Progress,
  refuse,
  type Sampling,
  sampledSeries,
  type Series,
  uniformSeries,
} from '@staithe/core';
import { runInSlices, runThrough } from '@staithe/core/long-work';
import { assemble } from './assemble.js';
import { readCovariates } from './covariates.js';
import { covarianceOf } from './errors-of.js';
import { allLines, lineNoiseOf, whiteOf } from './noise-of.js';
import { residualsOf } from './normal.js';
import { residualSize } from './outcome.js';
import { pose, type Problem } from './problem.js';
import { checkKeys, readChoice } from './read-options.js';
import { type FitRecord, readRecord } from './record.js';
import { type Rows, rowsOf } from './rows.js';
import { type Solvable, solvable } from './solvable.js';
import { inverseGram, solveScaled } from './solve.js';
import type { FitOptions, HarmonicFit } from './types.js';

/** The times that all cells share. @public */
export type CellGrid = (
  | { readonly start: InstantLike; readonly step: number; readonly count: number }
  | { readonly times: ArrayLike<InstantLike> }
) & { readonly sampling?: Sampling | undefined };

/** One cell of many: its fit, or why there is none. @public */
export interface CellFit {
  /** In the order of the cells. */
  readonly index: number;
  /** Without residuals. */
  readonly fit?: HarmonicFit | undefined;
  /** What its data do not allow: all gaps (land), no tide, too few samples. */
  readonly absent?: { readonly code: ComputationErrorCode; readonly reason: string } | undefined;
}

/** Cells with the same gaps, ready to be solved together. */
interface Pattern {
  readonly present: Uint8Array;
  readonly record: FitRecord;
  readonly problem: Problem;
  readonly rows: Rows;
  readonly solved: Solvable;
  readonly inverse: Float64Array;
}

const BATCH = 32; // cells that share a pass
const TURNS = 2; // the solution from nothing, then one refinement

function seriesOf(grid: CellGrid, values: ArrayLike<number>, index: number): Series {
  const expected = 'times' in grid ? grid.times.length : grid.count;
  if (values.length !== expected) {
    const text = `expected ${expected} numbers, one a time, got ${values.length}`;
    throw new InputError('LENGTH_MISMATCH', `cells[${index}]`, text);
  }
  const { sampling } = grid;
  try {
    return 'times' in grid
      ? sampledSeries({ times: grid.times, values, sampling })
      : uniformSeries({ start: grid.start, step: grid.step, values, sampling });
  } catch (error) {
    if (!(error instanceof InputError) || !error.path.startsWith('values')) throw error;
    const text = error.message.slice(error.path.length + 2);
    throw new InputError(error.code, `cells[${index}].${error.path}`, text, error.details);
  }
}

function samePresence(present: Uint8Array, values: Float64Array): boolean {
  return values.every((value, i) => Number.isNaN(value) !== (present[i] === 1));
}

function* patternOf(record: FitRecord, options: FitOptions): Generator<Progress, Pattern, void> {
  const covariates = readCovariates(options.covariates, record);
  const problem = pose(options, record, covariates.columns, record.series.sampling);
  const rows = rowsOf(record, covariates.values);
  const solved = yield* solvable(problem.selection, [rows], problem.choosing);
  const present = Uint8Array.from(record.values, (value) => (Number.isNaN(value) ? 0 : 1));
  return {
    present,
    record,
    problem,
    rows,
    solved,
    inverse: inverseGram(solved.factor, solved.scaled),
  };
}

/** The fits of some cells with the same gaps. */
function* fitTogether(
  pattern: Pattern,
  cells: readonly { readonly index: number; readonly record: FitRecord }[],
): Generator<Progress, CellFit[], void> {
  const { solved, problem, inverse } = pattern;
  const { design, factor, scaled } = solved;
  const { options, borrowed } = problem;
  const rows = { ...pattern.rows, sides: cells.map(({ record }) => record.values) };
  const solutions = cells.map(() => new Float64Array(design.order.length));
  let last = yield* residualsOf(design, rows, solutions);
  for (let turn = 0; turn < TURNS; turn++) {
    solutions.forEach((solution, k) => {
      const correction = solveScaled(factor, scaled, last.projections[k] as Float64Array);
      correction.forEach((value, i) => {
        solution[i] = (solution[i] as number) + value;
      });
    });
    last = yield* residualsOf(design, rows, solutions);
  }
  const out: CellFit[] = [];
  for (const [k, { index, record }] of cells.entries()) {
    const solution = solutions[k] as Float64Array;
    const residual = last.residuals[k] as Float64Array;
    const white = whiteOf(rows, residual, solution.length, undefined);
    const noise =
      options.errorModel === 'independent'
        ? allLines(design).map(() => ({ density: white, bins: 0 }))
        : yield* lineNoiseOf(design, rows, residual, white, allLines(design), undefined);
    const covariance = covarianceOf(design, inverse, noise);
    const size = residualSize(residual, record.times);
    const parts = { options, record, borrowed, solved, solution, covariance, noise };
    out.push({ index, fit: assemble({ ...parts, residual: size }) });
  }
  return out;
}

/** Takes batches of cells, one after another; remembers the last pattern of gaps and the choice of constituents. */
function makeFitter(
  grid: CellGrid,
  options: FitOptions,
): (cells: readonly ArrayLike<number>[], first: number) => Generator<Progress, CellFit[], void> {
  checkKeys(options);
  readChoice(options.weighting, 'options.weighting', ['equal']);
  readChoice(options.errorModel, 'options.errorModel', ['residual-spectrum', 'independent']);
  if (options.redraw !== undefined) {
    refuse('CONFLICT', 'options.redraw', 'nothing for many cells', 'a redraw');
  }
  let settled = options;
  let pattern: Pattern | undefined;
  return function* (cells, first) {
    const out: CellFit[] = [];
    let group: { index: number; record: FitRecord }[] = [];
    const flush = function* (): Generator<Progress, void, void> {
      if (pattern && group.length > 0) out.push(...(yield* fitTogether(pattern, group)));
      group = [];
    };
    for (const [i, values] of cells.entries()) {
      const index = first + i;
      const series = seriesOf(grid, values, index);
      try {
        const record = readRecord(series, options.weights);
        if (!pattern || !samePresence(pattern.present, record.values)) {
          yield* flush();
          pattern = undefined;
          pattern = yield* patternOf(record, settled);
          // One list for all cells: what the times of the first one can hold.
          settled = {
            ...options,
            constituents: pattern.solved.selection.taken.map(({ name }) => name),
          };
        }
        group.push({ index, record });
      } catch (error) {
        if (!(error instanceof ComputationError)) throw error;
        yield* flush();
        out.push({ index, absent: { code: error.code, reason: error.message } });
      }
    }
    yield* flush();
    return out;
  };
}

/**
 * Fits many series over the same times, such as the cells of a model or of an altimeter's grid.
 *
 * @param grid - The times of all cells, and their sampling.
 * @param cells - Metres, one array a cell with one value a time; NaN is a gap.
 * @param options - As of `fitHarmonics`. `resolvable` chooses once, by the times of the first cell that has data; weighting is
 *   equal, and errors are not redrawn.
 * @returns One result a cell, in order. A cell without enough data has a reason instead of a fit.
 * @throws InputError as `fitHarmonics`; `LENGTH_MISMATCH`, path `cells[i]`.
 * @example
 * const grid = { start: record.start, step: record.step, count: record.values.length };
 * const land = new Float64Array(grid.count).fill(NaN);
 * fitMany(grid, [land, record.values], { constituents: ['M2', 'S2'] }).map(({ absent }) => absent?.code); // ['TOO_FEW_SAMPLES', undefined]
 * @public
 */
export function fitMany(
  grid: CellGrid,
  cells: readonly ArrayLike<number>[],
  options: FitOptions = {},
): CellFit[] {
  const fit = makeFitter(grid, options);
  const out: CellFit[] = [];
  for (let first = 0; first < cells.length; first += BATCH) {
    out.push(...runThrough(fit(cells.slice(first, first + BATCH), first)));
  }
  return out;
}

/**
 * {@link fitMany} for cells that arrive one by one: some are held at a time, results come as they are ready.
 *
 * @param grid - As there.
 * @param cells - Arrays, at hand or to come.
 * @param options - As there, and signal and progress.
 * @returns Results in order; an abort throws `signal.reason`.
 * @throws As there.
 * @example
 * const grid = { start: record.start, step: record.step, count: record.values.length };
 * const names = [];
 * for await (const { fit } of fitManyAsync(grid, [record.values], { constituents: ['M2', 'S2'] })) {
 *   names.push(fit?.constants.constituents[0]?.name);
 * }
 * names; // ['M2']
 * @public
 */
export async function* fitManyAsync(
  grid: CellGrid,
  cells: AsyncIterable<ArrayLike<number>> | Iterable<ArrayLike<number>>,
  options: FitOptions & LongWork = {},
): AsyncGenerator<CellFit, void, void> {
  const fit = makeFitter(grid, options);
  let batch: ArrayLike<number>[] = [];
  let first = 0;
  for await (const cell of cells) {
    batch.push(cell);
    if (batch.length < BATCH) continue;
    yield* await runInSlices(fit(batch, first), options);
    first += batch.length;
    batch = [];
  }
  yield* await runInSlices(fit(batch, first), options);
}
