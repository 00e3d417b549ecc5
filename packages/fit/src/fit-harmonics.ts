/**
 * The harmonic fit of a record by least squares: constants, error bars and the grounds for each of them.
 *
 * h(t) = Z₀ + rate·t + Σ steps + Σ f·H·cos(V + u − G) + noise, all in one problem, borrowed constituents inside it.
 * @module
 */
import { type LongWork, type Progress, type Series } from '@staithe/core';
import { runInSlices, runThrough } from '@staithe/core/long-work';
import { readCovariates } from './covariates.js';
import { estimate } from './estimate.js';
import { outcome } from './outcome.js';
import { pose } from './problem.js';
import { checkKeys, checkStepsSeen, readCurve, readRedraw, readSteps } from './read-options.js';
import { readRecord } from './record.js';
import { rowsOf } from './rows.js';
import type { FitOptions, RecordFit } from './types.js';

/** A fit step by step. */
export function* fitSteps(
  series: Series,
  options: FitOptions,
): Generator<Progress, RecordFit, void> {
  checkKeys(options);
  const record = readRecord(series, options.weights);
  readCurve(options);
  readRedraw(options, record.step > 0);
  checkStepsSeen(
    readSteps(options.steps, record.from, record.to),
    record.times,
    (i) => !Number.isNaN(record.values[i]),
  );
  const covariates = readCovariates(options.covariates, record);
  const problem = pose(options, record, covariates.columns, record.series.sampling);
  const found = yield* estimate(problem, [rowsOf(record, covariates.values)]);
  return yield* outcome(problem, record, found);
}

/**
 * Fits harmonic constants to a record.
 *
 * @param series - Metres; NaN is a gap. `sampling`, where stated, is taken into account.
 * @param options - See {@link FitOptions}.
 * @returns Constants with errors, covariance, residuals, diagnostics, warnings.
 * @throws InputError of `checkSeries`, `constituent`, `makeBasis`; `DUPLICATE`, `CONFLICT`, `MISSING`, `OUT_OF_RANGE`,
 *   `UNKNOWN_CHOICE`, `INSEPARABLE` with the path of the option. ComputationError `TOO_FEW_SAMPLES`, `NO_TIDE`, or `RANK_DEFICIENT` with
 *   the pair that cannot be told apart.
 * @example
 * fitHarmonics(record, { constituents: ['M2', 'S2'] }).constants.constituents[0]?.name; // 'M2'
 * @public
 */
export function fitHarmonics(series: Series, options: FitOptions = {}): RecordFit {
  return runThrough(fitSteps(series, options));
}

/**
 * {@link fitHarmonics} in slices: shows its progress, can be aborted, never blocks the host for long.
 *
 * @param series - As there.
 * @param options - As there, and signal and progress.
 * @returns The same; rejects with `signal.reason` after an abort.
 * @throws As there, by rejection.
 * @example
 * (await fitHarmonicsAsync(record, { constituents: ['M2', 'S2'] })).diagnostics.unknowns; // 5
 * @public
 */
export function fitHarmonicsAsync(
  series: Series,
  options: FitOptions & LongWork = {},
): Promise<RecordFit> {
  return runInSlices(fitSteps(series, options), options);
}
