/**
 * ΔT = TT − UT1, smooth at every date: no leap seconds; UTC is read as UT1, an error below 0.9 s.
 *
 * Sources: 1700 to 1950 the polynomial expressions of F. Espenak and J. Meeus (2006), evaluated each five years;
 * from 1955 the observed values each five years (yearly almanacs, from memory); from 2025 blended over 50 years into
 * the long-term parabola −20 + 32·((year − 1820)/100)² s of L. V. Morrison and F. R. Stephenson (2004).
 * Between the knots a cubic with continuous slope. An error of 1 s moves M2 by 0.0003°.
 * @module
 */
import { type InstantLike, toInstant } from '@staithe/core';

const FIRST_YEAR = 1700;
const KNOT_YEARS = 5;
// Hundredths of a second, from 1700 each five years to 2025.
const KNOTS: readonly number[] = /* @__PURE__ */ Object.freeze([
  883, 950, 996, 1031, 1060, 1088, 1121, 1162, 1211, 1270, 1337, 1411, 1487, 1562, 1629, 1681, 1710,
  1706, 1657, 1551, 1372, 1254, 1250, 1263, 1186, 1000, 767, 592, 546, 617, 711, 725, 762, 603, 94,
  -309, -501, -565, -612, -619, -279, 383, 1039, 1709, 2120, 2378, 2413, 2382, 2441, 2688, 2907,
  3107, 3315, 3573, 4018, 4548, 5054, 5434, 5686, 6078, 6383, 6469, 6607, 6764, 6936, 6914,
]);
const LAST_YEAR = 2025;
const BLEND_YEARS = 50;
const MS_PER_YEAR = 365.2425 * 86400000;
const YEAR_1700_MS = -8520336000000;

/** Value in seconds and slope in seconds a year on the knots. */
function onKnots(year: number): readonly [number, number] {
  const last = KNOTS.length - 1;
  const at = (i: number): number => (KNOTS[i] as number) / 100;
  const slope = (i: number): number =>
    i === 0 || i === last ? 0 : (at(i + 1) - at(i - 1)) / (2 * KNOT_YEARS);
  const place = (year - FIRST_YEAR) / KNOT_YEARS;
  if (place >= last) return [at(last), 0];
  const k = Math.max(0, Math.floor(place));
  const x = place - k;
  const [a, b] = [at(k), at(k + 1)];
  const [u, v] = [slope(k) * KNOT_YEARS, slope(k + 1) * KNOT_YEARS];
  const c2 = 3 * (b - a) - 2 * u - v;
  const c3 = 2 * (a - b) + u + v;
  return [a + x * (u + x * (c2 + x * c3)), (u + x * (2 * c2 + 3 * x * c3)) / KNOT_YEARS];
}

/**
 * ΔT and its slope.
 *
 * @param instant - Milliseconds since 1970.
 * @returns Seconds, and seconds a year.
 */
export function deltaTAt(instant: number): readonly [seconds: number, slope: number] {
  const year = FIRST_YEAR + (instant - YEAR_1700_MS) / MS_PER_YEAR;
  const [near, nearSlope] = onKnots(year);
  if (year <= LAST_YEAR) return [near, nearSlope];
  const centuries = (year - 1820) / 100;
  const far = -20 + 32 * centuries * centuries;
  const farSlope = 0.64 * centuries;
  const x = Math.min(1, (year - LAST_YEAR) / BLEND_YEARS);
  const weight = x * x * (3 - 2 * x);
  const weightSlope = (6 * x * (1 - x)) / BLEND_YEARS;
  return [
    near + weight * (far - near),
    nearSlope + weight * (farSlope - nearSlope) + weightSlope * (far - near),
  ];
}

/**
 * ΔT = TT − UT1 with its standard error.
 *
 * Sigma: 0.05 s from 1955; before, rising evenly to 0.5 s at 1900 and by 0.02 s a year beyond; after 2025 the
 * random walk of P. Huber (2006), 365.25·n·√(n·0.058/3·(1 + n/2500)) ms for n years (from memory).
 *
 * @param t - An instant from year 1700 to 2200.
 * @returns Seconds. Smooth; within 0.3 s of the values of test-vectors/from-memory/trade-checks.
 * @throws InputError of `toInstant`.
 * @example
 * deltaT('2020-01-01T00:00Z').sigma; // 0.05
 * @public
 */
export function deltaT(t: InstantLike): { readonly seconds: number; readonly sigma: number } {
  const instant = toInstant(t, 't');
  const year = FIRST_YEAR + (instant - YEAR_1700_MS) / MS_PER_YEAR;
  const ahead = Math.max(0, year - LAST_YEAR);
  const walk = 0.36525 * ahead * Math.sqrt(((ahead * 0.058) / 3) * (1 + ahead / 2500));
  const old =
    Math.max(0, Math.min(55, 1955 - year)) * (0.45 / 55) + Math.max(0, 1900 - year) * 0.02;
  return { seconds: deltaTAt(instant)[0], sigma: 0.05 + old + walk };
}
