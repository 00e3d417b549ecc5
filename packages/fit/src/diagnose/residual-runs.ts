/**
 * Runs of one sign in the residual, and how long it remembers itself: noise that is not white makes few and long runs.
 * @module
 */
import { HOUR, type Instant } from '@staithe/core';
import { usualStep } from '../cadence.js';
import type { HarmonicFit } from '../types.js';
import { cellsOf, correlationTime } from './autocorrelation.js';
import { presentOf, residualSeries } from './residual-samples.js';

/** Runs of one sign. @public */
export interface ResidualRuns {
  readonly count: number;
  /** As many runs as independent samples of these signs would make. */
  readonly expected: number;
  /** Samples of the longest run, and its first one. */
  readonly longest: number;
  readonly longestFrom: Instant;
  /** Hours: the integral of the autocorrelation up to its first zero. Half a step for white noise. */
  readonly correlationTime: number;
}

const LONGER = 1.5; // steps: a longer one is a gap and ends a run

/**
 * Counts the runs of one sign in the residual of a fit. A gap ends a run; 0 counts as above.
 *
 * Independent samples, n₁ above and n₂ below, change sign from one to the next with the chance 2·n₁·n₂/(n(n − 1)), so
 * that a whole record has 1 + 2·n₁·n₂/n runs (A. Wald and J. Wolfowitz 1940).
 *
 * @param fit - With residuals.
 * @returns Runs, and the correlation time in hours.
 * @throws InputError `MISSING`, path `fit.residuals`.
 * @example
 * const { count, expected } = residualRuns(fitHarmonics(record, { constituents: ['M2', 'S2', 'K1', 'O1'] }));
 * count < expected; // true
 * @public
 */
export function residualRuns(fit: HarmonicFit): ResidualRuns {
  const { times, values, step } = residualSeries(fit);
  const kept = presentOf(values);
  const own = Float64Array.from(kept, (i) => times[i] as number);
  const usual = step || usualStep(own) || HOUR;
  const isAbove = (k: number): boolean => (values[kept[k] as number] as number) >= 0;
  let above = 0;
  let count = 0;
  let pairs = 0;
  let start = 0;
  let longest = 0;
  let longestFrom = own[0] as number;
  for (let k = 0; k < kept.length; k++) {
    if (isAbove(k)) above++;
    const joined = k > 0 && (own[k] as number) - (own[k - 1] as number) <= LONGER * usual;
    if (joined) pairs++;
    if (!joined || isAbove(k) !== isAbove(k - 1)) {
      count++;
      start = k;
    }
    if (k - start + 1 > longest) {
      longest = k - start + 1;
      longestFrom = own[start] as number;
    }
  }
  const n = kept.length;
  const change = n > 1 ? (2 * above * (n - above)) / (n * (n - 1)) : 0;
  const first = own[0] as number;
  const cells = cellsOf(
    own.map((t) => (t - first) / HOUR),
    Float64Array.from(kept, (i) => values[i] as number),
    usual / HOUR,
  );
  return {
    count,
    expected: n - pairs + pairs * change,
    longest,
    longestFrom,
    correlationTime: correlationTime(cells),
  };
}
