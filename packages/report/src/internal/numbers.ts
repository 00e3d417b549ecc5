/**
 * Numbers for people: metres and millimetres, degrees, counts, durations. Minus is U+2212 (d3-format's own).
 * @module
 */
import { DAY, MINUTE } from '@staithe/core';
import { format, formatLocale } from 'd3-format';

/** Metres with some decimals. */
export const metres = (value: number, decimals: number = 2): string =>
  format(`.${decimals}f`)(value);
/** Metres shown as whole millimetres. */
export const millimetres = (value: number): string => format('.0f')(value * 1000);
/** Metres shown as whole millimetres, with a plus. */
export const signedMillimetres = (value: number): string => format('+.0f')(value * 1000);
/** Degrees with one decimal, in [0, 360): 359.96 reads 0.0. */
export function degrees(value: number): string {
  const text = format('.1f')(value);
  return text === '360.0' ? '0.0' : text;
}

/** 94 210, with a space that does not break. */
export function count(value: number): string {
  const spaced = formatLocale({
    decimal: '.',
    thousands: '\u00a0',
    grouping: [3],
    currency: ['', ''],
  });
  return spaced.format(',.0f')(value);
}

/** `1 window`, `2 windows`. */
export const counted = (n: number, one: string, many: string = `${one}s`): string =>
  `${count(n)} ${n === 1 ? one : many}`;

/** The time between two returns of a constituent: `12 h 25.2 min`, `27.555 d`. */
export function returnsEvery(hours: number): string {
  if (hours >= 48) return `${format('.5r')(hours / 24)} d`;
  const tenths = Math.round(hours * 600);
  return `${Math.floor(tenths / 600)} h ${padded((tenths % 600) / 10)} min`;
}
const padded = (minutes: number): string => format('04.1f')(minutes);

/** A span of time: `4 h 30 min`, `2.5 d`, `12 min`. */
export function duration(ms: number): string {
  if (ms >= DAY) return `${format('.1f')(ms / DAY)} d`;
  const minutes = Math.round(ms / MINUTE);
  if (minutes < 60) return `${minutes} min`;
  return `${Math.floor(minutes / 60)} h ${String(minutes % 60).padStart(2, '0')} min`;
}
