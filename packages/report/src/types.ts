/**
 * What the pictures and tables take, as plain data.
 * @module
 */
import type { Instant, Metres } from '@staithe/core';

/** Samples of a record in a row with one flag for one reason. @public */
export interface FlaggedRun {
  /** Time of the first sample. */
  readonly from: Instant;
  /** Time of the last sample. */
  readonly to: Instant;
  /** Flag of the open standard: 1 pass, 2 not evaluated, 3 suspect, 4 fail, 9 missing. */
  readonly flag: number;
  readonly reason: string;
  readonly measured?: number | undefined;
  readonly allowed?: number | readonly number[] | undefined;
}

/** A time without samples. @public */
export interface RecordGap {
  readonly from: Instant;
  readonly to: Instant;
}

/** The zero of the gauge moved. @public */
export interface ZeroStep {
  readonly at: Instant;
  /** Metres by which heights are greater from then on. */
  readonly change: Metres;
  /** Standard error, metres. */
  readonly sigma?: Metres | undefined;
}

/** One level of a ladder. @public */
export interface Rung {
  readonly name: string;
  /** Metres above the datum. Needed unless `missing` is given; with it, about where the level would stand. */
  readonly height?: Metres | undefined;
  /** Standard error, metres. */
  readonly sigma?: Metres | undefined;
  /** What the level rests on: `705 tides`, `predicted, 19 y`. */
  readonly grounds?: string | undefined;
  /** Why there is no such level: what is missing. */
  readonly missing?: string | undefined;
}

/** A line of the tide that stands out in what is left. @public */
export interface LeftOver {
  /** Degrees per hour. */
  readonly speed: number;
  /** Metres. */
  readonly amplitude: Metres;
  /** The constituent it may be. */
  readonly likely?: string | undefined;
}

/** What the sky does on a day. @public */
export interface SkyDay {
  /** Local date, `2031-06-01`. */
  readonly date: string;
  readonly moon?: 'new' | 'first-quarter' | 'full' | 'last-quarter' | undefined;
  /** Such as `Moon 11°S, perigee in 3 d`. */
  readonly note?: string | undefined;
}
