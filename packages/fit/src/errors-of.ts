/**
 * Error bars: the covariance of the coefficients from the noise that each line feels.
 * @module
 */
import type { Progress } from '@staithe/core';
import { degreesToRadians, HOUR } from '@staithe/core';
import { type Design, headCount } from './design.js';
import { type LineNoise, noiseBesideAll, residualOf } from './noise.js';
import type { FitRecord } from './record.js';
import { discFactor } from './student.js';

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
  const found = noiseBesideAll(residual, lines, [0, ...speeds]);
  yield { done: lines.length, total: lines.length, stage: 'noise beside each line' };
  return found.map((noise) => (noise.bins > 0 ? noise : { density: variance, bins: 0 }));
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

/**
 * Squared half axis of the 95 % region of two jointly normal numbers, over their variance: χ² for a variance that is
 * known, 5.991; 2·F(2, 2b) for one that is worth b bins, over Student's factor, which is in the variance already.
 *
 * @param bins - b; 0: known.
 */
export function disc95(bins: number): number {
  return discFactor(bins);
}

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
 * @param disc - Of {@link disc95}.
 */
export function pairErrors(
  a: number,
  b: number,
  caa: number,
  cab: number,
  cbb: number,
  disc: number,
): PairErrors {
  const h2 = a * a + b * b;
  const mean = (caa + cbb) / 2;
  const half = (caa - cbb) / 2;
  const radius95 = Math.sqrt(disc * (mean + Math.sqrt(half * half + cab * cab)));
  if (h2 === 0)
    return { amplitudeSigma: Math.sqrt(mean), phaseSigma: Math.PI / Math.sqrt(3), radius95 };
  const along = (a * a * caa + 2 * a * b * cab + b * b * cbb) / h2;
  const across = (b * b * caa - 2 * a * b * cab + a * a * cbb) / h2;
  // Where the noise covers the origin every phase is possible: uniform over a turn, π/√3.
  const phaseSigma = Math.min(Math.sqrt(Math.max(0, across) / h2), Math.PI / Math.sqrt(3));
  return { amplitudeSigma: Math.sqrt(Math.max(0, along)), phaseSigma, radius95 };
}
