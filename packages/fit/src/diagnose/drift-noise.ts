/**
 * The noise that a column of a fit feels, from the spectrum of the residual weighted by the column's own.
 *
 * With the other columns taken out of it, a column d has the coefficient Σ d·y/Σ d², and its variance is the noise density
 * under the spectrum of d, Σ |D(ω)|²·S(ω)/Σ |D(ω)|², over Σ d². The residual's I(ω) stands for S(ω) where the fit left
 * it: E I = S·(1 − h), h what the lines took and |D(ω)|²/(n·Σ d²) what the column itself took. A drift feels the cusps
 * next to the strong lines of its species.
 *
 * The few bins under D tell S only roughly. With b of them, exponentially distributed, the square of an error over its
 * standard error has the mean b/(b − 1) (Student's t with 2b degrees of freedom), which is made good here.
 * @module
 */
import type { Progress } from '@staithe/core';
import { type Periodogram, periodogramOf } from './periodogram.js';
import { samplesOf } from './residual-samples.js';
import { searchOf, sharesLeft } from './stand-out.js';

/** Columns of a fit with everything else taken out of them. */
export interface BareColumns {
  readonly times: Float64Array;
  /** Milliseconds where times are uniform, else 0. */
  readonly step: number;
  /** NaN where no sample takes part. */
  readonly residual: Float64Array;
  readonly columns: readonly Float64Array[];
}

const FEWEST = 2; // bins
const LEFT = 0.3; // share of the noise that must be left for a bin to be evidence

/**
 * @param bare - Residual and columns, all times the roots of the weights.
 * @param lines - Degrees per hour of what is fitted, 0 among them.
 * @returns m² of white noise whose errors are as large, one a column; undefined where the spectrum has no evidence.
 */
export function* densitiesUnder(
  { times, step, residual, columns }: BareColumns,
  lines: readonly number[],
): Generator<Progress, (number | undefined)[], void> {
  const spectrumOf = (values: Float64Array): Generator<Progress, Periodogram, void> =>
    periodogramOf(samplesOf({ times, values, step, weights: undefined }));
  const noise = yield* spectrumOf(residual);
  const samples = samplesOf({ times, values: residual, step, weights: undefined });
  const search = yield* searchOf(samples);
  const left = sharesLeft({ ...search, lines }, noise);
  const perBin = noise.spacing / search.width;
  const out: (number | undefined)[] = [];
  for (const column of columns) {
    const { power } = yield* spectrumOf(column);
    const squares = column.reduce((sum, v) => (Number.isNaN(v) ? sum : sum + v * v), 0);
    let seen = 0;
    let weight = 0;
    let total = 0;
    let squared = 0;
    for (let k = 1; k < power.length; k++) {
      const own = power[k] as number;
      const share = (left[k] as number) - own / squares;
      if (share < LEFT) continue;
      seen += own * (noise.power[k] as number);
      weight += own * share;
      total += own;
      squared += own * own;
    }
    const bins = Math.max(FEWEST, squared > 0 ? (total * total * perBin) / squared : 0);
    out.push(weight > 0 ? (seen / weight) * (bins / (bins - 1)) : undefined);
    yield { done: out.length, total: columns.length, stage: 'noise of the drift' };
  }
  return out;
}
