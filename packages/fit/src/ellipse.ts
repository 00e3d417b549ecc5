/**
 * The ellipse that the tip of a tidal current draws: from its components east and north, and back.
 *
 * Each component is f·H·cos(θ − G) with θ = V + u, as a height is. As a complex number, east + i·north is
 * W₊·e^{iθ} + W₋·e^{−iθ}: a vector that turns left and one that turns right ({@link RotaryPair}). Where both point the
 * same way the speed is greatest, |W₊| + |W₋|; a quarter period on it is least. The derivation is in docs/currents.md.
 *
 * Method: rotary components, G. Godin 1972; R. Pugh and P. Woodworth 2014. Formulas derived here so that nothing cancels
 * where the ellipse is nearly a line or nearly a circle.
 * @module
 */
import {
  angleDifference,
  type Degrees,
  degreesToRadians,
  radiansToDegrees,
  refuse,
  wrapDegrees,
} from '@staithe/core';
import { atan2, sin } from '@staithe/core/trig';
import { type EllipseSigmas, sigmasOf } from './ellipse-sigmas.js';

/** One component, or one rotating vector. @public */
export interface Oscillation {
  /** Metres per second, 0 or more. */
  readonly amplitude: number;
  /** Greenwich phase lag, degrees. */
  readonly phaseLag: Degrees;
}

/** One constituent of a current by its components. @public */
export interface CurrentComponents {
  readonly east: Oscillation;
  readonly north: Oscillation;
  /** Of (H cos G, H sin G) of east, then of north: row-major, 4 × 4, m²/s². Without it there are no sigmas. */
  readonly covariance?: ArrayLike<number> | undefined;
}

/** One constituent of a current by its ellipse; at θ = V + u the tip is at angle θ − `phaseLag` of the way round. @public */
export interface CurrentEllipse extends EllipseSigmas {
  /** Greatest speed, metres per second. */
  readonly major: number;
  /** Least speed, metres per second, 0 or more. */
  readonly minor: number;
  /** Which way the vector turns, seen from above: left is anticlockwise. A line (`minor` 0) counts as left. */
  readonly turning: 'left' | 'right';
  /** Of the major axis, degrees clockwise from north in [0, 180); 0 of a circle. */
  readonly bearing: Degrees;
  /** Greenwich phase lag of the greatest speed towards `bearing`, degrees in [0, 360). Half a turn on it runs the other way. */
  readonly phaseLag: Degrees;
}

/**
 * One constituent of a current as two vectors of constant length: `left` points east at θ = `left.phaseLag` and turns
 * anticlockwise, `right` points east at θ = `right.phaseLag` and turns clockwise. So W₊ = L·e^{−i·G_L},
 * W₋ = R·e^{+i·G_R}. The phase lag of a vector of length 0 is 0.
 * @public
 */
export interface RotaryPair {
  readonly left: Oscillation;
  readonly right: Oscillation;
}

const LARGEST = 1e6; // m/s, as for records

function check(value: number, path: string): void {
  if (!Number.isFinite(value)) refuse('NOT_FINITE', path, 'a finite number', value);
}

function checkSize(value: number, path: string): void {
  check(value, path);
  if (value < 0 || value > LARGEST) {
    refuse('OUT_OF_RANGE', path, `metres per second from 0 to ${LARGEST}`, value);
  }
}

function checkOscillation({ amplitude, phaseLag }: Oscillation, path: string): void {
  checkSize(amplitude, `${path}.amplitude`);
  check(phaseLag, `${path}.phaseLag`);
}

/** `to - from` in [−180, 180], without the rounding that wrapping into [0, 360) does to small negative angles. */
function turn(from: Degrees, to: Degrees): Degrees {
  const difference = to - from;
  return Math.abs(difference) > 360
    ? angleDifference(from, to)
    : difference - 360 * Math.round(difference / 360);
}

/** Sine of an angle in [−270, 270]: exact at whole quarter turns, and to its last digits beside half a turn. */
function sinDegrees(angle: Degrees): number {
  const folded = angle > 90 ? 180 - angle : angle < -90 ? -180 - angle : angle;
  return sin(degreesToRadians(folded));
}

