import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { atan2, cos, LARGEST_ANGLE, sin, sinCosInto } from '../src/trig.js';
import {
  exactAtan,
  exactCos,
  exactSin,
  PI,
  toDouble,
  toFixedPoint,
} from './reference/exact-trig.js';

/** Distance from the exact value in units of the last place of the exact value's double. */
function ulps(got: number, exact: bigint): number {
  const near = Math.abs(toDouble(exact));
  const ulp = near < 2 ** -1022 ? 2 ** -1074 : 2 ** (Math.floor(Math.log2(near)) - 52);
  return Math.abs(toDouble(toFixedPoint(got) - exact)) / ulp;
}

const SIN_ULP = 1; // stated in src/trig.ts
const ATAN_ULP = 1.5;
const angles = fc
  .double({ min: -LARGEST_ANGLE, max: LARGEST_ANGLE, noNaN: true })
  .filter((x) => Math.abs(x) > 1e-12);

describe('sine and cosine', () => {
  it('are within 1 ulp of 220-bit fixed point (π by Machin 1706)', () => {
    fc.assert(
      fc.property(angles, (x) => {
        expect(ulps(sin(x), exactSin(x))).toBeLessThan(SIN_ULP);
        expect(ulps(cos(x), exactCos(x))).toBeLessThan(SIN_ULP);
      }),
      { numRuns: 1500 },
    );
  });

  it('hold next to multiples of a quarter turn, where bits cancel', () => {
    for (let n = 1; n < 1048576; n = n * 3 + 1) {
      const x = (n * Math.PI) / 2;
      if (x > LARGEST_ANGLE) break;
      expect(ulps(sin(x), exactSin(x)), `sin ${x}`).toBeLessThan(SIN_ULP);
      expect(ulps(cos(x), exactCos(x)), `cos ${x}`).toBeLessThan(SIN_ULP);
    }
  });

  it('are exact at 0 and odd and even', () => {
    expect(sin(0)).toBe(0);
    expect(cos(0)).toBe(1);
    expect(sin(-1)).toBe(-sin(1));
    expect(cos(-1)).toBe(cos(1));
  });

  it('refuse what is no angle', () => {
    expect(() => sin(Number.NaN)).toThrow(/angle: expected a finite number/);
    expect(() => sinCosInto(2 * LARGEST_ANGLE, new Float64Array(2))).toThrow(
      /angle: expected radians/,
    );
  });
});

describe('atan2', () => {
  it('is within 1.5 ulp of 220-bit fixed point', () => {
    const side = fc.double({ min: 1e-9, max: 1e9, noNaN: true });
    fc.assert(
      fc.property(side, side, (y, x) => {
        expect(ulps(atan2(y, x), exactAtan(y, x))).toBeLessThan(ATAN_ULP);
        expect(ulps(atan2(y, -x), PI - exactAtan(y, x))).toBeLessThan(ATAN_ULP);
        expect(atan2(-y, x)).toBe(-atan2(y, x));
      }),
      { numRuns: 1500 },
    );
  });

  it('knows the axes and the signs of zero', () => {
    expect(atan2(0, 1)).toBe(0);
    expect(Object.is(atan2(-0, 1), -0)).toBe(true);
    expect(atan2(0, -1)).toBe(Math.PI);
    expect(atan2(-0, -1)).toBe(-Math.PI);
    expect(atan2(1, 0)).toBe(Math.PI / 2);
    expect(atan2(-1, 0)).toBe(-Math.PI / 2);
    expect(atan2(0, 0)).toBe(0);
    expect(() => atan2(Number.NaN, 1)).toThrow(/y: expected/);
    expect(() => atan2(1, Infinity)).toThrow(/x: expected/);
  });
});
