/**
 * The spectrum of the noise on a fine grid of speeds, from the residual at a uniform step.
 *
 * |Σ r·e^{−iωt}|²/n, less what the fit did to it: it emptied the spectrum at its lines, so bins within a turn of the
 * record of a line get the density that the line was found to feel, and others near it are divided by the share of the
 * noise that the fit left (share-left.ts). Less what gaps did: they will do it again to what is drawn. Zeros as long as
 * the record follow it, so that what is drawn does not run from its end into its start.
 * @module
 */
import { HOUR, type Progress } from '@staithe/core';
import { shownSpeed } from './cadence.js';
import { type Design, headCount } from './design.js';
import type { LineNoise } from './noise.js';
import { lineSpeeds } from './noise-of.js';
import { shareLeftBy } from './share-left.js';
import { powerOfTwo, transform, type Turns, turnsOf } from './transform.js';
import type { Whitened } from './whitened.js';
import { runsOf, windowOf } from './window.js';

const LEFT = 0.3; // share that the fit must have left in a bin
const REACH = 10; // turns of the record within which a line is counted
const SEEN = 0.25; // share of the pairs at a lag that must be there; fewer are not made up for in full
const SLICE = 65536; // bins between two yields
const STAGE = 'spectrum of the residual';

/** A spectrum to draw from. */
export interface Spectrum {
  /** Of the waves at speeds from 0 to half a turn a step, for a complex transform of which the real part is wanted. */
  readonly amplitudes: Float64Array;
  readonly turns: Turns;
  /** Buffers of the transform, written over at each draw. */
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** A line as the samples show it. */
interface Line {
  /** In bins, from 0 to half their count. */
  readonly at: number;
  /** Bins on either side that the fit emptied. */
  readonly width: number;
  /** Variance of white noise of the same density. */
  readonly density: number;
}

/** Fitted lines in the order of their bins; `turn` in bins is a turn of the record. */
function linesOf(
  design: Design,
  noise: readonly LineNoise[],
  shown: readonly number[],
  bins: (speed: number) => number,
  turn: number,
): Line[] {
  // A rate and steps take the slowest of the noise along with the mean.
  const slow = (1 + headCount(design) - design.given) / 2;
  return shown
    .slice(0, 1 + design.fitted)
    .map((speed, line) => ({
      at: bins(speed),
      width: line === 0 ? slow * turn : turn,
      density: (noise[line] as LineNoise).density,
    }))
    .sort((a, b) => a.at - b.at);
}

/** |Σ x·e^{−2πikt/n}|², k below n. */
function* powerOf(
  x: Float64Array,
  length: number,
  turns: Turns,
): Generator<Progress, Float64Array, void> {
  const re = new Float64Array(length);
  const im = new Float64Array(length);
  re.set(x);
  yield* transform(re, im, turns);
  for (let k = 0; k < length; k++) {
    const [a, b] = [re[k] as number, im[k] as number];
    re[k] = a * a + b * b;
  }
  yield { done: 1, total: 1, stage: STAGE };
  return re;
}

/** Divides by the shares that the fit left, and fills what it emptied. */
function* refill(
  power: Float64Array,
  lines: readonly Line[],
  leftAt: (bin: number) => number,
): Generator<Progress, void, void> {
  const n = power.length;
  let next = 0;
  for (let k = 0; k <= n / 2; k++) {
    while (next < lines.length && (lines[next] as Line).at < k) next++;
    let nearest: Line | undefined;
    let distance = Infinity;
    for (const line of [lines[next - 1], lines[next]]) {
      if (!line || Math.abs(k - line.at) / line.width >= distance) continue;
      nearest = line;
      distance = Math.abs(k - line.at) / line.width;
    }
    if (!nearest || distance > REACH) continue;
    const left = distance > 1 ? leftAt(k) : 0;
    const value = left < LEFT ? nearest.density : (power[k] as number) / left;
    power[k] = value;
    power[(n - k) % n] = value;
    if (k % 64 === 0) yield { done: k, total: n / 2, stage: STAGE };
  }
}

/**
 * Takes out what the gaps did. The correlation at each lag was seen at the pairs of samples that both took part, against
 * all pairs of a record without gaps.
 *
 * @param power - Written to.
 * @param window - Of the samples, in any unit; written over.
 * @param covered - Steps from the first sample to the last, one more included.
 */
function* withoutGaps(
  power: Float64Array,
  window: Float64Array,
  covered: number,
  turns: Turns,
): Generator<Progress, void, void> {
  const n = power.length;
  const unused = new Float64Array(n);
  yield* transform(power, unused, turns);
  yield* transform(window, unused.fill(0), turns);
  const all = window[0] as number;
  for (let lag = 0; lag < n; lag++) {
    const whole = Math.max(0, 1 - Math.min(lag, n - lag) / covered);
    const seen = Math.max((window[lag] as number) / all, SEEN * whole);
    power[lag] = whole > 0 ? ((power[lag] as number) * whole) / (n * seen) : 0;
  }
  yield { done: 1, total: 1, stage: STAGE };
  yield* transform(power, unused.fill(0), turns);
  for (let k = 0; k < n; k++) power[k] = Math.max(0, power[k] as number);
  yield { done: 1, total: 1, stage: STAGE };
}

/**
 * @param design - Of the fit.
 * @param step - Milliseconds between times.
 * @param whitened - The residual.
 * @param noise - Of each line.
 */
export function* spectrumOf(
  design: Design,
  step: number,
  { values, shown, kept }: Whitened,
  noise: readonly LineNoise[],
): Generator<Progress, Spectrum, void> {
  const length = powerOfTwo(2 * values.length);
  const half = length / 2;
  const turns = yield* turnsOf(length);
  const power = yield* powerOf(values, length, turns);
  let worth = 0;
  for (let i = 0; i < shown.length; i++) worth += (shown[i] as number) * (shown[i] as number);
  for (let k = 0; k < length; k++) power[k] = (power[k] as number) / worth;
  yield { done: 1, total: 1, stage: STAGE };

  const covered = (kept[kept.length - 1] as number) - (kept[0] as number) + 1;
  const degrees = (360 * HOUR) / (length * step); // an hour that a bin spans
  const speeds = lineSpeeds(design).map((speed) => shownSpeed(speed, step));
  const turn = length / covered;
  const hours = new Float64Array(kept.length);
  for (let i = 0; i < hours.length; i++) hours[i] = ((kept[i] as number) * step) / HOUR;
  yield { done: 1, total: 1, stage: STAGE };
  const runs = runsOf(hours, step / HOUR);
  yield { done: 1, total: 1, stage: STAGE };
  const leftOf = shareLeftBy(windowOf(runs, REACH * turn * degrees), speeds);
  const lines = linesOf(design, noise, speeds, (speed) => speed / degrees, turn);
  yield* refill(power, lines, (bin) => leftOf(bin * degrees));
  if (worth < covered) {
    yield* withoutGaps(power, yield* powerOf(shown, length, turns), covered, turns);
  }
  const amplitudes = new Float64Array(half + 1);
  for (let k = 0; k <= half; k++) {
    amplitudes[k] = Math.sqrt((4 * (power[k] as number)) / length); // each stands for its mirror too
    if (k % SLICE === SLICE - 1) yield { done: k, total: half, stage: STAGE };
  }
  for (const alone of [0, half])
    amplitudes[alone] = Math.sqrt((2 * (power[alone] as number)) / length);
  return { amplitudes, turns, re: power, im: new Float64Array(length) };
}
