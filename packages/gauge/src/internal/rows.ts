/**
 * One row of cells to samples: the time with its zone settled, the height in metres.
 * @module
 */
import {
  describe,
  formatInstant,
  HOUR,
  InputError,
  type InputErrorCode,
  type Instant,
} from '@staithe/core';
import type { ReadOptions } from '../record.js';
import { cellReader, sentinelTest, toMetres } from './cells.js';
import { type ClockReading, readClock, readDate } from './clock.js';
import { type Layout, placeOf } from './layout.js';
import type { Collector } from './samples.js';
import type { WarningList } from './warnings.js';
import { offsetName, zoneResolver } from './zone.js';

export interface RowReader {
  readonly layout: Layout;
  readonly read: (cells: readonly string[], line: number) => void;
  /** The zone that the times were read in. */
  readonly zoneName: () => string;
}

/** Makes the reader of rows for a layout. */
export function rowReader(
  layout: Layout,
  options: ReadOptions,
  commaAllowed: boolean,
  warnings: WarningList,
  collector: Collector,
): RowReader {
  const { names, date, clock, values, daily, unit, zone } = layout;
  const width = names.length;
  const needed = Math.max(date, clock ?? 0, ...values) + 1;
  const readCell = cellReader(commaAllowed);
  const isSentinel = sentinelTest(options.sentinels);
  const resolve = zone && zoneResolver(zone);
  const nameAt = (column: number): string => names[column] as string;
  let carried: number | undefined; // the offset that the first time carried
  let latest = Number.NEGATIVE_INFINITY;

  const refuse = (code: InputErrorCode, path: string, text: string): never => {
    throw new InputError(code, path, text);
  };

  /** A local time to its instant; undefined where it was skipped and that is allowed. */
  const settle = (
    local: number,
    text: string,
    path: string,
    mayMiss: boolean,
  ): Instant | undefined => {
    const found = resolve?.(local) ?? [];
    const name = zone?.name ?? '';
    if (found.length === 0) {
      if (mayMiss) return undefined;
      return refuse(
        'SKIPPED_TIME',
        path,
        `expected a time that ${name} has, got ${describe(text)}`,
      );
    }
    const [first, second] = found as [Instant, Instant | undefined];
    if (second === undefined || options.whenTwice === 'first') return first;
    if (options.whenTwice === 'second') return second;
    if (options.whenTwice === 'by-order') return first > latest ? first : second;
    return refuse(
      'AMBIGUOUS_TIME',
      path,
      `expected options.whenTwice for a time that ${name} has twice (${formatInstant(first)} and ${formatInstant(second)}), got ${describe(text)}`,
    );
  };

  const instantOf = (reading: ClockReading, text: string, path: string): Instant => {
    const { local, offset } = reading;
    if (offset === undefined) {
      if (zone) return settle(local, text, path, false) as Instant;
      const code = carried === undefined ? 'NO_TIME_ZONE' : 'TWO_TIME_ZONES';
      const wish =
        carried === undefined ? 'a zone' : `a zone such as ${offsetName(carried)} before`;
      return refuse(code, path, `expected ${wish}, got ${describe(text)}`);
    }
    const instant = local - offset;
    if (resolve && zone && !resolve(local).includes(instant)) {
      const expected = `expected a time in ${zone.name} as the header or options.timeZone says`;
      return refuse('TWO_TIME_ZONES', path, `${expected}, got ${describe(text)}`);
    }
    carried ??= offset;
    if (!zone && carried !== offset) {
      warnings.add('OFFSETS_VARY', `offsets other than ${offsetName(carried)}`);
    }
    return instant;
  };

  const heightOf = (text: string, line: number, column: number): number => {
    const value = readCell(text, () => placeOf(line, nameAt(column)));
    const metres = toMetres(value, unit);
    if (!isSentinel(value, metres)) return metres;
    warnings.add('SENTINEL', `${value} taken as a gap`, line);
    return Number.NaN;
  };

  const push = (time: Instant, height: number, line: number): void => {
    if (time > latest) latest = time;
    collector.push(time, height, line);
  };

  const readDay = (cells: readonly string[], line: number): void => {
    const path = placeOf(line, nameAt(date));
    const text = (cells[date] as string).trim();
    const day = readDate(text, options.dateOrder, path);
    for (let hour = 0; hour < 24; hour++) {
      const column = values[hour] as number;
      const height = heightOf(cells[column] as string, line, column);
      const place = placeOf(line, nameAt(column));
      const time = settle(day + hour * HOUR, `${text} ${hour}:00`, place, Number.isNaN(height));
      if (time !== undefined) push(time, height, line);
    }
  };

  const read = (cells: readonly string[], line: number): void => {
    if (cells.length < needed) {
      const expected = `expected ${needed} columns or more, got ${cells.length}`;
      refuse('MISSING', placeOf(line, nameAt(cells.length)), expected);
    }
    for (let i = width; i < cells.length; i++) {
      if ((cells[i] as string).trim() === '') continue;
      const hint = commaAllowed ? '' : ' (decimal commas need ; or tab between columns)';
      refuse(
        'UNKNOWN_LAYOUT',
        placeOf(line),
        `expected ${width} columns, got ${cells.length}${hint}`,
      );
    }
    if (daily) {
      readDay(cells, line);
      return;
    }
    const path = placeOf(line, nameAt(clock ?? date));
    const dateText = (cells[date] as string).trim();
    const clockText = clock === undefined ? undefined : (cells[clock] as string).trim();
    const reading = readClock(dateText, clockText, options.dateOrder, path);
    const text = clockText === undefined ? dateText : `${dateText} ${clockText}`;
    const time = instantOf(reading, text, path);
    const column = values[0] as number;
    push(time, heightOf(cells[column] as string, line, column), line);
  };

  return { layout, read, zoneName: () => zone?.name ?? offsetName(carried ?? 0) };
}
