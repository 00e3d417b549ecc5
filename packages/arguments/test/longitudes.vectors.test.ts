import { expectAngleWithin, expectWithin, loadVector, recordAccuracy } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { lunisolarLongitudes, lunisolarLongitudesTT } from '../src/index.js';

const KEYS = ['s', 'h', 'p', 'N', 'ps'] as const;
type Key = (typeof KEYS)[number];

/** Five longitudes in the order of KEYS, with N instead of N′. */
function five(row: { s: number; h: number; p: number; nPrime: number; ps: number }): number[] {
  return [row.s, row.h, row.p, -row.nPrime, row.ps];
}

describe('iers2010', () => {
  const { cases, tolerance } = loadVector<number[][]>('erfa-fundamental-arguments');
  const abs = tolerance.abs as number;

  it('agrees with ERFA from 1850 to 2150', () => {
    const got = cases.flatMap(([day]) => five(lunisolarLongitudesTT(day as number)));
    const want = cases.flatMap((row) => row.slice(1, 6));
    const seen = expectAngleWithin(got, want, { abs });
    recordAccuracy('erfa-fundamental-arguments', {
      capability: 's, h, p, N, p_s on TT',
      compared: 'every 500 days 1850 to 2150',
      ...seen,
      tolerance: abs,
      unit: 'degrees',
      headline: true,
    });
  });

  it('takes a Julian date in two parts', () => {
    const whole = lunisolarLongitudesTT(2451545.25);
    expect(lunisolarLongitudesTT({ day: 2451545, fraction: 0.25 })).toEqual(whole);
    expect(() => lunisolarLongitudesTT(Number.NaN)).toThrow(/julianDateTT: expected/);
    expect(() => lunisolarLongitudesTT(0)).toThrow(/julianDateTT: expected/);
  });

  it('agrees with the check case of the Conventions', () => {
    interface Row {
      centuriesTT: number;
      l: number;
      lPrime: number;
      F: number;
      D: number;
      omega: number;
    }
    const vector = loadVector<Row[]>('iers2010-fundamental-arguments');
    for (const row of vector.cases) {
      const degrees = (angle: number): number => (angle * 180) / Math.PI;
      const { F, omega, D, l, lPrime } = row;
      const got = five(lunisolarLongitudesTT({ day: 2451545, fraction: row.centuriesTT * 36525 }));
      const want = [F + omega, F + omega - D, F + omega - l, omega, F + omega - D - lPrime].map(
        degrees,
      );
      // Tolerance of the vector in radians, three angles summed.
      const allowed = degrees(3 * (vector.tolerance.abs as number)) + 1e-9;
      const seen = expectAngleWithin(got, want, { abs: allowed });
      recordAccuracy('iers2010-fundamental-arguments', {
        capability: 'sums of the Delaunay arguments',
        compared: 'one instant of 2007',
        ...seen,
        tolerance: allowed,
        unit: 'degrees',
      });
    }
  });

  it('agrees with the Doodson phases of the Conventions, which turn the Earth by the mean Sun', () => {
    interface Row {
      utc: string;
      doodsonNumbers: number[];
      phase: number;
    }
    const vector = loadVector<Row[]>('iers2010-doodson-phases');
    // UTC there is carried to TT by leap seconds (66.184 s), here by the smooth ΔT: 0.3 s of twice the Moon's motion.
    const abs = (vector.tolerance.abs as number) + (0.3 * 2 * 0.549) / 3600;
    const sums = vector.cases.map(({ utc, doodsonNumbers }) => {
      const { tau, s, h, p, nPrime, ps } = lunisolarLongitudes(utc);
      return [tau, s, h, p, nPrime, ps].reduce(
        (sum, a, i) => sum + a * (doodsonNumbers[i] as number),
        0,
      );
    });
    const seen = expectAngleWithin(
      sums,
      vector.cases.map(({ phase }) => phase),
      { abs },
    );
    recordAccuracy('iers2010-doodson-phases', {
      capability: 'phases of lines from τ, s, h, p, N′, p_s',
      compared: 'ten phases of 2009, Earth turned by the mean Sun',
      ...seen,
      tolerance: abs,
      unit: 'degrees',
    });
    expect(vector.cases.length).toBe(10);
  });
});

describe('schureman1940', () => {
  it('keeps to the bounds of its longitudes against ERFA', () => {
    const { cases } = loadVector<number[][]>('erfa-fundamental-arguments');
    const vector = loadVector('schureman-derived-factors');
    const bounds = (vector as unknown as { longitudeBounds: Record<Key, number> }).longitudeBounds;
    KEYS.forEach((key, i) => {
      const got = cases.map(([day]) => {
        const instant = ((day as number) - 2440587.5) * 86400000;
        return five(lunisolarLongitudes(instant, 'schureman1940'))[i] as number;
      });
      const want = cases.map((row) => row[1 + i] as number);
      // The bounds are rounded to the last printed digit.
      const abs = bounds[key] + 0.0005;
      const seen = expectAngleWithin(got, want, { abs }, key);
      recordAccuracy('erfa-fundamental-arguments', {
        capability: `longitude ${key} of Schureman (1940)`,
        compared: 'every 500 days 1850 to 2150, TT read as the civil time of SP 98',
        ...seen,
        tolerance: abs,
        unit: 'degrees',
      });
    });
  });
});

describe('mean lunar time', () => {
  it('is 15° UT + h − s in both models', () => {
    for (const model of ['iers2010', 'schureman1940'] as const) {
      const { tau, s, h } = lunisolarLongitudes('1987-03-14T07:30Z', model);
      expectAngleWithin(tau, 15 * 7.5 + h - s, { abs: 1e-9 });
    }
    expectWithin(
      lunisolarLongitudes('1800-01-01T00:00Z').tau,
      lunisolarLongitudes(Date.UTC(1800, 0, 1)).tau,
      { abs: 0 },
    );
  });
});
