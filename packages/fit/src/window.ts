/**
 * The spectral window of the samples: |Σ e^{−iδt}|²/n², 1 at δ = 0, what a fitted line takes out of the noise at the
 * distance δ. In runs of equal steps each sum is Dirichlet's, sin(nx/2)/sin(x/2), so gaps cost a term a run.
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

/** sin(nx/2)/sin(x/2), x in degrees. */
function dirichlet(count: number, x: number): number {
  const below = sin(degreesToRadians(wrapDegrees(x / 2)));
  if (Math.abs(below) < 1e-9) return count;
  return sin(degreesToRadians(wrapDegrees((count * x) / 2))) / below;
}

/**
 * @param runs - Of {@link runsOf}.
 * @param samples - Of all runs.
 * @param apart - Degrees per hour.
 * @returns From 0 to 1.
 */
export function windowAt(runs: readonly SampleRun[], samples: number, apart: number): number {
  let re = 0;
  let im = 0;
  for (const { middle, count, step } of runs) {
    const size = dirichlet(count, apart * step);
    const angle = degreesToRadians(wrapDegrees(apart * middle));
    re += size * cos(angle);
    im += size * sin(angle);
  }
  return (re * re + im * im) / (samples * samples);
}
