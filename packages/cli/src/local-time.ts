/**
 * Local time at the edge of the command: dates and times of a named zone, read and written through `Intl`. The host's own
 * zone plays no part.
 * @module
 */
import { DAY, describe, HOUR, InputError, type Instant, MINUTE, toInstant } from '@staithe/core';

/** A zone by name, with local minus UTC in milliseconds. */
export interface Zone {
  readonly name: string;
  readonly offsetAt: (t: Instant) => number;
}

const OFFSET = /^([+-])(\d\d):(\d\d)$/;
const LOCAL = /^(\d{4}-\d\d-\d\d)(?:T(\d\d:\d\d(?::\d\d)?))?$/;
const WIDEST = 18 * HOUR;

function offsetByRules(name: string): (t: Instant) => number {
  const clock = new Intl.DateTimeFormat('en-US', {
    timeZone: name,
    calendar: 'iso8601',
    numberingSystem: 'latn',
    hourCycle: 'h23',
    year: 'numeric',
    month: 'numeric',
    day: 'numeric',
    hour: 'numeric',
    minute: 'numeric',
    second: 'numeric',
  });
  return (t) => {
    const part: Record<string, number> = {};
    for (const { type, value } of clock.formatToParts(t)) part[type] = Number(value);
    const { year = 0, month = 1, day = 1, hour = 0, minute = 0, second = 0 } = part;
    return Date.UTC(year, month - 1, day, hour, minute, second) - Math.floor(t / 1000) * 1000;
  };
}

/** Reads `UTC`, an offset such as `+02:00`, or an IANA name. */
export function readZone(text: string, path: string = '--zone'): Zone {
  if (/^(UTC|Z)$/i.test(text)) return { name: 'UTC', offsetAt: () => 0 };
  const [, sign, hours = '', minutes = ''] = OFFSET.exec(text) ?? [];
  if (sign !== undefined && +hours <= 18 && +minutes <= 59) {
    const offset = (sign === '-' ? -1 : 1) * (+hours * HOUR + +minutes * MINUTE);
    return { name: text, offsetAt: () => offset };
  }
  try {
    if (sign === undefined) return { name: text, offsetAt: offsetByRules(text) };
  } catch {
    // Intl throws for a name it does not know.
  }
  const expected = 'expected an IANA zone like Europe/Lisbon, UTC or an offset like +02:00';
  throw new InputError('UNKNOWN_CHOICE', path, `${expected}, got ${describe(text)}`);
}

/** The instants at which the clocks of a zone show a local time: none, one, or two. */
function instantsOf(wall: number, zone: Zone): Instant[] {
  const probes = [-WIDEST, -6 * HOUR, 0, 6 * HOUR, WIDEST].map((d) => zone.offsetAt(wall + d));
  return [...new Set(probes)]
    .map((offset) => wall - offset)
    .filter((t) => t + zone.offsetAt(t) === wall)
    .sort((a, b) => a - b);
}

/** The first instant of a local day, given as the UTC midnight of its date: where the clocks skip midnight, what comes next. */
export function startOfDay(midnight: number, zone: Zone): Instant {
  const [first] = instantsOf(midnight, zone);
  if (first !== undefined) return first;
  let before = midnight - WIDEST;
  let after = midnight + WIDEST;
  while (after - before > 1000) {
    const middle = Math.round((before + after) / 2000) * 1000;
    if (middle + zone.offsetAt(middle) < midnight) before = middle;
    else after = middle;
  }
  return after;
}

/**
 * Reads an option's instant: with `Z` or an offset as it is; a date alone is the start of that local day; a date and time
 * without zone is local time.
 */
export function readMoment(text: string, zone: Zone, path: string): Instant {
  const [, date, time] = LOCAL.exec(text) ?? [];
  if (date === undefined) return toInstant(text, path);
  const midnight = toInstant(`${date}T00:00Z`, path);
  if (time === undefined) return startOfDay(midnight, zone);
  const found = instantsOf(toInstant(`${date}T${time}Z`, path), zone);
  const [only] = found;
  if (found.length === 1 && only !== undefined) return only;
  const code = found.length > 1 ? 'AMBIGUOUS_TIME' : 'SKIPPED_TIME';
  const expected = `a local time that occurs once in ${zone.name}, or one with an offset`;
  throw new InputError(code, path, `expected ${expected}, got ${describe(text)}`);
}

/** The start of the local day that an instant falls into. */
export function dayOf(t: Instant, zone: Zone): Instant {
  return startOfDay(Math.floor((t + zone.offsetAt(t)) / DAY) * DAY, zone);
}

/** The month of an instant by the zone's clock, `2031-06`, or one so many later. */
export function monthOf(t: Instant, zone: Zone, later: number = 0): string {
  const local = new Date(t + zone.offsetAt(t));
  const first = Date.UTC(local.getUTCFullYear(), local.getUTCMonth() + later, 1);
  return new Date(first).toISOString().slice(0, 7);
}

const two = (n: number): string => String(Math.floor(n)).padStart(2, '0');

/** `+01:00`. */
function offsetText(offset: number): string {
  const size = Math.abs(offset);
  const rest = Math.floor(size / MINUTE) - 60 * Math.floor(size / HOUR);
  return `${offset < 0 ? '-' : '+'}${two(size / HOUR)}:${two(rest)}`;
}

/** `2031-06-01 02:14 +01:00`, to the minute; the offset tells repeated hours apart. UTC reads `2031-06-01 02:14Z`. */
export function momentText(t: Instant, zone: Zone): string {
  const minute = Math.round(t / MINUTE) * MINUTE;
  const offset = zone.offsetAt(minute);
  const wall = new Date(minute + offset).toISOString().slice(0, 16).replace('T', ' ');
  return zone.name === 'UTC' ? `${wall}Z` : `${wall} ${offsetText(offset)}`;
}
