/**
 * A clock that drifts: all species of the tide move in phase together, in proportion to their speed.
 *
 * y(t) = h(t + x·Δ) ≈ h(t) + Δ·x·h′(t), x from −1/2 to +1/2 over the record. The slopes of the species, times x, stand beside
 * the usual columns and the annual side-bands of M2, H1 and H2, which look like a drift where the season changes M2.
 * @module
 */
import {
  ComputationError,
  degreesToRadians,
  HOUR,
  isStaitheError,
  type LongWork,
  type NodalModel,
  type Progress,
  type Series,
} from '@staithe/core';
import { runInSlices, runThrough } from '@staithe/core/long-work';
import { constituent } from '@staithe/constituents';
import { nodalPlan } from '@staithe/nodal';
import { shownSpeed } from '../cadence.js';
import { readCovariates } from '../covariates.js';
import { type Estimate, estimate } from '../estimate.js';
import { whiteOf } from '../noise-of.js';
import { pose, type Problem } from '../problem.js';
import { checkKeys, readCurve, readRedraw } from '../read-options.js';
import { type FitRecord, readRecord } from '../record.js';
import { trusted } from '../resistant.js';
import { type Rows, rowsOf } from '../rows.js';
import { cholesky, inverseGram, type Scaled, scaleGram, solveScaled } from '../solve.js';
import type { FitOptions } from '../types.js';
import { type DriftColumn, driftColumns } from './drift-columns.js';
import { densitiesUnder } from './drift-noise.js';
import { type ClockDrift, joinSpecies, type SpeciesDrift } from './drift-verdict.js';

const SEASONAL = ['H1', 'H2'];
const LEAST_DAYS = 183; // of half a year: a shorter record cannot part M2 from its annual side-bands

/** The annual side-bands of M2 that a fit does not have yet. */
function sideBands(
  names: readonly string[],
  record: FitRecord,
  nodalModel: NodalModel | undefined,
): string[] {
  if (!names.includes('M2') || record.days < LEAST_DAYS) return [];
  const missing = SEASONAL.filter((name) => !names.includes(name));
  try {
    nodalPlan(missing.map(constituent), nodalModel ?? 'potential');
    return missing;
  } catch (error) {
    if (!isStaitheError(error, 'NO_NODAL_FORMULA')) throw error;
    return [];
  }
}

/** Residual and drift columns with everything else taken out of them, times the roots of the weights. */
function bareOf(found: Estimate): Float64Array[] {
  const { weights } = found.blocks[0] as Rows;
  const bare = found.residuals[0] as readonly Float64Array[];
  if (!weights) return bare.map((values) => Float64Array.from(values));
  return bare.map((values) => values.map((value, i) => value * Math.sqrt(weights[i] as number)));
}

/** Products of the columns and with the residual. */
function gramOf(
  columns: readonly Float64Array[],
  y: Float64Array,
): { gram: Scaled; rhs: Float64Array } {
  const product = (a: Float64Array, b: Float64Array): number =>
    a.reduce((sum, value, i) => (Number.isNaN(value) ? sum : sum + value * (b[i] as number)), 0);
  const count = columns.length;
  const matrix = new Float64Array(count * count);
  columns.forEach((a, i) => {
    for (let j = 0; j <= i; j++) matrix[i * count + j] = product(a, columns[j] as Float64Array);
  });
  return {
    gram: scaleGram(matrix, count, count),
    rhs: Float64Array.from(columns, (a) => product(a, y)),
  };
}

function* speciesDrifts(
  drifting: readonly DriftColumn[],
  found: Estimate,
  record: FitRecord,
): Generator<Progress, SpeciesDrift[], void> {
  const [y, ...columns] = bareOf(found) as [Float64Array, ...Float64Array[]];
  const { gram, rhs } = gramOf(columns, y);
  const factor = cholesky(gram);
  if (!factor) {
    throw new ComputationError(
      'RANK_DEFICIENT',
      'expected a record in which a drift can be told from the tide, got one in which it cannot',
      { species: drifting.map(({ species }) => species) },
    );
  }
  const minutes = solveScaled(factor, gram, rhs);
  const inverse = inverseGram(factor, gram);
  const residual = y.map((value, i) =>
    columns.reduce(
      (left, column, k) => left - (minutes[k] as number) * (column[i] as number),
      value,
    ),
  );
  const { design } = found.solved;
  const lines = Array.from(design.basis.speeds, (speed) =>
    shownSpeed((speed * HOUR) / degreesToRadians(1), record.cadence),
  );
  const bare = { times: record.times, step: record.step, residual, columns };
  const densities = yield* densitiesUnder(bare, [0, ...lines]);
  const rows = { ...(found.blocks[0] as Rows), weights: undefined };
  const white = whiteOf(rows, residual, design.order.length + columns.length, undefined);
  return drifting.map(({ species }, k) => ({
    species,
    minutes: minutes[k] as number,
    sigma: Math.sqrt((densities[k] ?? white) * (inverse[k * (columns.length + 1)] as number)),
  }));
}

