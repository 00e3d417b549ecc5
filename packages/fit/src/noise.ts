/**
 * Noise density at each line, from the residual beside it.
 *
 * A line's coefficients feel the noise at its own frequency alone. The spectrum of the sea is red and has cusps round
 * strong lines (W. Munk, B. Zetler and G. Groves 1965), so the density is read from the nearest bins that the fit left
 * whole (docs/fitting.md). I(ω) = |Σ r·e^{−iωt}|²/n has the variance of white noise as its mean, less the share that the
 * fit took out. Three steps: which bins (`binsBeside`), what they hold (`sumsAt`; sums add up over chunks of a record),
 * what follows (`densityFrom`).
 * @module
 */
import { degreesToRadians, HOUR, wrapDegrees } from '@staithe/core';
import { sinCosInto } from '@staithe/core/trig';
import { exponential, logarithm } from './logarithm.js';
import type { BinGroup, LineBins, NoiseBins } from './noise-bins.js';
import { studentFactor } from './student.js';
import { coveredBy, runsOf, type SampleRun } from './window.js';

const RESTART = 1024;
const SLOPE_DOUBT = 0.5; // of the common slope before any bin is seen; its mean is 0
const LOW_SLOPE = -0.5; // of the spectrum near 0 where bins do not tell, between white and red noise, and its doubt
const LOW_SLOPE_DOUBT = 0.7;
const LOW_WIDTH = 2.5; // of ln speed, over which bins near 0 count
const EULER = 0.5772156649015329;
const LEAST = 1e-300;
const ROOT_OF_MEAN = [0.886226925452758, 0.9399856029866254]; // √ of the mean of one and of two exponential variables, expected

/** Residual with gaps as zeros or taken out: times from the middle of the record in hours, and values. */
export interface Residual {
  readonly hours: Float64Array;
  readonly values: Float64Array;
  /** Hours between the times where they are uniform and whole, else 0. */
  readonly step: number;
  /** Hours that the samples cover, gaps apart: bins a turn of this apart are independent. */
  readonly covered: number;
  readonly runs: readonly SampleRun[];
  readonly samples: number;
}

/** The noise that a line feels. */
export interface LineNoise {
  /** Variance of white noise of the same density, m², times `studentFactor`: ±1.96 σ holds 95 %. */
  readonly density: number;
  /** Independent bins that the density is worth, not a whole number; 0: it is taken as known. */
  readonly bins: number;
  /** The density as estimated, without that factor, m². */
  readonly level?: number | undefined;
}

/**
 * Σ r·e^{−iωt} at each speed. Sums of chunks add up where their hours count from the same instant.
 *
 * @param residual - Values that are not numbers must have been made 0.
 * @param speeds - Degrees per hour.
 * @returns Real and imaginary part by turns.
 */
export function sumsAt(
  { hours, values, step }: Pick<Residual, 'hours' | 'values' | 'step'>,
  speeds: Float64Array,
): Float64Array {
  const out = new Float64Array(2 * speeds.length);
  const pair = new Float64Array(2);
  const count = values.length;
  for (let k = 0; k < speeds.length; k++) {
    const speed = speeds[k] as number;
    let re = 0;
    let im = 0;
    sinCosInto(degreesToRadians(wrapDegrees(speed * step)), pair);
    const turnSin = pair[0] as number;
    const turnCos = pair[1] as number;
    const length = step === 0 ? 1 : RESTART;
    for (let from = 0; from < count; from += length) {
      const to = Math.min(count, from + length);
      sinCosInto(degreesToRadians(wrapDegrees(speed * (hours[from] as number))), pair);
      let s = pair[0] as number;
      let c = pair[1] as number;
      for (let i = from; i < to; i++) {
        const value = values[i] as number;
        re += value * c;
        im -= value * s;
        const turned = c * turnCos - s * turnSin;
        s = c * turnSin + s * turnCos;
        c = turned;
      }
    }
    out[2 * k] = re;
    out[2 * k + 1] = im;
  }
  return out;
}

