/**
 * High and low waters of a sampled record.
 *
 * Samples closer than half an hour are smoothed by a quadratic over ±45 minutes (A. Savitzky and M. Golay 1964), which
 * keeps the height of a crest; a crest or trough is the parabola through three samples. Where a gap is longer than
 * three hours the record is cut. Neighbours less than 0.03 m or 2 h apart (NOS practice, from memory) are no tide: a
 * crest counts once the record has left it by that range; of those too near in time the pair of smallest range goes.
 * @module
 */
import { HOUR, type Instant, MINUTE } from '@staithe/core';

/** A crest or a trough. */
export interface Extreme {
  readonly kind: 'high' | 'low';
  readonly time: Instant;
  readonly height: number;
}

/** A run of samples without a long gap. */
export interface Run {
  readonly times: Float64Array;
  readonly values: Float64Array;
}

const SMOOTH_BELOW = 30 * MINUTE;
const HALF_WINDOW = 45 * MINUTE;
const LONGEST_GAP = 3 * HOUR;
const UNEVEN = 0.05; // of a step

/** Cuts a record at gaps longer than three hours; shorter ones are stepped over. */
export function runsOf(times: Float64Array, values: Float64Array): Run[] {
  const out: Run[] = [];
  let kept: number[] = [];
  const close = (): void => {
    if (kept.length > 2) {
      out.push({
        times: Float64Array.from(kept, (i) => times[i] as number),
        values: Float64Array.from(kept, (i) => values[i] as number),
      });
    }
    kept = [];
  };
  for (let i = 0; i < values.length; i++) {
    if (Number.isNaN(values[i])) continue;
    const last = kept[kept.length - 1];
    if (last !== undefined && (times[i] as number) - (times[last] as number) > LONGEST_GAP) close();
    kept.push(i);
  }
  close();
  return out;
}

/** The middle one of the steps between samples. */
function usualStep(times: Float64Array): number {
  const steps = times
    .slice(1)
    .map((t, i) => t - (times[i] as number))
    .sort();
  return steps[steps.length >> 1] as number;
}

/** Quadratic smoothing of samples closer than half an hour. */
function smooth({ times, values }: Run): Run {
  const step = usualStep(times);
  if (step >= SMOOTH_BELOW) return { times, values };
  const m = Math.round(HALF_WINDOW / step);
  const norm = (2 * m - 1) * (2 * m + 1) * (2 * m + 3);
  const out = Float64Array.from(values);
  for (let i = m; i < values.length - m; i++) {
    // The weights stand for samples at one step: where they are not, the record stays as it is.
    const [before, at, after] = [
      times[i - m] as number,
      times[i] as number,
      times[i + m] as number,
    ];
    if (
      Math.abs(at - before - m * step) > UNEVEN * step ||
      Math.abs(after - at - m * step) > UNEVEN * step
    )
      continue;
    let sum = 0;
    for (let k = -m; k <= m; k++) {
      sum += ((3 * (3 * m * m + 3 * m - 1 - 5 * k * k)) / norm) * (values[i + k] as number);
    }
    out[i] = sum;
  }
  return { times, values: out };
}

/** The vertex of the parabola through three samples; the middle one where it is no extreme of theirs. */
function vertex(
  run: Run,
  before: number,
  at: number,
  after: number,
): { time: number; height: number } {
  const [t0, t1, t2] = [
    run.times[before] as number,
    run.times[at] as number,
    run.times[after] as number,
  ];
  const [y0, y1, y2] = [
    run.values[before] as number,
    run.values[at] as number,
    run.values[after] as number,
  ];
  const left = (y1 - y0) / (t1 - t0);
  const right = (y2 - y1) / (t2 - t1);
  const curve = (right - left) / (t2 - t0);
  if (curve === 0) return { time: t1, height: y1 };
  const slope = left + curve * (t1 - t0);
  const time = t1 - slope / (2 * curve);
  return { time, height: y1 - (slope * slope) / (4 * curve) };
}

/** All crests and troughs of a run, alternating; equal neighbouring samples count as one. */
function turnsOf(run: Run): Extreme[] {
  const { times, values } = run;
  const out: Extreme[] = [];
  let before = 0;
  let at = 1;
  while (at < values.length) {
    let after = at + 1;
    while (after < values.length && values[after] === values[at]) after++;
    if (after >= values.length) break;
    const rise = (values[at] as number) - (values[before] as number);
    const fall = (values[after] as number) - (values[at] as number);
    if (rise * fall < 0) {
      const kind = rise > 0 ? 'high' : 'low';
      const flat = after - at > 1;
      const last = after - 1;
      const found = flat
        ? {
            time: ((times[at] as number) + (times[last] as number)) / 2,
            height: values[at] as number,
          }
        : vertex(run, before, at, after);
      out.push({ kind, time: Math.round(found.time), height: found.height });
    }
    if (rise !== 0 || fall !== 0) before = after - 1;
    at = after;
  }
  return out;
}

/**
 * Turns that the record leaves on both sides by the smallest range: of those between, the most extreme of their kind. The
 * ends of the run stand beside the first and the last turn as what the record came from and goes to.
 */
function lasting(
  turns: readonly Extreme[],
  { times, values }: Run,
  smallestRange: number,
): Extreme[] {
  const [first, last] = [turns[0], turns[turns.length - 1]];
  if (!first || !last) return [];
  const beside = ({ kind }: Extreme, at: number): Extreme => ({
    kind: kind === 'high' ? 'low' : 'high',
    time: times[at] as number,
    height: values[at] as number,
  });
  const start = beside(first, 0);
  const out: Extreme[] = [];
  let held = start;
  for (const turn of [...turns, beside(last, values.length - 1)]) {
    const sign = held.kind === 'high' ? 1 : -1;
    if (turn.kind === held.kind) {
      if ((turn.height - held.height) * sign > 0) held = turn;
    } else if ((held.height - turn.height) * sign >= smallestRange) {
      if (held !== start) out.push(held);
      held = turn;
    }
  }
  return out;
}

/** Takes neighbours too near in time away, smallest range first. */
function apart(turns: readonly Extreme[], shortest: number): Extreme[] {
  const kept = [...turns];
  for (;;) {
    let worst = -1;
    let range = Infinity;
    for (let i = 1; i < kept.length; i++) {
      const [a, b] = [kept[i - 1] as Extreme, kept[i] as Extreme];
      const here = Math.abs(b.height - a.height);
      if (b.time - a.time < shortest && here < range) {
        worst = i;
        range = here;
      }
    }
    if (worst < 0) return kept;
    kept.splice(worst - 1, 2);
  }
}

/**
 * The crests and troughs of a run that count as tides.
 *
 * @param run - Samples without a long gap.
 * @param smallestRange - Metres.
 * @param shortest - Milliseconds.
 */
export function extremesOf(
  run: Run,
  smallestRange: number,
  shortest: number,
): { kept: Extreme[]; dropped: number } {
  const smoothed = smooth(run);
  const turns = turnsOf(smoothed);
  const kept = apart(lasting(turns, smoothed, smallestRange), shortest);
  return { kept, dropped: turns.length - kept.length };
}
