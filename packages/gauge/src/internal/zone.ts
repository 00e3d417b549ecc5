/**
 * Time zones: names and offsets read, local times turned to instants with the host's zone rules (`Intl`).
 * @module
 */
import { DAY, describe, HOUR, InputError, type Instant, MINUTE } from '@staithe/core';

/** A zone with one offset, or with rules. */
export interface Zone {
  readonly name: string;
  /** Milliseconds east; absent where the offset changes. */
  readonly offset?: number;
}

/** A local time as instants: none (skipped), one, or two (the clocks went back). */
export type Resolver = (local: number) => readonly Instant[];

const OFFSET = /^(?:UTC|GMT)?\s*([+-])(\d{1,2})(?::?(\d\d))?$/i;
const UNIVERSAL = /^(?:Z|UTC|GMT|Etc\/UTC|Etc\/GMT)$/i;

/** Milliseconds east as `+02:00`. */
export function offsetName(offset: number): string {
  if (offset === 0) return 'UTC';
  const minutes = Math.round(Math.abs(offset) / MINUTE);
  const two = (n: number): string => String(n).padStart(2, '0');
  return `${offset < 0 ? '-' : '+'}${two(Math.floor(minutes / 60))}:${two(minutes % 60)}`;
}

/** A zone from its text, or undefined where the text names none. */
export function readZone(text: string): Zone | undefined {
  const trimmed = text.trim();
  if (UNIVERSAL.test(trimmed)) return { name: 'UTC', offset: 0 };
  const [, sign, hours = '', minutes = '0'] = OFFSET.exec(trimmed) ?? [];
  if (sign) {
    if (+hours > 18 || +minutes > 59) return undefined;
    const offset = (sign === '-' ? -1 : 1) * (+hours * HOUR + +minutes * MINUTE) + 0;
    return { name: offsetName(offset), offset };
  }
  if (!/^[A-Za-z][A-Za-z0-9_+-]*(?:\/[A-Za-z0-9_+-]+)+$/.test(trimmed)) return undefined;
  try {
    const name = new Intl.DateTimeFormat('en', { timeZone: trimmed }).resolvedOptions().timeZone;
    return UNIVERSAL.test(name) ? { name: 'UTC', offset: 0 } : { name: trimmed };
  } catch {
    return undefined; // Intl throws for a name it does not know
  }
}

/** A zone that the caller names, or a refusal. */
export function askZone(text: string, path: string): Zone {
  const zone = typeof text === 'string' ? readZone(text) : undefined;
  if (zone) return zone;
  throw new InputError(
    'UNKNOWN_CHOICE',
    path,
    `expected an IANA zone, UTC or an offset like +02:00, got ${describe(text)}`,
  );
}

function offsetReader(name: string): (instant: Instant) => number {
  const format = new Intl.DateTimeFormat('en-US', {
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
  return (instant) => {
    const part: Record<string, number> = {};
    for (const { type, value } of format.formatToParts(instant)) part[type] = +value;
    const { year = 0, month = 0, day = 0, hour = 0, minute = 0, second = 0 } = part;
    const local = Date.UTC(year, month - 1, day, hour, minute, second);
    return local - Math.floor(instant / 1000) * 1000;
  };
}

/** Makes the function that turns local milliseconds (the clock read as UTC) into instants. */
export function zoneResolver(zone: Zone): Resolver {
  const { offset } = zone;
  if (offset !== undefined) return (local) => [local - offset];
  const offsetAt = offsetReader(zone.name);
  let knownDay = Number.NaN;
  let offsets: readonly number[] = [];
  return (local) => {
    const day = Math.floor(local / DAY) * DAY;
    if (day !== knownDay) {
      // No zone is more than 14 h from UTC: these instants surround every reading of the day.
      const probes = [-15, -6, 0, 6, 12, 18, 24, 30, 39].map((h) => offsetAt(day + h * HOUR));
      offsets = [...new Set(probes)];
      knownDay = day;
    }
    if (offsets.length === 1) return [local - (offsets[0] as number)];
    return offsets
      .map((east) => local - east)
      .filter((instant, i) => offsetAt(instant) === offsets[i])
      .sort((a, b) => a - b);
  };
}
