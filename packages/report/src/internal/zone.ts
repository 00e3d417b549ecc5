/**
 * Local time as display: an IANA zone through `Intl`, `UTC`, or a fixed offset. The zone is always the caller's, never the host's.
 *
 * A wall clock is held as the milliseconds that UTC would have when its clock read the same.
 * @module
 */
import { DAY, describe, HOUR, InputError, type Instant, MINUTE, SECOND } from '@staithe/core';
import { utcDay } from 'd3-time';
import { utcFormat } from 'd3-time-format';

/** What a wall clock reads, as milliseconds of a clock without zone. */
export type WallTime = number;

export interface Zone {
  readonly name: string;
  /** Local minus UTC, milliseconds. */
  offsetAt(t: Instant): number;
  wallAt(t: Instant): WallTime;
  /** The first instant at which the wall clock reads this, or, where it is skipped, the first after. */
  instantOf(wall: WallTime): Instant;
}

function fixedOffset(name: string): number | undefined {
  if (/^(UTC|Etc\/UTC|Z)$/i.test(name)) return 0;
  const match = /^(?:UTC)?([+-])(\d\d):(\d\d)$/.exec(name);
  if (!match || +(match[2] as string) > 18 || +(match[3] as string) > 59) return undefined;
  return (
    (match[1] === '-' ? -1 : 1) * (+(match[2] as string) * HOUR + +(match[3] as string) * MINUTE)
  );
}

function offsetByIntl(name: string): (t: Instant) => number {
  let clock: Intl.DateTimeFormat;
  try {
    clock = new Intl.DateTimeFormat('en-US', {
      timeZone: name,
      calendar: 'gregory',
      numberingSystem: 'latn',
      hourCycle: 'h23',
      era: 'short',
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: 'numeric',
      minute: 'numeric',
      second: 'numeric',
    });
  } catch {
    throw new InputError(
      'UNKNOWN_CHOICE',
      'timeZone',
      `expected an IANA zone like Europe/Lisbon, UTC or an offset like +02:00, got ${describe(name)}`,
    );
  }
  return (t) => {
    const whole = Math.floor(t / SECOND) * SECOND;
    const read: Record<string, number> = {};
    for (const { type, value } of clock.formatToParts(whole)) read[type] = Number(value);
    const { year = 0, month = 1, day = 1, hour = 0, minute = 0, second = 0 } = read;
    return Date.UTC(year, month - 1, day, hour, minute, second) - whole;
  };
}

/**
 * Reads the name of a zone.
 *
 * @throws InputError `MISSING` or `UNKNOWN_CHOICE`, path `timeZone`.
 */
export function readZone(name: unknown): Zone {
  if (typeof name !== 'string' || name === '') {
    throw new InputError(
      'MISSING',
      'timeZone',
      `expected the name of a zone, got ${describe(name)}`,
    );
  }
  const fixed = fixedOffset(name);
  const offsetAt = fixed === undefined ? offsetByIntl(name) : () => fixed;
  const zone: Zone = {
    name: fixed === undefined ? name : fixed === 0 ? 'UTC' : offsetName(fixed),
    offsetAt,
    wallAt: (t) => t + offsetAt(t),
    instantOf(wall) {
      const before = wall - offsetAt(wall - DAY);
      const after = wall - offsetAt(wall + DAY);
      const found = [before, after].filter((t) => zone.wallAt(t) === wall);
      return found.length > 0 ? Math.min(...found) : before;
    },
  };
  return zone;
}

/** `UTC+02:00`; seconds of old local mean times are shown where there are any. */
export function offsetName(offset: number): string {
  const size = Math.abs(offset);
  const two = (value: number): string => String(Math.floor(value)).padStart(2, '0');
  const seconds = (size % MINUTE) / SECOND;
  const rest = seconds === 0 ? '' : `:${two(seconds)}`;
  return `UTC${offset < 0 ? '−' : '+'}${two(size / HOUR)}:${two((size % HOUR) / MINUTE)}${rest}`;
}

/** An instant at which the clocks of a zone change. */
export interface ClockChange {
  readonly at: Instant;
  readonly before: number;
  readonly after: number;
}

/** The change between two instants, if their offsets differ, to the second. */
function changeBetween(zone: Zone, from: Instant, to: Instant): ClockChange | undefined {
  const before = zone.offsetAt(from);
  const after = zone.offsetAt(to);
  if (before === after) return undefined;
  let low = from;
  let high = to;
  while (high - low > SECOND) {
    const middle = Math.floor((low + high) / 2 / SECOND) * SECOND;
    if (middle <= low) break;
    if (zone.offsetAt(middle) === before) low = middle;
    else high = middle;
  }
  return { at: high, before, after };
}

/** A local day: 23, 24 or 25 hours, or what the zone makes of it. */
export interface LocalDay {
  readonly from: Instant;
  readonly to: Instant;
  /** Midnight of its date on the wall clock. */
  readonly wall: WallTime;
  readonly change: ClockChange | undefined;
}

/** The local days that touch [from, to). */
export function localDays(zone: Zone, from: Instant, to: Instant): LocalDay[] {
  const first = utcDay.floor(new Date(zone.wallAt(from)));
  const last = utcDay.ceil(new Date(zone.wallAt(to - 1) + 1));
  return utcDay
    .range(first, last)
    .map((midnight) => {
      const wall = midnight.getTime();
      const start = zone.instantOf(wall);
      const end = zone.instantOf(utcDay.offset(midnight, 1).getTime());
      return { from: start, to: end, wall, change: changeBetween(zone, start, end) };
    })
    .filter((day) => day.to > day.from && day.to > from && day.from < to);
}

/** Writes a wall clock with a d3 time format. */
export const wallText = (pattern: string, wall: WallTime): string =>
  utcFormat(pattern)(new Date(wall));

/** Hours and minutes, rounded to the minute. */
export const clockText = (zone: Zone, t: Instant): string =>
  wallText('%H:%M', zone.wallAt(Math.round(t / MINUTE) * MINUTE));

/** `Sat 1 Jun 04:10`, rounded to the minute. */
export const momentText = (zone: Zone, t: Instant, pattern: string = '%a %-d %b %H:%M'): string =>
  wallText(pattern, zone.wallAt(Math.round(t / MINUTE) * MINUTE));

/** The zone with its offset, and what changes on the way: `Europe/Lisbon, UTC+00:00, from Sun 29 Mar 02:00 UTC+01:00`. */
export function zoneText(zone: Zone, from: Instant, to: Instant): string {
  if (zone.name === 'UTC') return 'UTC';
  if (zone.name.startsWith('UTC')) return zone.name;
  const parts = [`${zone.name}, ${offsetName(zone.offsetAt(from))}`];
  const changes: ClockChange[] = [];
  for (let t = from; t < to; t += 7 * DAY) {
    const change = changeBetween(zone, t, Math.min(t + 7 * DAY, to - 1));
    if (change) changes.push(change);
  }
  if (changes.length > 4) return `${parts[0]} at the start, by the zone's own rules later`;
  for (const { at, after } of changes) {
    parts.push(`from ${momentText(zone, at)} ${offsetName(after)}`);
  }
  return parts.join(', ');
}
