import { HOUR } from '@staithe/core';
import { describe, expect, it } from 'vitest';
import { complain, difference } from '../steps/compare.mjs';
import { inverseBarometer } from '../steps/pressure.mjs';

const ROUNDING = 1e-12; // metres

describe('the inverse barometer', () => {
  const text =
    'Time (UTC),Air pressure at sea level (hPa)\n2030-01-01 00:00,1005.0\n2030-01-01 01:00,1015.0\n2030-01-01 02:00,1025.0\n';
  const rise = inverseBarometer({ text });
  const start = Date.UTC(2030, 0, 1);
  it.each([
    [0, 0.0995],
    [0.5, 0.04975],
    [1, 0],
    [1.25, -0.024875],
    [2, -0.0995],
    [-5, 0.0995],
    [9, -0.0995],
  ])('lifts the water %f h into the file by %f m', (hours, metres) => {
    expect(Math.abs(rise(start + hours * HOUR) - metres)).toBeLessThan(ROUNDING);
  });
});

describe('complain', () => {
  const truth = { constituents: [{ name: 'M2', amplitude: 1, phaseLag: 359.9 }] };
  const of = (amplitude, phaseLag, amplitudeSigma) => ({
    constituents: [{ name: 'M2', amplitude, phaseLag, amplitudeSigma, phaseLagSigma: 0.1 }],
  });
  it('is silent within 5 mm, or 3 sigma, across 0°', () => {
    expect(complain('X', of(1.004, 359.9, 0.0001), truth, 'M2')).toEqual([]);
    expect(complain('X', of(1, 0.1, 0.0001), truth, 'M2')).toEqual([]); // 3.5 mm apart
    expect(complain('X', of(1.02, 359.9, 0.02), truth, 'M2')).toEqual([]);
  });
  it('says plainly what is wrong beyond both', () => {
    const [said] = complain('X', of(1.02, 359.9, 0.001), truth, 'M2');
    expect(said).toMatch(
      /^X: expected M2 within 3 sigma \(4\.3 mm\) or 5 mm of the truth, got 20\.0 mm$/,
    );
    expect(complain('X', { constituents: [] }, truth, 'M2')).toHaveLength(1);
  });
});

describe('difference', () => {
  it('takes the mean off the root mean square', () => {
    const { mean, rms } = difference(Float64Array.of(1.1, 2.3), Float64Array.of(1, 2));
    expect(Math.abs(mean - 0.2)).toBeLessThan(ROUNDING);
    expect(Math.abs(rms - 0.1)).toBeLessThan(ROUNDING);
  });
});
