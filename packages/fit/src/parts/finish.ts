/**
 * The fit that merged parts amount to. One pass does not know the residual, so its errors are those of white noise, and
 * say so; a second pass gives the rest (residual-pass.ts).
 * @module
 */
import { ComputationError, DAY } from '@staithe/core';
import { runThrough } from '@staithe/core/long-work';
import { assemble } from '../assemble.js';
import { covarianceOf } from '../errors-of.js';
import type { LineNoise } from '../noise.js';
import { allLines } from '../noise-of.js';
import type { Products } from '../normal.js';
import type { Borrowed } from '../read-options.js';
import type { RecordSummary } from '../record.js';
import { checkParted, select } from '../select.js';
import { checkEnough, factored, leaveStill, parentsOf, type Solvable } from '../solvable.js';
import { inverseGram, solveScaled } from '../solve.js';
import type { FitWarning, HarmonicFit } from '../types.js';
import { countRateFrom } from './rate-from.js';
import { checkPlan, type FitPlan, planDesign } from './plan.js';
import { checkSamePlan, type FitPartial } from './partial.js';

/** A fit in parts: what is known after one pass, and what the second one needs. @public */
export interface PartsFit extends HarmonicFit {
  /** What the first pass added up to. */
  readonly firstPass: FitPartial;
  /** Coefficients in the order of the covariance. */
  readonly coefficients: readonly number[];
}

/** Everything that the passes share: the solved problem. */
export interface PartsSolved {
  readonly plan: FitPlan;
  readonly record: RecordSummary;
  readonly borrowed: readonly Borrowed[];
  readonly solved: Solvable;
  readonly solution: Float64Array;
  /** Σ r² by the products. */
  readonly squares: number;
}

/** The record that parts add up to. */
function summaryOf({ samples, missing, lowest, highest, runs }: FitPartial): RecordSummary {
  const [first] = runs;
  const last = runs[runs.length - 1];
  if (samples < 2 || !first || !last) {
    throw new ComputationError(
      'TOO_FEW_SAMPLES',
      `expected 2 samples or more that are not gaps, got ${samples}`,
      { samples, missing },
    );
  }
  if (lowest === highest) {
    throw new ComputationError(
      'NO_TIDE',
      `expected values that change, got ${lowest} at each of ${samples} samples`,
      { samples },
    );
  }
  const step = runs.reduce((most, run) => (run.count > most.count ? run : most)).step;
  const whole = (apart: number): boolean =>
    Math.abs(apart / step - Math.round(apart / step)) <= 1e-3;
  const regular = runs.every((run) => whole(run.step) && whole(run.from - first.from));
  return {
    samples,
    missing,
    from: first.from,
    to: last.to,
    days: (last.to - first.from + step) / DAY,
    cadence: regular ? step : 0,
  };
}

/** Products as a whole matrix. */
function unpacked(packed: readonly number[], size: number): Products {
  const matrix = new Float64Array(size * size);
  for (let i = 0, at = 0; i < size; i++) {
    for (let j = 0; j <= i; j++, at++) {
      matrix[i * size + j] = packed[at] as number;
      matrix[j * size + i] = packed[at] as number;
    }
  }
  return { matrix, size };
}

/** Solves what the parts add up to. */
export function solveParts(plan: FitPlan, partial: FitPartial): PartsSolved {
  checkPlan(plan);
  checkSamePlan('partial.plan', plan.fingerprint, partial.plan);
  const record = summaryOf(partial);
  const { design, borrowed } = planDesign(plan, record);
  const selection = select(plan.options, record, borrowed);
  const { rateFrom, products: sums } = partial;
  const counted = countRateFrom(sums, design, rateFrom, design.rateFrom ?? rateFrom);
  const products = unpacked(counted, design.order.length + 1);
  const choosing = { record, parents: parentsOf(borrowed), ours: false, designFor: () => design };
  const posed = { design, selection, products };
  checkEnough(choosing, posed);
  checkParted(selection.taken, record);
  leaveStill(posed, choosing);
  const solved = runThrough(factored(posed, [], choosing));
  const side = solved.sides[0] as Float64Array;
  const solution = solveScaled(solved.factor, solved.scaled, side);
  const { matrix, size } = products;
  const explained = solution.reduce((sum, value, i) => sum + value * (side[i] as number), 0);
  const squares = Math.max(0, (matrix[size * size - 1] as number) - explained);
  return { plan, record, borrowed, solved, solution, squares };
}

/** What a fit in parts gives, from its coefficients and the noise of its lines. */
export function partsFit(
  { plan, record, borrowed, solved }: PartsSolved,
  solution: Float64Array,
  noise: readonly LineNoise[],
  residual: HarmonicFit['diagnostics']['residual'],
  firstPass: FitPartial,
): PartsFit {
  const covariance = covarianceOf(solved.design, inverseGram(solved.factor, solved.scaled), noise);
  const { options } = plan;
  return {
    ...assemble({ options, record, borrowed, solved, solution, covariance, noise, residual }),
    firstPass,
    coefficients: [...solution],
  };
}

/**
 * The fit that merged parts amount to.
 *
 * @param plan - The plan of all parts.
 * @param partial - Their sum.
 * @returns The fit without residuals. Its errors are `independent`; where the plan asks for the spectrum, the warning
 *   `ERRORS_PROVISIONAL` says that the second pass is still to come.
 * @throws InputError and ComputationError as `fitHarmonics`; `CONFLICT` for parts of another plan.
 * @example
 * const plan = planFit({ constituents: ['M2', 'S2'] });
 * finishFit(plan, accumulate(plan, record)).warnings[0]?.code; // 'ERRORS_PROVISIONAL'
 * @public
 */
export function finishFit(plan: FitPlan, partial: FitPartial): PartsFit {
  const parts = solveParts(plan, partial);
  const { record, solved, solution, squares } = parts;
  const { design } = solved;
  const variance = squares / (record.samples - design.order.length);
  const noise = allLines(design).map(() => ({ density: variance, bins: 0 }));
  const provisional: FitWarning = {
    code: 'ERRORS_PROVISIONAL',
    message: 'errors of white noise: the second pass over the record gives those of its spectrum',
  };
  const residual = { rms: Math.sqrt(squares / record.samples) };
  const fit = partsFit(parts, solution, noise, residual, partial);
  if (plan.options.errorModel === 'independent') return fit;
  return { ...fit, warnings: [...fit.warnings, provisional] };
}
