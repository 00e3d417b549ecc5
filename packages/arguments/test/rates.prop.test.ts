import { angleDifference, EARLIEST, HOUR, LATEST } from '@staithe/core';
import { expectWithin, loadVector, recordAccuracy } from '@staithe/test-vectors';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { deltaT, lunisolarLongitudes, lunisolarRates } from '../src/index.js';

const KEYS = ['tau', 's', 'h', 'p', 'nPrime', 'ps'] as const;

describe('rates', () => {
  it('are the slopes of the longitudes, in both models', () => {
    const instants = fc.integer({ min: EARLIEST + 2e8, max: LATEST - 2e8 });
    fc.assert(
      fc.property(
        instants,
        fc.constantFrom('iers2010' as const, 'schureman1940' as const),
        (t, model) => {
          // Five hours either side: far from half a turn of τ, long against the rounding of an angle.
          const [before, after] = [
            lunisolarLongitudes(t - 5 * HOUR, model),
            lunisolarLongitudes(t + 5 * HOUR, model),
          ];
          const rates = lunisolarRates(t, model);
          for (const key of KEYS) {
            const slope = angleDifference(before[key], after[key]) / 10;
            expectWithin(rates[key], slope, { abs: 2e-9 }, `${key} ${model}`);
          }
        },
      ),
    );
  });
});

describe('deltaT', () => {
  it('meets the values of the almanacs', () => {
    const vector = loadVector<{ deltaTSeconds: Record<string, number> }>('trade-checks');
    const { cases } = vector;
    const abs = (vector as unknown as { tolerances: { deltaTSeconds: number } }).tolerances
      .deltaTSeconds;
    const rows = Object.entries(cases.deltaTSeconds);
    const got = rows.map(([year]) => deltaT(`${year}-01-01T00:00Z`).seconds);
    const seen = expectWithin(
      got,
      rows.map(([, seconds]) => seconds),
      { abs },
    );
    recordAccuracy('trade-checks', {
      capability: 'ΔT',
      compared: '1900, 1950, 2000, 2010, 2020',
      ...seen,
      tolerance: abs,
      unit: 's',
    });
  });

  it('has no step above 0.02 s between neighbouring days, 1700 to 2200', () => {
    let last = deltaT(EARLIEST).seconds;
    let largest = 0;
    for (let t = EARLIEST + 24 * HOUR; t <= LATEST; t += 24 * HOUR) {
      const now = deltaT(t).seconds;
      largest = Math.max(largest, Math.abs(now - last));
      last = now;
    }
    expect(largest).toBeLessThan(0.02);
    expect(largest).toBeGreaterThan(0);
  });

  it('is the less sure the farther from the observations', () => {
    const sigma = (year: number): number => deltaT(`${year}-07-01T00:00Z`).sigma;
    expect(sigma(1750)).toBeGreaterThan(sigma(1850));
    expect(sigma(1850)).toBeGreaterThan(sigma(1990));
    expect(sigma(2100)).toBeGreaterThan(sigma(2030));
  });

  it('refuses what lies outside', () => {
    expect(() => deltaT('1066-10-14T09:00Z')).toThrow(/t: expected/);
    expect(() => lunisolarLongitudes(0, 'other' as 'iers2010')).toThrow(/model: expected/);
    expect(() => lunisolarRates(0, 'other' as 'iers2010')).toThrow(/model: expected/);
  });
});
