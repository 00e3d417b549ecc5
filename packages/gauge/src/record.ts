/**
 * What a reader gives back: the series in metres, a flag a sample, the reasons, and what was found on the way.
 * @module
 */
import type { Instant, Series } from '@staithe/core';

/**
 * Flags of the open standard: 1 pass, 2 not evaluated, 3 suspect, 4 fail, 9 missing.
 *
 * Source: U.S. IOOS QARTOD, flag scheme.
 * @public
 */
export type QualityFlag = 1 | 2 | 3 | 4 | 9;

/** The standard's titles of the tests; a run names the one that put it there. @public */
export type QualityReason =
  | 'gap'
  | 'gross range'
  | 'climatology'
  | 'spike'
  | 'rate of change'
  | 'flat line'
  | 'attenuated signal'
  | 'neighbour';

/** Samples in a row with one flag for one reason. @public */
export interface Run {
  /** Time of the first sample. */
  readonly from: Instant;
  /** Time of the last sample: it belongs to the run. */
  readonly to: Instant;
  readonly samples: number;
  readonly flag: QualityFlag;
  readonly reason: QualityReason;
  /** The worst figure of the run: metres, metres per hour (rate of change) or milliseconds (flat line, gap). */
  readonly measured?: number | undefined;
  /** The limit it passed, in the same unit; a pair where the limit has two ends. */
  readonly allowed?: number | readonly [low: number, high: number] | undefined;
}

/** Codes of what a reader lets pass, but not in silence. @public */
export type GaugeWarningCode =
  | 'SENTINEL'
  | 'DUPLICATES'
  | 'CONFLICTS_RESOLVED'
  | 'SORTED'
  | 'OFFSETS_VARY'
  | 'ONE_SAMPLE'
  | 'ALL_GAPS'
  | 'CONSTANT'
  | 'STEP_CHANGES'
  | 'UNEVEN'
  | 'TOO_FEW_TO_JUDGE';

/** A soft finding. @public */
export interface GaugeWarning {
  readonly code: GaugeWarningCode;
  readonly message: string;
  /** How often. */
  readonly count: number;
  /** Line of the first one, counted from 1. */
  readonly line?: number | undefined;
}

/** Units that a file can have. @public */
export type GaugeUnit = 'm' | 'cm' | 'mm' | 'ft';

/** A record as read from a file. @public */
export interface GaugeRecord {
  /** Metres; uniform with NaN for gaps where the file has one step, else at its own times. */
  readonly series: Series;
  /** A flag a sample: 2 (not evaluated) or 9 (missing); `checkRecord` gives the others. */
  readonly flags: Uint8Array;
  /** The gaps, as runs. */
  readonly reasons: readonly Run[];
  /** What the file had. */
  readonly unit: GaugeUnit;
  /** What the times were read in: `UTC`, an offset such as `+02:00`, or an IANA name. */
  readonly timeZone: string;
  /** The vertical datum, where the header or the caller names one. */
  readonly datum?: string | undefined;
  /** The most frequent difference between samples, milliseconds; absent with fewer than two samples. */
  readonly step?: number | undefined;
  readonly warnings: readonly GaugeWarning[];
}

/** How a gauge file is to be read. Everything the file says itself can be left out. @public */
export interface ReadOptions {
  /** IANA name (`Europe/Madrid`), `UTC` or an offset (`+02:00`), where the file names no zone. */
  readonly timeZone?: string | undefined;
  /**
   * A local time that occurs twice, when clocks go back. `by-order` takes the first as long as times still rise, then
   * the second. Default `refuse`.
   */
  readonly whenTwice?: 'refuse' | 'first' | 'second' | 'by-order' | undefined;
  /** Unit of the values, where the header names none. */
  readonly unit?: GaugeUnit | undefined;
  /** Columns by their header's name, or by position counted from 1. `date` only where date and time stand apart. */
  readonly columns?:
    | {
        readonly date?: string | number | undefined;
        readonly time?: string | number | undefined;
        readonly value?: string | number | undefined;
      }
    | undefined;
  /** The header's line, counted from 1. Default: the first that is neither blank nor a `#` comment. */
  readonly headerLine?: number | undefined;
  /** What stands between columns. Default: found in the first line. */
  readonly delimiter?: ',' | ';' | '\t' | undefined;
  /** Dates such as 03/04/2012 are refused unless this says how to read them. */
  readonly dateOrder?: 'day-first' | 'month-first' | undefined;
  /**
   * Two heights at one time. Default `refuse`: one of them is wrong, and the file does not say which. `first` keeps
   * the first and warns.
   */
  readonly onConflict?: 'refuse' | 'first' | undefined;
  /** Time that goes backwards. Default `refuse`: it is mostly a clock or a zone that was changed. `sort` warns. */
  readonly onDisorder?: 'refuse' | 'sort' | undefined;
  /**
   * Numbers that mean "missing". Default: all nines (9999, -99.99 …) and -32768, where they lie beyond 20 m, so that
   * 9999 mm stays a height.
   */
  readonly sentinels?: readonly number[] | undefined;
  /** The vertical datum of the values. */
  readonly datum?: string | undefined;
}
