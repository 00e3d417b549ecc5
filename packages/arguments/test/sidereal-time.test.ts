import { angleDifference, DAY } from '@staithe/core';
import { expectWithin, loadVector, recordAccuracy } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import {
  deltaT,
  lunisolarLongitudes,
  lunisolarLongitudesTT,
  lunisolarRates,
} from '../src/index.js';

// The aberration that the mean Sun of sidereal time contains, and its drift from 1850 to 2150: degrees.
const SMALLEST = 0.0051;
const LARGEST = 0.0062;
const MIDDLE = 0.00565;
const HALF = 0.00055;

/** UT as an angle, 15° an hour since 0h, from a Julian date. */
function turnOf(julianDate: number): number {
  return (julianDate + 0.5 - Math.floor(julianDate + 0.5)) * 360;
}

function instantOf(julianDate: number): number {
  return (julianDate - 2440587.5) * DAY;
}

describe('the hour angle of the vernal equinox', () => {
  // Columns: Julian date, s, h, p, N, p_s, GMST 1982, GMST 2006.
  const { cases } = loadVector<number[][]>('erfa-fundamental-arguments');
  const rows = cases.map((row) => ({
    date: row[0] as number,
    gmst1982: row[6] as number,
    gmst2006: row[7] as number,
  }));

  it('leads sidereal time by the aberration in its mean Sun, with UT1 = TT', () => {
    for (const column of ['gmst1982', 'gmst2006'] as const) {
      const lead = rows.map((row) =>
        angleDifference(row[column], turnOf(row.date) + lunisolarLongitudesTT(row.date).h - 180),
      );
      const [least, most] = [Math.min(...lead), Math.max(...lead)];
      expect(least, column).toBeGreaterThanOrEqual(SMALLEST);
      expect(most, column).toBeLessThanOrEqual(LARGEST);
      const off = lead.map((value) => Math.abs(value - MIDDLE));
      recordAccuracy('erfa-fundamental-arguments', {
        capability: `15° UT + h − 180° − GMST, from ${MIDDLE}°`,
        compared: `every 500 days 1850 to 2150 with UT1 = TT, ${column}: ${least.toFixed(5)}° to ${most.toFixed(5)}°`,
        cases: off.length,
        worst: Math.max(...off),
        typical: Math.sqrt(off.reduce((sum, value) => sum + value * value, 0) / off.length),
        tolerance: HALF,
        unit: 'degrees',
      });
    }
  });

  it('leads by ΔT·0.0411/3600 degrees more, because h runs on TT', () => {
    const got = rows.map(({ date }) => {
      const { tau, s } = lunisolarLongitudes(instantOf(date));
      return angleDifference(turnOf(date) + lunisolarLongitudesTT(date).h, tau + s);
    });
    const want = rows.map(({ date }) => {
      const rate = lunisolarRates(instantOf(date)).h;
      expectWithin(rate, 0.0411, { abs: 5e-5 });
      return (deltaT(instantOf(date)).seconds * rate) / 3600;
    });
    // A Julian date in one number holds an instant to 0.02 ms, 1e-7° of the turn of the Earth.
    expectWithin(got, want, { abs: 2e-7 });
    expect(Math.max(...want)).toBeGreaterThan(0.003);
  });

  it('moves M2 by about 0.013° today', () => {
    const { date, gmst2006 } = rows.find(
      (row) => instantOf(row.date) > Date.UTC(2020, 0, 1),
    ) as (typeof rows)[number];
    // Sidereal time of the vector counts its TT as UT1, so both sides take this date as UT.
    const { tau, s } = lunisolarLongitudes(instantOf(date));
    expectWithin(2 * angleDifference(gmst2006 + 180 - s, tau), 0.013, { abs: 5e-4 });
  });
});
