/**
 * A place in the sky, and the turn from ecliptic to equator.
 *
 * Source: J. Meeus, Astronomical Algorithms, 2nd ed. (1998), eq. 13.3, 13.4 in rectangular form.
 * @module
 */
import { type Degrees, radiansToDegrees, wrapDegrees } from '@staithe/core';
import { atan2 } from '@staithe/core/trig';
import { obliquity } from './nutation.js';
import { sinCos } from './series.js';

/** An apparent place seen from the centre of the Earth, true equinox of date. @public */
export interface SkyPosition {
  /** Ecliptic longitude, degrees in [0, 360). */
  readonly longitude: Degrees;
  /** Ecliptic latitude, degrees north. */
  readonly latitude: Degrees;
  /** From centre to centre, kilometres. */
  readonly distance: number;
  /** Right ascension, degrees in [0, 360). */
  readonly rightAscension: Degrees;
  /** Declination, degrees north. */
  readonly declination: Degrees;
}

/** Longitude and latitude counted from a plane that is tilted about the origin of longitude. */
export function turned(
  longitude: Degrees,
  latitude: Degrees,
  tilt: Degrees,
): readonly [longitude: Degrees, latitude: Degrees] {
  const [sinLongitude, cosLongitude] = sinCos(longitude);
  const [sinLatitude, cosLatitude] = sinCos(latitude);
  const [sinTilt, cosTilt] = sinCos(tilt);
  const x = cosLatitude * cosLongitude;
  const y = cosLatitude * sinLongitude * cosTilt - sinLatitude * sinTilt;
  const z = cosLatitude * sinLongitude * sinTilt + sinLatitude * cosTilt;
  return [
    wrapDegrees(radiansToDegrees(atan2(y, x))),
    radiansToDegrees(atan2(z, Math.sqrt(x * x + y * y))),
  ];
}

/** Adds right ascension and declination to ecliptic coordinates at t, Julian centuries TT. */
export function placeFrom(
  longitude: Degrees,
  latitude: Degrees,
  distance: number,
  t: number,
): SkyPosition {
  const [rightAscension, declination] = turned(longitude, latitude, obliquity(t));
  return { longitude: wrapDegrees(longitude), latitude, distance, rightAscension, declination };
}
