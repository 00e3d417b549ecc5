/**
 * Error bars of a current ellipse: the covariance of its four coefficients carried to its axes, to first order.
 *
 * With the coefficients (a, b) = (H cos G, H sin G) of each component, the lengths of the two rotating vectors and
 * their phase lags have the gradients, in (a_e, b_e, a_n, b_n),
 *
 *     ∇L = ½(cos G_L, sin G_L, −sin G_L, cos G_L),   L·∇G_L = ½(−sin G_L, cos G_L, −cos G_L, −sin G_L),
 *     ∇R = ½(cos G_R, sin G_R,  sin G_R, −cos G_R),  R·∇G_R = ½(−sin G_R, cos G_R,  cos G_R,  sin G_R);
 *
 * major = L + R, minor = ±(L − R), phase lag = (G_L + G_R)/2, bearing = 90° − (G_R − G_L)/2.
 * @module
 */
import { type Degrees, degreesToRadians, radiansToDegrees, refuse } from '@staithe/core';
import { cos, sin } from '@staithe/core/trig';

/** Standard errors of an ellipse, where the covariance of its components is known. @public */
export interface EllipseSigmas {
  /** Metres per second. */
  readonly majorSigma?: number | undefined;
  /** Metres per second. */
  readonly minorSigma?: number | undefined;
  /** Degrees; at most 51.96, that of an axis of which nothing is known. */
  readonly bearingSigma?: Degrees | undefined;
  /** Degrees; at most 103.92, that of a phase of which nothing is known. */
  readonly phaseLagSigma?: Degrees | undefined;
  /**
   * Radius of the ball that holds the 95 % region of the four coefficients, metres per second: what stands out from the
   * noise has √(major² + minor²), the distance of the coefficients from 0, beyond it.
   */
  readonly radius95?: number | undefined;
}

/** χ² of four degrees of freedom at 95 %: e^{−x/2}(1 + x/2) = 0.05. */
const CHI_SQUARED_4 = 9.487729036781154;
const PHASE_AT_MOST = 180 / Math.sqrt(3);
// Each squaring doubles the exponent of what is left of the smaller eigenvalues; beyond 2^53 they are equal to the largest.
const SQUARINGS = 54;

function checkCovariance(covariance: ArrayLike<number>): void {
  if (covariance.length !== 16) {
    refuse('LENGTH_MISMATCH', 'covariance', '16 numbers', covariance.length);
  }
  for (let i = 0; i < 16; i++) {
    const value = covariance[i] as number;
    if (!Number.isFinite(value)) {
      refuse('NOT_FINITE', `covariance[${i}]`, 'a finite number', value);
    }
    if (i % 5 === 0 && value < 0) {
      refuse('OUT_OF_RANGE', `covariance[${i}]`, 'a variance of 0 or more', value);
    }
  }
}

/** Largest eigenvalue of a covariance: squared again and again it leaves the projector on that direction. */
function largestVariance(covariance: ArrayLike<number>): number {
  const entry = (matrix: ArrayLike<number>, i: number, j: number): number =>
    matrix[4 * i + j] as number;
  const trace = (matrix: ArrayLike<number>): number =>
    entry(matrix, 0, 0) + entry(matrix, 1, 1) + entry(matrix, 2, 2) + entry(matrix, 3, 3);
  const times = (a: ArrayLike<number>, b: ArrayLike<number>): Float64Array =>
    Float64Array.from({ length: 16 }, (_, at) => {
      const [i, j] = [at >> 2, at & 3];
      let sum = 0;
      for (let k = 0; k < 4; k++) sum += entry(a, i, k) * entry(b, k, j);
      return sum;
    });
  const whole = trace(covariance);
  if (whole === 0) return 0;
  // Symmetric to the last bit, so that the trace of each square is a sum of squares.
  let projector = Float64Array.from({ length: 16 }, (_, at) => {
    const [i, j] = [at >> 2, at & 3];
    return (entry(covariance, i, j) + entry(covariance, j, i)) / (2 * whole);
  });
  for (let i = 0; i < SQUARINGS; i++) {
    const square = times(projector, projector);
    const scale = trace(square);
    projector = square.map((value) => value / scale);
  }
  return trace(times(covariance, projector));
}

/** Of a quadratic form that rounding may leave below 0. */
function root(variance: number): number {
  return Math.sqrt(Math.max(0, variance));
}

/**
 * Sigmas of an ellipse.
 *
 * @param axes - Lengths of the two vectors, bearing and phase lag, degrees.
 * @param covariance - Of (a_e, b_e, a_n, b_n), row-major.
 */
export function sigmasOf(
  axes: {
    readonly left: number;
    readonly right: number;
    readonly bearing: Degrees;
    readonly phaseLag: Degrees;
  },
  covariance: ArrayLike<number>,
): Required<EllipseSigmas> {
  checkCovariance(covariance);
  const { left, right, bearing, phaseLag } = axes;
  const toLeft = degreesToRadians(phaseLag - (90 - bearing));
  const toRight = degreesToRadians(phaseLag + (90 - bearing));
  const [cl, sl, cr, sr] = [cos(toLeft), sin(toLeft), cos(toRight), sin(toRight)];
  // Twice the gradients of the module comment; the last two over their lengths.
  const along = { left: [cl, sl, -sl, cl], right: [cr, sr, sr, -cr] };
  const across = { left: [-sl, cl, -cl, -sl], right: [-sr, cr, cr, sr] };
  const between = (a: readonly number[], b: readonly number[]): number => {
    let sum = 0;
    for (let i = 0; i < 4; i++)
      for (let j = 0; j < 4; j++)
        sum += (a[i] as number) * (covariance[4 * i + j] as number) * (b[j] as number);
    return sum / 4;
  };
  // A vector of length 0 has no direction: the mean of all, which no other length goes with.
  const spread = (side: 'left' | 'right', length: number): number => {
    const own = between(along[side], along[side]);
    return length > 0 ? own : (own + between(across[side], across[side])) / 2;
  };
  const lengths = spread('left', left) + spread('right', right);
  const round = left > 0 && right > 0;
  const shared = round ? 2 * between(along.left, along.right) : 0;
  const angles = round
    ? between(across.left, across.left) / (left * left) +
      between(across.right, across.right) / (right * right)
    : Infinity;
  const turned = round ? (2 * between(across.left, across.right)) / (left * right) : 0;
  const capped = (variance: number, most: Degrees): Degrees =>
    Math.min(radiansToDegrees(root(variance) / 2), most);
  return {
    majorSigma: root(lengths + shared),
    minorSigma: root(lengths - shared),
    bearingSigma: capped(angles - turned, PHASE_AT_MOST / 2),
    phaseLagSigma: capped(angles + turned, PHASE_AT_MOST),
    radius95: root(CHI_SQUARED_4 * largestVariance(covariance)),
  };
}
