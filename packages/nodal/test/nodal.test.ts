import { constituent, listConstituents } from '@staithe/constituents';

import { expectAngleWithin, expectWithin, refusal } from '@staithe/test-vectors';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { nodalCorrection, nodalPlan, sideLines } from '../src/index.js';

const T = '1988-03-14T00:00Z';

describe('nodalCorrection', () => {
  it('is 1 and 0 for the Sun, the weather and the model none', () => {
    for (const name of ['Sa', 'Ssa', 'S1'])
      expect(nodalCorrection(name, T)).toEqual({ f: 1, u: 0 });
    for (const name of ['S2', 'P1', 'T2']) {
      expect(nodalCorrection(name, T, { model: 'schureman1940' })).toEqual({ f: 1, u: 0 });
    }
    expect(nodalCorrection('O1', T, { model: 'none' })).toEqual({ f: 1, u: 0 });
  });

  it('of a compound multiplies f and adds u with their signs', () => {
    for (const model of ['potential', 'schureman1940'] as const) {
      const of = (name: string): { f: number; u: number } => nodalCorrection(name, T, { model });
      const [m2, k1, s2] = [of('M2'), of('K1'), of('S2')];
      const mk = of('2MK3');
      expectWithin(mk.f, m2.f * m2.f * k1.f, { rel: 1e-14 });
      expectAngleWithin(mk.u, 2 * m2.u - k1.u, { abs: 1e-11 });
      const sm = of('2SM2');
      expectWithin(sm.f, s2.f * s2.f * m2.f, { rel: 1e-14 });
      expectAngleWithin(sm.u, 2 * s2.u - m2.u, { abs: 1e-11 });
    }
  });

  it('repeats with the node where the node is its only argument (Schureman)', () => {
    const nodeCycle = 6798.3836 * 86400000; // days of a turn of N at J2000, from the rate
    for (const name of ['M2', 'O1', 'K1', 'K2', 'J1', 'OO1', 'Mf', 'Mm', 'M3']) {
      const a = nodalCorrection(name, Date.UTC(1995, 0, 1), { model: 'schureman1940' });
      const b = nodalCorrection(name, Date.UTC(1995, 0, 1) + nodeCycle, { model: 'schureman1940' });
      expectWithin(a.f, b.f, { abs: 2e-5 }, name);
      expectAngleWithin(a.u, b.u, { abs: 1e-3 }, name);
    }
  });

  it('has f > 0 at every date', () => {
    fc.assert(
      fc.property(fc.integer({ min: Date.UTC(1700, 0, 1), max: Date.UTC(2200, 0, 1) }), (t) => {
        for (const { name, kind } of listConstituents()) {
          if (kind !== 'compound') expect(nodalCorrection(name, t).f, name).toBeGreaterThan(0);
        }
      }),
      { numRuns: 20 },
    );
  });

  it('lets degree 3 in with a latitude: N2 changes by several per cent, M3 stands on it', () => {
    const [without, withLines] = [
      nodalCorrection('N2', T),
      nodalCorrection('N2', T, { latitude: 45 }),
    ];
    expect(Math.abs(withLines.f - without.f)).toBeGreaterThan(0.01);
    expect(Math.abs(withLines.f - without.f)).toBeLessThan(0.1);
    // North and south see opposite signs of degree 3.
    const south = nodalCorrection('N2', T, { latitude: -45 });
    expectWithin(withLines.f + south.f, 2 * without.f, { abs: 5e-3 });
    expect(sideLines(constituent('M3')).lines[0]?.degree).toBe(3);
    expect(sideLines(constituent('Sa')).lines).toEqual([]);
  });

  it('leaves degree 3 out where degree 2 is weak, and says so', () => {
    expect(sideLines(constituent('K1'), { latitude: 0.5 }).leftOut).toBe(true);
    expect(sideLines(constituent('M2'), { latitude: 89 }).leftOut).toBe(true);
    expect(nodalPlan([constituent('O1'), constituent('M2')], 'potential', 0.5).leftOut).toEqual([
      'O1',
    ]);
  });

  it('refuses what it does not know', () => {
    expect(refusal(() => nodalCorrection('M2', T, { model: 'other' as 'none' })).code).toBe(
      'UNKNOWN_CHOICE',
    );
    expect(refusal(() => nodalCorrection('ETA2', T, { model: 'schureman1940' })).code).toBe(
      'NO_NODAL_FORMULA',
    );
    expect(refusal(() => nodalCorrection('M2', T, { latitude: 95 })).path).toBe('latitude');
    expect(refusal(() => nodalCorrection('M2', '1600-01-01T00:00Z')).code).toBe('OUT_OF_RANGE');
  });
});
