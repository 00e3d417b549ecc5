/**
 * Equinoxes and solstices: where the Sun's apparent longitude passes 0°, 90°, 180°, 270°.
 *
 * Source: J. Meeus, Astronomical Algorithms, 2nd ed. (1998), chapter 27, whose periodic terms are in the Sun's place
 * here, so that both agree. Checked against the exact instants 1996 to 2005 that he prints (45 s), and against an
 * independent library.
 * @module
 */
import type { Instant, Span } from '@staithe/core';
import { eventsIn, sunLongitude, whenPassed } from './mean.js';
import { apparentLongitude } from './sun.js';

/** An equinox or a solstice, named by its month: summer is not June everywhere. @public */
export interface Season {
  readonly kind: 'march-equinox' | 'june-solstice' | 'september-equinox' | 'december-solstice';
  /** Whole milliseconds. */
  readonly time: Instant;
}

const KINDS = ['march-equinox', 'june-solstice', 'september-equinox', 'december-solstice'] as const;

/**
 * Equinoxes and solstices in a span.
 *
 * @param span - Half-open, from year 1700 to 2200; UTC is read as UT1.
 * @returns In order of time; within 65 s of an independent library, 1900 to 2100.
 * @throws InputError of `toSpan`: of `toInstant`, and `EMPTY_SPAN`.
 * @example
 * const [first] = seasons({ from: '2031-01-01T00:00Z', to: '2032-01-01T00:00Z' });
 * first?.kind; // 'march-equinox'
 * @public
 */
export function seasons(span: Span): readonly Season[] {
  return eventsIn(span, KINDS, sunLongitude, (quarters) =>
    whenPassed(apparentLongitude, quarters * 90),
  );
}
