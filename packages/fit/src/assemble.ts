/**
 * The result of a fit put together: document, covariance, grounds, warnings.
 * @module
 */
import { documentOf } from './document.js';
import type { LineNoise } from './noise.js';
import { candidatesOf, isOurs } from './problem.js';
import type { Borrowed } from './read-options.js';
import type { RecordSummary } from './record.js';
import type { Solvable } from './solvable.js';
import type { FitOptions, HarmonicFit } from './types.js';
import { warningsOf } from './warnings.js';

/** What a result is made of. */
export interface Ingredients<Residual> {
  readonly options: FitOptions;
  readonly record: RecordSummary;
  readonly borrowed: readonly Borrowed[];
  readonly solved: Solvable;
  readonly solution: Float64Array;
  /** Row-major, of all columns. */
  readonly covariance: Float64Array;
  /** Of the mean level, then of each fitted constituent. */
  readonly noise: readonly LineNoise[];
  readonly residual: Residual;
}

/** Independent samples that the mean is worth; all of them where there is no noise at all. */
export function effectiveSamples(samples: number, variance: number, density: number): number {
  return density > 0 ? Math.min(samples, (samples * variance) / density) : samples;
}

/** Puts a result together. */
export function assemble<Residual extends HarmonicFit['diagnostics']['residual']>(
  parts: Ingredients<Residual>,
): HarmonicFit & { readonly diagnostics: { readonly residual: Residual } } {
  const { options, record, borrowed, solved, solution, covariance, noise, residual } = parts;
  const { design, selection, condition, solver } = solved;
  const count = design.order.length;
  const names = ['meanLevel', ...design.basis.names];
  const asked = isOurs(options) ? [] : selection.taken;
  return {
    constants: documentOf(design, record, options, solution, covariance, noise),
    covariance: { order: design.order, matrix: covariance },
    diagnostics: {
      samples: record.samples,
      missing: record.missing,
      from: record.from,
      to: record.to,
      days: record.days,
      candidates: candidatesOf(selection, borrowed),
      unknowns: count,
      rank: count,
      condition,
      solver,
      residual,
      noise: noise.map(({ density, bins }, i) => ({
        name: names[i] as string,
        sigma: Math.sqrt(density),
        bins,
      })),
      effectiveSamples: effectiveSamples(
        record.samples,
        residual.rms * residual.rms,
        (noise[0] as LineNoise).density,
      ),
    },
    warnings: warningsOf(record, design, condition, noise, asked),
  };
}
