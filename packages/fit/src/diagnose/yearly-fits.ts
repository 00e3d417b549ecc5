/**
 * Fits of single calendar years with one list of constituents: how steady the constants are, and whether their stated
 * errors explain how the years differ.
 * @module
 */
import {
  ComputationError,
  isStaitheError,
  type LongWork,
  type Progress,
  refuse,
  type Series,
} from '@staithe/core';
import { runInSlices, runThrough } from '@staithe/core/long-work';
import { fitSteps } from '../fit-harmonics.js';
import { isOurs } from '../problem.js';
import type { FitOptions, HarmonicFit } from '../types.js';
import { type RecordYear, yearsOf } from './calendar-years.js';
import { changesOf, type YearlyChange } from './yearly-changes.js';

/** Options of {@link yearlyFits}. @public */
export interface YearlyOptions extends FitOptions {
  /** Share of its samples that a year must have: above 0 to 1, default 0.8. */
  readonly leastShare?: number | undefined;
}

/** What {@link yearlyFits} gives. @public */
export interface YearlyFits {
  /** In order of time; without residuals. */
  readonly years: readonly {
    readonly year: number;
    readonly samples: number;
    readonly fit: HarmonicFit;
  }[];
  /** One a fitted constituent; empty for a single year. */
  readonly changes: readonly YearlyChange[];
  readonly skipped: readonly { readonly year: number; readonly reason: string }[];
}

const LEAST_SHARE = 0.8;

function readShare(share: number | undefined): number {
  const least = share ?? LEAST_SHARE;
  if (!(least > 0 && least <= 1)) {
    refuse('OUT_OF_RANGE', 'options.leastShare', 'a share above 0, up to 1', least);
  }
  return least;
}

/** One list for all years: the caller's, or what the year with the fewest samples can hold. */
function* listFor(
  years: readonly RecordYear[],
  options: FitOptions,
): Generator<Progress, FitOptions['constituents'], void> {
  if (!isOurs(options)) return options.constituents;
  const fewest = years.reduce((least, one) => (one.share < least.share ? one : least));
  const { constants } = yield* fitSteps(fewest.series, fewest.options);
  return constants.constituents.flatMap(({ name, standing }) =>
    standing === 'borrowed' ? [] : [name],
  );
}

function* steps(
  series: Series,
  { leastShare, ...options }: YearlyOptions & LongWork,
): Generator<Progress, YearlyFits, void> {
  const least = readShare(leastShare);
  const all = yearsOf(series, options);
  const enough = all.filter(({ share }) => share >= least);
  const skipped = all
    .filter(({ share }) => share < least)
    .map(({ year, share }) => ({
      year,
      reason: `has ${(100 * share).toFixed(1)} % of its samples, fewer than ${(100 * least).toFixed(1)} %`,
    }));
  if (enough.length === 0) {
    const text = `expected a calendar year with ${(100 * least).toFixed(1)} % of its samples, got none`;
    throw new ComputationError('TOO_FEW_SAMPLES', text, { years: skipped });
  }
  const constituents = yield* listFor(enough, options);
  const years: YearlyFits['years'][number][] = [];
  for (const { year, samples, ...one } of enough) {
    try {
      const whole = yield* fitSteps(one.series, { ...one.options, constituents });
      years.push({ year, samples, fit: { ...whole, residuals: undefined } });
    } catch (error) {
      // What the samples of one year do not allow is no reason to refuse the others.
      if (!isStaitheError(error) || !(error instanceof ComputationError)) throw error;
      skipped.push({ year, reason: error.message });
    }
    yield { done: years.length, total: enough.length, stage: 'years' };
  }
  skipped.sort((a, b) => a.year - b.year);
  return { years, changes: changesOf(years), skipped };
}

/**
 * Fits each calendar year of UTC on its own, with one list of constituents, and says how the years differ.
 *
 * The list is the caller's, or what the year with the fewest samples can hold. Points H·e^{iG} are compared with their
 * mean over the years: the scatter, the errors that the fits state, and χ² of the one by the other.
 *
 * @param series - Metres; NaN is a gap.
 * @param options - As of `fitHarmonics` without `sideLines`, and the share of its samples that a year must have.
 * @returns Fits, changes a constituent, years left out with the reason.
 * @throws As `fitHarmonics`; `OUT_OF_RANGE`, path `options.leastShare`; ComputationError `TOO_FEW_SAMPLES` where no year
 *   has enough samples.
 * @example
 * const { years, skipped } = yearlyFits(record, { constituents: ['M2', 'S2'], leastShare: 0.1 });
 * `${years[0]?.year} ${years[0]?.samples} ${skipped.length}`; // '2024 1440 0'
 * @public
 */
export function yearlyFits(series: Series, options: YearlyOptions = {}): YearlyFits {
  return runThrough(steps(series, options));
}

/**
 * {@link yearlyFits} in slices: shows its progress, can be aborted, never blocks the host for long.
 *
 * @param series - As there.
 * @param options - As there, and signal and progress.
 * @returns The same; rejects with `signal.reason` after an abort.
 * @throws As there, by rejection.
 * @example
 * (await yearlyFitsAsync(record, { constituents: ['M2'], leastShare: 0.1 })).changes.length; // 0
 * @public
 */
export function yearlyFitsAsync(
  series: Series,
  options: YearlyOptions & LongWork = {},
): Promise<YearlyFits> {
  return runInSlices(steps(series, options), options);
}
