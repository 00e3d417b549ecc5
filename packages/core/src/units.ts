/**
 * Conversions for the edge of a program: inside, everything is metres, hours and metres per second.
 *
 * Source: the international foot of 0.3048 m (1959 agreement), the international nautical mile of 1852 m (1929):
 * both exact by definition.
 * @module
 */

/** A length or a height in metres. @public */
export type Metres = number;

const METRES_PER_FOOT = 0.3048;
const METRES_PER_NAUTICAL_MILE = 1852;
const SECONDS_PER_HOUR = 3600;

/**
 * International feet to metres.
 *
 * @param feet - International feet.
 * @returns Metres.
 * @example
 * metresFromFeet(10); // 3.048
 * @public
 */
export function metresFromFeet(feet: number): Metres {
  return feet * METRES_PER_FOOT;
}

/**
 * Metres to international feet.
 *
 * @param metres - Metres.
 * @returns International feet.
 * @example
 * feetFromMetres(3.048); // 10
 * @public
 */
export function feetFromMetres(metres: Metres): number {
  return metres / METRES_PER_FOOT;
}

/**
 * Knots to metres per second.
 *
 * @param knots - International nautical miles per hour.
 * @returns Metres per second.
 * @example
 * metresPerSecondFromKnots(36); // 18.52
 * @public
 */
export function metresPerSecondFromKnots(knots: number): number {
  return (knots * METRES_PER_NAUTICAL_MILE) / SECONDS_PER_HOUR;
}

/**
 * Metres per second to knots.
 *
 * @param metresPerSecond - Metres per second.
 * @returns International nautical miles per hour.
 * @example
 * knotsFromMetresPerSecond(18.52); // 36
 * @public
 */
export function knotsFromMetresPerSecond(metresPerSecond: number): number {
  return (metresPerSecond * SECONDS_PER_HOUR) / METRES_PER_NAUTICAL_MILE;
}
