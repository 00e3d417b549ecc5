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
/** Degrees: the book's epoch of the mean perigee has four decimals only. */
const CUT = 0.0006;

// Columns D, M, F, terms in the order of the multipliers; sines in 1e-4 days, at perigee and at apogee.
const TERMS = /* @__PURE__ */ table(`
0 0 0 0 0 0 0 1 1 1 1 2 2 2 2 2 2 2 2 2 2 2 3 3 3 4 4 4 4 4 4 4 4 5 5 6 6 6 6 6 6 7 8 8 8 9 10 10 11 12 12 13 14 14 16 16 18 18 20 20 22 22 24
-2 -1 0 0 1 1 2 -1 0 1 2 -2 -1 -1 0 0 0 0 1 1 2 2 0 1 2 -2 -2 -1 0 0 0 0 1 0 1 -2 -1 0 0 0 1 0 -1 0 1 0 -1 0 0 -1 0 0 -1 0 -1 0 -1 0 -1 0 -1 0 0
2 2 2 4 0 2 0 0 0 0 0 0 0 2 -2 0 2 4 -2 0 -2 0 0 0 0 0 2 0 -4 -2 0 2 0 0 0 0 0 -2 0 2 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0 0
-6 7 129 -8 502 0 7 -4 237 -32 -10 -27 -773 0 0 -16769 -53 7 8 40 -6 5 -112 14 11 24 -11 422 5 -14 4589 27 -29 66 -14 -21 -256 8 -1856 -14 19 -41 162 883 -14 27 -104 -460 -18 69 253 13 -46 -145 31 86 -21 -52 13 32 -9 -21 6
0 0 212 0 456 3 6 -3 -189 36 0 22 426 3 -34 4392 47 0 0 5 0 5 -17 7 0 10 0 113 0 -4 684 13 0 -4 0 4 34 0 144 4 0 0 11 35 0 0 4 9 0 0 3 0 0 0 0 0 0 0 0 0 0 0 0
`);

/** Julian centuries TT of the mean apsis: the Moon's mean anomaly passes so many half turns, even at perigee. */
export function meanApsis(halves: number): number {
  return whenPassed(moonAnomaly, halves * 180 - CUT);
}

/** Julian centuries TT of the true apsis. */
export function trueApsis(halves: number): number {
  const t = meanApsis(halves);
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
  return eventsIn(span, KINDS, moonAnomaly, trueApsis).map(({ kind, time }) => ({
    kind,
    time,
    distance: moonOfDate(centuriesAt(time)).distance,
  }));
}
