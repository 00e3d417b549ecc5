/**
 * Phase lags of other conventions into the Greenwich phase lag G, and back.
 *
 * Local epoch κ counts V at the place: G = κ − n₁·λ, λ degrees east (P. Schureman 1940, SP 98, section on epochs).
 * Zone-time lag g takes V with the zone's clock read as UT: G = g − σ·z, z hours east of Greenwich; checked against
 * the six published constituents of station 9414131 (test-vectors/published/phase-conversion).
 * @module
 */
import { type Degrees, wrapDegrees } from './angles.js';
import { refuse } from './errors.js';

/**
 * The convention of a phase lag: counted at the place (`doodsonNumbers`, of which the first counts, and `longitude`,
 * degrees east), or in zone time (`speed`, degrees an hour, and `zoneHours`, east of Greenwich).
 * @public
 */
export type PhaseConvention =
  | { readonly doodsonNumbers: ArrayLike<number>; readonly longitude: Degrees }
  | { readonly speed: number; readonly zoneHours: number };

function shift(convention: PhaseConvention): Degrees {
  const [a, b, path] =
    'longitude' in convention
      ? [convention.doodsonNumbers[0], convention.longitude, 'longitude']
      : [convention.speed, convention.zoneHours, 'zoneHours'];
  const turned = (a as number) * b;
  if (Number.isFinite(turned)) return turned;
  refuse('NOT_FINITE', path, 'a finite number', b);
}

/**
 * To the Greenwich phase lag G.
 *
 * @param lag - Degrees: κ or g.
 * @param convention - Which of the two, and where.
 * @returns Degrees in [0, 360).
 * @throws InputError `NOT_FINITE`, path `longitude` or `zoneHours`.
 * @example
 * toGreenwichPhaseLag(97, { speed: 15.041069, zoneHours: -8 }); // 217.328552
 * @public
 */
export function toGreenwichPhaseLag(lag: Degrees, convention: PhaseConvention): Degrees {
  return wrapDegrees(lag - shift(convention));
}

/**
 * From the Greenwich phase lag G.
 *
 * @param lag - Degrees: G.
 * @param convention - The convention wanted.
 * @returns Degrees in [0, 360): κ or g.
 * @throws InputError `NOT_FINITE`, path `longitude` or `zoneHours`.
 * @example
 * fromGreenwichPhaseLag(180, { doodsonNumbers: [2, 0, 0, 0, 0, 0], longitude: -70 }); // 40
 * @public
 */
export function fromGreenwichPhaseLag(lag: Degrees, convention: PhaseConvention): Degrees {
  return wrapDegrees(lag + shift(convention));
}