/** Cosine of an angle in [−180, 180], as exact. */
function cosDegrees(angle: Degrees): number {
  return sinDegrees(90 - Math.abs(angle));
}

/** What both forms are made of. */
interface Axes {
  readonly left: number;
  readonly right: number;
  readonly minor: number;
  readonly bearing: Degrees;
  readonly phaseLag: Degrees;
}

const NOTHING: Axes = { left: 0, right: 0, minor: 0, bearing: 0, phaseLag: 0 };

/** Left and right vectors and axes: `minor` is negative where the vector turns right. */
function axesOf({ east, north }: CurrentComponents): Axes {
  checkOscillation(east, 'east');
  checkOscillation(north, 'north');
  const eastLarger = east.amplitude >= north.amplitude;
  const [larger, smaller] = eastLarger ? [east, north] : [north, east];
  const size = larger.amplitude;
  if (size === 0) return NOTHING;
  // In units of the larger amplitude: the smaller, and by how much it is smaller, which 1 − ratio would round.
  const ratio = smaller.amplitude / size;
  const excess = (size - smaller.amplitude) / size;
  const difference = turn(east.phaseLag, north.phaseLag);
  const s = sinDegrees(difference);
  const c = cosDegrees(difference);
  // 4|W±|² = (H_e − H_n)² + 2 H_e H_n (1 ± sin); 1 − |sin| = cos²/(1 + |sin|).
  const less = (c * c) / (1 + Math.abs(s));
  const more = 1 + Math.abs(s);
  const left = Math.sqrt(excess * excess + 2 * ratio * (s < 0 ? less : more)) / 2;
  const right = Math.sqrt(excess * excess + 2 * ratio * (s < 0 ? more : less)) / 2;
  const minor = (ratio * s) / (left + right);
  const lengths = { left: size * left, right: size * right, minor: size * minor };
  // A circle is at its greatest speed always: bearing 0 is taken, so the phase lag is that of north.
  if (excess === 0 && c === 0)
    return { ...lengths, bearing: 0, phaseLag: wrapDegrees(north.phaseLag) };
  // H_e² − H_n² and 2 H_e H_n cos: cosine and sine of twice the axis, from east towards north.
  const squares = excess * (1 + ratio);
  const axis = atan2(2 * ratio * c, eastLarger ? squares : -squares) / 2;
  const raw = 90 - radiansToDegrees(axis);
  const bearing = raw >= 180 ? 0 : raw;
  // Twice the phase from that of the larger component, which is then beyond 0 itself.
  const across = 2 * ratio * ratio * c * s;
  const phase = atan2(eastLarger ? across : -across, squares + 2 * ratio * ratio * c * c) / 2;
  const opposite = !eastLarger && bearing > 90 ? 180 : 0;
  const phaseLag = wrapDegrees(larger.phaseLag + radiansToDegrees(phase) + opposite);
  return { ...lengths, bearing, phaseLag };
}

function lagOf(amplitude: number, phaseLag: Degrees): Oscillation {
  return { amplitude, phaseLag: amplitude > 0 ? wrapDegrees(phaseLag) : 0 };
}

/**
 * The ellipse of one constituent from its components.
 *
 * @param components - East and north, and the covariance of their coefficients where it is known.
 * @returns Axes in m/s, bearing and phase lag in degrees; with a covariance also their sigmas. All 0 where both are 0.
 * @throws InputError `NOT_FINITE`, `OUT_OF_RANGE` (negative or beyond 1e6 m/s; a negative variance), `LENGTH_MISMATCH`,
 *   paths `east.amplitude` …, `covariance[5]`.
 * @example
 * ellipseOf({ east: { amplitude: 1, phaseLag: 0 }, north: { amplitude: 0.5, phaseLag: 90 } }).turning; // 'left'
 * @public
 */
export function ellipseOf(components: CurrentComponents): CurrentEllipse {
  const axes = axesOf(components);
  const { left, right, minor, bearing, phaseLag } = axes;
  const major = left + right;
  const { covariance } = components;
  return {
    major,
    minor: Math.min(Math.abs(minor), major),
    turning: minor < 0 ? 'right' : 'left',
    bearing,
    phaseLag,
    ...(covariance ? sigmasOf(axes, covariance) : {}),
  };
}

