/**
 * The axis along which a current varies most.
 * @module
 */
import {
  ComputationError,
  type Degrees,
  degreesToRadians,
  radiansToDegrees,
  refuse,
} from '@staithe/core';
import { atan2, cos, sin } from '@staithe/core/trig';

/** The axis of greatest variance of a current. @public */
export interface PrincipalAxis {
  /** Degrees clockwise from north in [0, 180); 0 where no direction varies more than another. */
  readonly bearing: Degrees;
  /** Root mean square about the mean along the axis, metres per second. */
  readonly alongSigma: number;
  /** The same across it. */
  readonly acrossSigma: number;
  /** The part of the variance that is along the axis, in [0.5, 1]. */
  readonly share: number;
}

const LARGEST = 1e6; // m/s: beyond, squares lose what the current is

/**
 * The axis of greatest variance of two series.
 *
 * @param east - Metres per second, length n; NaN is a gap.
 * @param north - As many, of the same instants. A pair counts where neither is a gap.
 * @returns Bearing in degrees, sigmas in m/s (divided by the number of pairs), share of the variance.
 * @throws InputError `LENGTH_MISMATCH`, path `north`; `OUT_OF_RANGE` beyond 1e6 m/s, path `east[3]`; ComputationError
 *   `TOO_FEW_SAMPLES` below two pairs, `NO_TIDE` where all pairs are the same.
 * @example
 * principalAxis(Float64Array.of(-1, 0, 1), Float64Array.of(2, 2, 2)).bearing; // 90
 * @public
 */
export function principalAxis(east: Float64Array, north: Float64Array): PrincipalAxis {
  if (east.length !== north.length) {
    refuse('LENGTH_MISMATCH', 'north', `${east.length} values`, north.length);
  }
  const pairs: number[] = [];
  let [meanEast, meanNorth] = [0, 0];
  for (let i = 0; i < east.length; i++) {
    const [u, v] = [east[i] as number, north[i] as number];
    if (Number.isNaN(u) || Number.isNaN(v)) continue;
    if (Math.abs(u) > LARGEST) refuse('OUT_OF_RANGE', `east[${i}]`, `up to ${LARGEST} m/s`, u);
    if (Math.abs(v) > LARGEST) refuse('OUT_OF_RANGE', `north[${i}]`, `up to ${LARGEST} m/s`, v);
    pairs.push(i);
    meanEast += (u - meanEast) / pairs.length;
    meanNorth += (v - meanNorth) / pairs.length;
  }
  if (pairs.length < 2) {
    throw new ComputationError(
      'TOO_FEW_SAMPLES',
      `expected 2 pairs or more that are not gaps, got ${pairs.length}`,
      { samples: pairs.length, missing: east.length - pairs.length },
    );
  }
  let [squares, product] = [0, 0];
  for (const i of pairs) {
    const u = (east[i] as number) - meanEast;
    const v = (north[i] as number) - meanNorth;
    // u² − v² as a product keeps a current that is nearly round.
    squares += (u - v) * (u + v);
    product += 2 * u * v;
  }
  const raw = 90 - radiansToDegrees(atan2(product, squares)) / 2;
  const bearing = raw >= 180 || (product === 0 && squares === 0) ? 0 : raw;
  const angle = degreesToRadians(bearing);
  const [toEast, toNorth] = [sin(angle), cos(angle)];
  let [along, across] = [0, 0];
  // Summed in the turned frame: as the smaller eigenvalue it would cancel where the current runs in a line.
  for (const i of pairs) {
    const u = (east[i] as number) - meanEast;
    const v = (north[i] as number) - meanNorth;
    const [a, b] = [u * toEast + v * toNorth, u * toNorth - v * toEast];
    along += a * a;
    across += b * b;
  }
  if (along + across === 0) {
    throw new ComputationError(
      'NO_TIDE',
      `expected a current that changes, got the same at each of ${pairs.length} pairs`,
      { samples: pairs.length },
    );
  }
  return {
    bearing,
    alongSigma: Math.sqrt(along / pairs.length),
    acrossSigma: Math.sqrt(across / pairs.length),
    share: Math.max(0.5, along / (along + across)),
  };
}