/** The logarithm of a group's density: what it says, and how sure that is. */
interface Reading {
  /** Logarithm of the rank or of the speed. */
  readonly x: number;
  readonly y: number;
  readonly variance: number;
}

/** The mean of g exponential variables has ln(mean) + ψ(g) − ln g for its expected logarithm, ψ′(g) for its variance. */
function readingOf({ at, bins }: BinGroup, power: (bin: number) => number): Reading {
  const g = bins.length;
  let psi = -EULER;
  let variance = (Math.PI * Math.PI) / 6;
  for (let k = 1; k < g; k++) {
    psi += 1 / k;
    variance -= 1 / (k * k);
  }
  const sum = bins.reduce((total, bin) => total + power(bin), 0);
  return { x: logarithm(at), y: logarithm(Math.max(LEAST, sum)) - psi, variance };
}

interface Weighted extends Reading {
  readonly weight: number;
}

function meanOf(readings: readonly Weighted[], of: (reading: Weighted) => number): number {
  let sum = 0;
  let total = 0;
  for (const reading of readings) {
    sum += reading.weight * of(reading);
    total += reading.weight;
  }
  return sum / total;
}

/** Products about the mean, x with x and x with y. */
function slopeSums(readings: readonly Weighted[]): { xx: number; xy: number } {
  const x0 = meanOf(readings, ({ x }) => x);
  let xx = 0;
  let xy = 0;
  for (const { x, y, weight } of readings) {
    xx += weight * (x - x0) * (x - x0);
    xy += weight * (x - x0) * y;
  }
  return { xx, xy };
}

interface Slope {
  readonly value: number;
  readonly variance: number;
}

/** The slope towards the line that all lines share: a cusp rises, so it is never positive. */
function commonSlope(lines: readonly (readonly Reading[] | undefined)[]): Slope {
  let xx = 1 / (SLOPE_DOUBT * SLOPE_DOUBT);
  let xy = 0;
  for (const readings of lines) {
    if (!readings || readings.length === 0) continue;
    const sums = slopeSums(readings.map((r) => ({ ...r, weight: 1 / r.variance })));
    xx += sums.xx;
    xy += sums.xy;
  }
  return { value: Math.min(0, xy / xx), variance: 1 / xx };
}

function noiseOfBins(level: number, bins: number): LineNoise {
  return { density: level * studentFactor(bins), bins, level };
}

/** From the logarithm of a density and its variance v: b bins with ψ′(b) = v, nearly, and their mean. */
function noiseFrom(y: number, variance: number): LineNoise {
  const bins = Math.max(1, 1 / variance + 0.6);
  // ψ(b) − ln b: what an estimate of b bins has for its expected logarithm.
  return noiseOfBins(exponential(y - 1 / (2 * bins) - 1 / (12 * bins * bins)), bins);
}

/**
 * Beside a line: the mean of the square roots over ranks, so that a line that is not fitted does not rule it, near ranks
 * weighing more, all brought to the first rank by the common slope.
 */
function besideLine(
  groups: readonly BinGroup[],
  slope: Slope,
  power: (bin: number) => number,
): LineNoise {
  let before = 0;
  let total = 0;
  let root = 0;
  let way = 0;
  let variance = 0;
  for (const { at, bins } of groups) {
    const size = Math.min(bins.length, 2) - 1;
    // A group stands for the ranks since the last one.
    const weight = ((at - before) / (Math.sqrt(at) * Math.sqrt(Math.sqrt(at)))) * (bins.length / 2);
    before = at;
    const mean = bins.reduce((sum, bin) => sum + power(bin), 0) / bins.length;
    const far = logarithm(at);
    const expected = ROOT_OF_MEAN[size] as number;
    root += (weight * Math.sqrt(mean) * exponential((-slope.value * far) / 2)) / expected;
    way += weight * far;
    variance += weight * weight * 4 * (1 / (expected * expected) - 1);
    total += weight;
  }
  way /= total;
  variance = variance / (total * total) + slope.variance * way * way;
  return noiseOfBins((root / total) * (root / total), 1 / variance);
}

