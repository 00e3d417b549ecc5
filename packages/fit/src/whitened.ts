/**
 * The residual as equal samples, √w·r: what noise is drawn anew from.
 * @module
 */
import type { Estimate } from './estimate.js';
import type { Rows } from './rows.js';

/** The residual as equal samples. */
export interface Whitened {
  /** √(weight · inflation) times the residual, one a time; 0 where no sample takes part. */
  readonly values: Float64Array;
  /** What a sample shows of the noise: 1, the root of the trust it earned, 0 where it takes no part. */
  readonly shown: Float64Array;
  /** Indices of the samples that take part. */
  readonly kept: Int32Array;
}

/** @param found - Of a fit of levels. */
export function whitenedOf({ blocks, residuals, resistant }: Estimate): Whitened {
  const { weights } = blocks[0] as Rows;
  const [residual] = residuals[0] as readonly [Float64Array];
  const count = residual.length;
  const values = new Float64Array(count);
  const shown = new Float64Array(count);
  const kept = new Int32Array(count);
  let samples = 0;
  const inflation = resistant?.inflation ?? 1;
  for (let i = 0; i < count; i++) {
    const r = residual[i] as number;
    if (Number.isNaN(r)) continue;
    values[i] = Math.sqrt(inflation * (weights?.[i] ?? 1)) * r;
    shown[i] = Math.sqrt(resistant?.trust[i] ?? 1);
    kept[samples++] = i;
  }
  return { values, shown, kept: kept.slice(0, samples) };
}
