/**
 * The residual of a fit month by month: where a gauge goes wrong or the season shows.
 * @module
 */
import type { Instant, Metres } from '@staithe/core';
import type { HarmonicFit } from '../types.js';
import { presentOf, residualSeries } from './residual-samples.js';

/** The residual in a month of UTC. @public */
export interface MonthResidual {
  /** `2031-01`. */
  readonly month: string;
  readonly samples: number;
  readonly mean: Metres;
  /** Standard deviation about that mean; 0 for one sample. */
  readonly sigma: Metres;
  /** The largest size, and its time. */
  readonly largest: Metres;
  readonly largestAt: Instant;
}

function monthOf(t: Instant): string {
  return new Date(t).toISOString().slice(0, 7);
}

/** The first instant of the month after. */
function nextMonth(t: Instant): Instant {
  const date = new Date(t);
  return Date.UTC(date.getUTCFullYear(), date.getUTCMonth() + 1, 1);
}

function monthRow(times: Float64Array, values: Float64Array, own: Int32Array): MonthResidual {
  let sum = 0;
  let at = own[0] as number;
  for (const i of own) {
    sum += values[i] as number;
    if (Math.abs(values[i] as number) > Math.abs(values[at] as number)) at = i;
  }
  const mean = sum / own.length;
  let squares = 0;
  for (const i of own) squares += ((values[i] as number) - mean) ** 2;
  return {
    month: monthOf(times[own[0] as number] as number),
    samples: own.length,
    mean,
    sigma: own.length > 1 ? Math.sqrt(squares / (own.length - 1)) : 0,
    largest: Math.abs(values[at] as number),
    largestAt: times[at] as number,
  };
}

/**
 * The residual of a fit in each month of UTC.
 *
 * @param fit - With residuals.
 * @returns One row a month in order of time, metres; months without a sample are left out.
 * @throws InputError `MISSING`, path `fit.residuals`.
 * @example
 * const fit = fitHarmonics(record, { constituents: ['M2', 'S2', 'K1', 'O1'] });
 * residualByMonth(fit).map(({ month, samples }) => `${month} ${samples}`); // ['2024-03 744', '2024-04 696']
 * @public
 */
export function residualByMonth(fit: HarmonicFit): MonthResidual[] {
  const { times, values } = residualSeries(fit);
  const kept = presentOf(values);
  const rows: MonthResidual[] = [];
  for (let from = 0; from < kept.length; ) {
    const end = nextMonth(times[kept[from] as number] as number);
    let to = from;
    while (to < kept.length && (times[kept[to] as number] as number) < end) to++;
    rows.push(monthRow(times, values, kept.subarray(from, to)));
    from = to;
  }
  return rows;
}
