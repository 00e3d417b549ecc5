/**
 * How far the noise of two components is one and the same.
 * @module
 */

/** A complex number of size 0 to 1. */
export interface Coherence {
  readonly re: number;
  readonly im: number;
}

/**
 * @param bins - Places of the bins.
 * @param left - Share of the noise that the fit left in each.
 * @param one - Sums of the first component, real and imaginary part by turns.
 * @param other - Of the second.
 */
export function coherenceFrom(
  bins: readonly number[],
  left: Float64Array,
  one: Float64Array,
  other: Float64Array,
): Coherence {
  let re = 0;
  let im = 0;
  let first = 0;
  let second = 0;
  for (const bin of bins) {
    const share = left[bin] as number;
    const [a, b] = [one[2 * bin] as number, one[2 * bin + 1] as number];
    const [c, d] = [other[2 * bin] as number, other[2 * bin + 1] as number];
    re += (a * c + b * d) / share;
    im += (b * c - a * d) / share;
    first += (a * a + b * b) / share;
    second += (c * c + d * d) / share;
  }
  const root = Math.sqrt(first * second);
  return root > 0 ? { re: re / root, im: im / root } : { re: 0, im: 0 };
}
