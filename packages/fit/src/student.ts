/**
 * What it costs that a variance is estimated: Student's and Fisher's quantiles over those of a variance that is known.
 * @module
 */
import { exponential, logarithm } from './logarithm.js';

const NORMAL_975 = 1.959963984540054;
const CHI_SQUARED_95 = 5.991464547107979; // two degrees of freedom
const LN_20 = logarithm(20);

/**
 * Square of t(0.975; 2b)/1.96: what a variance that rests on b bins is multiplied by, so that ±1.96 σ holds 95 %.
 *
 * Source: the expansion of R. A. Fisher and E. A. Cornish (1960), Technometrics 2, 209, to ν⁻⁴; t to 0.8 % from b = 1,
 * to 0.05 % from b = 2.5.
 *
 * @param bins - b; 0: the variance is known.
 */
export function studentFactor(bins: number): number {
  if (!(bins > 0)) return 1;
  const z = NORMAL_975;
  const q = z * z;
  const nu = 2 * bins;
  const first = (q + 1) / 4;
  const second = ((5 * q + 16) * q + 3) / 96;
  const third = (((3 * q + 19) * q + 17) * q - 15) / 384;
  const fourth = ((((79 * q + 776) * q + 1482) * q - 1920) * q - 945) / 92160;
  const ratio = 1 + (first + (second + (third + fourth / nu) / nu) / nu) / nu;
  return ratio * ratio;
}

/**
 * Squared half axis of the 95 % region of two jointly normal numbers over their variance, once {@link studentFactor} is
 * in it: 2·F(2, 2b)/factor = 2b·(20^{1/b} − 1)/factor, 5.991 for a variance that is known.
 *
 * @param bins - b; 0: known.
 */
export function discFactor(bins: number): number {
  if (!(bins > 0)) return CHI_SQUARED_95;
  return (2 * bins * (exponential(LN_20 / bins) - 1)) / studentFactor(bins);
}
