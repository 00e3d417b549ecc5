/**
 * Error bars: the covariance of the coefficients from the noise that each line feels.
 * @module
 */
import { type Design, headCount } from './design.js';
import type { LineNoise } from './noise.js';
import { discFactor } from './student.js';

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
