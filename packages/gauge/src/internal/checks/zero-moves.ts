/**
 * Steps of the zero: a sudden, lasting shift of the residual.
 *
 * Method: on both sides of every sample a straight line of common slope is fitted over half an hour to four hours,
 * whichever is quietest here; the jump between the two lines is compared with the spread of such jumps over the record
 * and in the half day around, so weather that comes and goes over hours is no step. Across a gap the means of a tidal
 * day are compared, and their jump with such jumps as far apart. A jump that longer lines and the means of a tidal day
 * and of ten days do not show is a squall. Where weather is as large as the jump, those say little: a clear jump is also
 * taken where they differ from it by no more than weather makes such jumps differ.
 *
 * What it finds: of 399 steps put into the hourly record of La Jolla 2011-2019 (residual 65 mm), one in a year of it,
 * 96 % of those of 20 cm, 74 % of 12 cm, 20 % of 8 cm. Nobody put one into 33 overlapping years of it, and 1 is
 * found, none in the nine years at once. In a year every 6 minutes under red weather of 5 cm nine of ten of 8 cm.
 * @module
 */
import { HOUR } from '@staithe/core';
import type { ZeroMoved } from '../../findings.js';
import { sampleOf, spreadOf } from '../robust.js';

/** Samples that can be trusted, with what is left after the expected curve. */
export interface KeptResidual {
  readonly times: Float64Array;
  readonly residual: Float64Array;
  readonly step: number;
}

const SIGNIFICANT = 5; // robust sigmas
/** Share of the jump that must be there on longer lines and in the means on both sides. */
const LINES: readonly (readonly [window: number, share: number])[] = [
  [6 * HOUR, 0.6],
  [12 * HOUR, 0.6],
];
const MEANS: readonly (readonly [window: number, share: number])[] = [
  [25 * HOUR, 0.4],
  [240 * HOUR, 0.3],
];
// Where weather is as large as the jump, its share there says little: a clear one need only agree with lines and means.
const CLEAR = 9; // robust sigmas; squalls of Grand Isle that pass the rest reach 8.6
const BAND = 2.5; // robust sigmas of such jumps over the record by which lines and means may differ from the jump
const TIDAL_DAY = 25 * HOUR;
const APART = 12 * HOUR; // of two jumps nearer than this the clearer one counts
const WINDOWS: readonly number[] = [0.5, 1, 2, 4].map((hours) => hours * HOUR);
const LOOKS = 4000; // positions looked at for a spread
const AROUND = 12 * HOUR;
const NEAR_LOOKS = 200;
const LONGEST_GAP = 60 * 24 * HOUR;

/** The jump between the lines that end at sample `before` and begin at sample `after`; NaN with too few samples. */
function jumpAt(kept: KeptResidual, before: number, after: number, window: number): number {
  const { times, residual, step } = kept;
  const needed = Math.max(2, (0.6 * window) / step);
  const sums = (from: number, direction: 1 | -1): [number, number, number, number] => {
    const origin = times[from] as number;
    let count = 0;
    let time = 0;
    let level = 0;
    for (let i = from; i >= 0 && i < times.length; i += direction) {
      const away = (times[i] as number) - origin;
      if (away >= window || away <= -window) break;
      count++;
      time += away;
      level += residual[i] as number;
    }
    const middle = time / count;
    const mean = level / count;
    let across = 0;
    let along = 0;
    for (let k = 0, i = from; k < count; k++, i += direction) {
      const away = (times[i] as number) - origin - middle;
      across += away * ((residual[i] as number) - mean);
      along += away * away;
    }
    // Where the line stands at the sample itself follows from its mean, its middle and the common slope.
    return count >= needed ? [mean, middle, across, along] : [Number.NaN, 0, 0, 1];
  };
  const [mean1, middle1, across1, along1] = sums(before, -1);
  const [mean2, middle2, across2, along2] = sums(after, 1);
  const slope = (across1 + across2) / (along1 + along2);
  const lag = (times[after] as number) - (times[before] as number);
  return mean2 - mean1 - slope * (middle2 - middle1 + lag);
}

