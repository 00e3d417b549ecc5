/**
 * The harmonic fit of high and low waters alone, as old tide books have them.
 *
 * Each point gives two rows: its height, and the slope, which is 0 at its time. How sure heights and times are is found from
 * the residuals of each, so that neither drowns the other.
 * @module
 */
import {
  ComputationError,
  HOUR,
  type Instant,
  type LongWork,
  type Metres,
  type Progress,
  refuse,
} from '@staithe/core';
import { runInSlices, runThrough } from '@staithe/core/long-work';
import { assemble } from './assemble.js';
import { readCovariates } from './covariates.js';
import { headCount } from './design.js';
import { type Estimate, estimate } from './estimate.js';
import { covariateResults, pairReader, residualSize } from './outcome.js';
import { isOurs, pose } from './problem.js';
import { checkKeys } from './read-options.js';
import type { Rows } from './rows.js';
import { sideLineResults } from './side-lines.js';
import { turningErrors } from './turning/errors.js';
import { type Footing, rowsOn, type StatedSigmas } from './turning/footing.js';
import { prepare, sharesIn } from './turning/prepare.js';
import { readPoints, type ReadPoints, type TurningPoint } from './turning/read.js';
import type { Book } from './turning/turn.js';
import type { FitOptions, FitWarning, RecordFit } from './types.js';

const MANY = 0.02; // of the points, astray

/** Options of a fit of high and low waters. @public */
export interface TurningPointOptions extends FitOptions {
  /** Metres: standard error of a height. Absent: found from the residuals. */
  readonly heightSigma?: Metres | undefined;
  /** Milliseconds: standard error of a time, such as `2 * MINUTE`. Absent: found from the residuals. */
  readonly timeSigma?: number | undefined;
}

/** How the times of a fit of high and low waters come out. @public */
export interface TurningTimes {
  /** Observed minus fitted, milliseconds, one a point; NaN where a point takes no part or is astray. */
  readonly residuals: Float64Array;
  /** Root mean square, milliseconds. */
  readonly rms: number;
  /** The largest, its size and the observed time. */
  readonly largest: number;
  readonly largestAt: Instant;
  /** Indices of points without a turn of the fitted curve within a quarter of the usual time between points: only the height counted. */
  readonly astray: readonly number[];
  /** Indices of points where the fitted curve turns the other way than the point's kind says. */
  readonly contrary: readonly number[];
}

/** What a fit of high and low waters gives; `residuals` are of the heights. @public */
export interface TurningPointFit extends RecordFit {
  readonly timing: TurningTimes;
  /** By which heights and times were weighed, stated or found. */
  readonly sigmas: { readonly height: Metres; readonly time: number };
}

function readSigma(value: number | undefined, path: string): number | undefined {
  if (value === undefined || (value > 0 && value < Infinity)) return value;
  return refuse('OUT_OF_RANGE', path, 'a finite number above 0', value);
}

/** Checks what high and low waters cannot take, and what is stated of them. */
function readStated(options: TurningPointOptions): StatedSigmas {
  checkKeys(options, ' heightSigma timeSigma');
  const { weighting = 'equal', resistant, errorModel, redraw } = options;
  if (weighting !== 'equal') {
    refuse('UNKNOWN_CHOICE', 'options.weighting', 'equal for high and low waters', weighting);
  }
  if (resistant !== undefined) {
    refuse('UNKNOWN_CHOICE', 'options.resistant', 'nothing for high and low waters', resistant);
  }
  if (errorModel !== undefined && !['residual-spectrum', 'independent'].includes(errorModel)) {
    const wanted = 'residual-spectrum or independent for high and low waters';
    refuse('UNKNOWN_CHOICE', 'options.errorModel', wanted, errorModel);
  }
  if (redraw !== undefined) {
    refuse('UNKNOWN_CHOICE', 'options.redraw', 'nothing for high and low waters', redraw);
  }
  return {
    height: readSigma(options.heightSigma, 'options.heightSigma'),
    time: readSigma(options.timeSigma, 'options.timeSigma'),
  };
}

/** Refuses a curve that turns near none of the points: there is no time to speak of. */
function checkTurns({ level }: ReadPoints, { astray }: Footing): void {
  if (astray.some((one, i) => one === 0 && level[i] === 0)) return;
  throw new ComputationError(
    'NO_TIDE',
    `expected a curve that turns near its high and low waters, got one that turns near none of ${astray.length}`,
    { points: astray.length },
  );
}

/** Times that belong to no turn, where they are many. */
function strayWarnings({ astray }: TurningTimes, points: number): FitWarning[] {
  if (astray.length <= MANY * points) return [];
  const message = `${astray.length} of ${points} times lie near no turn of the fitted curve: noise makes turns of its own, the list of constituents lacks some, or the times are wrong`;
  return [{ code: 'TIMES_ASTRAY', message }];
}

