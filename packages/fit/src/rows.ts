/**
 * The rows of a least-squares problem as a pass over the data takes them.
 * @module
 */
import type { FitRecord } from './record.js';

/** Rows of one kind: levels, or slopes (h′ = 0 at a high or low water). */
export interface Rows {
  readonly times: Float64Array;
  /** Milliseconds where times are uniform, else 0. */
  readonly step: number;
  /** Right-hand sides, one value a time each. NaN in the first: the time takes no part. */
  readonly sides: readonly Float64Array[];
  /** One a time; absent: all 1. */
  readonly weights?: Float64Array | undefined;
  /** Columns that are given as values, one a time each, in the order of the design. */
  readonly given: readonly Float64Array[];
  /** Whether the rows are slopes, metres per hour. */
  readonly slope?: true | undefined;
}

/** The rows of a record of levels. */
export function rowsOf(
  { times, step, values, weights }: FitRecord,
  given: readonly Float64Array[] = [],
): Rows {
  return { times, step, sides: [values], weights, given };
}
