/**
 * Instants, spans and steps. An instant is milliseconds since 1970-01-01T00:00Z, UTC read as UT1.
 * @module
 */
import { refuse } from './errors.js';

/** Milliseconds since 1970-01-01T00:00Z, UTC. Fractions are allowed as input; results are whole. @public */
export type Instant = number;

/** What every function takes for an instant; `Temporal.Instant` fits. Strings carry `Z` or an offset. @public */
export type InstantLike = Instant | Date | string | { readonly epochMilliseconds: number };

/** Half-open, `[from, to)`: results of adjacent spans join to the result of the whole. @public */
export interface Span {
  readonly from: InstantLike;
  readonly to: InstantLike;
}

/** Milliseconds in a second: steps are written `6 * MINUTE`. @public */
export const SECOND = 1000;
/** Milliseconds in a minute. @public */
export const MINUTE = 60000;
/** Milliseconds in an hour. @public */
export const HOUR = 3600000;
/** Milliseconds in a day. @public */
export const DAY = 86400000;

/** Milliseconds in a year of 365.25 days, the year of secular rates. @public */
export const YEAR = 31557600000;

/** 1700-01-01T00:00Z, the earliest instant taken. @public */
export const EARLIEST: Instant = -8520336000000;
/** 2201-01-01T00:00Z, the latest instant taken. @public */
export const LATEST: Instant = 7289654400000;

const ISO =
  /^(\d{4}-\d\d-\d\d)(?:T(\d\d):(\d\d)(?::(\d\d)([.,]\d+)?)?(?:Z|([+-])(\d\d)(?::?(\d\d))?)?)?$/;

function inRange(value: Instant, path: string, got: unknown): Instant {
  if (value >= EARLIEST && value <= LATEST) return value;
  const code = Number.isFinite(value) ? 'OUT_OF_RANGE' : 'NOT_FINITE';
  refuse(code, path, 'an instant from year 1700 to 2200', got);
}

function parseInstant(text: string, path: string): Instant {
  const [, date, hour, minute, second = 0, fraction, sign, offsetHour = 0, offsetMinute = 0] =
    ISO.exec(text) ?? [];
  if (!date || !hour) refuse('BAD_TIME', path, 'date, time and zone like 2031-06-01T12:00Z', text);
  if (!sign && !text.endsWith('Z'))
    refuse('NO_TIME_ZONE', path, 'Z or an offset after the time', text);
  if (second === '60') refuse('LEAP_SECOND', path, 'seconds from 00 to 59', text);
  const day = Date.parse(date); // a date alone is read as UTC by every engine
  const milliseconds = fraction ? +`0.${fraction.slice(1)}` * SECOND : 0;
  const local = day + +hour * HOUR + +(minute as string) * MINUTE + +second * SECOND + milliseconds;
  if (
    Number.isNaN(day) ||
    !new Date(day).toISOString().startsWith(date) ||
    local - day > DAY ||
    +(minute as string) > 59 ||
    +second > 59 ||
    +offsetHour > 18 ||
    +offsetMinute > 59
  ) {
    refuse('BAD_TIME', path, 'a date and time that exist', text);
  }
  const offset = +`${sign ?? '+'}1` * (+offsetHour * HOUR + +offsetMinute * MINUTE);
  return inRange(local - offset, path, text);
}

/**
 * Reads an instant. Nothing is guessed: a string without `Z` or an offset, without a time, or with a leap second is refused.
 *
 * @param value - Milliseconds since 1970 UTC, a Date, an ISO 8601 string with zone, or a `Temporal.Instant`.
 * @param path - What the value is called in error messages.
 * @returns Milliseconds since 1970-01-01T00:00Z, from 1700-01-01 to 2201-01-01; fractions are kept.
 * @throws InputError `BAD_TIME`, `NO_TIME_ZONE`, `LEAP_SECOND`, `NOT_FINITE`, `OUT_OF_RANGE` or `WRONG_TYPE`.
 * @example
 * toInstant('2031-06-01T02:00+02:00'); // 1938038400000
 * @public
 */
export function toInstant(value: InstantLike, path: string = 'time'): Instant {
  if (typeof value === 'number') return inRange(value, path, value);
  if (typeof value === 'string') return parseInstant(value, path);
  if (value instanceof Date) return inRange(value.getTime(), path, value.getTime());
  const ms = (value as { epochMilliseconds?: unknown } | null | undefined)?.epochMilliseconds;
  if (typeof ms === 'number') return inRange(ms, path, ms);
  refuse('WRONG_TYPE', path, 'an instant', value);
}

/**
 * Reads a span.
 *
 * @param span - Half-open `[from, to)`.
 * @returns Both ends as instants, `from < to`.
 * @throws InputError as {@link toInstant}, and `EMPTY_SPAN` where `to` is not after `from`.
 * @example
 * toSpan({ from: 0, to: HOUR }).to; // 3600000
 * @public
 */
export function toSpan(span: Span): { readonly from: Instant; readonly to: Instant } {
  const from = toInstant(span.from, 'span.from');
  const to = toInstant(span.to, 'span.to');
  if (to > from) return { from, to };
  refuse('EMPTY_SPAN', 'span.to', `after span.from ${from}`, to);
}

/**
 * Checks a step between samples.
 *
 * @param step - Milliseconds, 1000 or more.
 * @returns The step.
 * @throws InputError `STEP_TOO_SHORT` or `NOT_FINITE`, path `step`.
 * @example
 * toStep(6 * MINUTE); // 360000
 * @public
 */
export function toStep(step: number): number {
  if (step >= SECOND && step < Infinity) return step;
  refuse(
    Number.isFinite(step) ? 'STEP_TOO_SHORT' : 'NOT_FINITE',
    'step',
    '1000 ms or more (steps are milliseconds: six minutes are 6 * MINUTE)',
    step,
  );
}

/**
 * An instant as ISO 8601 in UTC, without the parts that are zero.
 *
 * @param instant - Milliseconds since 1970, rounded to whole ones.
 * @returns `2031-06-01T00:00Z`, with seconds and milliseconds where there are any.
 * @throws InputError as {@link toInstant}.
 * @example
 * formatInstant(1937952000000); // '2031-05-31T00:00Z'
 * @public
 */
export function formatInstant(instant: Instant): string {
  const text = new Date(Math.round(toInstant(instant, 'instant'))).toISOString();
  return text.replace(/(?::00)?\.000Z$/, 'Z').replace(/(\.\d*?)0+Z$/, '$1Z');
}
