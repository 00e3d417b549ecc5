/**
 * The residual of a fit as the diagnostics take it: on a grid where the times are those of one, gaps as zeros.
 * @module
 */
import { checkSeries, HOUR, refuse, seriesTimes } from '@staithe/core';
import { cadenceOf, usualStep } from '../cadence.js';
import type { HarmonicFit } from '../types.js';

/** Samples on a uniform grid, or at times of their own without gaps. */
export interface ResidualSamples {
  /** Hours from the middle of the record. */
  readonly hours: Float64Array;
  /** Metres; 0 at gaps. */
  readonly values: Float64Array;
  /** 1 at samples, 0 at gaps. */
  readonly weights: Float64Array;
  /** Hours between the times where they are uniform, else 0. */
  readonly step: number;
  /** Hours between neighbours, the usual ones. */
  readonly usual: number;
  /** Samples that take part. */
  readonly samples: number;
}

/** Times and values of a residual. */
export interface ResidualSeries {
  readonly times: Float64Array;
  /** NaN is a gap. */
  readonly values: Float64Array;
  /** Milliseconds where the times are uniform, else 0. */
  readonly step: number;
  /** Of a resistant fit, one a time. */
  readonly weights: Float64Array | undefined;
}

const TRUSTED = 0.5; // weight: what has less is left out; weights in between would bend the waves
const LONGEST_GRID = 1 << 23; // times: beyond, a record with gaps stays a list

/**
 * The residual of a fit.
 *
 * @throws InputError `MISSING`, path `fit.residuals`.
 */
export function residualSeries({ residuals, resistant }: HarmonicFit): ResidualSeries {
  if (!residuals) refuse('MISSING', 'fit.residuals', 'a fit of a record at hand', residuals);
  const series = checkSeries(residuals);
  return {
    times: seriesTimes(series),
    values: series.values,
    step: series.times ? 0 : series.step,
    weights: resistant?.weights,
  };
}

/** Indices of the samples that take part. */
export function presentOf(values: Float64Array): Int32Array {
  const kept = new Int32Array(values.length);
  let count = 0;
  values.forEach((value, i) => {
    if (!Number.isNaN(value)) kept[count++] = i;
  });
  return kept.subarray(0, count);
}

/** Puts a residual on its grid, from its first to its last sample that is trusted. */
export function samplesOf({ times, values, step, weights }: ResidualSeries): ResidualSamples {
  const kept = presentOf(values).filter((i) => (weights?.[i] ?? 1) >= TRUSTED);
  const own = Float64Array.from(kept, (i) => times[i] as number);
  const first = own[0] ?? 0;
  const length = (own[own.length - 1] ?? first) - first;
  const usual = step || usualStep(own) || HOUR;
  const cadence = step || cadenceOf(own);
  const isGrid = cadence > 0 && length / cadence < LONGEST_GRID;
  const count = isGrid ? Math.round(length / cadence) + 1 : kept.length;
  const out = {
    hours: new Float64Array(count),
    values: new Float64Array(count),
    weights: new Float64Array(count),
    step: isGrid ? cadence / HOUR : 0,
    usual: usual / HOUR,
    samples: kept.length,
  };
  kept.forEach((i, k) => {
    const at = isGrid ? Math.round(((own[k] as number) - first) / cadence) : k;
    out.weights[at] = 1;
    out.values[at] = values[i] as number;
  });
  const middle = length / 2;
  for (let i = 0; i < count; i++) {
    out.hours[i] = ((isGrid ? i * cadence : (own[i] as number) - first) - middle) / HOUR;
  }
  return out;
}