/** The same problem with the side-bands, and with the weights that were found before. */
function again(problem: Problem, first: Estimate, record: FitRecord): Problem {
  const names = first.solved.selection.taken.map(({ name }) => name);
  const { options, covariates } = problem;
  const constituents = [...names, ...sideBands(names, record, options.nodalModel)];
  const plain = { ...options, constituents, weighting: undefined, resistant: undefined };
  return pose(plain, record, covariates, record.series.sampling);
}

function* steps(series: Series, options: FitOptions): Generator<Progress, ClockDrift, void> {
  checkKeys(options);
  const record = readRecord(series, options.weights);
  readCurve(options);
  readRedraw(options, record.step > 0);
  const covariates = readCovariates(options.covariates, record);
  const problem = pose(options, record, covariates.columns, record.series.sampling);
  const rows = rowsOf(record, covariates.values);
  const first = yield* estimate(problem, [rows]);
  const drifting = yield* driftColumns(first, record);
  if (drifting.length === 0) {
    throw new ComputationError('NO_TIDE', 'expected a tide beyond its errors, got none', {
      samples: record.samples,
    });
  }
  const second = again(problem, first, record);
  // What is doubted weighs little: put back by its neighbours it would show a drift smaller than it is.
  const trust = first.resistant?.shown;
  const { weights } = trust ? trusted(rows, trust) : rows;
  const sides = [record.values, ...drifting.map(({ values }) => values)];
  const found = yield* estimate(second, [{ ...rows, weights, sides }]);
  const names = found.solved.selection.taken.map(({ name }) => name);
  const species = yield* speciesDrifts(drifting, found, record);
  return { ...joinSpecies(species), annual: SEASONAL.every((name) => names.includes(name)) };
}

/**
 * Looks for a drift of the clock over the whole record.
 *
 * A clock that loses stamps too early: the sample stamped t shows the water of a later time, and high waters come earlier and
 * earlier. That is counted above 0; a clock that gains, below. To first order in the drift: 1 to 2 % at an hour. Gaps do not
 * matter; a fault in part of the record is the business of `checkRecord` (`@staithe/gauge`), whose `clock-off` counts
 * the other way: how much later the stamps are than the truth.
 *
 * The errors come from the residual's spectrum under each species' own (docs/fitting.md). A species whose error is more than
 * three times the smallest does not count. Where those that count scatter more than their errors allow, the error of the mean
 * grows with the scatter.
 *
 * @param series - Metres; NaN is a gap. A year or more; in less than half a year H1 and H2 cannot be fitted.
 * @param options - As of `fitHarmonics`.
 * @returns Minutes over the record from the first to the last sample, for all and for each species.
 * @throws As `fitHarmonics`; ComputationError `NO_TIDE` where no species stands beyond its errors, `RANK_DEFICIENT` where a drift
 *   cannot be told from the tide.
 * @example
 * const { minutes } = clockDrift(record, { constituents: ['M2', 'S2', 'K1', 'O1'], nodalModel: 'none' });
 * Math.abs(minutes) < 0.01; // true
 * @public
 */
export function clockDrift(series: Series, options: FitOptions = {}): ClockDrift {
  return runThrough(steps(series, options));
}

/**
 * {@link clockDrift} in slices: shows its progress, can be aborted, never blocks the host for long.
 *
 * @param series - As there.
 * @param options - As there, and signal and progress.
 * @returns The same; rejects with `signal.reason` after an abort.
 * @throws As there, by rejection.
 * @example
 * (await clockDriftAsync(record, { constituents: ['M2', 'S2', 'K1', 'O1'] })).annual; // false
 * @public
 */
export function clockDriftAsync(
  series: Series,
  options: FitOptions & LongWork = {},
): Promise<ClockDrift> {
  return runInSlices(steps(series, options), options);
}
