/**
 * From samples to a series: one step found, or times of their own.
 * @module
 */
import { formatInstant, SECOND, type Series } from '@staithe/core';
import type { Samples } from './samples.js';
import type { WarningList } from './warnings.js';

const MOST_FILL = 4; // a uniform series may have this many slots a sample
const OTHER_STRETCH = 24; // so many equal differences that are not the step are another step

interface Grid {
  readonly step: number;
  readonly slots: number;
}

/** The most frequent difference; of equally frequent ones the shortest. */
function mostFrequent(steps: ReadonlyMap<number, number>): number | undefined {
  let best: number | undefined;
  let most = 0;
  for (const [step, count] of steps) {
    if (count > most || (count === most && best !== undefined && step < best)) {
      best = step;
      most = count;
    }
  }
  return best;
}

/** The grid that all samples stand on, or undefined with a warning that says why there is none. */
function findGrid(samples: Samples, step: number, warnings: WarningList): Grid | undefined {
  const { times } = samples;
  const count = times.length();
  const start = times.at(0);
  let uneven = -1;
  let changed = -1;
  let last = start;
  let lastDifference = step;
  let stretch = 0;
  times.scan((time, i) => {
    if (uneven < 0 && (time - start) % step !== 0) uneven = i;
    const difference = time - last;
    if (i > 0) {
      stretch = difference === lastDifference ? stretch + 1 : 1;
      if (difference !== step && stretch === OTHER_STRETCH && changed < 0) {
        changed = i - OTHER_STRETCH;
      }
      lastDifference = difference;
    }
    last = time;
  });
  const slots = Math.round((last - start) / step) + 1;
  if (changed >= 0) {
    const at = formatInstant(times.at(changed));
    warnings.add('STEP_CHANGES', `the step of ${step} ms changes, first at ${at}`);
  } else if (uneven >= 0) {
    const at = formatInstant(times.at(uneven));
    warnings.add('UNEVEN', `samples off the step of ${step} ms, first at ${at}`);
  } else if (step >= SECOND && slots <= MOST_FILL * count) return { step, slots };
  return undefined;
}

/** The series of the samples, which are used up. */
export function assembleSeries(
  samples: Samples,
  warnings: WarningList,
): { series: Series; step: number | undefined } {
  const { times, values, steps } = samples;
  const count = times.length();
  let finite = 0;
  let constant = true;
  let seen = Number.NaN;
  values.scan((value) => {
    if (Number.isNaN(value)) return;
    finite++;
    if (finite === 1) seen = value;
    else if (value !== seen) constant = false;
  });
  if (count === 1) warnings.add('ONE_SAMPLE', 'one sample has no step and no tide');
  if (finite === 0) warnings.add('ALL_GAPS', 'every sample is a gap');
  else if (constant && finite > 1) warnings.add('CONSTANT', `every height is ${seen} m`);

  const step = mostFrequent(steps);
  const grid = step === undefined ? undefined : findGrid(samples, step, warnings);
  if (!grid) {
    const ownTimes = new Float64Array(count);
    times.drain((time, i) => {
      ownTimes[i] = time;
    });
    const heights = new Float64Array(count);
    values.drain((value, i) => {
      heights[i] = value;
    });
    return { series: { times: ownTimes, values: heights }, step };
  }
  const start = times.at(0);
  const heights = new Float64Array(grid.slots);
  let next = 0; // gaps are written on the way, so that memory fills as the column's blocks are let go
  values.drain((value, i) => {
    const slot = Math.round((times.at(i) - start) / grid.step);
    while (next < slot) heights[next++] = Number.NaN;
    heights[next++] = value;
  });
  return { series: { start, step: grid.step, values: heights }, step };
}