/** The times, by the slope that the curve has where its turning point was awaited. */
function timingOf(
  { record: { times }, level, kinds }: ReadPoints,
  found: Estimate,
  { curvature, late, astray }: Footing,
): TurningTimes {
  const residual = (found.residuals[1] as readonly Float64Array[])[0] as Float64Array;
  const [side] = (found.blocks[1] as Rows).sides as [Float64Array];
  const taking = (i: number): boolean => level[i] === 0;
  const residuals = late.map((x, i) => {
    const slope = (side[i] as number) - (residual[i] as number);
    return astray[i] ? Number.NaN : x + (slope / (curvature[i] as number)) * HOUR;
  });
  return {
    residuals,
    ...residualSize(residuals, times),
    astray: [...late.keys()].filter((i) => taking(i) && astray[i]),
    contrary: kinds.flatMap((kind, i) => {
      const bend = curvature[i] as number;
      const other = (kind === 'high' && bend > 0) || (kind === 'low' && bend < 0);
      return taking(i) && other ? [i] : [];
    }),
  };
}

function* steps(
  input: readonly TurningPoint[],
  options: TurningPointOptions,
): Generator<Progress, TurningPointFit, void> {
  const stated = readStated(options);
  const points = readPoints(input, options.weights);
  const { record } = points;
  const covariates = readCovariates(options.covariates, record);
  // A list may lean on the slopes too; our own choice rests on heights, which alone tell of the noise beside a line.
  const samples = isOurs(options) ? record.samples : record.samples + record.times.length;
  const posed = pose(options, { ...record, samples }, covariates.columns, undefined);
  const book: Book = { points, given: covariates.values, stated };
  const spectral = options.errorModel !== 'independent';
  const { problem, footing } = yield* prepare(posed, book, spectral);
  checkTurns(points, footing);
  const blocks = rowsOn(points, book.given, footing);
  const found = yield* estimate(problem, blocks);
  const { solved } = found;
  const solution = found.solutions[0] as Float64Array;
  const high = (found.residuals[0] as readonly Float64Array[])[0] as Float64Array;
  const shares = yield* sharesIn(found);
  const { noise, covariance } = yield* turningErrors(found, shares, record.times, spectral);
  const { borrowed, freed } = problem;
  const residual = residualSize(high, record.times);
  const first = headCount(solved.design) - solved.design.given;
  const timing = timingOf(points, found, footing);
  const made = { options, record, borrowed, solved, solution, covariance, noise, residual };
  const { warnings, ...rest } = assemble(made);
  return {
    ...rest,
    residuals: { ...record.series, values: high },
    ...(covariates.columns.length > 0
      ? { covariates: covariateResults(covariates.columns, first, solution, covariance) }
      : {}),
    ...(freed.length > 0
      ? { sideLines: sideLineResults(freed, pairReader(found, covariance)) }
      : {}),
    timing,
    sigmas: footing.sigmas,
    warnings: [...warnings, ...strayWarnings(timing, record.times.length)],
  };
}

/**
 * Fits harmonic constants to high and low waters alone.
 *
 * Heights and times are weighed by their standard errors, `heightSigma` and `timeSigma`; one that is not stated is found from
 * the residuals of its kind (from 1 mm and 1 s on). Stated or not, the error bars rest on the residuals.
 *
 * @param points - In order of time. Where the height is null or NaN, the time alone counts.
 * @param options - As of `fitHarmonics`, and what is known of the errors; not `resistant`, not `redrawn`. Covariates move the
 *   heights; `weights` are one a point and count for both its rows.
 * @returns As `fitHarmonics`, and how the times come out. `residuals`: observed height minus that of the fitted curve where it
 *   turns.
 * @throws InputError as `fitHarmonics`; `NOT_RISING`, `NOT_FINITE`, `OUT_OF_RANGE`, `WRONG_TYPE`, `UNKNOWN_CHOICE` with the
 *   path of a point or an option. ComputationError as `fitHarmonics`.
 * @example
 * const points = Array.from({ length: 60 }, (_, i) => ({ time: (2 + 6 * i) * 3600000, height: i % 2 ? 1 : 3 }));
 * const { constants } = fitTurningPoints(points, { constituents: ['S2'], nodalModel: 'none' });
 * constants.constituents[0]?.phaseLag.toFixed(6); // '60.000000'
 * @public
 */
export function fitTurningPoints(
  points: readonly TurningPoint[],
  options: TurningPointOptions = {},
): TurningPointFit {
  return runThrough(steps(points, options));
}

/**
 * {@link fitTurningPoints} in slices: shows its progress, can be aborted, never blocks the host for long.
 *
 * @param points - As there.
 * @param options - As there, and signal and progress.
 * @returns The same; rejects with `signal.reason` after an abort.
 * @throws As there, by rejection.
 * @example
 * const points = Array.from({ length: 60 }, (_, i) => ({ time: (2 + 6 * i) * 3600000, height: i % 2 ? 1 : 3 }));
 * (await fitTurningPointsAsync(points, { constituents: ['S2'] })).constants.meanLevel.toFixed(6); // '2.000000'
 * @public
 */
export function fitTurningPointsAsync(
  points: readonly TurningPoint[],
  options: TurningPointOptions & LongWork = {},
): Promise<TurningPointFit> {
  return runInSlices(steps(points, options), options);
}
