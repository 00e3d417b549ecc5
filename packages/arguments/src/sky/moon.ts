/**
 * The Moon's place.
 *
 * Source: J. Meeus, Astronomical Algorithms, 2nd ed. (1998), chapter 47.
 * @module
 */
import { type Degrees, type InstantLike, toInstant } from '@staithe/core';
import { elongation, moonAnomaly, moonLongitude, nodeDistance, sunAnomaly } from './mean.js';
import { LATITUDE, LONGITUDE_AND_DISTANCE, OTHERS } from './moon-terms.js';
import { nutation } from './nutation.js';
import { placeFrom, type SkyPosition } from './position.js';
import { centuriesAt, periodic } from './series.js';

const MEAN_DISTANCE = 385000.56;

/** Ecliptic longitude (not wrapped) and latitude, mean equinox of date, without nutation, degrees; distance, km. */
export function moonOfDate(
  t: number,
): readonly [longitude: Degrees, latitude: Degrees, distance: number] {
  const mean = moonLongitude(t);
  const angles = [elongation(t), sunAnomaly(t), moonAnomaly(t), nodeDistance(t)];
  const others = [
    119.75 + 131.849 * t,
    mean,
    53.09 + 479264.29 * t,
    313.45 + 481266.484 * t,
    ...angles.slice(2),
  ];
  const [longitude, distance] = periodic(LONGITUDE_AND_DISTANCE, angles, t, 0, 1);
  return [
    mean + (longitude + periodic(OTHERS, others)[0]) * 1e-6,
    (periodic(LATITUDE, angles, t)[0] + periodic(OTHERS, others, 0, 1)[0]) * 1e-6,
    MEAN_DISTANCE + distance / 1000,
  ];
}

/**
 * The Moon's apparent place, seen from the centre of the Earth.
 *
 * @param t - An instant from year 1700 to 2200; UTC is read as UT1, TT follows through ΔT.
 * @returns Ecliptic and equatorial coordinates, degrees; distance, km. Within 0.005°, 0.002° in latitude and 25 km of
 * an independent library, 1900 to 2100.
 * @throws InputError of `toInstant`, path `t`.
 * @example
 * const { declination, distance } = moonPosition('1992-04-11T23:59:01Z');
 * declination.toFixed(3); // '13.768'
 * distance.toFixed(0); // '368410'
 * @public
 */
export function moonPosition(t: InstantLike): SkyPosition {
  const centuries = centuriesAt(toInstant(t, 't'));
  const [longitude, latitude, distance] = moonOfDate(centuries);
  return placeFrom(longitude + nutation(centuries)[0] / 3600, latitude, distance, centuries);
}
