/**
 * The gaps of a record, with the times at which samples are missing.
 * @module
 */
import type { FitRecord } from '../record.js';
import { usualStep } from '../cadence.js';
import { presentOf } from './residual-samples.js';

/** Times without a sample, one usual step apart. */
export type GapTimes = Float64Array;

const LONGER = 1.5; // steps: a longer one is a gap

function between(after: number, before: number, step: number): Float64Array {
  const count = Math.max(0, Math.round((before - after) / step) - 1);
  return Float64Array.from({ length: count }, (_, i) => after + (i + 1) * step);
}

/** The gaps in order of time. A uniform series has gaps at its ends too where it begins or ends with missing values. */
export function gapsOf({ times, values, step }: FitRecord): GapTimes[] {
  const own = Float64Array.from(presentOf(values), (i) => times[i] as number);
  const usual = step || usualStep(own);
  const out: GapTimes[] = [];
  const last = times.length - 1;
  const ends = step > 0 ? [(times[0] as number) - step, (times[last] as number) + step] : [];
  const marks = [...ends.slice(0, 1), ...own, ...ends.slice(1)];
  for (let k = 1; k < marks.length; k++) {
    const [after, before] = [marks[k - 1] as number, marks[k] as number];
    if (before - after > LONGER * usual) out.push(between(after, before, usual));
  }
  return out;
}
