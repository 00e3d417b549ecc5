/**
 * Where things stand in a file: which columns, which unit, which zone. Decided once, from the header, the first line
 * of data and the caller's options.
 * @module
 */
import { describe, InputError } from '@staithe/core';
import type { GaugeUnit, ReadOptions } from '../record.js';
import { looksLikeDate, readClock } from './clock.js';
import { type HeaderWords, readHeader, TIME_NAMES, VALUE_NAMES } from './header.js';
import { askZone, type Zone } from './zone.js';

/** A line of a file: its number counted from 1, its text, its cells. */
export interface Line {
  readonly number: number;
  readonly text: string;
  readonly cells: readonly string[];
}

export interface Layout {
  /** Names for messages, by column. */
  readonly names: readonly string[];
  /** Column of the time, or of the date where `clock` has the time of day. */
  readonly date: number;
  readonly clock: number | undefined;
  /** Column of the heights; in the daily layout 24 of them, hour by hour. */
  readonly values: readonly number[];
  readonly daily: boolean;
  readonly unit: GaugeUnit;
  /** From the header or the caller; absent where every time carries its own. */
  readonly zone: Zone | undefined;
  readonly datum: string | undefined;
}

/** How a place in a file is called in messages. */
export function placeOf(line: number, name?: string): string {
  return name === undefined ? `line ${line}` : `line ${line}, column ${name}`;
}

/** The unit names a caller may give. */
function askUnit(unit: GaugeUnit | undefined): GaugeUnit | undefined {
  if (unit === undefined || unit === 'm' || unit === 'cm' || unit === 'mm' || unit === 'ft') {
    return unit;
  }
  const got = describe(unit);
  throw new InputError('UNKNOWN_UNIT', 'options.unit', `expected m, cm, mm or ft, got ${got}`);
}

function hourColumns(words: readonly HeaderWords[]): number[] | undefined {
  const columns: number[] = [];
  words.forEach(({ base }, i) => {
    const [, hour] = /^h?(\d{1,2})(?:h|:00| 00)?$/.exec(base) ?? [];
    if (hour !== undefined && +hour === columns.length) columns.push(i);
  });
  return columns.length === 24 ? columns : undefined;
}

/** Decides the layout. `header` is absent where the first line is data already. */
export function findLayout(header: Line | undefined, first: Line, options: ReadOptions): Layout {
  const width = header ? header.cells.length : first.cells.length;
  const titles = header ? header.cells.map((cell) => cell.trim()) : [];
  const names = Array.from({ length: width }, (_, i) =>
    header ? JSON.stringify(titles[i]) : String(i + 1),
  );
  const words = titles.map(readHeader);
  const headerLine = header?.number ?? first.number;
  const listed = header ? titles.map((t) => describe(t)).join(', ') : `${width} without header`;
  const unknown = (path: string, expected: string, got: string): InputError =>
    new InputError('UNKNOWN_COLUMN', path, `expected ${expected}, got ${got}`);

  const asked = (key: 'date' | 'time' | 'value'): number | undefined => {
    const wanted = options.columns?.[key];
    if (wanted === undefined) return undefined;
    const at = typeof wanted === 'number' ? wanted - 1 : titles.indexOf(wanted);
    if (Number.isInteger(at) && at >= 0 && at < width) return at;
    throw unknown(`options.columns.${key}`, `one of the columns ${listed}`, describe(wanted));
  };
  const named = (...bases: readonly string[]): number[] =>
    words.flatMap((w, i) => (bases.includes(w.base) && (w.base || w.zone) ? [i] : []));
  const one = (found: readonly number[], what: string): number => {
    if (found.length === 1) return found[0] as number;
    const several = found.map((i) => names[i]).join(', ');
    throw unknown(
      placeOf(headerLine),
      `one column of ${what}, or options.columns, or options.headerLine`,
      found.length > 1 ? `${found.length}: ${several}` : listed,
    );
  };

  const dates = named('date', 'day');
  const hours = options.columns?.value === undefined ? hourColumns(words) : undefined;
  let date = asked('date');
  let clock: number | undefined;
  if (hours) {
    date ??= asked('time') ?? one([...dates, ...named(...TIME_NAMES)], 'dates');
  } else if (header) {
    let time = asked('time');
    if (time === undefined) {
      const times = named(...TIME_NAMES, 'hour');
      time = times.length === 0 && dates.length === 1 ? dates[0] : one(times, 'times');
      if (date === undefined && dates.length === 1 && dates[0] !== time) date = dates[0];
    }
    clock = date === undefined || date === time ? undefined : time;
    date ??= time;
  } else {
    date ??= options.columns?.date === undefined ? (asked('time') ?? 0) : 0;
    clock = asked('time');
    if (clock === date) clock = undefined;
    const next = first.cells[date + 1]?.trim() ?? '';
    if (options.columns?.time === undefined && /^\d{1,2}:\d\d/.test(next)) clock = date + 1;
  }

  let values = hours;
  if (!values) {
    let value = asked('value');
    if (value === undefined) {
      const rest = names.flatMap((_, i) => (i === date || i === clock ? [] : [i]));
      value = rest.length === 1 ? rest[0] : one(named(...VALUE_NAMES), 'heights');
    }
    values = [value as number];
  }
  if (date === undefined) throw unknown(placeOf(headerLine), 'a column of dates', listed);
  const dateColumn: number = date;
  const valueName = placeOf(headerLine, names[values[0] as number]);
  const valueWords = words[values[0] as number];
  return {
    names,
    date: dateColumn,
    clock,
    values,
    daily: hours !== undefined,
    unit: findUnit(valueWords, options, valueName),
    zone: findZone([words[dateColumn], words[clock ?? -1]], first, options, {
      date: dateColumn,
      clock,
      daily: hours !== undefined,
      path: placeOf(first.number, names[clock ?? date]),
    }),
    datum: options.datum ?? valueWords?.datum,
  };
}

