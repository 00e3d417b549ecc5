/**
 * Reads a gauge file that is at hand as text.
 * @module
 */
import { describe, InputError } from '@staithe/core';
import { gaugeReader } from './internal/reader.js';
import type { GaugeRecord, ReadOptions } from './record.js';

const PIECE = 65536; // characters

/**
 * Reads a gauge record from CSV text. What the file does not say (zone, unit, which column) and the caller does not
 * either is refused, never guessed.
 *
 * Understood: a header or none; one column of times, a column each of date and time, or a date and 24 hours a line;
 * zone in the times, in the header (`Time (GMT)`) or from the caller; unit in the header (`Verified (m)`) or from the
 * caller; comma, semicolon or tab; decimal comma where columns are not apart by commas; `#` comments, blank lines,
 * 24:00, byte-order mark, any line end.
 *
 * @param text - The whole file; for files that are large or come in pieces see `readGaugeCsv`.
 * @param options - What the file does not say.
 * @returns The record in metres. One step with gaps filled by NaN gives a uniform series, else times stay their own.
 * @throws InputError `EMPTY_INPUT`, `UNKNOWN_LAYOUT`, `UNKNOWN_COLUMN`, `MISSING`, `UNKNOWN_UNIT`, `CONFLICT`,
 * `NO_TIME_ZONE`, `TWO_TIME_ZONES`, `AMBIGUOUS_TIME`, `SKIPPED_TIME`, `BAD_TIME`, `LEAP_SECOND`, `OUT_OF_RANGE`,
 * `NOT_RISING`, `BAD_NUMBER`, `LINE_TOO_LONG`, `UNKNOWN_CHOICE`; the path names line and column.
 * @example
 * const text = 'Time (GMT),Verified (cm)\n2031-06-01 00:00,152\n2031-06-01 00:06,149\n';
 * parseGaugeCsv(text).series.values[1]; // 1.49
 * @public
 */
export function parseGaugeCsv(text: string, options: ReadOptions = {}): GaugeRecord {
  if (typeof text !== 'string') {
    throw new InputError('WRONG_TYPE', 'text', `expected text, got ${describe(text)}`);
  }
  const reader = gaugeReader(options);
  for (let at = 0; at < text.length; at += PIECE) reader.take(text.slice(at, at + PIECE));
  return reader.finish();
}
