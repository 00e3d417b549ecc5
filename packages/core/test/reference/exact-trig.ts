/**
 * Sine, cosine and arc tangent in 220-bit fixed point: slow and obvious. π by J. Machin's formula (1706).
 */
const BITS = 220n;
const ONE = 1n << BITS;

/** A double as a fixed-point number, exactly where it is not below 2^-220. */
export function toFixedPoint(value: number): bigint {
  const view = new DataView(new ArrayBuffer(8));
  view.setFloat64(0, Math.abs(value));
  const bits = view.getBigUint64(0);
  const exponent = Number(bits >> 52n) - 1075;
  const mantissa = (bits & 0xfffffffffffffn) | (exponent === -1075 ? 0n : 0x10000000000000n);
  const shift = BigInt(exponent) + BITS;
  const size = shift >= 0n ? mantissa << shift : mantissa >> -shift;
  return value < 0 ? -size : size;
}

/** Nearest double, by way of 70 leading bits. */
export function toDouble(value: bigint): number {
  return Number(value >> (BITS - 120n)) / 2 ** 120;
}

function arcTangentOfInverse(n: bigint): bigint {
  let term = ONE / n;
  let sum = 0n;
  for (let k = 0n; term !== 0n; k++) {
    sum += (k % 2n === 0n ? term : -term) / (2n * k + 1n);
    term /= n * n;
  }
  return sum;
}

export const PI: bigint = 4n * (4n * arcTangentOfInverse(5n) - arcTangentOfInverse(239n));

function series(first: bigint, x: bigint, from: bigint): bigint {
  let term = first;
  let sum = 0n;
  for (let k = from; term !== 0n; k += 2n) {
    sum += term;
    term = (-(((term * x) >> BITS) * x) >> BITS) / ((k + 1n) * (k + 2n));
  }
  return sum;
}

export function exactSin(angle: number): bigint {
  const turn = 2n * PI;
  let x = toFixedPoint(angle) % turn;
  if (x > PI) x -= turn;
  if (x < -PI) x += turn;
  return series(x, x, 1n);
}

export function exactCos(angle: number): bigint {
  const turn = 2n * PI;
  const x = toFixedPoint(angle) % turn;
  return series(ONE, x, 0n);
}

/** atan(y/x) for 0 <= y, 0 < x, by halving the angle until the series is quick. */
export function exactAtan(y: number, x: number): bigint {
  let ratio = (toFixedPoint(y) << BITS) / toFixedPoint(x);
  let doubled = 0n;
  while (ratio > ONE / 64n) {
    // tan(a/2) = t/(1 + √(1 + t²))
    const root = squareRoot(ONE + ((ratio * ratio) >> BITS));
    ratio = (ratio << BITS) / (ONE + root);
    doubled++;
  }
  let term = ratio;
  let sum = 0n;
  for (let k = 0n; term !== 0n; k++) {
    sum += term / (2n * k + 1n);
    term = -((((term * ratio) >> BITS) * ratio) >> BITS);
  }
  return sum << doubled;
}

function squareRoot(value: bigint): bigint {
  const wide = value << BITS;
  let x = wide;
  let next = (x + 1n) >> 1n;
  while (next < x) {
    x = next;
    next = (x + wide / x) >> 1n;
  }
  return x;
}
