/**
 * Noise density at each line, from the residual beside it.
 *
 * A line's coefficients feel the noise at its own frequency alone. The spectrum of the sea is red and has cusps round
 * strong lines (W. Munk, B. Zetler and G. Groves 1965), so the density is taken from the band 0.02 to 0.3°/h away,
 * widened only where bins are too few. I(ω) = |Σ r·e^{−iωt}|²/n has the variance of white noise as its mean, less the
 * share h that the fit took out: E I = s²(1 − h), h nearly the spectral window of the samples at the distance of each
 * fitted line. Bins of which the fit left less than 30 % are no evidence (docs/fitting.md).
 * @module
 */
import { degreesToRadians, HOUR, wrapDegrees } from '@staithe/core';
import { sinCosInto } from '@staithe/core/trig';
import { runsOf, type SampleRun, windowAt } from './window.js';

const NEAREST = 0.02; // degrees per hour
const BANDS = [0.3, 1, 3, 8];
const ENOUGH = 8;
const MOST = 32;
const RESTART = 1024;
const LEFT = 0.3; // share of the noise that the fit must have left in a bin
const REACH = 1.5; // degrees per hour, beyond which the window of a line is not counted

/** Residual with gaps as zeros or taken out: times from the middle of the record in hours, and values. */
export interface Residual {
  readonly hours: Float64Array;
  readonly values: Float64Array;
  /** Hours between the times where they are uniform and whole, else 0. */
  readonly step: number;
  /** Hours that the samples cover, gaps apart: bins a turn of this apart are independent. */
  readonly covered: number;
  readonly runs: readonly SampleRun[];
  readonly samples: number;
}

/** |Σ r·e^{−iωt}|²/n at a speed in degrees per hour. */
function periodogramAt(residual: Residual, speed: number, pair: Float64Array): number {
  const { hours, values, step, samples } = residual;
  let re = 0;
  let im = 0;
  let s = 0;
  let c = 1;
  sinCosInto(degreesToRadians(wrapDegrees(speed * step)), pair);
  const turnSin = pair[0] as number;
  const turnCos = pair[1] as number;
  for (let i = 0; i < values.length; i++) {
    if (step === 0 || i % RESTART === 0) {
      sinCosInto(degreesToRadians(wrapDegrees(speed * (hours[i] as number))), pair);
      s = pair[0] as number;
      c = pair[1] as number;
    }
    const value = values[i] as number;
    re += value * c;
    im += value * s;
    const turned = c * turnCos - s * turnSin;
    s = c * turnSin + s * turnCos;
    c = turned;
  }
  return (re * re + im * im) / samples;
}

/** Speeds beside a line, a turn of the covered time apart, on both sides while they are above 0. */
function binsBeside(line: number, band: number, width: number): number[] {
  const offsets: number[] = [];
  const nearest = Math.max(NEAREST, width);
  for (let offset = nearest; offset <= Math.max(band, 6 * width); offset += width) {
    offsets.push(offset);
  }
  // Thinned by offset, so that both sides of the line stay: the spectrum is not level.
  const every = Math.max(1, Math.ceil((2 * offsets.length) / MOST));
  return offsets
    .filter((_, i) => i % every === 0)
    .flatMap((offset) => [line - offset, line + offset])
    .filter((speed) => speed >= width);
}

/** The share of the noise at a speed that the fit of the lines left in the residual. */
function shareLeft({ runs, samples }: Residual, speed: number, lines: readonly number[]): number {
  let taken = 0;
  for (const line of lines) {
    const apart = Math.abs(speed - line);
    if (apart < REACH) taken += windowAt(runs, samples, apart);
  }
  return 1 - taken;
}

/** The noise that a line feels. */
export interface LineNoise {
  /** Variance of white noise of the same density, m². */
  readonly density: number;
  readonly bins: number;
}

/**
 * @param residual - Of the fit.
 * @param line - Speed of the line, degrees per hour; 0 for the mean level.
 * @param lines - Speeds of all fitted and borrowed lines, 0 among them.
 * @returns No bins where the fit left no evidence near the line.
 */
export function noiseBeside(residual: Residual, line: number, lines: readonly number[]): LineNoise {
  const width = 360 / residual.covered;
  const pair = new Float64Array(2);
  let found: { speed: number; left: number }[] = [];
  for (const band of BANDS) {
    found = binsBeside(line, band, width)
      .map((speed) => ({ speed, left: shareLeft(residual, speed, lines) }))
      .filter(({ left }) => left >= LEFT);
    if (found.length >= ENOUGH) break;
  }
  let power = 0;
  let left = 0;
  for (const bin of found) {
    power += periodogramAt(residual, bin.speed, pair);
    left += bin.left;
  }
  return { density: left > 0 ? power / left : 0, bins: found.length };
}

/**
 * The residual as the periodogram takes it.
 *
 * @param times - Instants.
 * @param step - Milliseconds where they are uniform, else 0.
 * @param values - NaN is a gap.
 */
export function residualOf(times: Float64Array, step: number, values: Float64Array): Residual {
  const kept = Float64Array.from(values.keys()).filter((i) => !Number.isNaN(values[i]));
  const first = times[kept[0] as number] as number;
  const last = times[kept[kept.length - 1] as number] as number;
  const middle = (first + last) / 2;
  const samples = kept.length;
  const runs = runsOf(
    kept.map((i) => ((times[i] as number) - middle) / HOUR),
    step / HOUR,
  );
  const covered = runs.reduce((sum, run) => sum + run.count * run.step, 0);
  if (step > 0) {
    // On a uniform grid a gap weighs nothing: 0 keeps the rotation going.
    return {
      hours: times.map((t) => (t - middle) / HOUR),
      values: values.map((v) => (Number.isNaN(v) ? 0 : v)),
      step: step / HOUR,
      covered,
      runs,
      samples,
    };
  }
  return {
    hours: kept.map((i) => ((times[i] as number) - middle) / HOUR),
    values: kept.map((i) => values[i] as number),
    step: 0,
    covered,
    runs,
    samples,
  };
}
