/**
 * What a fit left over: the spectrum of the residual, and the lines that still stand out of it.
 * @module
 */
import { constituent } from '@staithe/constituents';
import { HOUR, type LongWork, type Metres, type Progress, refuse } from '@staithe/core';
import { runInSlices, runThrough } from '@staithe/core/long-work';
import { shownSpeed } from '../cadence.js';
import type { HarmonicFit } from '../types.js';
import { linesLeftOver } from './left-over-lines.js';
import { makeNamer } from './likely.js';
import { type Periodogram, periodogramOf } from './periodogram.js';
import { type ResidualSamples, residualSeries, samplesOf } from './residual-samples.js';

/** Options of {@link leftOver}. @public */
export interface LeftOverOptions {
  /** Lines, at most: 1 to 100, default 12. */
  readonly most?: number | undefined;
}

/** A line that stands out of a residual. @public */
export interface LeftOverLine {
  /** Degrees per hour. */
  readonly speed: number;
  /** As the samples show it: a mean over a sample is not made good. */
  readonly amplitude: Metres;
  /** Radius of its 95 % region, from the noise beside it. */
  readonly radius95: Metres;
  /** The constituent it may be: one that is not in the fit, within half a bin. */
  readonly likely?: string | undefined;
}

/** What {@link leftOver} gives. @public */
export interface LeftOverFindings {
  /** The largest first. */
  readonly lines: readonly LeftOverLine[];
  readonly spectrum: {
    /** Degrees per hour, one turn of the record apart. */
    readonly speeds: Float64Array;
    /** m² per degree per hour: over all speeds it adds up to the variance. */
    readonly density: Float64Array;
  };
}

const NODE = 360 / (18.613 * 365.25 * 24); // degrees an hour
const MOST = 12;

/** Speeds of a fit as its samples show them, degrees per hour, 0 among them. */
function speedsOf({ constants, sideLines = [] }: HarmonicFit, cadence: number): number[] {
  const own = constants.constituents.map(({ name }) => constituent(name).speed);
  const side = sideLines.flatMap(({ name, lines }) =>
    lines.map(({ node }) => constituent(name).speed + node * NODE),
  );
  return [0, ...[...own, ...side].map((speed) => shownSpeed(speed, cadence))];
}

/** One value a turn of the record, each a mean under a triangle of two such widths. */
function smoothed(
  { spacing, power }: Periodogram,
  { hours, usual, samples }: ResidualSamples,
): LeftOverFindings['spectrum'] {
  const length = (hours[hours.length - 1] as number) - (hours[0] as number) + usual;
  const width = 360 / length;
  const count = Math.floor(((power.length - 1) * spacing) / width);
  const speeds = Float64Array.from({ length: count }, (_, k) => (k + 1) * width);
  const covered = Math.min(length, samples * usual);
  const density = speeds.map((speed) => {
    let sum = 0;
    let total = 0;
    const to = Math.min(power.length - 1, Math.floor((speed + width) / spacing));
    for (let k = Math.ceil((speed - width) / spacing); k <= to; k++) {
      const weight = Math.max(0, 1 - Math.abs(k * spacing - speed) / width);
      sum += weight * (power[k] as number);
      total += weight;
    }
    return ((sum / total) * covered) / (180 * samples);
  });
  return { speeds, density };
}

function* steps(
  fit: HarmonicFit,
  { most = MOST }: LeftOverOptions,
): Generator<Progress, LeftOverFindings, void> {
  if (!(Number.isInteger(most) && most >= 1 && most <= 100)) {
    refuse('OUT_OF_RANGE', 'options.most', 'a whole number from 1 to 100', most);
  }
  const samples = samplesOf(residualSeries(fit));
  const whole = yield* periodogramOf(samples);
  const spectrum = smoothed(whole, samples);
  const cadence = samples.step * HOUR;
  const found = yield* linesLeftOver(samples, speedsOf(fit, cadence), most, whole);
  const { nodalModel, constituents } = fit.constants;
  const fitted = constituents.map(({ name }) => constituent(name).name);
  const nameOf = makeNamer(nodalModel, fitted, cadence);
  const bin = spectrum.speeds[0] ?? 0;
  const lines = found.map((line): LeftOverLine => {
    const likely = nameOf(line.speed, bin / 2);
    return likely === undefined ? line : { ...line, likely };
  });
  return { lines, spectrum };
}

/**
 * The spectrum of a fit's residual, and the lines that still stand out of it: candidates for the list of constituents.
 *
 * A line stands out when it is larger than chance lets the largest of all bins be in one record of twenty, by the noise of
 * the bins beside it (docs/fitting.md). Speeds go up to 200° an hour or half a turn a sample. Gaps count as
 * zeros; samples at times of their own are laid on a fine grid.
 *
 * @param fit - With residuals.
 * @param options - How many lines.
 * @returns Lines and spectrum; both may be empty in a short record.
 * @throws InputError `MISSING`, path `fit.residuals`; `OUT_OF_RANGE`, path `options.most`.
 * @example
 * const fit = fitHarmonics(record, { constituents: ['M2', 'K1', 'O1'], nodalModel: 'none' });
 * leftOver(fit).lines.map(({ likely, amplitude }) => `${likely} ${amplitude.toFixed(2)}`); // ['S2 0.50']
 * @public
 */
export function leftOver(fit: HarmonicFit, options: LeftOverOptions = {}): LeftOverFindings {
  return runThrough(steps(fit, options));
}

/**
 * {@link leftOver} in slices: shows its progress, can be aborted, never blocks the host for long.
 *
 * @param fit - As there.
 * @param options - As there, and signal and progress.
 * @returns The same; rejects with `signal.reason` after an abort.
 * @throws As there, by rejection.
 * @example
 * const fit = fitHarmonics(record, { constituents: ['M2', 'K1', 'O1'], nodalModel: 'none' });
 * (await leftOverAsync(fit)).lines.length; // 1
 * @public
 */
export function leftOverAsync(
  fit: HarmonicFit,
  options: LeftOverOptions & LongWork = {},
): Promise<LeftOverFindings> {
  return runInSlices(steps(fit, options), options);
}
