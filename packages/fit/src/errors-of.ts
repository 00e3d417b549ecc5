/**
 * Error bars: the covariance of the coefficients from the noise that each line feels.
 * @module
 */
import type { Progress } from '@staithe/core';
import { degreesToRadians, HOUR } from '@staithe/core';
import { type Design, headCount } from './design.js';
import { type LineNoise, noiseBeside, residualOf } from './noise.js';
import type { FitRecord } from './record.js';

/** Noise of the mean level first, then of each fitted constituent. */
export function* noiseOf(
  design: Design,
  record: FitRecord,
  residuals: Float64Array,
  errorModel: 'residual-spectrum' | 'independent',
  variance: number,
): Generator<Progress, LineNoise[], void> {
  const { basis, fitted } = design;
  if (errorModel === 'independent') {
    return Array.from({ length: fitted + 1 }, () => ({ density: variance, bins: 0 }));
  }
  const residual = residualOf(record.times, record.step, residuals);
  const speeds = Array.from(basis.speeds, (speed) => (speed * HOUR) / degreesToRadians(1));
  const lines = [0, ...speeds.slice(0, fitted)];
  const out: LineNoise[] = [];
  for (const line of lines) {
    const noise = noiseBeside(residual, line, [0, ...speeds]);
    out.push(noise.bins > 0 ? noise : { density: variance, bins: 0 });
    yield { done: out.length, total: lines.length, stage: 'noise beside each line' };
  }
  return out;
}

/** Covariance of the coefficients: (AᵀA)⁻¹ between the noise of the two columns. */
export function covarianceOf(
  design: Design,
  inverse: Float64Array,
  noise: readonly LineNoise[],
): Float64Array {
  const count = design.order.length;
  const head = headCount(design);
  const sigma = (column: number): number => {
    const line = column < head ? 0 : 1 + ((column - head) >> 1);
    return Math.sqrt((noise[line] as LineNoise).density);
  };
  return inverse.map((value, at) => value * sigma(Math.floor(at / count)) * sigma(at % count));
}

/** Half axes of the 95 % region of two jointly normal numbers: √5.991 of the standard deviation. */
const DISC_95 = 2.447746830680816;

/** Amplitude, phase lag and their errors from a pair of coefficients. */
export interface PairErrors {
  readonly amplitudeSigma: number;
  /** Radians. */
  readonly phaseSigma: number;
  /** Radius of the disc that holds the 95 % ellipse. */
  readonly radius95: number;
}

/**
 * @param a - H cos G.
 * @param b - H sin G.
 * @param caa - Variance of a.
 * @param cab - Covariance.
 * @param cbb - Variance of b.
 */
export function pairErrors(
  a: number,
  b: number,
  caa: number,
  cab: number,
  cbb: number,
): PairErrors {
  const h2 = a * a + b * b;
  const mean = (caa + cbb) / 2;
  const half = (caa - cbb) / 2;
  const radius95 = DISC_95 * Math.sqrt(mean + Math.sqrt(half * half + cab * cab));
  if (h2 === 0)
    return { amplitudeSigma: Math.sqrt(mean), phaseSigma: Math.PI / Math.sqrt(3), radius95 };
  const along = (a * a * caa + 2 * a * b * cab + b * b * cbb) / h2;
  const across = (b * b * caa - 2 * a * b * cab + a * a * cbb) / h2;
  // Where the noise covers the origin every phase is possible: uniform over a turn, π/√3.
  const phaseSigma = Math.min(Math.sqrt(Math.max(0, across) / h2), Math.PI / Math.sqrt(3));
  return { amplitudeSigma: Math.sqrt(Math.max(0, along)), phaseSigma, radius95 };
}
