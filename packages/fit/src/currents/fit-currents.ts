/**
 * The fit of currents: both components in one call, with the same constituents, weights and gaps.
 * @module
 */
import { type HarmonicConstant, type LongWork, type Progress, refuse } from '@staithe/core';
import { runInSlices, runThrough } from '@staithe/core/long-work';
import { readCovariates } from '../covariates.js';
import { type Design, headCount } from '../design.js';
import { constantsOf, modelsOf, packed, originOf } from '../document.js';
import type { Coherence } from '../coherence.js';
import { covarianceOf } from '../errors-of.js';
import { type Estimate, estimate } from '../estimate.js';
import type { LineNoise } from '../noise.js';
import { allLines, coherenceOf, lineNoiseOf, whiteOf } from '../noise-of.js';
import { covariateResults, residualSize, weightsOf } from '../outcome.js';
import { principalAxis } from '../principal-axis.js';
import { candidatesOf, isOurs, pose } from '../problem.js';
import { checkKeys, readChoice, readCurve } from '../read-options.js';
import type { FitRecord } from '../record.js';
import { type Rows, rowsOf } from '../rows.js';
import { inverseGram } from '../solve.js';
import { effectiveSamples } from '../assemble.js';
import { warningsOf } from '../warnings.js';
import { jointCovariance, jointOrder } from './covariance.js';
import { ellipsesOf } from './ellipses-of.js';
import { type CurrentRecord, readCurrents } from './record.js';
import type { CurrentFit, CurrentFitOptions } from './types.js';

const HEIGHTS_ONLY = ['secularRate', 'steps', 'datum', 'sideLines', 'redraw'];

function* currentSteps(
  input: CurrentRecord,
  options: CurrentFitOptions,
): Generator<Progress, CurrentFit, void> {
  checkKeys(options);
  for (const key of HEIGHTS_ONLY) {
    if (Object.hasOwn(options, key)) {
      const got = (options as Record<string, unknown>)[key];
      if (got !== undefined) refuse('CONFLICT', `options.${key}`, 'nothing for currents', got);
    }
  }
  readCurve(options);
  const errorModel = readChoice(options.errorModel, 'options.errorModel', [
    'residual-spectrum',
    'independent',
  ]);
  const record = readCurrents(input, options.weights);
  const covariates = readCovariates(options.covariates, record.east);
  const problem = pose(options, record.east, covariates.columns, record.east.series.sampling);
  const base = rowsOf(record.east, covariates.values);
  const found = yield* estimate(problem, [
    { ...base, sides: [record.east.values, record.north.values] },
  ]);
  const { solved, solutions, resistant } = found;
  const { design, selection, condition, solver } = solved;
  const rows = found.blocks[0] as Rows;
  const residuals = found.residuals[0] as readonly Float64Array[];
  const inverse = inverseGram(solved.factor, solved.scaled);
  const count = design.order.length;
  const sides: Side[] = [];
  for (const [k, own] of [record.east, record.north].entries()) {
    const residual = residuals[k] as Float64Array;
    const white = whiteOf(rows, residual, count, resistant);
    const noise: LineNoise[] =
      errorModel === 'independent'
        ? allLines(design).map(() => ({ density: white, bins: 0 }))
        : yield* lineNoiseOf(design, rows, residual, white, allLines(design), resistant);
    const solution = solutions[k] as Float64Array;
    const covariance = covarianceOf(design, inverse, noise);
    const constants = constantsOf(design, solution, covariance, noise);
    const shown = found.observed?.[k] ?? residual;
    sides.push({ own, residual, shown, noise, solution, covariance, constants });
  }
  const [east, north] = sides as [Side, Side];
  const coherence =
    errorModel === 'independent'
      ? whiteCoherence(design, east.residual, north.residual)
      : yield* coherenceOf(design, rows, [east.residual, north.residual]);
  const order = jointOrder(design);
  const joint = jointCovariance(
    design,
    inverse,
    [east.covariance, north.covariance],
    [east.noise, north.noise],
    coherence,
  );
  const names = ['mean', ...design.basis.names];
  const sideDiagnostics = (side: Side): CurrentFit['diagnostics']['east'] => {
    const residual = residualSize(side.shown, side.own.times);
    const { density } = side.noise[0] as LineNoise;
    return {
      residual,
      noise: side.noise.map((one, i) => ({
        name: names[i] as string,
        sigma: Math.sqrt(one.density),
        bins: one.bins,
      })),
      effectiveSamples: effectiveSamples(side.own.samples, residual.rms * residual.rms, density),
    };
  };
  const { place } = options;
  const weights = weightsOf(problem, found);
  const first = headCount(design) - design.given;
  const { samples, missing, from, to, days } = record.east;
  return {
    constants: {
      format: 'staithe-constants',
      version: 1,
      quantity: 'current',
      unit: 'm/s',
      ...(place ? { place } : {}),
      mean: { east: east.solution[0] as number, north: north.solution[0] as number },
      ...modelsOf(options, record.east),
      east: east.constants,
      north: north.constants,
      uncertainty: { order, covariance: packed(joint, order.length) },
      ...originOf(options, record.east),
    },
    ellipses: ellipsesOf(design, east.constants, north.constants, joint, order),
    principalAxis: principalAxis(record.east.values, record.north.values),
    covariance: { order, matrix: joint },
    residuals: {
      east: { ...record.east.series, values: east.shown },
      north: { ...record.north.series, values: north.shown },
    },
    ...(covariates.columns.length > 0
      ? {
          covariates: {
            east: covariateResults(covariates.columns, first, east.solution, east.covariance),
            north: covariateResults(covariates.columns, first, north.solution, north.covariance),
          },
        }
      : {}),
    ...(weights ? { resistant: { ...weights, scale: scalesOf(found) } } : {}),
    diagnostics: {
      samples,
      missing,
      from,
      to,
      days,
      candidates: candidatesOf(selection, problem.borrowed),
      unknowns: count,
      rank: count,
      condition,
      solver,
      east: sideDiagnostics(east),
      north: sideDiagnostics(north),
    },
    warnings: warningsOf(
      record.east,
      design,
      condition,
      east.noise,
      isOurs(options) ? [] : selection.taken,
    ),
  };
}

