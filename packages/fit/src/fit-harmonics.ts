/**
 * The harmonic fit of a record by least squares: constants, error bars and the grounds for each of them.
 *
 * h(t) = Z₀ + rate·t + Σ steps + Σ f·H·cos(V + u − G) + noise, all in one problem, borrowed constituents inside it.
 * @module
 */
import { type Basis, makeBasis } from '@staithe/basis';
import type { Constituent } from '@staithe/constituents';
import {
  ComputationError,
  type LongWork,
  type Progress,
  type Series,
  toInstant,
} from '@staithe/core';
import { runInSlices, runThrough } from '@staithe/core/long-work';
import { type Design, makeDesign } from './design.js';
import { documentOf, middleOf } from './document.js';
import { covarianceOf, noiseOf } from './errors-of.js';
import type { LineNoise } from './noise.js';
import { residualsOf } from './normal.js';
import { type Borrowed, checkKeys, readBorrowings, readChoice, readSteps } from './read-options.js';
import { type FitRecord, readRecord } from './record.js';
import { select } from './select.js';
import { solvable } from './solvable.js';
import { cholesky, inverseGram, solveScaled } from './solve.js';
import type { Candidate, FitOptions, HarmonicFit } from './types.js';
import { warningsOf } from './warnings.js';

const REFINEMENTS = 2;

/** Whether the choice of constituents is ours. */
function ours({ constituents }: FitOptions): boolean {
  return constituents === undefined || constituents === 'resolvable';
}

function designOf(
  taken: readonly Constituent[],
  borrowed: readonly Borrowed[],
  record: FitRecord,
  options: FitOptions,
): Design {
  const nodalHold = readChoice(options.nodalHold, 'options.nodalHold', [
    'continuous',
    'span-middle',
    'calendar-year',
  ]);
  const nodalModel = options.nodalModel ?? 'potential';
  const basis: Basis = makeBasis({
    constituents: [...taken, ...borrowed.map(({ of }) => of)],
    argumentModel: options.argumentModel,
    nodalModel,
    nodalHold: nodalHold === 'span-middle' ? { heldAt: middleOf(record) } : nodalHold,
    nodalLatitude: nodalModel === 'potential' ? options.place?.latitude : undefined,
    sampling: record.series.sampling,
  });
  const folds = borrowed.map(({ parent, rule }, i) => ({
    child: taken.length + i,
    parent: taken.findIndex(({ name }) => name === parent.name),
    ratio: rule.amplitudeRatio,
    difference: rule.phaseLagDifference,
  }));
  const rateFrom = options.secularRate ? toInstant(middleOf(record)) : undefined;
  return makeDesign(
    basis,
    taken.length,
    folds,
    rateFrom,
    readSteps(options.steps, record.from, record.to),
  );
}

/** Independent samples that the mean is worth; all of them where there is no noise at all. */
function effectiveSamples(samples: number, squares: number, density: number): number {
  return density > 0 ? Math.min(samples, squares / density) : samples;
}

function* fitSteps(series: Series, options: FitOptions): Generator<Progress, HarmonicFit, void> {
  checkKeys(options);
  readChoice(options.weighting, 'options.weighting', ['equal']);
  const errorModel = readChoice(options.errorModel, 'options.errorModel', [
    'residual-spectrum',
    'independent',
  ]);
  const record = readRecord(series);
  const borrowed = readBorrowings(options.borrow);
  const chosen = select(options, record, borrowed);
  const { design, selection, scaled, rhs, condition } = yield* solvable(
    record,
    chosen,
    borrowed,
    ours(options),
    (taken) => designOf(taken, borrowed, record, options),
  );
  const count = design.order.length;
  const factor = cholesky(scaled);
  if (!factor) {
    throw new ComputationError(
      'RANK_DEFICIENT',
      'expected a positive definite Gram matrix, got none',
      { condition },
    );
  }
  const solution = solveScaled(factor, scaled, rhs);
  let last = yield* residualsOf(design, record, solution);
  for (let i = 0; i < REFINEMENTS; i++) {
    const correction = solveScaled(factor, scaled, last.projection);
    correction.forEach((value, k) => {
      solution[k] = (solution[k] as number) + value;
    });
    last = yield* residualsOf(design, record, solution);
  }
  let sum = 0;
  let largestAt = 0;
  last.residuals.forEach((value, i) => {
    if (Number.isNaN(value)) return;
    sum += value * value;
    if (!(Math.abs(value) <= Math.abs(last.residuals[largestAt] as number))) largestAt = i;
  });
  const variance = sum / (record.samples - count);
  const noise = yield* noiseOf(design, record, last.residuals, errorModel, variance);
  const covariance = covarianceOf(design, inverseGram(factor, scaled), noise);
  const names = ['meanLevel', ...design.basis.names];
  return {
    constants: documentOf(design, record, options, solution, covariance, noise),
    covariance: { order: design.order, matrix: covariance },
    residuals: { ...record.series, values: last.residuals },
    diagnostics: {
      samples: record.samples,
      missing: record.values.length - record.samples,
      from: record.from,
      to: record.to,
      days: record.days,
      candidates: [
        ...selection.candidates,
        ...borrowed.map(
          ({ of, parent, rule }): Candidate => ({
            name: of.name,
            decision: 'borrowed',
            reason: `${rule.amplitudeRatio} of ${parent.name}, ${rule.phaseLagDifference}° behind it`,
            beside: parent.name,
          }),
        ),
      ],
      unknowns: count,
      rank: count,
      condition,
      residual: {
        rms: Math.sqrt(sum / record.samples),
        largest: Math.abs(last.residuals[largestAt] as number),
        largestAt: record.times[largestAt] as number,
      },
      noise: noise.map(({ density, bins }, i) => ({
        name: names[i] as string,
        sigma: Math.sqrt(density),
        bins,
      })),
      effectiveSamples: effectiveSamples(record.samples, sum, (noise[0] as LineNoise).density),
    },
    warnings: warningsOf(
      record,
      design,
      condition,
      noise,
      ours(options) ? [] : selection.taken,
      errorModel === 'residual-spectrum',
    ),
  };
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
export function fitHarmonics(series: Series, options: FitOptions = {}): HarmonicFit {
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
): Promise<HarmonicFit> {
  return runInSlices(fitSteps(series, options), options);
}
