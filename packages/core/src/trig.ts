/**
 * The one sine, cosine and arc tangent of the numeric packages: equal to the last bit in every engine, because
 * only exactly specified operations are used (+, −, ×, ÷, floor), unlike `Math.sin`.
 *
 * Method: Cody and Waite (1980) reduction to |r| <= π/4 with π/2 in three parts, the reduced argument carried as a
 * sum of two doubles; then the Taylor series, whose first term left out is below 3e-18 relative.
 * Accuracy: below 1 ulp for sine and cosine, below 1.5 ulp for atan2, against 40-digit arithmetic (core/test).
 * @packageDocumentation
 */
import { refuse } from './errors.js';

// π/2 = PART_1 + PART_2 + PART_3 to 119 bits; the first two have 33 bits, so n·PART is exact for |n| < 2^20.
const PART_1 = 1.5707963267341256;
const PART_2 = 6.077100506303966e-11;
const PART_3 = 2.0222662487959506e-21;
const TWO_OVER_PI = 0.6366197723675814;

/** The largest |angle| in radians that the pair takes: 2^20 quarter turns. @public */
export const LARGEST_ANGLE: number = 1647099;

// Taylor coefficients ±1/k!.
const S3 = -1 / 6;
const S5 = 1 / 120;
const S7 = -1 / 5040;
const S9 = 1 / 362880;
const S11 = -1 / 39916800;
const S13 = 1 / 6227020800;
const S15 = -1 / 1307674368000;
const S17 = 1 / 355687428096000;
const C4 = 1 / 24;
const C6 = -1 / 720;
const C8 = 1 / 40320;
const C10 = -1 / 3628800;
const C12 = 1 / 479001600;
const C14 = -1 / 87178291200;
const C16 = 1 / 20922789888000;

function sinReduced(r: number, tail: number): number {
  const z = r * r;
  const p = S5 + z * (S7 + z * (S9 + z * (S11 + z * (S13 + z * (S15 + z * S17)))));
  return r + (r * z * (S3 + z * p) + tail * (1 - 0.5 * z));
}

function cosReduced(r: number, tail: number): number {
  const z = r * r;
  const half = 0.5 * z;
  const p = C4 + z * (C6 + z * (C8 + z * (C10 + z * (C12 + z * (C14 + z * C16)))));
  const w = 1 - half;
  return w + (1 - w - half + (z * z * p - r * tail));
}

function checkFinite(value: number, path: string): void {
  if (!Number.isFinite(value)) refuse('NOT_FINITE', path, 'a finite number', value);
}

function refuseAngle(angle: number): never {
  checkFinite(angle, 'angle');
  refuse('OUT_OF_RANGE', 'angle', `radians with |angle| <= ${LARGEST_ANGLE}`, angle);
}

/**
 * Sine and cosine of one angle, written to a buffer.
 *
 * @param angle - Radians, |angle| <= {@link LARGEST_ANGLE}.
 * @param out - Written to: `out[0]` the sine, `out[1]` the cosine.
 * @throws InputError `NOT_FINITE` or `OUT_OF_RANGE`, path `angle`.
 * @example
 * const pair = new Float64Array(2);
 * sinCosInto(Math.PI / 6, pair);
 * pair[1]; // 0.8660254037844387
 * @public
 */
export function sinCosInto(angle: number, out: Float64Array): void {
  if (!(angle <= LARGEST_ANGLE && angle >= -LARGEST_ANGLE)) refuseAngle(angle);
  const n = Math.floor(angle * TWO_OVER_PI + 0.5);
  const a = angle - n * PART_1;
  const b = n * PART_2;
  const c = a - b;
  const d = n * PART_3;
  const r = c - d;
  const tail = c - r - d + (a - c - b);
  const s = sinReduced(r, tail);
  const k = cosReduced(r, tail);
  const odd = n & 1;
  out[0] = (odd ? k : s) * (n & 2 ? -1 : 1);
  out[1] = (odd ? s : k) * ((n + 1) & 2 ? -1 : 1);
}

/**
 * Sine.
 *
 * @param angle - Radians, |angle| <= {@link LARGEST_ANGLE}.
 * @returns In [-1, 1]; below 1 ulp from exact.
 * @throws InputError `NOT_FINITE` or `OUT_OF_RANGE`, path `angle`.
 * @example
 * sin(Math.PI / 6); // 0.49999999999999994
 * @public
 */
export function sin(angle: number): number {
  const pair = new Float64Array(2);
  sinCosInto(angle, pair);
  return pair[0] as number;
}

/**
 * Cosine.
 *
 * @param angle - Radians, |angle| <= {@link LARGEST_ANGLE}.
 * @returns In [-1, 1]; below 1 ulp from exact.
 * @throws InputError `NOT_FINITE` or `OUT_OF_RANGE`, path `angle`.
 * @example
 * cos(0); // 1
 * @public
 */
export function cos(angle: number): number {
  const pair = new Float64Array(2);
  sinCosInto(angle, pair);
  return pair[1] as number;
}

// atan(k/4), k = 0 … 4, as a double and what it lacks (50-digit arithmetic; recomputed in the tests).
const ATAN_HIGH = /* @__PURE__ */ Object.freeze([
  0, 0.24497866312686414, 0.4636476090008061, 0.6435011087932844, 0.7853981633974483,
]);
const ATAN_LOW = /* @__PURE__ */ Object.freeze([
  0, 1.0698755618734451e-17, 2.2698777452961687e-17, 1.5834785051444286e-17, 3.061616997868383e-17,
]);
const HALF_PI = 1.5707963267948966;
const HALF_PI_LOW = 6.123233995736766e-17;
const PI = 3.141592653589793;
const PI_LOW = 1.2246467991473532e-16;

/**
 * The angle of the point (x, y), from the positive x axis.
 *
 * @param y - Ordinate, finite.
 * @param x - Abscissa, finite.
 * @returns Radians in [-π, π]; below 1.5 ulp from exact; 0 for the origin.
 * @throws InputError `NOT_FINITE`, path `y` or `x`.
 * @example
 * atan2(1, -1); // 2.356194490192345
 * @public
 */
export function atan2(y: number, x: number): number {
  checkFinite(y, 'y');
  checkFinite(x, 'x');
  const ay = Math.abs(y);
  const ax = Math.abs(x);
  const steep = ay > ax;
  const small = steep ? ax : ay;
  const large = steep ? ay : ax;
  const k = large === 0 ? 0 : Math.round((small / large) * 4);
  const r = large === 0 ? 0 : (small - (k / 4) * large) / (large + (k / 4) * small);
  const z = r * r;
  // atan r = r − r³/3 + r⁵/5 − …, |r| <= 1/8: the first term left out is below 2e-19 relative.
  let series = 0;
  for (let n = 19; n > 1; n -= 2) series = z * ((n & 2 ? -1 : 1) / n + series);
  const high = ATAN_HIGH[k] as number;
  const low = r * series + (ATAN_LOW[k] as number) + r;
  let angle = high + low;
  if (steep) angle = HALF_PI - high + (HALF_PI_LOW - low);
  if (x < 0 || (x === 0 && 1 / x < 0)) {
    angle = steep ? HALF_PI + high + (HALF_PI_LOW + low) : PI - high + (PI_LOW - low);
  }
  return y < 0 || (y === 0 && 1 / y < 0) ? -angle : angle;
}