/**
 * The two rotating vectors of one constituent from its components.
 *
 * @param components - East and north; a covariance is not used.
 * @returns Lengths in m/s, phase lags in degrees in [0, 360).
 * @throws InputError `NOT_FINITE`, `OUT_OF_RANGE`, paths `east.amplitude` ….
 * @example
 * rotaryOf({ east: { amplitude: 1, phaseLag: 0 }, north: { amplitude: 0.5, phaseLag: 90 } }).left.amplitude; // 0.75
 * @public
 */
export function rotaryOf(components: CurrentComponents): RotaryPair {
  const { left, right, bearing, phaseLag } = axesOf(components);
  const axis = 90 - bearing;
  return { left: lagOf(left, phaseLag - axis), right: lagOf(right, phaseLag + axis) };
}

/**
 * The ellipse of two rotating vectors.
 *
 * @param rotary - The vectors.
 * @returns The ellipse, without sigmas.
 * @throws InputError `NOT_FINITE`, `OUT_OF_RANGE`, paths `left.amplitude` ….
 * @example
 * ellipseFromRotary({ left: { amplitude: 0.25, phaseLag: 0 }, right: { amplitude: 0.75, phaseLag: 0 } }).minor; // 0.5
 * @public
 */
export function ellipseFromRotary({ left, right }: RotaryPair): CurrentEllipse {
  checkOscillation(left, 'left');
  checkOscillation(right, 'right');
  const [l, r] = [left.amplitude, right.amplitude];
  const lengths = {
    major: l + r,
    minor: Math.abs(l - r),
    turning: l < r ? ('right' as const) : ('left' as const),
  };
  if (l === 0 && r === 0) return { ...lengths, bearing: 0, phaseLag: 0 };
  // The phase lag of a circle is that of pointing north: a quarter turn from pointing east.
  if (r === 0) return { ...lengths, bearing: 0, phaseLag: wrapDegrees(left.phaseLag + 90) };
  if (l === 0) return { ...lengths, bearing: 0, phaseLag: wrapDegrees(right.phaseLag - 90) };
  const half = turn(left.phaseLag, right.phaseLag) / 2;
  const bearing = 90 - half;
  // Half a turn of the axis goes with half a period.
  return bearing < 180
    ? { ...lengths, bearing, phaseLag: wrapDegrees(left.phaseLag + half) }
    : { ...lengths, bearing: 0, phaseLag: wrapDegrees(left.phaseLag + half + 180) };
}

/**
 * The components of an ellipse.
 *
 * @param ellipse - The ellipse; sigmas are not used.
 * @returns East and north: amplitudes in m/s, phase lags in degrees in [0, 360), 0 of an amplitude of 0.
 * @throws InputError `NOT_FINITE`, `OUT_OF_RANGE`, `UNKNOWN_CHOICE`, paths `major`, `minor`, `bearing`, `phaseLag`, `turning`.
 * @example
 * componentsOf({ major: 1, minor: 0.5, turning: 'right', bearing: 0, phaseLag: 30 }).east; // { amplitude: 0.5, phaseLag: 120 }
 * @public
 */
export function componentsOf(ellipse: CurrentEllipse): Omit<CurrentComponents, 'covariance'> {
  const { major, minor, turning, bearing, phaseLag } = ellipse;
  checkSize(major, 'major');
  checkSize(minor, 'minor');
  check(bearing, 'bearing');
  check(phaseLag, 'phaseLag');
  if (turning !== 'left' && turning !== 'right') {
    refuse('UNKNOWN_CHOICE', 'turning', 'left or right', turning);
  }
  const signed = turning === 'left' ? minor : -minor;
  const angle = turn(0, bearing);
  const [toEast, toNorth] = [sinDegrees(angle), cosDegrees(angle)];
  const component = (along: number, later: number): Oscillation =>
    lagOf(
      Math.sqrt(along * along + later * later),
      phaseLag + radiansToDegrees(atan2(later, along)),
    );
  return {
    east: component(major * toEast, -signed * toNorth),
    north: component(major * toNorth, signed * toEast),
  };
}
