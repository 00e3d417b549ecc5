/**
 * What can be wrong with a stretch of a record rather than with a sample.
 * @module
 */
import type { Instant } from '@staithe/core';

/** The zero of the gauge moved. @public */
export interface ZeroMoved {
  readonly kind: 'zero-moved';
  /** First sample on the new zero. */
  readonly at: Instant;
  /** Metres: heights are larger by this from then on. */
  readonly change: number;
  readonly sigma: number;
}

/** The clock of the gauge was off. @public */
export interface ClockOff {
  readonly kind: 'clock-off';
  readonly from: Instant;
  /** Time of the last sample of the stretch; both ends are known to two days. */
  readonly to: Instant;
  /** Positive: stamps are later than the truth. */
  readonly minutes: number;
  readonly sigma: number;
}
