/**
 * The spectral window of the samples, Σ e^{−iδt}/n: how much of a fitted line shows at the distance δ. In runs of equal
 * steps each sum is Dirichlet's, sin(nx/2)/sin(x/2), so gaps cost a term a run.
 * @module
 */
import { degreesToRadians, wrapDegrees } from '@staithe/core';
import { cos, sin } from '@staithe/core/trig';

/** Samples at nearly equal steps. */
export interface SampleRun {
  /** Hours of the middle. */
  readonly middle: number;
  readonly count: number;
  /** Hours. */
  readonly step: number;
}

const LONGER = 1.5; // steps: a longer one begins a new run

function middleStep(hours: Float64Array): number {
  const steps = hours
    .slice(1)
    .map((t, i) => t - (hours[i] as number))
    .sort();
  return steps[steps.length >> 1] ?? 1;
}

/**
 * @param hours - Times of the samples, rising.
 * @param step - Hours where they are uniform, else 0: the middle step is taken.
 */
export function runsOf(hours: Float64Array, step: number): SampleRun[] {
  const usual = step > 0 ? step : middleStep(hours);
  const out: SampleRun[] = [];
  let start = 0;
  for (let i = 1; i <= hours.length; i++) {
    const gap =
      i < hours.length && (hours[i] as number) - (hours[i - 1] as number) <= LONGER * usual;
    if (gap) continue;
    const first = hours[start] as number;
    const last = hours[i - 1] as number;
    const count = i - start;
    out.push({
      middle: (first + last) / 2,
      count,
      step: count > 1 ? (last - first) / (count - 1) : usual,
    });
    start = i;
  }
  return out;
}

/** Samples of all runs. */
function samplesOf(runs: readonly SampleRun[]): number {
  return runs.reduce((sum, { count }) => sum + count, 0);
}

/** Hours that the samples cover, gaps apart. */
export function coveredBy(runs: readonly SampleRun[]): number {
  return runs.reduce((sum, { count, step }) => sum + count * step, 0);
}

/** The window at equal distances from 0, to be read between them. */
export interface SpectralWindow {
  /** Degrees per hour between the distances. */
  readonly spacing: number;
  /** Degrees per hour to which it reaches; beyond it counts as 0. */
  readonly reach: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

const FINENESS = 8; // distances a turn of the whole span: cubic interpolation leaves 5e-4
const LARGEST = 8192; // distances

/** sin(nx/2)/sin(x/2), x in degrees. */
function dirichlet(count: number, x: number): number {
  const below = sin(degreesToRadians(wrapDegrees(x / 2)));
  if (Math.abs(below) < 1e-9) return count;
  return sin(degreesToRadians(wrapDegrees((count * x) / 2))) / below;
}

/**
 * @param runs - Of {@link runsOf}; times from any hour.
 * @param reach - Degrees per hour; less where that would be more than 8192 distances.
 */
export function windowOf(runs: readonly SampleRun[], reach: number): SpectralWindow {
  const ends = runs.map(({ middle, count, step }): [number, number] => [
    middle - (count * step) / 2,
    middle + (count * step) / 2,
  ]);
  const from = ends.reduce((least, [start]) => Math.min(least, start), Infinity);
  const to = ends.reduce((most, [, end]) => Math.max(most, end), -Infinity);
  const centre = (from + to) / 2;
  const spacing = 360 / (FINENESS * (to - from));
  const size = Math.min(LARGEST, Math.ceil(reach / spacing) + 3);
  const re = new Float64Array(size);
  const im = new Float64Array(size);
  const samples = samplesOf(runs);
  for (let i = 0; i < size; i++) {
    const apart = i * spacing;
    for (const { middle, count, step } of runs) {
      const share = dirichlet(count, apart * step) / samples;
      const angle = degreesToRadians(wrapDegrees(apart * (middle - centre)));
      re[i] = (re[i] as number) + share * cos(angle);
      im[i] = (im[i] as number) - share * sin(angle);
    }
  }
  return { spacing, reach: Math.min(reach, (size - 3) * spacing), re, im };
}

/**
 * @param window - Of {@link windowOf}.
 * @param apart - Degrees per hour, of either sign.
 * @param out - Written to: real and imaginary part of Σ e^{−iδt}/n, t from the middle of the span.
 */
export function windowInto(window: SpectralWindow, apart: number, out: Float64Array): void {
  const { spacing, reach, re, im } = window;
  const distance = Math.abs(apart);
  if (distance > reach) {
    out.fill(0);
    return;
  }
  const at = distance / spacing;
  const i = Math.floor(at);
  const x = at - i;
  // Cubic through the four distances about it; across 0 the window is its own conjugate.
  const before = -x * (x - 1) * (x - 2) * (1 / 6);
  const here = (x + 1) * (x - 1) * (x - 2) * 0.5;
  const next = -(x + 1) * x * (x - 2) * 0.5;
  const after = (x + 1) * x * (x - 1) * (1 / 6);
  const mirror = i === 0;
  const back = mirror ? 1 : i - 1;
  out[0] =
    before * (re[back] as number) +
    here * (re[i] as number) +
    next * (re[i + 1] as number) +
    after * (re[i + 2] as number);
  const imaginary =
    before * (mirror ? -(im[back] as number) : (im[back] as number)) +
    here * (im[i] as number) +
    next * (im[i + 1] as number) +
    after * (im[i + 2] as number);
  out[1] = apart < 0 ? -imaginary : imaginary;
}