/** Scales of a resistant fit, by component. */
function scalesOf({ resistant }: Estimate): { east: number; north: number } {
  const [east, north] = (resistant?.scales ?? []) as [number, number];
  return { east, north };
}

/** One component of what was found. */
interface Side {
  readonly own: FitRecord;
  readonly residual: Float64Array;
  /** As observed. */
  readonly shown: Float64Array;
  readonly noise: readonly LineNoise[];
  readonly solution: Float64Array;
  readonly covariance: Float64Array;
  readonly constants: readonly HarmonicConstant[];
}

/** Of white noise: the same at each line, in phase. */
function whiteCoherence(design: Design, east: Float64Array, north: Float64Array): Coherence[] {
  const sum = (a: Float64Array, b: Float64Array): number =>
    a.reduce(
      (total, value, i) => (Number.isNaN(value) ? total : total + value * (b[i] as number)),
      0,
    );
  const root = Math.sqrt(sum(east, east) * sum(north, north));
  const re = root > 0 ? sum(east, north) / root : 0;
  return allLines(design).map(() => ({ re, im: 0 }));
}

/**
 * Fits tidal currents: both components at once, with ellipses.
 *
 * @param record - Metres per second: `east` and `north` at the same times, or `pairs`. NaN in either is a gap of both.
 * @param options - As of `fitHarmonics`, without datum, steps, rate, side-lines and redrawing.
 * @returns Constants of both components, ellipses with errors, covariance, residuals, grounds.
 * @throws InputError as `fitHarmonics`, path `east…`, `north…` or `pairs`; ComputationError likewise.
 * @example
 * fitCurrents({ east: record, north: record }, { constituents: ['M2', 'S2'] }).ellipses[0]?.bearing; // 45
 * @public
 */
export function fitCurrents(record: CurrentRecord, options: CurrentFitOptions = {}): CurrentFit {
  return runThrough(currentSteps(record, options));
}

/**
 * {@link fitCurrents} in slices.
 *
 * @param record - As there.
 * @param options - As there, and signal and progress.
 * @returns The same; rejects with `signal.reason` after an abort.
 * @throws As there, by rejection.
 * @example
 * (await fitCurrentsAsync({ east: record, north: record }, { constituents: ['M2', 'S2'] })).ellipses.length; // 2
 * @public
 */
export function fitCurrentsAsync(
  record: CurrentRecord,
  options: CurrentFitOptions & LongWork = {},
): Promise<CurrentFit> {
  return runInSlices(currentSteps(record, options), options);
}
