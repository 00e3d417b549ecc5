/**
 * Quantiles that a few wild values do not move.
 * @module
 */
const MOST = 200000; // values looked at: enough for any quantile used here

/** Up to 200 k values of a function of the index, evenly spread, finite ones only. */
export function sampleOf(count: number, valueAt: (index: number) => number): Float64Array {
  const stride = Math.max(1, Math.ceil(count / MOST));
  const out = new Float64Array(Math.max(0, Math.ceil(count / stride)));
  let kept = 0;
  for (let i = 0; i < count; i += stride) {
    const value = valueAt(i);
    if (Number.isFinite(value)) out[kept++] = value;
  }
  return out.slice(0, kept);
}

/** The quantile of finite values, 0 for none; the input stays as it is. */
export function quantile(values: Float64Array, share: number): number {
  if (values.length === 0) return 0;
  const sorted = values.slice().sort();
  const place = share * (sorted.length - 1);
  const below = Math.floor(place);
  const low = sorted[below] as number;
  const high = sorted[Math.min(below + 1, sorted.length - 1)] as number;
  return low + (place - below) * (high - low);
}

/** The median. */
export function medianOf(values: Float64Array): number {
  return quantile(values, 0.5);
}

/** 1.4826 times the median distance from the median: the standard deviation of a normal sample. */
export function spreadOf(values: Float64Array): number {
  const middle = medianOf(values);
  return 1.4826 * medianOf(values.map((value) => Math.abs(value - middle)));
}
