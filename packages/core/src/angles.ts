/**
 * Angles: degrees at the public face, radians inside kernels, wrapped in one place.
 * @module
 */

/** An angle in degrees. @public */
export type Degrees = number;

const RADIANS_PER_DEGREE = 0.017453292519943295;

/**
 * Degrees to radians.
 *
 * @param angle - Degrees.
 * @returns Radians.
 * @example
 * degreesToRadians(180); // 3.141592653589793
 * @public
 */
export function degreesToRadians(angle: Degrees): number {
  return angle * RADIANS_PER_DEGREE;
}

/**
 * Radians to degrees.
 *
 * @param angle - Radians.
 * @returns Degrees.
 * @example
 * radiansToDegrees(Math.PI); // 180
 * @public
 */
export function radiansToDegrees(angle: number): Degrees {
  return angle / RADIANS_PER_DEGREE;
}

/**
 * Wraps an angle into [0, 360).
 *
 * @param angle - Degrees, finite.
 * @returns Degrees in [0, 360).
 * @example
 * wrapDegrees(-90); // 270
 * @public
 */
export function wrapDegrees(angle: Degrees): Degrees {
  const rest = angle % 360;
  if (rest >= 0) return rest + 0;
  const turned = rest + 360;
  return turned === 360 ? 0 : turned;
}

/**
 * The signed way from one angle to another, the short way round.
 *
 * @param from - Degrees, finite.
 * @param to - Degrees, finite.
 * @returns `to - from` in (-180, 180].
 * @example
 * angleDifference(350, 10); // 20
 * @public
 */
export function angleDifference(from: Degrees, to: Degrees): Degrees {
  const turned = wrapDegrees(to - from);
  return turned > 180 ? turned - 360 : turned;
}
