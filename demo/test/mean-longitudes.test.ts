import { describe, expect, test } from 'vitest';
import { combine, DOODSON_RATES, doodsonVariables } from '../generate/mean-longitudes.mjs';

const DELTA_T = 69_200; // ms, as the generator holds it
const fromTT = (date: string): number => Date.parse(`${date}Z`) - DELTA_T;
const apart = (a: number, b: number): number => Math.abs(((((a - b) % 360) + 540) % 360) - 180);

// s, h, p, N, ps from ERFA 2.0.0 (IERS 2003 arguments), degrees.
const ERFA: readonly (readonly [string, number, number, number, number, number])[] = [
  ['1970-06-21T00:00', 291.115956, 88.78125, 321.698255, 336.230521, 282.429594],
  ['1999-03-21T00:00', 43.279056, 358.078482, 51.436133, 140.215809, 282.923854],
  ['2000-08-02T00:00', 151.477293, 130.902161, 107.137895, 113.738926, 282.947392],
  ['2029-05-02T00:00', 263.640139, 40.199446, 196.873986, 277.724574, 283.441731],
  ['2030-09-14T00:00', 11.838363, 173.023127, 252.575662, 251.247708, 283.465273],
];
const TOLERANCE_DEGREES = 1e-3; // two theories, both printed to about an arcsecond

describe('mean longitudes', () => {
  test.each(ERFA)('agree with ERFA at %s TT', (date, ...expected) => {
    const [, moon, sun, perigee, negativeNode, solarPerigee] = doodsonVariables(fromTT(date));
    const got = [moon, sun, perigee, -(negativeNode ?? 0), solarPerigee];
    expected.forEach((value, i) => {
      expect(apart(got[i] ?? Number.NaN, value)).toBeLessThan(TOLERANCE_DEGREES);
    });
  });

  test('give the Sun its mean anomaly of example 25.a of Meeus (1998)', () => {
    const [, , sun, , , solarPerigee] = doodsonVariables(fromTT('1992-10-13T00:00'));
    expect(apart((sun ?? 0) - (solarPerigee ?? 0), -2241.00603)).toBeLessThan(2e-5);
  });

  test.each(['2006-06-19', '2025-01-29', '2043-09-10'])(
    'have the node at 0° on %s (Meeus, p. 344)',
    (date) => {
      const noon = doodsonVariables(fromTT(`${date}T12:00`));
      expect(apart(noon[4] ?? Number.NaN, 0)).toBeLessThan(0.03); // half a day of the node's motion
    },
  );

  test('count lunar time from the Moon, and give M2 its speed', () => {
    const noon = Date.UTC(2030, 5, 1, 12);
    const [tau, moon, sun] = doodsonVariables(noon);
    expect(apart((tau ?? 0) + (moon ?? 0) - (sun ?? 0), 180)).toBeLessThan(1e-6);
    // 28.9841042 degrees an hour, as every official table prints it
    expect(apart(combine([2, 0, 0, 0, 0, 0], DOODSON_RATES), 28.9841042)).toBeLessThan(5e-8);
  });
});
