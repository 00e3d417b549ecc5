import { highLowRows, recordAccuracy } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { compareHighLow } from './reference/compare-high-low.js';
import { officialConstants } from './reference/places.js';

describe('official high and low waters of New London, 1997 to 2006', () => {
  const seen = compareHighLow(
    highLowRows('new-london-predicted-high-low'),
    officialConstants('8461490'),
    1997,
    2007,
  );

  it('are all found, and none beside them but two that the published files lost at their joins', () => {
    expect(seen.missing).toEqual([]);
    expect(seen.extra.map((text) => text.slice(0, 16))).toEqual([
      '2003-01-01T00:13',
      '2005-01-01T00:01',
    ]);
    expect(seen.rows).toBeGreaterThan(14000);
  });

  it('agree in time (published to the minute)', () => {
    expect(Math.abs(seen.minutes.mean)).toBeLessThanOrEqual(0.05);
    expect(seen.minutes.sd).toBeLessThanOrEqual(0.43);
    recordAccuracy('new-london-predicted-high-low', {
      capability: 'times of high and low water',
      compared: 'official rows 1997 to 2006, rounded to the minute; typical is the sd',
      cases: seen.rows,
      worst: seen.minutes.max,
      typical: seen.minutes.sd,
      tolerance: 1.7,
      unit: 'min',
      headline: true,
    });
  });

  it('agree in height (published to the centimetre above NAVD88, 0.092 m below mean sea level)', () => {
    // Heights of the rows are above NAVD88, those of the constants above mean sea level.
    expect(Math.abs(seen.metres.mean + 0.092)).toBeLessThanOrEqual(0.001);
    expect(seen.metres.sd).toBeLessThanOrEqual(3.2e-3);
    recordAccuracy('new-london-predicted-high-low', {
      capability: 'heights of high and low water',
      compared: 'official rows 1997 to 2006, rounded to the centimetre; typical is the sd',
      cases: seen.rows,
      worst: seen.metres.max * 1000,
      typical: seen.metres.sd * 1000,
      tolerance: 9.6,
      unit: 'mm',
    });
  });
});
