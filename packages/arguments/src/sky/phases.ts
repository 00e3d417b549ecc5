/**
 * New Moon, first quarter, full Moon, last quarter.
 *
 * Source: J. Meeus, Astronomical Algorithms, 2nd ed. (1998), chapter 49 (a few seconds; 17 s at most, 1980 to 2020);
 * from memory. Checked against his examples 49.a and 49.b to the printed digits, and an independent library.
 * @module
 */
import type { Instant, Span } from '@staithe/core';
import { elongation, eventsIn, moonAnomaly, nodeDistance, sunAnomaly, whenPassed } from './mean.js';
import { CENTURY, periodic, table } from './series.js';

/** A principal phase of the Moon. @public */
export interface MoonPhase {
  readonly kind: 'new' | 'first-quarter' | 'full' | 'last-quarter';
  /** The Moon's apparent longitude is 0°, 90°, 180° or 270° ahead of the Sun's; whole milliseconds. */
  readonly time: Instant;
}

const KINDS = ['new', 'first-quarter', 'full', 'last-quarter'] as const;
/** The apparent Sun is behind the mean one by aberration, 20.5″, the Moon by 0.7″. */
export const ABERRATION = 0.0055;
/** Quarters are so much nearer to the full Moon than to the new, 1e-5 days. */
const MEAN_APART = 306;

// Columns M′, M, F, terms in the order of the multipliers; sines in 1e-5 days at new Moon, at the quarters, at full
// Moon; cosines in 1e-5 days that part the quarters.
const TERMS = /* @__PURE__ */ table(`0 1 1 1 2 0 0 0 1 1 1 1 1 2 2 2 3 3 4 0 0 1 1 1 2
1 -1 0 1 0 1 2 3 -2 -1 0 1 2 -1 0 1 0 1 0 0 1 -1 0 1 0
-2 -2 -2 -2 -2 0 0 0 0 0 0 0 0 0 0 0 0 0 0 2 2 2 2 2 2
38 -2 -111 3 4 17241 208 4 0 739 -40720 -514 -7 -24 1608 56 -42 -2 2 1039 42 3 -57 -3 3
32 -5 -180 3 2 17172 204 3 4 454 -62801 -1183 -28 -34 862 27 -40 -2 0 804 32 2 -70 -4 4
38 -2 -111 3 4 17302 209 4 0 734 -40614 -515 -7 -24 1614 56 -42 -2 2 1043 42 3 -57 -3 3
0 0 0 0 0 -38 0 0 0 -2 26 2 0 0 0 0 0 0 0 2 0 0 0 0 0`);
// Planets, and last the node: phase in degrees, degrees a lunation from the new Moon of January 2000, sines in
// 1e-6 days.
const SLOW =
  /* @__PURE__ */ table(`299.77 251.88 251.83 349.42 84.66 141.74 207.14 154.84 34.52 207.19 291.34 161.72 239.56 331.55 124.7746
0.107408 0.016321 26.651886 36.412478 18.206239 53.303771 2.453732 7.30686 27.261239 0.121824 1.844379 24.198154 25.513099 3.592518 -1.56375588
325 165 164 126 110 62 60 56 47 42 40 37 35 23 -170`);

/** Julian centuries TT of a phase, counted in quarters: 4 is the new Moon of January 2000. */
export function truePhase(quarters: number): number {
  const t = whenPassed(elongation, quarters * 90 - ABERRATION);
  const angles = [moonAnomaly, sunAnomaly, nodeDistance].map((angle) => angle(t));
  const phase = quarters & 3;
  const isQuarter = phase & 1;
  const [sines, cosines] = periodic(TERMS, angles, t, isQuarter || phase, 3);
  const apart = isQuarter * (2 - phase) * (MEAN_APART + cosines);
  const slow = periodic(SLOW, [1, quarters / 4 - 1])[0] / 10;
  return t + ((sines + apart + slow) * 1e-5) / CENTURY;
}

/**
 * The principal phases of the Moon in a span.
 *
 * @param span - Half-open, from year 1700 to 2200; UTC is read as UT1.
 * @returns In order of time; within 2 minutes of an independent library, 1900 to 2100.
 * @throws InputError of `toSpan`: of `toInstant`, and `EMPTY_SPAN`.
 * @example
 * const [first] = moonPhases({ from: '1977-02-01T00:00Z', to: '1977-03-01T00:00Z' });
 * first?.kind; // 'full'
 * @public
 */
export function moonPhases(span: Span): readonly MoonPhase[] {
  return eventsIn(span, KINDS, elongation, truePhase);
}
