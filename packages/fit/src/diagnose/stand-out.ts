/**
 * The bins of a periodogram that stand out from their neighbours.
 * @module
 */
import type { Progress } from '@staithe/core';
import { type Beside, levelOf, levelOfLargest } from './false-alarm.js';
import { type Periodogram, periodogramOf } from './periodogram.js';
import type { ResidualSamples } from './residual-samples.js';

/** A bin that stands out. */
export interface Peak {
  /** Degrees per hour. */
  readonly speed: number;
  /** m², of white noise of the same density. */
  readonly power: number;
}

/** What a search knows of the record. */
export interface Search {
  /** Degrees per hour between independent bins. */
  readonly width: number;
  /** |Σ e^{−iδt}|²/n² at distances k·spacing: the share of the noise that a fitted line takes there. */
  readonly window: Float64Array;
  /** Degrees per hour: what is fitted or found, 0 among them. */
  readonly lines: readonly number[];
}

const LEFT = 0.3; // share of the noise that a bin must have left for it to be evidence
const REACH = 4; // bins from a line within which its window counts
const NEAREST = 2; // bins: closer ones hold what leaks from the line itself
const FURTHEST = 15;
const LEAST = 6; // neighbours
const STRIDE = 1024; // bins between two yields

/** What a search needs beside the lines. */
export function* searchOf(
  samples: ResidualSamples,
): Generator<Progress, Omit<Search, 'lines'>, void> {
  const { hours, weights, usual } = samples;
  const length = (hours[hours.length - 1] as number) - (hours[0] as number) + usual;
  const { power } = yield* periodogramOf({ ...samples, values: weights });
  const largest = power[0] as number;
  return {
    width: 360 / Math.min(length, samples.samples * usual),
    window: power.map((value) => value / largest),
  };
}

/** The share of the noise that the lines left in each bin. */
export function sharesLeft(search: Search, { spacing, power }: Periodogram): Float64Array {
  const left = new Float64Array(power.length).fill(1);
  const { lines, width, window } = search;
  const reach = Math.ceil((REACH * width) / spacing);
  for (const line of lines) {
    const middle = Math.round(line / spacing);
    const to = Math.min(left.length - 1, middle + reach);
    for (let k = Math.max(0, middle - reach); k <= to; k++) {
      const apart = Math.abs(k - line / spacing);
      const near = Math.floor(apart);
      const before = window[near] ?? 0;
      const after = window[near + 1] ?? 0;
      left[k] = (left[k] as number) - (before + (apart - near) * (after - before));
    }
  }
  return left;
}

/**
 * The noise beside a bin, from neighbours on both sides that stand no further away than half its speed: the spectrum
 * rises towards 0.
 *
 * @returns Undefined where there is no evidence.
 */
export function noiseBeside(
  { width }: Pick<Search, 'width'>,
  { spacing, power }: Periodogram,
  left: Float64Array,
  speed: number,
): Beside | undefined {
  const bins: number[] = [];
  for (let j = NEAREST; j <= FURTHEST; j++) {
    const apart = j * width;
    if (apart > speed / 2) break;
    for (const at of [speed - apart, speed + apart]) {
      const k = Math.round(at / spacing);
      const share = left[k];
      if (share !== undefined && share >= LEFT) bins.push((power[k] as number) / share);
    }
  }
  return bins.length < LEAST ? undefined : levelOf(Float64Array.from(bins));
}

/** Bins that stand out, the strongest first. */
export function* standingOut(
  search: Search,
  spectrum: Periodogram,
): Generator<Progress, Peak[], void> {
  const { spacing, power } = spectrum;
  const left = sharesLeft(search, spectrum);
  const searched = left.reduce((sum, share) => (share >= LEFT ? sum + 1 : sum), 0);
  const levels = new Map<number, number>();
  const out: Peak[] = [];
  for (let k = 1; k + 1 < power.length; k++) {
    if (k % STRIDE === 0) yield { done: k, total: power.length, stage: 'search' };
    const own = power[k] as number;
    if (own < (power[k - 1] as number) || own <= (power[k + 1] as number)) continue;
    const share = left[k] as number;
    if (share < LEFT) continue;
    const beside = noiseBeside(search, spectrum, left, k * spacing);
    if (!beside) continue;
    const { level, bins } = beside;
    const limit = levels.get(bins) ?? levelOfLargest(searched, bins);
    levels.set(bins, limit);
    if (own / share > limit * level) out.push({ speed: k * spacing, power: own });
  }
  return out.sort((a, b) => b.power - a.power);
}
