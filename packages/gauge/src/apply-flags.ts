/**
 * A series without the samples that did not pass.
 * @module
 */
import { InputError, type Series } from '@staithe/core';

/**
 * Puts NaN where a sample's flag is not among those to keep.
 *
 * @param series - Either kind; not changed.
 * @param flags - A flag a sample, as from `checkRecord`.
 * @param options - `keep`: flags to keep; default 1, 2 and 3, all that did not fail.
 * @returns A series of the same kind and times with its own values.
 * @throws InputError `LENGTH_MISMATCH`, path `flags`.
 * @example
 * const series = { start: 0, step: 3600000, values: new Float64Array([1, 9, 2]) };
 * applyFlags(series, new Uint8Array([1, 4, 3]), { keep: [1] }).values[1]; // NaN
 * @public
 */
export function applyFlags<S extends Series>(
  series: S,
  flags: ArrayLike<number>,
  options: { readonly keep?: readonly number[] | undefined } = {},
): S {
  const { values } = series;
  if (flags.length !== values.length) {
    const text = `expected ${values.length} as in the series, got ${flags.length}`;
    throw new InputError('LENGTH_MISMATCH', 'flags', text);
  }
  const keep = new Set(options.keep ?? [1, 2, 3]);
  const kept = values.map((value, i) => (keep.has(flags[i] as number) ? value : Number.NaN));
  return { ...series, values: kept };
}
