/**
 * The periodogram of a residual between the bins too: I(ω) = |Σ v·e^{−iωt}|²/n at speeds half a bin apart or closer.
 *
 * Samples at times of their own are laid on the four nearest points of a fine grid, so that the waves they are summed with
 * come out as cubics through these points (W. Press and G. Rybicki 1989): within 0.1 % of the sums where the grid turns by
 * 22.5° a step, the fastest wave here.
 * @module
 */
import type { Progress } from '@staithe/core';
import { powerOfTwo, transform, turnsOf } from '../transform.js';
import type { ResidualSamples } from './residual-samples.js';

/** Power at speeds k·spacing. */
export interface Periodogram {
  /** Degrees per hour from one to the next. */
  readonly spacing: number;
  /** m²: the variance of white noise of the same density. */
  readonly power: Float64Array;
}

const FASTEST = 200; // degrees an hour: beyond the tides of species 12
const TURN = 22.5; // degrees that the fastest wave turns in a step of the fine grid

/** Samples on a grid. */
interface Gridded {
  readonly values: Float64Array;
  /** Hours. */
  readonly step: number;
}

/** Lays samples on a fine grid, each on its four nearest points with the weights of a cubic. */
function laidOut({ hours, values }: ResidualSamples, step: number): Gridded {
  const first = hours[0] as number;
  const count = Math.ceil(((hours[hours.length - 1] as number) - first) / step) + 4;
  const out = new Float64Array(count);
  for (let i = 0; i < values.length; i++) {
    const at = ((hours[i] as number) - first) / step;
    const k = Math.floor(at);
    const x = at - k;
    const value = values[i] as number;
    // Points k − 1 to k + 2, one further on so that none lies before the grid.
    out[k] = (out[k] as number) - (value * x * (x - 1) * (x - 2)) / 6;
    out[k + 1] = (out[k + 1] as number) + (value * (x + 1) * (x - 1) * (x - 2)) / 2;
    out[k + 2] = (out[k + 2] as number) - (value * (x + 1) * x * (x - 2)) / 2;
    out[k + 3] = (out[k + 3] as number) + (value * (x + 1) * x * (x - 1)) / 6;
  }
  return { values: out, step };
}

/** The periodogram of samples, up to 200° an hour or half a turn a sample. */
export function* periodogramOf(samples: ResidualSamples): Generator<Progress, Periodogram, void> {
  const fastest = Math.min(FASTEST, 180 / samples.usual);
  const { values, step } = samples.step > 0 ? samples : laidOut(samples, TURN / fastest);
  const length = powerOfTwo(2 * values.length);
  const spacing = 360 / (length * step);
  const re = new Float64Array(length);
  const im = new Float64Array(length);
  re.set(values);
  yield* transform(re, im, yield* turnsOf(length));
  const count = Math.min(length / 2, Math.floor(fastest / spacing)) + 1;
  const power = new Float64Array(count);
  for (let k = 0; k < count; k++) {
    const [a, b] = [re[k] as number, im[k] as number];
    power[k] = (a * a + b * b) / samples.samples;
  }
  return { spacing, power };
}
