/**
 * The bins of the residual's spectrum from which the noise of each line is read: they follow from the runs of samples and
 * the lines alone, so they can be settled before a residual is known.
 *
 * Bins stand a turn of the covered time apart: closer ones are not independent. A bin of which the fit left less than
 * 30 % of the noise is no evidence. A side of a line begins with the first bin that is; bins of the same rank on both
 * sides are one group, so that a slope of the spectrum falls out.
 * @module
 */
import { shareLeftBy } from './share-left.js';
import { coveredBy, type SampleRun, windowOf } from './window.js';

const NEAREST = 0.02; // degrees per hour
const BAND = 0.3;
const FARTHEST = 8; // where nearer bins are too few
const ENOUGH = 7; // bins a side, whatever the band
const MOST = 16; // bins a side
const SPREAD = 0.3; // beyond ENOUGH the distance grows by this share from bin to bin
const LEFT = 0.3; // share of the noise that the fit must have left in a bin
const REACH = 10; // turns within which a line is counted
const LOW = 6; // turns: lines below have no lower side
const LOW_BINS = 40;
const LOW_GROWTH = 1.35; // of groups towards higher speeds

/** Bins that count as one: their mean is taken. */
export interface BinGroup {
  /** Rank beside a line, speed below {@link LineBins.low}: the density is a power of it. */
  readonly at: number;
  /** Places in {@link NoiseBins.speeds}. */
  readonly bins: readonly number[];
}

/** Where the noise of a line is read. */
export interface LineBins {
  /** Degrees per hour. */
  readonly line: number;
  readonly groups: readonly BinGroup[];
  /** A line near 0: the spectrum above is followed down to it. */
  readonly low: boolean;
  /** Whether it is the first of the lines that share these bins, and so has a say in the common slope. */
  readonly first: boolean;
}

/** Bins of all lines. Plain data. */
export interface NoiseBins {
  /** Degrees per hour. */
  readonly speeds: Float64Array;
  /** Share of the noise that the fit left in each. */
  readonly left: Float64Array;
  /** Degrees per hour that a turn of the covered time spans. */
  readonly width: number;
  readonly lines: readonly LineBins[];
}

interface Bin {
  readonly speed: number;
  readonly left: number;
}

/** Usable bins on one side, with their ranks. */
function sideOf(
  line: number,
  sign: 1 | -1,
  width: number,
  leftAt: (speed: number) => number,
): { rank: number; bin: Bin }[] {
  const found: { rank: number; bin: Bin }[] = [];
  const farthest = Math.max(FARTHEST, ENOUGH * width);
  let rank = 1;
  let offset = Math.max(NEAREST, width);
  while (found.length < MOST && offset <= farthest) {
    if (found.length >= ENOUGH && offset > BAND) break;
    const speed = line + sign * offset;
    if (speed < width / 2) break;
    const left = leftAt(speed);
    if (left < LEFT) {
      offset += width;
      continue;
    }
    found.push({ rank, bin: { speed, left } });
    const step = found.length < ENOUGH ? 1 : Math.max(1, Math.floor(SPREAD * rank + 0.5));
    rank += step;
    offset += step * width;
  }
  return found;
}

/**
 * Settles the bins.
 *
 * @param runs - Of the samples, from any hour.
 * @param wanted - Lines whose noise is asked for, degrees per hour; 0 for the mean level.
 * @param lines - All fitted and borrowed lines, 0 among them.
 */
export function binsBeside(
  runs: readonly SampleRun[],
  wanted: readonly number[],
  lines: readonly number[],
): NoiseBins {
  const width = 360 / coveredBy(runs);
  const leftAt = shareLeftBy(windowOf(runs, REACH * width), lines);
  const bins: Bin[] = [];
  const keep = (bin: Bin): number => bins.push(bin) - 1;
  const lowGroups: BinGroup[] = [];
  if (wanted.some((line) => line < LOW * width)) {
    const top = Math.min(LOW_BINS * width, Math.max(FARTHEST, (ENOUGH + 1) * width));
    let group: Bin[] = [];
    let size = 1;
    for (let k = 1; k * width <= top; k++) {
      const left = leftAt(k * width);
      if (left >= LEFT) group.push({ speed: k * width, left });
      if (group.length === 0 || (group.length < Math.floor(size) && (k + 1) * width <= top))
        continue;
      const mean = group.reduce((sum, { speed }) => sum + speed, 0) / group.length;
      lowGroups.push({ at: mean, bins: group.map(keep) });
      group = [];
      size *= LOW_GROWTH;
    }
  }
  const out: LineBins[] = [];
  let counted = -1;
  const order = [...wanted.keys()].sort((a, b) => (wanted[a] as number) - (wanted[b] as number));
  for (const place of order) {
    const line = wanted[place] as number;
    if (line < LOW * width) {
      out[place] = { line, groups: lowGroups, low: true, first: false };
      continue;
    }
    const below = sideOf(line, -1, width, leftAt);
    const above = sideOf(line, 1, width, leftAt);
    const longer = below.length > above.length ? below : above;
    const groups = longer.map(({ rank }, i) => ({
      at: rank,
      bins: [below[i], above[i]].flatMap((found) => (found ? [keep(found.bin)] : [])),
    }));
    // No usable bin between it and the line before: the same bins once more.
    const first = !((below[0]?.bin.speed ?? 0) < counted);
    if (first) counted = line;
    out[place] = { line, groups, low: false, first };
  }
  return {
    speeds: Float64Array.from(bins, ({ speed }) => speed),
    left: Float64Array.from(bins, ({ left }) => left),
    width,
    lines: out,
  };
}
