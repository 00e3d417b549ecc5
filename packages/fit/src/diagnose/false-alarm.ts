/**
 * When a bin of a periodogram is larger than chance lets one of many be, and the noise beside it.
 *
 * Bins of noise are exponentially distributed. The r smallest of b bins, the others counted as large as the largest of
 * these, give a mean that is distributed as that of r bins (B. Epstein and M. Sobel 1953): lines among the neighbours
 * do not raise it. A bin over such a mean exceeds x by chance in (1 + x/r)^−r of cases: F(2, 2r).
 * @module
 */

/** The noise beside a bin. */
export interface Beside {
  /** m². */
  readonly level: number;
  /** r: bins that it is the mean of. */
  readonly bins: number;
}

const KEPT = 0.75;

/**
 * The mean of exponentially distributed bins, unmoved by a quarter of them.
 *
 * @param bins - At least one; sorted in place.
 */
export function levelOf(bins: Float64Array): Beside {
  bins.sort();
  const kept = Math.max(1, Math.floor(KEPT * bins.length));
  const largest = bins[kept - 1] as number;
  let sum = (bins.length - kept) * largest;
  for (let i = 0; i < kept; i++) sum += bins[i] as number;
  return { level: sum / kept, bins: kept };
}

/**
 * The r-th root of a number from 1 on, by square roots and Newton's method: exactly specified operations alone.
 *
 * @param value - 1 or more.
 * @param r - A whole number from 1 on.
 */
export function rootOf(value: number, r: number): number {
  // Square roots as long as they stay above the root; from there all steps of a convex power fall.
  let root = value;
  for (let power = 2; power <= r; power *= 2) root = Math.sqrt(root);
  for (;;) {
    let power = 1;
    for (let k = 1; k < r; k++) power *= root;
    const next = root - (root - value / power) / r;
    if (!(next < root)) return root;
    root = next;
  }
}

/**
 * What one of many bins of noise exceeds, over the level beside it, once in twenty records.
 *
 * @param searched - Bins looked at: chance has as many goes (C. Bonferroni).
 * @param bins - r of the level.
 */
export function levelOfLargest(searched: number, bins: number): number {
  return bins * (rootOf(20 * searched, bins) - 1);
}
