/**
 * Rate of change, flat line, attenuated signal: how a height moves over a stretch of time.
 * @module
 */
import { HOUR } from '@staithe/core';
import type { CalmLimits, StuckLimits } from '../../limits.js';
import type { CheckSignal, Note } from './signal.js';

const ENOUGH = 0.5; // share of samples that must be there for a value to be said to stand
const MOSTLY = 0.8; // share of samples that must be there to call a stretch calm

/** Rate of change from the sample before, where that one is there and was not rejected. */
export function checkSlope(
  signal: CheckSignal,
  limits: { readonly doubt: number; readonly reject?: number | undefined },
  rejected: Uint8Array,
  note: Note,
): void {
  const { times, heights, places } = signal;
  const { doubt, reject = Infinity } = limits;
  for (let i = 1; i < heights.length; i++) {
    if (rejected[i] || rejected[i - 1]) continue;
    if ((places[i] as number) - (places[i - 1] as number) !== 1) continue;
    const hours = ((times[i] as number) - (times[i - 1] as number)) / HOUR;
    const rate = Math.abs((heights[i] as number) - (heights[i - 1] as number)) / hours;
    if (rate > reject) note(i, 4, rate, reject, rate);
    else if (rate > doubt) note(i, 3, rate, doubt, rate);
  }
}

/** A window over a list whose lowest and highest are known: both ends only move forward. */
interface Window {
  readonly add: (index: number) => void;
  readonly dropBefore: (index: number) => void;
  readonly range: () => number;
}

function rangeWindow(heights: Float64Array): Window {
  const lows: number[] = [];
  const highs: number[] = [];
  let lowAt = 0;
  let highAt = 0;
  const at = (i: number | undefined): number => heights[i as number] as number;
  return {
    add(i) {
      while (lows.length > lowAt && at(lows[lows.length - 1]) >= at(i)) lows.pop();
      while (highs.length > highAt && at(highs[highs.length - 1]) <= at(i)) highs.pop();
      lows.push(i);
      highs.push(i);
    },
    dropBefore(i) {
      while ((lows[lowAt] as number) < i) lowAt++;
      while ((highs[highAt] as number) < i) highAt++;
    },
    range: () => at(highs[highAt]) - at(lows[lowAt]),
  };
}

/** Flat line: heights that stay within a hair for longer than allowed. */
export function checkStuck(signal: CheckSignal, limits: StuckLimits, note: Note): void {
  const { times, heights, step } = signal;
  const { doubt, reject, within, whole = false } = limits;
  const window = rangeWindow(heights);
  let first = 0;
  let from = 0; // of the stretch being noted as a whole
  let to = -1;
  let longest = 0;
  const flush = (): void => {
    const flag = longest > reject ? 4 : 3;
    for (let i = from; i <= to; i++) note(i, flag, longest, flag === 4 ? reject : doubt, longest);
    to = -1;
    longest = 0;
  };
  for (let i = 0; i < heights.length; i++) {
    window.add(i);
    while (first < i) {
      window.dropBefore(first);
      if (window.range() < within) break;
      first++;
    }
    window.dropBefore(first);
    if (whole && to >= 0 && first > to) flush();
    const here = times[i] as number;
    const seen = here - (times[first] as number);
    if (i - first + 1 < ENOUGH * (seen / step + 1)) continue;
    // The sample before the stretch is not part of it: at a uniform step this is the standard's count of samples.
    const stood = first === 0 ? seen : seen + step;
    const passes = (limit: number): boolean => (first === 0 ? stood >= limit : stood > limit);
    if (!passes(doubt)) continue;
    if (whole) {
      if (to < 0) from = first;
      to = i;
      longest = Math.max(longest, stood);
    } else {
      const flag = passes(reject) ? 4 : 3;
      note(i, flag, seen, flag === 4 ? reject : doubt, seen);
    }
  }
  if (to >= 0) flush();
}

/** Attenuated signal: too small a range in the trailing stretch, all of which is flagged. */
export function checkCalm(signal: CheckSignal, limits: CalmLimits, note: Note): void {
  const { times, heights, step } = signal;
  const { doubt, reject, over } = limits;
  const ranges = new Float64Array(heights.length).fill(Infinity); // of the stretch that ends here
  const starts = new Uint32Array(heights.length);
  const window = rangeWindow(heights);
  let first = 0;
  for (let i = 0; i < heights.length; i++) {
    window.add(i);
    while ((times[i] as number) - (times[first] as number) > over) first++;
    window.dropBefore(first);
    starts[i] = first;
    if ((times[i] as number) - over < (times[0] as number)) continue;
    if (i - first + 1 >= (MOSTLY * over) / step) ranges[i] = window.range();
  }
  // Backwards, the stretch met last reaches back the farthest: starts never fall.
  let doubtFrom = Infinity;
  let rejectFrom = Infinity;
  let doubted = Infinity;
  let rejected = Infinity;
  const found: [index: number, flag: 3 | 4, range: number][] = [];
  for (let i = heights.length - 1; i >= 0; i--) {
    const range = ranges[i] as number;
    if (range < doubt) [doubtFrom, doubted] = [starts[i] as number, range];
    if (range < reject) [rejectFrom, rejected] = [starts[i] as number, range];
    if (i >= rejectFrom) found.push([i, 4, rejected]);
    else if (i >= doubtFrom) found.push([i, 3, doubted]);
    if (i <= rejectFrom) rejectFrom = Infinity;
    if (i <= doubtFrom) doubtFrom = Infinity;
  }
  for (const [i, flag, range] of found.reverse()) {
    note(i, flag, range, flag === 4 ? reject : doubt, -range);
  }
}
