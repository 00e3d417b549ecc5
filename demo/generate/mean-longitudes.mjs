/**
 * Mean longitudes of Moon and Sun, written here a second time so that the demo's truth owes nothing to the packages.
 *
 * Source: J. Meeus, Astronomical Algorithms, 2nd ed. (1998), eq. 25.2 and 25.3 (Sun), 47.1 and 47.7 (Moon, node) and
 * p. 343 (perigee); coefficients from memory, checked in the tests against ERFA 2.0.0 to 0.001°.
 * @module
 */

const DAY = 86_400_000;
const J2000 = Date.UTC(2000, 0, 1, 12);
const DELTA_T_SECONDS = 69.2; // Terrestrial Time minus Universal Time, held constant over the records
const DAYS_PER_CENTURY = 36_525;

// Ascending powers of Julian centuries TT from J2000.0, degrees.
const MOON = [218.3164477, 481267.88123421, -0.0015786, 1 / 538841, -1 / 65194000];
const SUN = [280.46646, 36000.76983, 0.0003032];
const SUN_ANOMALY = [357.52911, 35999.05029, -0.0001537];
const LUNAR_PERIGEE = [83.3532465, 4069.0137287, -0.01032, -1 / 80053, 1 / 18999000];
const NODE = [125.0445479, -1934.1362891, 0.0020754, 1 / 467441, -1 / 60616000];

/** @param {number[]} powers @param {number} t */
const polynomial = (powers, t) => powers.reduceRight((sum, power) => sum * t + power, 0);

/**
 * The six Doodson variables tau, s, h, p, N', ps.
 *
 * @param {number} instant Milliseconds since 1970, UTC, read as Universal Time.
 * @returns {number[]} Degrees, not wrapped.
 */
export function doodsonVariables(instant) {
  const t = ((instant - J2000) / DAY + DELTA_T_SECONDS / 86_400) / DAYS_PER_CENTURY;
  const moon = polynomial(MOON, t);
  const sun = polynomial(SUN, t);
  const solarPerigee = sun - polynomial(SUN_ANOMALY, t);
  const hourAngle = 360 * (instant / DAY - Math.floor(instant / DAY));
  return [
    hourAngle + sun - moon,
    moon,
    sun,
    polynomial(LUNAR_PERIGEE, t),
    -polynomial(NODE, t),
    solarPerigee,
  ];
}

const HOURS_PER_CENTURY = DAYS_PER_CENTURY * 24;
const [moonRate, sunRate, perigeeRate, nodeRate, anomalyRate] = [
  MOON,
  SUN,
  LUNAR_PERIGEE,
  NODE,
  SUN_ANOMALY,
].map((powers) => /** @type {number} */ (powers[1]) / HOURS_PER_CENTURY);

/** Rates of tau, s, h, p, N', ps at J2000.0, degrees an hour. */
export const DOODSON_RATES = [
  15 + sunRate - moonRate,
  moonRate,
  sunRate,
  perigeeRate,
  -nodeRate,
  sunRate - anomalyRate,
];

/** @param {readonly number[]} multipliers @param {readonly number[]} variables */
export const combine = (multipliers, variables) =>
  multipliers.reduce((sum, multiplier, i) => sum + multiplier * variables[i], 0);
