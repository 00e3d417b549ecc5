/**
 * The second pass over a record in parts: what the residual of each chunk adds to the sums of its spectrum, and to one
 * refinement of the coefficients. Which bins are summed follows from the runs of samples that the first pass found.
 * @module
 */
import {
  checkSeries,
  HOUR,
  InputError,
  type Instant,
  type LongWork,
  type Progress,
  type Series,
  seriesTimes,
} from '@staithe/core';
import { runInSlices, runThrough } from '@staithe/core/long-work';
import { densityFrom, sumsAt } from '../noise.js';
import { binsBeside, type NoiseBins } from '../noise-bins.js';
import { lineNoiseFrom, lineSpeeds } from '../noise-of.js';
import { residualsOf } from '../normal.js';
import { solveScaled } from '../solve.js';
import type { HarmonicFit } from '../types.js';
import type { SampleRun } from '../window.js';
import { fingerprintOf } from './fingerprint.js';
import { type PartsFit, partsFit, type PartsSolved, solveParts } from './finish.js';
import { checkSamePlan, type FitPartial } from './partial.js';
import type { FitPlan } from './plan.js';

/** What the residuals of chunks add up to: plain JSON. @public */
export interface ResidualPartial {
  /** Fingerprints of the plan and of the coefficients that the residuals are of. */
  readonly plan: string;
  readonly fit: string;
  readonly samples: number;
  /** Σ r², m². */
  readonly squares: number;
  /** Metres; of no samples 0, at null. */
  readonly largest: number;
  readonly largestAt: Instant | null;
  /** Aᵀr. */
  readonly projection: readonly number[];
  /** Σ r·e^{−iωt} at each bin, real and imaginary part by turns, t from the middle of the record. */
  readonly sums: readonly number[];
}

const SLICE = 32; // bins between two yields

/** The problem that the first pass settled, with the bins of its residual. */
function settled(
  plan: FitPlan,
  fit: PartsFit,
): { parts: PartsSolved; bins: NoiseBins; middle: Instant } {
  const parts = solveParts(plan, fit.firstPass);
  const { record, solved } = parts;
  const middle = (record.from + record.to) / 2;
  const runs = fit.firstPass.runs.map(
    ({ from, to, count, step }): SampleRun => ({
      middle: ((from + to) / 2 - middle) / HOUR,
      count,
      step: step / HOUR,
    }),
  );
  const lines = lineSpeeds(solved.design);
  return { parts, bins: binsBeside(runs, lines.slice(0, solved.design.fitted + 1), lines), middle };
}

function* passSteps(
  plan: FitPlan,
  fit: PartsFit,
  chunk: Series,
): Generator<Progress, ResidualPartial, void> {
  const { parts, bins, middle } = settled(plan, fit);
  const { design } = parts.solved;
  const series = checkSeries(chunk);
  const times = seriesTimes(series);
  const step = series.times ? 0 : series.step;
  const rows = { times, step, sides: [series.values], given: [] };
  const solution = Float64Array.from(fit.coefficients);
  const found = yield* residualsOf(design, rows, [solution]);
  const residual = found.residuals[0] as Float64Array;
  let samples = 0;
  let squares = 0;
  let largest = 0;
  let largestAt: Instant | null = null;
  residual.forEach((r, i) => {
    if (Number.isNaN(r)) return;
    samples++;
    squares += r * r;
    if (largestAt !== null && Math.abs(r) <= largest) return;
    largest = Math.abs(r);
    largestAt = times[i] as number;
  });
  // On a uniform grid a gap weighs nothing: 0 keeps the rotation going.
  const heard = {
    step: step / HOUR,
    hours: times.map((t) => (t - middle) / HOUR),
    values: residual.map((r) => (Number.isNaN(r) ? 0 : r)),
  };
  const sums: number[] = [];
  for (let from = 0; from < bins.speeds.length; from += SLICE) {
    sums.push(...sumsAt(heard, bins.speeds.subarray(from, from + SLICE)));
    yield { done: from, total: bins.speeds.length, stage: 'spectrum of the residual' };
  }
  return {
    plan: plan.fingerprint,
    fit: fingerprintOf(fit.coefficients),
    samples,
    squares,
    largest,
    largestAt,
    projection: [...(found.projections[0] as Float64Array)],
    sums,
  };
}

/**
 * What the residual of a chunk adds to the errors of a fit in parts.
 *
 * @param plan - The plan of the fit.
 * @param fit - Of `finishFit`: all chunks of the first pass.
 * @param chunk - One of the same chunks, or the record cut in another way.
 * @returns Plain JSON, to be merged.
 * @throws InputError of `checkSeries`; `CONFLICT` for a fit of another plan.
 * @example
 * const plan = planFit({ constituents: ['M2', 'S2'] });
 * residualPass(plan, finishFit(plan, accumulate(plan, record)), record).samples; // 1440
 * @public
 */
