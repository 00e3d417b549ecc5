/**
 * Perigee and apogee of the Moon.
 *
 * Source: J. Meeus, Astronomical Algorithms, 2nd ed. (1998), chapter 50 (perigee 31 minutes at most, apogee 3);
 * from memory. Checked against his example 50.a to the printed digits, and an independent library.
 * @module
 */
import type { Instant, Span } from '@staithe/core';
import { elongation, eventsIn, moonAnomaly, nodeDistance, sunAnomaly, whenPassed } from './mean.js';
import { moonOfDate } from './moon.js';
import { CENTURY, centuriesAt, periodic, table } from './series.js';

/** The Moon nearest to the Earth, or farthest. @public */
export interface LunarApsis {
  readonly kind: 'perigee' | 'apogee';
  /** Whole milliseconds. */
  readonly time: Instant;
  /** From centre to centre, kilometres. */
  readonly distance: number;
}

const KINDS = ['perigee', 'apogee'] as const;

// Columns D, M, F, terms in the order of the multipliers; sines in 1e-4 days, at perigee and at apogee.
const TERMS =
  /* @__PURE__ */ table(`4 2 2 2 4 6 0 0 1 1 1 1 2 2 2 2 2 3 3 3 4 4 4 4 5 5 6 6 6 6 7 8 8 8 9 10 10 11 12 12 13 14 14 16 16 18 18 20 20 22 22 24 0 0 0 0 2 2 4 4 6 0 2
0 0 1 2 0 0 1 2 -1 0 1 2 -2 -1 0 1 2 0 1 2 -2 -1 0 1 0 1 -2 -1 0 1 0 -1 0 1 0 -1 0 0 -1 0 0 -1 0 -1 0 -1 0 -1 0 -1 0 0 -2 -1 0 1 -1 0 -2 0 0 0 0
-4 -2 -2 -2 -2 -2 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 2 2 2 2 2 2 2 2 2 4 4
5 0 8 -6 -14 8 502 7 -4 237 -32 -10 -27 -773 -16769 40 5 -112 14 11 24 422 4589 -29 66 -14 -21 -256 -1856 19 -41 162 883 -14 27 -104 -460 -18 69 253 13 -46 -145 31 86 -21 -52 13 32 -9 -21 6 -6 7 129 0 0 -53 -11 27 -14 -8 7
0 -34 0 0 -4 0 456 6 -3 -189 36 0 22 426 4392 5 5 -17 7 0 10 113 684 0 -4 0 4 34 144 0 0 11 35 0 0 4 9 0 0 3 0 0 0 0 0 0 0 0 0 0 0 0 0 0 212 3 3 47 0 13 4 0 0`);

/** Julian centuries TT of an apsis, counted in half turns of the Moon's mean anomaly: even ones are perigees. */
export function trueApsis(halves: number): number {
  const t = whenPassed(moonAnomaly, halves * 180);
  const angles = [elongation, sunAnomaly, nodeDistance].map((angle) => angle(t));
  const column = halves & 1;
  const [sines] = periodic(TERMS, angles, t, column);
  return t + (sines * 1e-4) / CENTURY;
}

/**
 * Perigees and apogees of the Moon in a span.
 *
 * @param span - Half-open, from year 1700 to 2200; UTC is read as UT1.
 * @returns In order of time; within 40 minutes (perigee) and 5 minutes (apogee) and 25 km of an independent library,
 * 1900 to 2100.
 * @throws InputError of `toSpan`: of `toInstant`, and `EMPTY_SPAN`.
 * @example
 * const [apsis] = lunarApsides({ from: '1988-10-01T00:00Z', to: '1988-10-20T00:00Z' });
 * apsis?.kind; // 'apogee'
 * @public
 */
export function lunarApsides(span: Span): readonly LunarApsis[] {
  return eventsIn(span, KINDS, moonAnomaly, trueApsis).map((event) => ({
    ...event,
    distance: moonOfDate(centuriesAt(event.time))[2],
  }));
}
