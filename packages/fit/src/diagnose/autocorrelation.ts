/**
 * How long a residual remembers itself: the integral of its autocorrelation up to the first zero.
 *
 * Products of all pairs a lag apart come from two transforms, of the values and of the mask, so that gaps take no part.
 * @module
 */
import { runThrough } from '@staithe/core/long-work';
import { powerOfTwo, transform, turnsOf } from '../transform.js';

const MOST_CELLS = 1 << 21;

/** Samples in cells of equal width: sums and counts. */
export interface Cells {
  readonly sums: Float64Array;
  readonly counts: Float64Array;
  /** Hours. */
  readonly width: number;
}

/** Means of samples in cells; a cell with none is a gap. Cells are widened where there would be too many of them. */
export function cellsOf(hours: Float64Array, values: Float64Array, step: number): Cells {
  const first = hours[0] as number;
  const length = (hours[hours.length - 1] as number) - first;
  const width = Math.max(step, length / MOST_CELLS);
  const count = Math.round(length / width) + 1;
  const sums = new Float64Array(count);
  const counts = new Float64Array(count);
  for (let i = 0; i < values.length; i++) {
    const at = Math.round(((hours[i] as number) - first) / width);
    sums[at] = (sums[at] as number) + (values[i] as number);
    counts[at] = (counts[at] as number) + 1;
  }
  return { sums, counts, width };
}

/** Σ of products of pairs a lag apart, for every lag. */
function products(values: Float64Array): Float64Array {
  const length = powerOfTwo(2 * values.length);
  const turns = runThrough(turnsOf(length));
  const re = new Float64Array(length);
  const im = new Float64Array(length);
  re.set(values);
  runThrough(transform(re, im, turns));
  for (let k = 0; k < length; k++) {
    const [a, b] = [re[k] as number, im[k] as number];
    re[k] = (a * a + b * b) / length;
  }
  im.fill(0);
  runThrough(transform(re, im, turns));
  return re.subarray(0, values.length);
}

/**
 * Hours over which samples are alike: ∫ ρ dτ from 0 to the first zero of the autocorrelation ρ, by trapezia, ρ a straight
 * line between lags. 0 where there is no noise.
 */
export function correlationTime({ sums, counts, width }: Cells): number {
  const cells = counts.map((count) => (count > 0 ? 1 : 0));
  const kept = cells.reduce((sum, one) => sum + one, 0);
  const means = sums.map((sum, i) => ((counts[i] as number) > 0 ? sum / (counts[i] as number) : 0));
  const mean = means.reduce((sum, value) => sum + value, 0) / kept;
  const centred = means.map((value, i) => (cells[i] as number) * (value - mean));
  const pairs = products(cells);
  const sum = products(centred);
  const variance = (sum[0] as number) / kept;
  if (!(variance > 0)) return 0;
  let before = 1;
  let integral = 0;
  for (let lag = 1; lag < sum.length; lag++) {
    const count = Math.round(pairs[lag] as number);
    if (count === 0) continue;
    const now = (sum[lag] as number) / count / variance;
    if (now <= 0) return width * (integral + (before * before) / (before - now) / 2);
    integral += (before + now) / 2;
    before = now;
  }
  return width * integral;
}
