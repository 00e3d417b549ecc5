/**
 * What the tests look at: the finite samples, one after the other, with their places in the series.
 * @module
 */
import type { Series } from '@staithe/core';
import { usualStep } from '../../gaps.js';
import type { QualityReason, Run } from '../../record.js';

/** The finite samples of a series. */
export interface CheckSignal {
  readonly times: Float64Array;
  readonly heights: Float64Array;
  /** Heights less the expected curve. */
  readonly residual: Float64Array | undefined;
  /** Place of each in the series. */
  readonly places: Uint32Array;
  /** The usual step, milliseconds. */
  readonly step: number;
}

/** Notes a flagged sample: its index in the signal, rising from call to call. */
export type Note = (
  index: number,
  flag: 3 | 4,
  measured: number,
  allowed: number | readonly [number, number],
  excess: number,
) => void;

/** The samples that hold a height. */
export function signalOf(
  series: Series,
  expected: ((times: Float64Array) => Float64Array) | undefined,
): CheckSignal {
  const { values } = series;
  let count = 0;
  for (let i = 0; i < values.length; i++) if (!Number.isNaN(values[i])) count++;
  const times = new Float64Array(count);
  const heights = new Float64Array(count);
  const places = new Uint32Array(count);
  let k = 0;
  for (let i = 0; i < values.length; i++) {
    if (Number.isNaN(values[i])) continue;
    times[k] = series.times ? (series.times[i] as number) : series.start + i * series.step;
    heights[k] = values[i] as number;
    places[k] = i;
    k++;
  }
  const curve = expected?.(times);
  const residual = curve && heights.map((height, i) => height - (curve[i] as number));
  return { times, heights, residual, places, step: usualStep(series) };
}

/** Collects notes into runs and flags. */
export function runCollector(
  signal: CheckSignal,
  reason: QualityReason,
  flags: Uint8Array,
  runs: Run[],
): Note {
  let last = -2;
  let worst = 0;
  return (index, flag, measured, allowed, excess) => {
    const { times, places } = signal;
    flags[places[index] as number] = flag;
    const time = times[index] as number;
    const open = runs[runs.length - 1];
    if (open && index === last + 1 && open.flag === flag && open.reason === reason) {
      const worse = excess > worst;
      runs[runs.length - 1] = {
        ...open,
        to: time,
        samples: open.samples + 1,
        ...(worse ? { measured, allowed } : {}),
      };
      if (worse) worst = excess;
    } else {
      runs.push({ from: time, to: time, samples: 1, flag, reason, measured, allowed });
      worst = excess;
    }
    last = index;
  };
}
