/**
 * What `check`, `fit`, `levels` and `report` share: a record read, judged, cleared of what failed, fitted, and judged again
 * against its own tide, which shows a zero that moved and a clock that was off.
 * @module
 */
import { type HarmonicConstants, isStaitheError, type LongWork, type Series } from '@staithe/core';
import { type FitOptions, fitHarmonicsAsync, type HarmonicFit, type RecordFit } from '@staithe/fit';
import { applyFlags, checkRecord, type GaugeRecord, type RecordCheck } from '@staithe/gauge';
import { tideCurve } from '@staithe/predict';

/** A record and what its quality tests say. */
export interface Judged {
  readonly check: RecordCheck;
  /** The record without the samples that failed. */
  readonly kept: Series;
  readonly failed: number;
}

/** Judges a record by itself. */
export function judge(record: GaugeRecord): Judged {
  const check = checkRecord(record.series);
  const failed = check.flags.reduce((n, flag) => (flag === 4 ? n + 1 : n), 0);
  return { check, kept: applyFlags(record.series, check.flags), failed };
}

/** The curve that constants expect, for `checkRecord`. */
export function expectedBy(constants: HarmonicConstants): (times: Float64Array) => Float64Array {
  const curve = tideCurve(constants);
  return (times) => curve.heightsAt(times);
}

/**
 * What is wrong with stretches of a record, by the tide fitted to it. Its own tide is no neighbour to judge samples by, so
 * that test is left out.
 */
export function findingsBy(
  record: GaugeRecord,
  fit: Pick<HarmonicFit, 'constants'>,
): RecordCheck['findings'] {
  // A step that was fitted belongs to the curve and is no finding any more.
  return checkRecord(record.series, {
    expected: expectedBy(fit.constants),
    limits: { besides: false },
  }).findings;
}

/** Fits a record; what its data do not allow (too short, no tide in it) comes back as the reason instead. */
export async function tryFit(
  series: Series,
  options: FitOptions,
  work: LongWork,
): Promise<RecordFit | { readonly reason: string }> {
  try {
    return await fitHarmonicsAsync(series, { ...options, onProgress: work.onProgress });
  } catch (error) {
    if (isStaitheError(error) && error.name === 'ComputationError')
      return { reason: error.message };
    throw error;
  }
}

/** Samples due, there and missing, and gaps, of a record. */
export interface RecordSize {
  readonly due: number;
  readonly there: number;
  readonly missing: number;
  readonly gaps: number;
}

export function sizeOf(record: GaugeRecord): RecordSize {
  const missing = record.flags.reduce((n, flag) => (flag === 9 ? n + 1 : n), 0);
  const due = record.series.values.length;
  return { due, there: due - missing, missing, gaps: record.reasons.length };
}
