/**
 * Dates and times as files write them. Nothing is guessed: 03/04/2012 needs the caller's word.
 * @module
 */
import { describe, HOUR, InputError, type InputErrorCode, MINUTE, SECOND } from '@staithe/core';
import { readZone } from './zone.js';

/** The clock's reading, and the offset where the text carries one. */
export interface ClockReading {
  /** Milliseconds, the clock read as if it were UTC. */
  readonly local: number;
  /** Milliseconds east. */
  readonly offset: number | undefined;
}

export type DateOrder = 'day-first' | 'month-first' | undefined;

const YEAR_FIRST = /^(\d{4})(?:([-/.])(\d{1,2})\2(\d{1,2})|(\d\d)(\d\d))$/;
const YEAR_LAST = /^(\d{1,2})([-/.])(\d{1,2})\2(\d{4})$/;
const TIME = /^(\d{1,2}):(\d\d)(?::(\d\d)(?:[.,](\d+))?)?\s*(Z|UTC|GMT|[+-]\d\d(?::?\d\d)?)?$/i;

function refuse(code: InputErrorCode, path: string, expected: string, text: string): never {
  throw new InputError(code, path, `expected ${expected}, got ${describe(text)}`);
}

/** The start of a day, the date read as if it were UTC. */
export function readDate(text: string, order: DateOrder, path: string): number {
  const [, year, , month1, day1, month2, day2] = YEAR_FIRST.exec(text) ?? [];
  if (year) return dayOf(+year, +(month1 ?? month2 ?? 0), +(day1 ?? day2 ?? 0), text, path);
  const [, first, , second, lastYear] = YEAR_LAST.exec(text) ?? [];
  if (!first || !second || !lastYear) {
    return refuse('BAD_TIME', path, 'a date like 2031-06-01', text);
  }
  if (!order) {
    return refuse('BAD_TIME', path, 'a date with the year first, or options.dateOrder', text);
  }
  const [day, month] = order === 'day-first' ? [+first, +second] : [+second, +first];
  return dayOf(+lastYear, month, day, text, path);
}

function dayOf(year: number, month: number, day: number, text: string, path: string): number {
  if (year < 1700 || year > 2200) {
    return refuse('OUT_OF_RANGE', path, 'a year from 1700 to 2200', text);
  }
  const start = Date.UTC(year, month - 1, day);
  const date = new Date(start);
  if (date.getUTCMonth() !== month - 1 || date.getUTCDate() !== day) {
    return refuse('BAD_TIME', path, 'a date that exists', text);
  }
  return start;
}

/** Date and time of one cell, or of two. */
export function readClock(
  dateText: string,
  timeText: string | undefined,
  order: DateOrder,
  path: string,
): ClockReading {
  let date = dateText;
  let time = timeText;
  if (time === undefined) {
    const cut = dateText.search(/[T ]/);
    if (cut < 0) {
      readDate(dateText, order, path);
      return refuse('BAD_TIME', path, 'a date and a time', dateText);
    }
    date = dateText.slice(0, cut);
    time = dateText.slice(cut + 1).trim();
  }
  const day = readDate(date, order, path);
  const [, hour, minute = '', second = '0', fraction, zone] = TIME.exec(time) ?? [];
  if (!hour) return refuse('BAD_TIME', path, 'a time like 18:30', time);
  if (second === '60') return refuse('LEAP_SECOND', path, 'seconds from 00 to 59', time);
  const inDay =
    +hour * HOUR +
    +minute * MINUTE +
    +second * SECOND +
    (fraction ? Math.round(+`0.${fraction}` * SECOND) : 0);
  if (+minute > 59 || +second > 59 || inDay > 24 * HOUR) {
    return refuse('BAD_TIME', path, 'a time from 00:00 to 24:00', time);
  }
  const offset = zone === undefined ? undefined : readZone(zone)?.offset;
  if (zone !== undefined && offset === undefined) {
    return refuse('BAD_TIME', path, 'an offset up to 18 hours', time);
  }
  return { local: day + inDay, offset };
}

/** Tells whether a cell begins like a date: then its line is data, not a header. */
export function looksLikeDate(text: string): boolean {
  const head = text.trim().split(/[T ]/)[0] ?? '';
  return YEAR_FIRST.test(head) || YEAR_LAST.test(head);
}
