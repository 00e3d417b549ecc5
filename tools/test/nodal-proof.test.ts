import { loadVector, recordAccuracy } from '@staithe/test-vectors';
import { constituent } from '@staithe/constituents';
import { describe, expect, it } from 'vitest';
import { groupsOf, namesFor, yearlyScatter, type YearlyFits } from './reference/yearly-fits.js';

const { cases: proof } = loadVector<YearlyFits>('ephemeris-yearly-fits');
// Each third year, over a whole turn of the node. All 19 years: tools/slow/nodal-proof.mjs.
const YEARS = [0, 3, 6, 9, 12, 15, 18];

function strays(scatter: ReturnType<typeof yearlyScatter>, name: string): [number, number] {
  const found = scatter.find((row) => row.name === name);
  if (!found) throw new Error(`expected ${name} among the fitted, got none`);
  return [found.amplitudeStrays, found.phaseLagStrays];
}

describe('the groups of the yearly fits', () => {
  it('are the 49 largest that a year tells apart, each under its own multipliers', () => {
    const groups = groupsOf(proof.hoursAYear, proof.leastTurns, 49);
    expect(proof.groups.map(({ doodsonNumbers }) => doodsonNumbers.join())).toEqual(
      groups.map(({ doodsonNumbers }) => doodsonNumbers.join()),
    );
    for (const [i, { name, doodsonNumbers, size }] of proof.groups.entries()) {
      // Sta and S1 stand without the p_s of their lines, a turn in 20 900 years.
      const own = name === 'S1' || name === 'Sta' ? 5 : 6;
      const numbers = constituent(name).doodsonNumbers;
      expect([...numbers].slice(0, own), name).toEqual(doodsonNumbers.slice(0, own));
      expect(Math.abs(size - (groups[i]?.size ?? 0)), name).toBeLessThan(1e-6);
    }
  });
});

describe('the tide of the ephemeris, fitted a year at a time', () => {
  it('has constant constants under potential', () => {
    const scatter = yearlyScatter(proof, YEARS, 'potential');
    for (const { names, amplitude, phaseLag } of Object.values(proof.limits)) {
      const seen = names.map((name) => strays(scatter, name));
      const compared = `${names.join(', ')}; each third year, 1993 to 2011; typical is the least`;
      const common = { compared, cases: seen.length * YEARS.length };
      const shares = seen.map(([share]) => share);
      const degrees = seen.map(([, lag]) => lag);
      recordAccuracy('ephemeris-yearly-fits', {
        ...common,
        capability: 'yearly amplitudes under potential, departure from their mean',
        worst: Math.max(...shares) * 100,
        typical: Math.min(...shares) * 100,
        tolerance: amplitude * 100,
        unit: '%',
      });
      recordAccuracy('ephemeris-yearly-fits', {
        ...common,
        capability: 'yearly phase lags under potential, departure from their mean',
        worst: Math.max(...degrees),
        typical: Math.min(...degrees),
        tolerance: phaseLag,
        unit: 'degrees',
      });
    }
  });

  it('strays more under schureman1940, and by the whole nodal cycle under none', () => {
    const potential = yearlyScatter(proof, YEARS, 'potential');
    const schureman = yearlyScatter(proof, YEARS, 'schureman1940');
    const none = yearlyScatter(proof, YEARS, 'none');
    // Schureman (1940) has no formula for ETA2, TAU1 and BET1.
    expect(namesFor(proof, 'potential').length).toBe(49);
    expect(namesFor(proof, 'schureman1940').length).toBeGreaterThanOrEqual(46);
    for (const name of ['O1', 'K2', 'OO1', 'Mf']) {
      const [a, b, c] = [potential, schureman, none].map((rows) => strays(rows, name)[0]);
      expect(b, name).toBeGreaterThan(a as number);
      expect(c, name).toBeGreaterThan(b as number);
    }
    expect(strays(none, 'M2')[0]).toBeGreaterThan(0.03);
    expect(strays(none, 'O1')[0]).toBeGreaterThan(0.15);
  });
});
