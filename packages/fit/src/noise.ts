/**
 * Noise density at each line, from the residual beside it.
 *
 * A line's coefficients feel the noise at its own frequency alone. The spectrum of the sea is red and has cusps round
 * strong lines (W. Munk, B. Zetler and G. Groves 1965), so the density is taken from the band 0.02 to 0.3°/h away,
 * leaving out the bins within 1/T of any fitted line, which the fit emptied; widened only where bins are too few.
 * I(ω) = |Σ r·e^{−iωt}|²/n has the variance of white noise as its mean.
 * @module
 */
import { degreesToRadians, HOUR } from '@staithe/core';
import { sinCosInto } from '@staithe/core/trig';

const NEAREST = 0.02; // degrees per hour
const BANDS = [0.3, 1, 3];
const ENOUGH = 8;
const MOST = 32;
const RESTART = 1024;

/** Residual without gaps: times from the middle of the record in hours, and values. */
export interface Residual {
  readonly hours: Float64Array;
  readonly values: Float64Array;
  /** Hours between the times where they are uniform and whole, else 0. */
  readonly step: number;
  /** Record length in hours. */
  readonly span: number;
}

/** |Σ r·e^{−iωt}|²/n at a speed in degrees per hour. */
function periodogramAt(
  { hours, values, step }: Residual,
  speed: number,
  pair: Float64Array,
): number {
  const n = values.length;
  const rate = degreesToRadians(speed);
  let re = 0;
  let im = 0;
  let s = 0;
  let c = 1;
  sinCosInto(rate * step, pair);
  const turnSin = pair[0] as number;
  const turnCos = pair[1] as number;
  for (let i = 0; i < n; i++) {
    if (step === 0 || i % RESTART === 0) {
      sinCosInto(rate * (hours[i] as number), pair);
      s = pair[0] as number;
      c = pair[1] as number;
    }
    const value = values[i] as number;
    re += value * c;
    im += value * s;
    const turned = c * turnCos - s * turnSin;
    s = c * turnSin + s * turnCos;
    c = turned;
  }
  return (re * re + im * im) / n;
}

/** Speeds of the bins beside a line that the fit left alone, spread over the band. */
function binsBeside(
  line: number,
  band: number,
  width: number,
  emptied: readonly number[],
): number[] {
  const out: number[] = [];
  const nearest = Math.max(NEAREST, width);
  for (let offset = nearest; offset <= Math.max(band, 6 * width); offset += width) {
    for (const speed of [line - offset, line + offset]) {
      if (speed >= width && emptied.every((other) => Math.abs(other - speed) >= width))
        out.push(speed);
    }
  }
  if (out.length <= MOST) return out;
  return Array.from({ length: MOST }, (_, i) => out[Math.floor((i * out.length) / MOST)] as number);
}

/** The noise that a line feels. */
export interface LineNoise {
  /** Mean of the periodogram over the bins, m². */
  readonly density: number;
  readonly bins: number;
}

/**
 * @param residual - Of the fit.
 * @param line - Speed of the line, degrees per hour; 0 for the mean level.
 * @param emptied - Speeds of all fitted and borrowed lines.
 */
export function noiseBeside(
  residual: Residual,
  line: number,
  emptied: readonly number[],
): LineNoise {
  const width = 360 / residual.span;
  const pair = new Float64Array(2);
  let bins: number[] = [];
  for (const band of BANDS) {
    bins = binsBeside(line, band, width, emptied);
    if (bins.length >= ENOUGH) break;
  }
  const total = bins.reduce((sum, speed) => sum + periodogramAt(residual, speed, pair), 0);
  return {
    density: bins.length > 0 ? total / bins.length : Number.POSITIVE_INFINITY,
    bins: bins.length,
  };
}

/** Gaps taken out, times counted in hours from the middle. */
export function residualOf(times: Float64Array, step: number, values: Float64Array): Residual {
  const kept: number[] = [];
  for (let i = 0; i < values.length; i++) if (!Number.isNaN(values[i])) kept.push(i);
  const first = times[kept[0] as number] as number;
  const last = times[kept[kept.length - 1] as number] as number;
  const middle = (first + last) / 2;
  const whole = step > 0;
  if (whole) {
    // On a uniform grid a gap weighs nothing: 0 keeps the rotation going. n counts what is there.
    const count = values.length;
    return {
      hours: Float64Array.from({ length: count }, (_, i) => ((times[i] as number) - middle) / HOUR),
      values: values.map((v) => (Number.isNaN(v) ? 0 : v * Math.sqrt(count / kept.length))),
      step: step / HOUR,
      span: (last - first + step) / HOUR,
    };
  }
  return {
    hours: Float64Array.from(kept, (i) => ((times[i] as number) - middle) / HOUR),
    values: Float64Array.from(kept, (i) => values[i] as number),
    step: 0,
    span: ((last - first) * kept.length) / (kept.length - 1) / HOUR,
  };
}
