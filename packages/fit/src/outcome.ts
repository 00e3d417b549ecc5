/**
 * What a fit gives, from the coefficients that were found: errors, document, grounds.
 * @module
 */
import type { Progress } from '@staithe/core';
import { assemble } from './assemble.js';
import type { CovariateColumn } from './covariates.js';
import { headCount } from './design.js';
import { covarianceOf } from './errors-of.js';
import type { Estimate } from './estimate.js';
import type { LineNoise } from './noise.js';
import { allLines, lineNoiseOf, whiteOf } from './noise-of.js';
import type { Problem } from './problem.js';
import { readCurve, readRedraw } from './read-options.js';
import type { FitRecord } from './record.js';
import { redrawnCovariance } from './redrawn.js';
import type { Rows } from './rows.js';
import { type PairReader, sideLineResults } from './side-lines.js';
import { inverseGram } from './solve.js';
import type { CovariateResult, RecordFit, ResistantWeights } from './types.js';

/** Size of a residual. */
export function residualSize(
  residual: Float64Array,
  times: Float64Array,
): RecordFit['diagnostics']['residual'] {
  let sum = 0;
  let samples = 0;
  let largestAt = -1;
  residual.forEach((value, i) => {
    if (Number.isNaN(value)) return;
    sum += value * value;
    samples++;
    if (!(Math.abs(value) <= Math.abs(residual[largestAt] ?? 0)) || largestAt < 0) largestAt = i;
  });
  return {
    rms: Math.sqrt(sum / samples),
    largest: Math.abs(residual[largestAt] as number),
    largestAt: times[largestAt] as number,
  };
}

export function covariateResults(
  columns: readonly CovariateColumn[],
  first: number,
  solution: Float64Array,
  covariance: Float64Array,
): CovariateResult[] {
  return columns.map(({ name, lag, reference }, i) => ({
    name,
    lag,
    coefficient: solution[first + i] as number,
    sigma: Math.sqrt(covariance[(first + i) * (solution.length + 1)] as number),
    reference,
  }));
}

/** The weights of a resistant fit, as they are shown. */
export function weightsOf(
  { options }: Problem,
  { resistant }: Estimate,
): ResistantWeights | undefined {
  const curve = readCurve(options);
  if (!resistant || !curve) return undefined;
  const { scales } = resistant;
  const trust = resistant.shown ?? resistant.trust;
  const count = (under: (w: number) => boolean): number =>
    trust.reduce((n, w) => (under(w) ? n + 1 : n), 0);
  return {
    ...curve,
    weights: trust,
    scale: scales[0] as number,
    doubted: count((w) => w < 0.5),
    setAside: count((w) => w === 0),
  };
}

/** Reads coefficients and their mean variance by the name of the constituent. */
export function pairReader({ solved, solutions }: Estimate, covariance: Float64Array): PairReader {
  const { order } = solved.design;
  const solution = solutions[0] as Float64Array;
  return (name) => {
    const at = order.indexOf(`${name}.cos`);
    const variance = (k: number): number => covariance[k * (order.length + 1)] as number;
    const [a, b] = [solution[at] as number, solution[at + 1] as number];
    return { a, b, variance: (variance(at) + variance(at + 1)) / 2 };
  };
}

/** The outcome for a record of heights. */
export function* outcome(
  problem: Problem,
  record: FitRecord,
  found: Estimate,
): Generator<Progress, RecordFit, void> {
  const { options, borrowed, covariates, freed } = problem;
  const { solved, resistant } = found;
  const { design, factor, scaled } = solved;
  const count = design.order.length;
  const rows = found.blocks[0] as Rows;
  const solution = found.solutions[0] as Float64Array;
  const residual = (found.residuals[0] as readonly Float64Array[])[0] as Float64Array;
  const white = whiteOf(rows, residual, count, resistant);
  const redraw = readRedraw(options, record.step > 0);
  const spectral = options.errorModel !== 'independent';
  const noise: LineNoise[] = spectral
    ? yield* lineNoiseOf(design, rows, residual, white, allLines(design), resistant)
    : allLines(design).map(() => ({ density: white, bins: 0 }));
  const inverse = inverseGram(factor, scaled);
  const covariance = redraw
    ? yield* redrawnCovariance(found, redraw, noise)
    : covarianceOf(design, inverse, noise);
  const weights = weightsOf(problem, found);
  const shown = found.observed?.[0] ?? residual;
  const first = headCount(design) - design.given;
  return {
    ...assemble({
      options,
      record,
      borrowed,
      solved,
      solution,
      covariance,
      noise,
      residual: residualSize(shown, record.times),
    }),
    residuals: { ...record.series, values: shown },
    ...(covariates.length > 0
      ? { covariates: covariateResults(covariates, first, solution, covariance) }
      : {}),
    ...(freed.length > 0
      ? { sideLines: sideLineResults(freed, pairReader(found, covariance)) }
      : {}),
    ...(weights ? { resistant: weights } : {}),
  };
}