export function residualPass(plan: FitPlan, fit: PartsFit, chunk: Series): ResidualPartial {
  return runThrough(passSteps(plan, fit, chunk));
}

/**
 * {@link residualPass} in slices.
 *
 * @param plan - As there.
 * @param fit - As there.
 * @param chunk - As there.
 * @param work - Signal and progress.
 * @returns The same; rejects with `signal.reason` after an abort.
 * @throws As there, by rejection.
 * @example
 * const plan = planFit({ constituents: ['M2', 'S2'] });
 * (await residualPassAsync(plan, finishFit(plan, accumulate(plan, record)), record)).samples; // 1440
 * @public
 */
export function residualPassAsync(
  plan: FitPlan,
  fit: PartsFit,
  chunk: Series,
  work: LongWork = {},
): Promise<ResidualPartial> {
  return runInSlices(passSteps(plan, fit, chunk), work);
}

const added = (a: readonly number[], b: readonly number[]): number[] =>
  a.map((value, i) => value + (b[i] as number));

/**
 * The sum of two parts of a second pass.
 *
 * @param a - Of `residualPass` or of this function.
 * @param b - Likewise, of the same plan and fit.
 * @returns Plain JSON.
 * @throws InputError `CONFLICT` for parts of another plan or fit.
 * @example
 * const plan = planFit({ constituents: ['M2', 'S2'] });
 * const part = residualPass(plan, finishFit(plan, accumulate(plan, record)), record);
 * mergeResidualPartials(part, part).samples; // 2880
 * @public
 */
export function mergeResidualPartials(a: ResidualPartial, b: ResidualPartial): ResidualPartial {
  checkSamePlan('b.plan', a.plan, b.plan);
  checkSameFit('b.fit', a.fit, b.fit);
  const larger = b.largestAt !== null && (a.largestAt === null || b.largest > a.largest) ? b : a;
  return {
    plan: a.plan,
    fit: a.fit,
    samples: a.samples + b.samples,
    squares: a.squares + b.squares,
    largest: larger.largest,
    largestAt: larger.largestAt,
    projection: added(a.projection, b.projection),
    sums: added(a.sums, b.sums),
  };
}

function checkSameFit(path: string, expected: string, got: string): void {
  if (expected === got) return;
  throw new InputError(
    'CONFLICT',
    path,
    `expected residuals of fit ${expected}, got those of ${got}`,
  );
}

function checkWhole(expected: FitPartial, { samples }: ResidualPartial): void {
  if (samples === expected.samples) return;
  const text = `expected the ${expected.samples} samples of the first pass, got ${samples}`;
  throw new InputError('MISSING', 'partial.samples', text);
}

/**
 * The fit with the errors that its residual shows, and its coefficients refined once.
 *
 * @param plan - The plan of the fit.
 * @param fit - Of `finishFit`.
 * @param partial - The sum of the second pass, over all samples of the first.
 * @returns The fit as `fitHarmonics` gives it, without residuals.
 * @throws InputError `CONFLICT` for parts of another plan or fit; `MISSING` where samples of the first pass were not seen, or
 *   seen twice, path `partial.samples`.
 * @example
 * const plan = planFit({ constituents: ['M2', 'S2'] });
 * const fit = finishFit(plan, accumulate(plan, record));
 * finishErrors(plan, fit, residualPass(plan, fit, record)).diagnostics.noise[1]?.name; // 'M2'
 * @public
 */
export function finishErrors(plan: FitPlan, fit: PartsFit, partial: ResidualPartial): PartsFit {
  checkSamePlan('partial.plan', plan.fingerprint, partial.plan);
  checkSameFit('partial.fit', fingerprintOf(fit.coefficients), partial.fit);
  checkWhole(fit.firstPass, partial);
  const { parts, bins } = settled(plan, fit);
  const { record, solved } = parts;
  const projection = Float64Array.from(partial.projection);
  const correction = solveScaled(solved.factor, solved.scaled, projection);
  const solution = correction.map((value, i) => value + (fit.coefficients[i] as number));
  const { samples, squares, largest, largestAt } = partial;
  const white = squares / (samples - solution.length);
  const sums = Float64Array.from(partial.sums);
  const noise = lineNoiseFrom(densityFrom(bins, sums, samples), white, undefined);
  const residual: HarmonicFit['diagnostics']['residual'] = {
    rms: Math.sqrt(squares / samples),
    ...(largestAt === null ? {} : { largest, largestAt }),
  };
  const spectral = plan.options.errorModel !== 'independent';
  const own = spectral ? noise : noise.map(() => ({ density: white, bins: 0 }));
  return partsFit({ ...parts, record }, solution, own, residual, fit.firstPass);
}