/** Difference of the means over a window up to sample `before` and from sample `after` on. */
function meanJump(kept: KeptResidual, before: number, after: number, window: number): number {
  const { times, residual } = kept;
  const mean = (from: number, direction: 1 | -1): number => {
    let sum = 0;
    let count = 0;
    for (let i = from; i >= 0 && i < times.length; i += direction) {
      if (Math.abs((times[i] as number) - (times[from] as number)) >= window) break;
      sum += residual[i] as number;
      count++;
    }
    return sum / count;
  };
  return mean(after, 1) - mean(before, -1);
}

function firstFrom(times: Float64Array, time: number): number {
  let low = 0;
  let high = times.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((times[middle] as number) < time) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Spread of the jumps, of one kind or the other, between windows that stand `lag` apart. */
function spreadAt(kept: KeptResidual, lag: number, window: number, jump: typeof jumpAt): number {
  const { times } = kept;
  const stride = Math.max(1, Math.floor(times.length / LOOKS));
  return spreadOf(
    sampleOf(Math.floor((times.length - 1) / stride), (k) => {
      const before = k * stride;
      const after = firstFrom(times, (times[before] as number) + lag);
      return after < times.length ? jump(kept, before, after, window) : Number.NaN;
    }),
  );
}

/** Spread of the jumps in the days around a sample, the windows that see its own jump left out: high in a storm. */
function spreadAround(kept: KeptResidual, at: number, window: number): number {
  const { times } = kept;
  const time = times[at] as number;
  const first = firstFrom(times, time - AROUND);
  const end = firstFrom(times, time + AROUND);
  const stride = Math.max(1, Math.floor((end - first) / NEAR_LOOKS));
  return spreadOf(
    sampleOf(Math.floor((end - first) / stride), (k) => {
      const i = first + k * stride;
      const near = Math.abs((times[i] as number) - time) <= window;
      return near || i === 0 ? Number.NaN : jumpAt(kept, i - 1, i, window);
    }),
  );
}

/** Finds the steps of the zero in a residual. */
export function findZeroMoves(kept: KeptResidual): readonly ZeroMoved[] {
  const { times, step } = kept;
  if (times.length < 100) return [];
  const windows = WINDOWS.map((w) => Math.max(w, 3 * step));
  const spreads = windows.map((w) => spreadAt(kept, step, w, jumpAt));
  const least = Math.min(...spreads);
  const quietest = windows[spreads.indexOf(least)] as number;
  const known = new Map<number, number>();
  /** Spread over the record of the jumps of one window: what weather does to them. Measured when first asked for. */
  const spreadOver = (window: number, kind: typeof jumpAt): number => {
    const spread = known.get(window) ?? spreadAt(kept, step, window, kind);
    known.set(window, spread);
    return spread;
  };
  const found: (ZeroMoved & { score: number })[] = [];
  for (let i = 1; i < times.length; i++) {
    const lag = (times[i] as number) - (times[i - 1] as number);
    if (lag > LONGEST_GAP) continue;
    const away = lag > 1.5 * step;
    // No line reaches over a gap: there the means of a tidal day are compared.
    const [jump, window] = away ? [meanJump, TIDAL_DAY] : [jumpAt, quietest];
    const change = jump(kept, i - 1, i, window);
    if (!(Math.abs(change) > SIGNIFICANT * least)) continue;
    const own = away ? spreadAt(kept, lag, window, jump) : spreadAround(kept, i, window);
    const sigma = Math.max(least, own);
    const score = Math.abs(change) / sigma;
    if (!(score > SIGNIFICANT)) continue;
    const longer = [
      ...(away ? [] : LINES.map(([w, share]) => ({ w, share, kind: jumpAt }))),
      ...MEANS.map(([w, share]) => ({ w, share, kind: meanJump })),
    ].map(({ w, share, kind }) => ({ w, share, kind, seen: kind(kept, i - 1, i, w) / change }));
    const stands = longer.every(({ share, seen }) => seen > share);
    const agrees = (): boolean =>
      longer.every(({ w, kind, seen }) => {
        const band = (BAND * spreadOver(w, kind)) / Math.abs(change);
        return Math.abs(seen - 1) < band;
      });
    if (!stands && (away || score < CLEAR || !agrees())) continue;
    const entry = { kind: 'zero-moved' as const, at: times[i] as number, change, sigma, score };
    const last = found[found.length - 1];
    if (!last || entry.at - last.at > APART) found.push(entry);
    else if (score > last.score) found[found.length - 1] = entry;
  }
  return found.map(({ kind, at, change, sigma }) => ({ kind, at, change, sigma }));
}
