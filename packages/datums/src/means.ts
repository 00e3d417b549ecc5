/**
 * Means and their standard errors, by blocks of time: what is measured within a block shares its weather.
 * @module
 */
import { DAY, type HarmonicConstants, type Instant } from '@staithe/core';

const ENOUGH = 3; // blocks that a standard error is taken from

/** Calendar months since year 0, UTC. */
export function monthOf(t: Instant): number {
  const date = new Date(t);
  return date.getUTCFullYear() * 12 + date.getUTCMonth();
}

/** Arithmetic mean of one value or more. */
export function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

function standardError(values: readonly number[]): number {
  const centre = mean(values);
  const squares = values.reduce((sum, value) => sum + (value - centre) * (value - centre), 0);
  return Math.sqrt(squares / Math.max(1, values.length - 1) / values.length);
}

/** Means of the blocks that hold at least half as many values as the middle one: two days of March would weigh as much as a month. */
function blockMeans(
  times: ArrayLike<number>,
  values: ArrayLike<number>,
  block: (t: Instant) => number,
): number[] {
  const sums = new Map<number, { sum: number; count: number }>();
  for (let i = 0; i < values.length; i++) {
    const value = values[i] as number;
    if (Number.isNaN(value)) continue;
    const key = block(times[i] as number);
    const entry = sums.get(key);
    if (entry) {
      entry.sum += value;
      entry.count++;
    } else sums.set(key, { sum: value, count: 1 });
  }
  const blocks = [...sums.values()];
  const counts = blocks.map(({ count }) => count).sort((a, b) => a - b);
  const usual = counts[counts.length >> 1] ?? 0;
  return blocks.filter(({ count }) => count >= usual / 2).map(({ sum, count }) => sum / count);
}

/**
 * Standard error of a mean: of monthly means where there are three or more, else of daily ones, else of the values.
 *
 * @param times - Instants.
 * @param values - NaN is a gap; one value or more is none.
 */
export function blockError(times: ArrayLike<number>, values: ArrayLike<number>): number {
  const months = blockMeans(times, values, monthOf);
  if (months.length >= ENOUGH) return standardError(months);
  const days = blockMeans(times, values, (t) => Math.floor(t / DAY));
  if (days.length >= ENOUGH) return standardError(days);
  return standardError(Array.from(values).filter((value) => !Number.isNaN(value)));
}

/** The mean level of a document after the last of its steps: what predictions from then on are counted from. */
export function levelAfterSteps({ meanLevel, steps = [] }: HarmonicConstants): number {
  return steps.reduce((level, { change }) => level + change, meanLevel);
}