function findUnit(words: HeaderWords | undefined, options: ReadOptions, path: string): GaugeUnit {
  const unit = askUnit(options.unit);
  if (unit && words?.unit && unit !== words.unit) {
    throw new InputError(
      'CONFLICT',
      'options.unit',
      `expected ${words.unit} as the header says, got ${unit}`,
    );
  }
  const found = unit ?? words?.unit;
  if (found) return found;
  if (words?.unread !== undefined) {
    const got = describe(words.unread);
    throw new InputError(
      'UNKNOWN_UNIT',
      path,
      `expected m, cm, mm or ft, or options.unit, got ${got}`,
    );
  }
  throw new InputError(
    'MISSING',
    'options.unit',
    `expected m, cm, mm or ft since ${path} names no unit, got nothing`,
  );
}

/** Where a zone can stand in the first line of data. */
interface Place {
  readonly date: number;
  readonly clock: number | undefined;
  readonly daily: boolean;
  readonly path: string;
}

function findZone(
  words: readonly (HeaderWords | undefined)[],
  first: Line,
  options: ReadOptions,
  place: Place,
): Zone | undefined {
  const fromHeader = words.find((w) => w?.zone)?.zone;
  const fromCaller =
    options.timeZone === undefined ? undefined : askZone(options.timeZone, 'options.timeZone');
  if (fromHeader && fromCaller && fromHeader.name !== fromCaller.name) {
    throw new InputError(
      'TWO_TIME_ZONES',
      'options.timeZone',
      `expected ${fromHeader.name} as the header says, got ${fromCaller.name}`,
    );
  }
  const zone = fromHeader ?? fromCaller;
  if (zone) return zone;
  const date = (first.cells[place.date] ?? '').trim();
  const carried =
    !place.daily &&
    looksLikeDate(date) &&
    readClock(
      date,
      place.clock === undefined ? undefined : (first.cells[place.clock] ?? '').trim(),
      options.dateOrder,
      place.path,
    ).offset !== undefined;
  if (carried || (!place.daily && !looksLikeDate(date))) return undefined; // a bad date is refused as such later
  throw new InputError(
    'NO_TIME_ZONE',
    place.path,
    `expected a zone in the times, in the header or in options.timeZone, got ${describe(first.text)}`,
    { line: first.number, text: first.text.slice(0, 1000) },
  );
}
