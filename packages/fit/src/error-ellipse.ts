/**
 * The ellipse of errors in the plane of (H cos G, H sin G).
 * @module
 */
import type { Metres } from '@staithe/core';
import { disc95 } from './errors-of.js';

/** Variances and covariance of two coefficients, m². */
export interface PairCovariance {
  readonly aa: number;
  readonly ab: number;
  readonly bb: number;
}

/** The errors of a difference whose ends err each by itself; an end without errors counts as exact. */
export function addErrors(
  first: PairCovariance | undefined,
  second: PairCovariance | undefined,
): PairCovariance | undefined {
  if (!first || !second) return first ?? second;
  return { aa: first.aa + second.aa, ab: first.ab + second.ab, bb: first.bb + second.bb };
}

const LN_2 = 0.6931471805599453;

/**
 * χ² of two degrees of freedom that chance exceeds with a probability: −2 ln p, with ln x = 2 artanh((x − 1)/(x + 1)).
 *
 * @param probability - In (0, 1).
 */
export function chiSquared2(probability: number): number {
  let x = probability;
  let halvings = 0;
  for (; x < 0.75; x *= 2) halvings++;
  const s = (x - 1) / (x + 1);
  // |s| <= 1/5: the first term left out is below 1e-20.
  let series = 0;
  for (let n = 25; n > 0; n -= 2) series = 1 / n + s * s * series;
  return 2 * (halvings * LN_2 - 2 * s * series);
}

/** The larger of the two variances along the axes of the ellipse. */
function longVariance({ aa, ab, bb }: PairCovariance): number {
  const half = (aa - bb) / 2;
  return (aa + bb) / 2 + Math.sqrt(half * half + ab * ab);
}

/** Radius of the disc that holds the 95 % ellipse, metres. */
export function radiusOf(errors: PairCovariance): Metres {
  return Math.sqrt(disc95(0) * longVariance(errors));
}

/** Standard error of the length of (x, y), metres: along it, or where it is nothing the mean of all directions. */
export function lengthSigma(x: number, y: number, { aa, ab, bb }: PairCovariance): Metres {
  const square = x * x + y * y;
  const variance = square > 0 ? (x * x * aa + 2 * x * y * ab + y * y * bb) / square : (aa + bb) / 2;
  return Math.sqrt(Math.max(0, variance));
}

/** Whether (x, y) lies outside the ellipse whose squared half axes are `chiSquared` times the variances. */
export function isBeyond(
  x: number,
  y: number,
  errors: PairCovariance,
  chiSquared: number,
): boolean {
  // An ellipse without width gets a millionth of its length, so that rounding across it is no finding.
  const least = 1e-12 * longVariance(errors);
  const aa = errors.aa + least;
  const bb = errors.bb + least;
  const { ab } = errors;
  const determinant = aa * bb - ab * ab;
  if (!(determinant > 0)) return x !== 0 || y !== 0;
  return x * x * bb - 2 * x * y * ab + y * y * aa > chiSquared * determinant;
}
