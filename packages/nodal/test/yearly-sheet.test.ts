import { InputError } from '@staithe/core';
import { expectWithin, loadVector } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { nodalCorrection, yearlySheet } from '../src/index.js';

describe('yearlySheet', () => {
  it('holds f at mid-year as derived after Schureman (1940), 1960 to 2038', () => {
    interface Row {
      year: number;
      f: Record<string, number>;
    }
    const vector = loadVector<Row[]>('schureman-derived-factors');
    for (const { year, f } of vector.cases) {
      const rows = yearlySheet(year, { constituents: Object.keys(f), model: 'schureman1940' });
      expectWithin(
        rows.map(({ middle }) => middle.f),
        Object.values(f),
        vector.tolerance,
        `${year}`,
      );
    }
  });

  it('holds twelve months, each as nodalCorrection gives it, and their extremes', () => {
    for (const { name, months, lowest, highest } of yearlySheet(2031)) {
      expect(months.length).toBe(12);
      for (const { time, f, u } of months) {
        const one = nodalCorrection(name, time);
        expectWithin([f, u], [one.f, one.u], { abs: 1e-12 }, name);
      }
      const factors = months.map(({ f }) => f);
      expect([lowest.f, highest.f]).toEqual([Math.min(...factors), Math.max(...factors)]);
    }
  });

  it.each([1699, 2201, 2000.5, Number.NaN])('refuses the year %d', (year) => {
    try {
      yearlySheet(year);
    } catch (error) {
      const { code, path, message } = error as InputError;
      expect([code, path]).toEqual(['OUT_OF_RANGE', 'year']);
      expect(message).toMatch(/expected .* got/);
      return;
    }
    throw new Error('expected a refusal');
  });
});
