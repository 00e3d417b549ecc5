/**
 * Nutation and the obliquity of the ecliptic.
 *
 * Source: J. Meeus, Astronomical Algorithms, 2nd ed. (1998), chapter 22: the short series, right to 0.5″ in longitude and
 * 0.1″ in obliquity; mean obliquity eq. 22.2. From memory; checked against his example 22.a.
 * @module
 */
import type { Degrees } from '@staithe/core';
import { moonLongitude, nodeLongitude, sunLongitude } from './mean.js';
import { periodic, table } from './series.js';

// Columns Ω, L₀, L′; nutation in longitude (sine) and in obliquity (cosine), arcseconds.
const NUTATION = /* @__PURE__ */ table(`0 0 1 2
0 2 0 0
2 0 0 0
-0.23 -1.32 -17.2 0.21
0.1 0.57 9.2 -0.09`);

/** Nutation in longitude and in obliquity, arcseconds. */
export function nutation(t: number): readonly [inLongitude: number, inObliquity: number] {
  return periodic(NUTATION, [nodeLongitude(t), sunLongitude(t), moonLongitude(t)], 0, 0, 1);
}

/** Mean obliquity of the ecliptic, arcseconds. */
export function meanObliquity(t: number): number {
  return 84381.448 - 46.815 * t;
}

/** True obliquity of the ecliptic. */
export function obliquity(t: number): Degrees {
  return (meanObliquity(t) + nutation(t)[1]) / 3600;
}
