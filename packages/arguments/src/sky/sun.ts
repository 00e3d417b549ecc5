/**
 * The Sun's place, and how high it stands.
 *
 * Source: J. Meeus, Astronomical Algorithms, 2nd ed. (1998), chapter 25, lower accuracy (0.01°), with the periodic terms
 * of table 27.C, which he gives for equinoxes and solstices, at all times: 0.0011° against an independent library.
 * Mean sidereal time eq. 12.4. Numbers from memory.
 * @module
 */
import { type Degrees, type InstantLike, refuse, toInstant, wrapDegrees } from '@staithe/core';
import { sunAnomaly, sunLongitude } from './mean.js';
import { nutation } from './nutation.js';
import { placeFrom, type SkyPosition, turned } from './position.js';
import { CENTURY, centuriesAt, daysAt, periodic, polynomial, sinCos, table } from './series.js';

const ABERRATION = 0.00569;
const KILOMETRES_PER_UNIT = 149597870.7; // IAU (2012), resolution B2

// Columns: phase in degrees, degrees a century, cosines in 1e-5 days of the Sun's mean motion, by which it comes late:
// the pull of Moon and planets, and nutation.
const LATE =
  /* @__PURE__ */ table(`324.96 337.23 342.08 27.85 73.14 171.52 222.54 296.72 243.58 119.81 297.17 21.02 247.54 325.15 60.93 155.12 288.79 198.04 199.76 95.39 287.11 320.81 227.73 15.45
1934.136 32964.467 20.186 445267.112 45036.886 22518.443 65928.934 3034.906 9037.513 33718.147 150.678 2281.226 29929.562 31555.956 4443.417 67555.328 4562.452 62894.029 31436.921 14577.848 31931.756 34777.259 1222.114 16859.074
485 203 199 182 156 136 77 74 70 58 52 50 45 44 29 18 17 16 14 12 12 12 9 8`);
const EQUINOX_SHARE = 0.000254852; // cosine of the obliquity, degrees in an arcsecond
const MEAN_MOTION = 0.98565e-5; // degrees in 1e-5 days

/** True longitude without aberration and nutation, degrees, not wrapped; distance, astronomical units. */
export function sunOfDate(t: number): readonly [longitude: Degrees, radius: number] {
  const anomaly = sunAnomaly(t);
  const eccentricity = polynomial([0.016708634, -0.000042037, -0.0000001267], t);
  const centre =
    polynomial([1.914602, -0.004817, -0.000014], t) * sinCos(anomaly)[0] +
    (0.019993 - 0.000101 * t) * sinCos(2 * anomaly)[0] +
    0.000289 * sinCos(3 * anomaly)[0];
  return [
    sunLongitude(t) + centre,
    (1.000001018 * (1 - eccentricity * eccentricity)) /
      (1 + eccentricity * sinCos(anomaly + centre)[1]),
  ];
}

/** Apparent longitude, degrees, not wrapped. */
export function apparentLongitude(t: number): Degrees {
  return sunOfDate(t)[0] - ABERRATION - periodic(LATE, [1, t])[1] * MEAN_MOTION;
}

/** The apparent place, from Julian centuries TT. */
function sunAt(t: number): SkyPosition {
  return placeFrom(apparentLongitude(t), 0, sunOfDate(t)[1] * KILOMETRES_PER_UNIT, t);
}

/**
 * The Sun's apparent place, seen from the centre of the Earth. Its ecliptic latitude, below 1.2″, is taken as zero.
 *
 * @param t - An instant from year 1700 to 2200; UTC is read as UT1, TT follows through ΔT.
 * @returns Ecliptic and equatorial coordinates, degrees; distance, km. Within 0.002° and 15000 km of an
 * independent library, 1900 to 2100.
 * @throws InputError of `toInstant`, path `t`.
 * @example
 * const { rightAscension, declination } = sunPosition('1992-10-12T23:59:01Z');
 * rightAscension.toFixed(2); // '198.38'
 * declination.toFixed(2); // '-7.78'
 * @public
 */
export function sunPosition(t: InstantLike): SkyPosition {
  return sunAt(centuriesAt(toInstant(t, 't')));
}

/** Mean sidereal time at Greenwich, degrees, from days of UT since J2000.0. */
export function meanSiderealTime(days: number): Degrees {
  const t = days / CENTURY;
  return wrapDegrees(280.46061837 + 360.98564736629 * days + 0.000387933 * t * t);
}

function checkAngle(angle: Degrees, limit: number, path: string): void {
  const finite = Number.isFinite(angle);
  if (finite && Math.abs(angle) <= limit) return;
  refuse(finite ? 'OUT_OF_RANGE' : 'NOT_FINITE', path, `degrees from -${limit} to ${limit}`, angle);
}

/**
 * How high the Sun's centre stands above the horizon of a place, without the lift of the air (0.57° at the horizon)
 * and without parallax (0.0024°). By the usual rule the upper limb shows above −0.833°; civil twilight ends at −6°.
 *
 * @param t - An instant from year 1700 to 2200; UTC is read as UT1.
 * @param place - Latitude north, −90 to 90; longitude east, −360 to 360; degrees.
 * @returns Degrees in [−90, 90], within 0.004° of an independent library, 1900 to 2100.
 * @throws InputError of `toInstant`, path `t`; `NOT_FINITE` or `OUT_OF_RANGE`, path `place.latitude` or
 * `place.longitude`.
 * @example
 * sunAltitude('2031-06-21T12:00Z', { latitude: 52, longitude: 0 }).toFixed(1); // '61.4'
 * @public
 */
export function sunAltitude(
  t: InstantLike,
  place: { readonly latitude: Degrees; readonly longitude: Degrees },
): Degrees {
  const instant = toInstant(t, 't');
  checkAngle(place.latitude, 90, 'place.latitude');
  checkAngle(place.longitude, 360, 'place.longitude');
  const centuries = centuriesAt(instant);
  const { rightAscension, declination } = sunAt(centuries);
  const hourAngle =
    meanSiderealTime(daysAt(instant)) +
    nutation(centuries)[0] * EQUINOX_SHARE +
    place.longitude -
    rightAscension;
  // The equator is tilted against the horizon by 90° less the latitude, about the line from east to west.
  return turned(hourAngle + 90, declination, 90 - place.latitude)[1];
}