/** Near 0: a power law through the bins above, followed down to the line. */
function lowLine(readings: readonly Reading[], speed: number): LineNoise {
  const at = logarithm(speed);
  const weighted = readings.map((r): Weighted => {
    const far = (r.x - at) / LOW_WIDTH;
    return { ...r, weight: 1 / (r.variance * (1 + far * far)) };
  });
  const total = weighted.reduce((sum, { weight }) => sum + weight, 0);
  const x0 = meanOf(weighted, ({ x }) => x);
  const way = at - x0;
  const { xx, xy } = slopeSums(weighted);
  const prior = 1 / (LOW_SLOPE_DOUBT * LOW_SLOPE_DOUBT);
  const slope = (xy + LOW_SLOPE * prior) / (xx + prior);
  const doubt = (way / (xx + prior)) * (way / (xx + prior)) * prior;
  const variance = weighted.reduce((sum, { x, weight, variance: own }) => {
    const share = weight / total + (weight * (x - x0) * way) / (xx + prior);
    return sum + share * share * own;
  }, doubt);
  return noiseFrom(meanOf(weighted, ({ y }) => y) + slope * way, variance);
}

/**
 * The noise of each line from what its bins hold.
 *
 * @param bins - Of `binsBeside`.
 * @param sums - Of {@link sumsAt} at its speeds.
 * @param samples - In the sums.
 * @returns In the order of the lines asked for; no bins where the fit left no evidence near the line.
 */
export function densityFrom(bins: NoiseBins, sums: Float64Array, samples: number): LineNoise[] {
  const power = (bin: number): number => {
    const re = sums[2 * bin] as number;
    const im = sums[2 * bin + 1] as number;
    return (re * re + im * im) / (samples * (bins.left[bin] as number));
  };
  const readings = bins.lines.map(({ groups }) => groups.map((group) => readingOf(group, power)));
  const slope = commonSlope(
    bins.lines.map(({ low, first }, i) => (first && !low ? readings[i] : undefined)),
  );
  return bins.lines.map(({ line, groups, low }: LineBins, i) => {
    const own = readings[i] as Reading[];
    if (own.length === 0) return { density: 0, bins: 0 };
    // The mean level is read at half a turn: below that no record shows anything.
    if (low) return lowLine(own, Math.max(line, bins.width / 2));
    return besideLine(groups, slope, power);
  });
}

/**
 * The residual as the periodogram takes it.
 *
 * @param times - Instants.
 * @param step - Milliseconds where they are uniform, else 0.
 * @param values - NaN is a gap.
 */
export function residualOf(times: Float64Array, step: number, values: Float64Array): Residual {
  const kept = Float64Array.from(values.keys()).filter((i) => !Number.isNaN(values[i]));
  const first = times[kept[0] as number] as number;
  const last = times[kept[kept.length - 1] as number] as number;
  const middle = (first + last) / 2;
  const samples = kept.length;
  const runs = runsOf(
    kept.map((i) => ((times[i] as number) - middle) / HOUR),
    step / HOUR,
  );
  const covered = coveredBy(runs);
  const common = { step: step / HOUR, covered, runs, samples };
  // On a uniform grid a gap weighs nothing: 0 keeps the rotation going.
  if (step > 0) {
    return {
      hours: times.map((t) => (t - middle) / HOUR),
      values: values.map((v) => (Number.isNaN(v) ? 0 : v)),
      ...common,
    };
  }
  return {
    hours: kept.map((i) => ((times[i] as number) - middle) / HOUR),
    values: kept.map((i) => values[i] as number),
    ...common,
  };
}
