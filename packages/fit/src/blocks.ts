/**
 * Noise put together from blocks of the residual, taken where chance falls and round its end (H. Künsch 1989; D. Politis
 * and J. Romano 1992), tapered (E. Paparoditis and D. Politis 2001).
 *
 * Blocks of L samples under a half turn of a sine overlap by half, so that their squares add up to 1 and no joins leak
 * the slow noise into the tides. What is drawn at a line is the residual's spectrum seen through the window K of a
 * block: mean of the noise within about 1.5/L, less the share that the fit took out at each line there, K at its distance.
 * @module
 */
import { degreesToRadians, HOUR, type Progress } from '@staithe/core';
import { sin, sinCosInto } from '@staithe/core/trig';
import { shownSpeed, usualStep } from './cadence.js';
import type { Design } from './design.js';
import type { LineNoise } from './noise.js';
import { lineSpeeds } from './noise-of.js';
import { nextShare, type RandomState } from './random.js';
import type { Whitened } from './whitened.js';

/** Blocks to draw. */
export interface Blocks {
  /** The residual, short gaps bridged, long ones cut out. */
  readonly source: Float64Array;
  /** Steps between values of the source, milliseconds. */
  readonly step: number;
  /** The place of each sample that takes part, in steps. */
  readonly places: Float64Array;
  /** Half turn of a sine; its length is even. */
  readonly taper: Float64Array;
}

const SLICE = 65536; // values between two yields: about a millisecond
const LEAST = 0.2; // share left at a line, below which it is not divided further
const REGULAR = 1e-3; // of a step
const THINNEST = 5; // places a sample: beyond, straight lines would be most of the source
const LUNAR_DAY = 24.8412 * HOUR;
// L of n samples show 1/Σ K² = n/(0.587·L) independent bins: 0.587 is the integral of the squared correlation of the taper.
const TAPER = 0.5866;

/**
 * Draws one series of blocks.
 *
 * @param blocks - Of {@link blocksOf}.
 * @param kept - Indices of the samples that take part.
 * @param random - Moves on.
 * @param out - Written to, at the samples that take part.
 */
export function* drawBlocks(
  { source, places, taper }: Blocks,
  kept: Int32Array,
  random: RandomState,
  out: Float64Array,
): Generator<Progress, void, void> {
  const length = taper.length;
  const hop = length / 2;
  const n = source.length;
  const series = new Float64Array((places[places.length - 1] as number) + 1);
  const offset = Math.floor(hop * nextShare(random));
  for (let start = offset - length; start < series.length; start += hop) {
    const from = Math.floor(n * nextShare(random));
    for (let slice = Math.max(0, -start); slice < length; slice += SLICE) {
      const to = Math.min(length, slice + SLICE, series.length - start);
      let k = (from + slice) % n;
      for (let i = slice; i < to; i++) {
        const at = start + i;
        series[at] = (series[at] as number) + (taper[i] as number) * (source[k] as number);
        if (++k === n) k = 0;
      }
      yield { done: Math.max(0, start), total: series.length, stage: 'blocks' };
    }
  }
  for (let i = 0; i < kept.length; i++) {
    out[kept[i] as number] = series[places[i] as number] as number;
  }
}

const sine = (x: number): number => sin(x - 2 * Math.PI * Math.round(x / (2 * Math.PI)));

/** Σ e^{ixt} over n samples about their middle, x in radians. */
function dirichlet(n: number, x: number): number {
  const below = sine(x / 2);
  return Math.abs(below) < 1e-12 ? n : sine((n * x) / 2) / below;
}

/** Window of the taper: |Σ taper·e^{ixt}|² over samples times Σ taper². */
function window(samples: number, length: number, x: number): number {
  const turn = Math.PI / length;
  const sum = (dirichlet(length, x - turn) + dirichlet(length, x + turn)) / 2;
  return (2 * sum * sum) / (samples * length);
}

/** What blocks show at a line. */
export interface Shown {
  /** Share of the noise that the fit left in it. */
  readonly left: number;
  /** Whether the line turns too slowly for a block to hold it apart from the mean. */
  readonly slow: boolean;
}

/** What blocks show at the mean level, then at each fitted constituent. */
export function shownBy(design: Design, { source, step, taper }: Blocks): Shown[] {
  const turns = lineSpeeds(design)
    .slice(0, 1 + design.fitted)
    .map((speed) => degreesToRadians(shownSpeed(speed, step)) * (step / HOUR));
  return turns.map((x) => {
    let left = 1;
    turns.forEach((y, line) => {
      left -= window(source.length, taper.length, x - y);
      if (line > 0) left -= window(source.length, taper.length, x + y);
    });
    return { left: Math.max(LEAST, left), slow: x * taper.length < 3 * Math.PI };
  });
}

/** The step that all distances are whole multiples of, where it leaves most of them filled; else 0. */
function wholeStep(times: Float64Array): number {
  const last = times.length - 1;
  let least = Infinity;
  for (let i = 0; i < last; i++) {
    least = Math.min(least, (times[i + 1] as number) - (times[i] as number));
  }
  for (let i = 0; i < last; i++) {
    const steps = ((times[i + 1] as number) - (times[i] as number)) / least;
    if (Math.abs(steps - Math.round(steps)) > REGULAR) return 0;
  }
  const places = ((times[last] as number) - (times[0] as number)) / least;
  return places < THINNEST * times.length ? least : 0;
}

/** The residual on whole steps where there are any, else one value after the other. */
function sourceOf(
  times: Float64Array,
  step: number,
  { values, kept }: Whitened,
): Pick<Blocks, 'source' | 'step' | 'places'> {
  const count = kept.length;
  const at = new Float64Array(count);
  const own = new Float64Array(count);
  const places = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    at[i] = times[kept[i] as number] as number;
    own[i] = values[kept[i] as number] as number;
    places[i] = i;
  }
  const cadence = step || wholeStep(at);
  if (cadence === 0) return { source: own, step: usualStep(at), places };
  for (let i = 0; i < count; i++) {
    places[i] = Math.round(((at[i] as number) - (at[0] as number)) / cadence);
  }
  const source = new Float64Array((places[count - 1] as number) + 1);
  let size = 0;
  for (let i = 0; i < count; i++) {
    const gap = i > 0 ? ((at[i] as number) - (at[i - 1] as number)) % LUNAR_DAY : 0;
    const steps = Math.max(1, Math.round(gap / cadence));
    const last = own[i - 1] ?? 0;
    const rise = (own[i] as number) - last;
    for (let k = 1; k <= steps; k++) source[size++] = last + (rise * k) / steps;
  }
  return { source: source.subarray(0, size), step: cadence, places };
}

/**
 * @param times - Of the record.
 * @param step - Milliseconds where they are uniform, else 0.
 * @param whitened - The residual.
 * @param noise - Of each line.
 */
export function blocksOf(
  times: Float64Array,
  step: number,
  whitened: Whitened,
  noise: readonly LineNoise[],
): Blocks {
  const found = sourceOf(times, step, whitened);
  const bins = noise.map((line) => line.bins).sort((a, b) => a - b);
  const typical = bins[bins.length >> 1] as number;
  const half = found.source.length / Math.max(4, 2 * TAPER * typical);
  const taper = new Float64Array(2 * Math.max(1, Math.round(half)));
  const pair = new Float64Array(2);
  for (let i = 0; i < taper.length; i++) {
    sinCosInto((Math.PI * (i + 0.5)) / taper.length, pair);
    taper[i] = pair[0] as number;
  }
  return { ...found, taper };
}
