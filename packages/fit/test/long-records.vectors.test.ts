import {
  expectAngleWithin,
  expectWithin,
  hourlySeries,
  publishedConstants,
} from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { fitHarmonics, type HarmonicFit } from '../src/index.js';

const OLD = { argumentModel: 'schureman1940', nodalModel: 'schureman1940' } as const;

function expectPublished(
  fit: HarmonicFit,
  station: string,
  limits: Readonly<Record<string, readonly [metres: number, degrees: number]>>,
): void {
  const { rows } = publishedConstants(station);
  for (const [name, [metres, degrees]] of Object.entries(limits)) {
    const got = fit.constants.constituents.find((one) => one.name === name);
    const want = rows.find((row) => row.name === name);
    expectWithin(got?.amplitude as number, want?.amplitude as number, { abs: metres }, name);
    expectAngleWithin(got?.phaseLag as number, want?.phaseLag as number, { abs: degrees }, name);
  }
}

describe('records of other lengths than a year', () => {
  it('Grand Isle, 36 years: constants near the published, and the land sinks', () => {
    const fit = fitHarmonics(hourlySeries('grand-isle-observed'), {
      ...OLD,
      constituents: ['K1', 'O1', 'P1', 'Q1', 'M2', 'S2', 'Sa', 'Ssa'],
      secularRate: true,
      errorModel: 'independent',
    });
    expect(fit.diagnostics.samples).toBeGreaterThan(310000);
    expectPublished(fit, '8761724', { K1: [2e-3, 1], O1: [3e-3, 1.5], M2: [1e-3, 2] });
    // The gauge subsides with the delta: 7.5 mm a year over these years (README of the record).
    expectWithin(fit.constants.secularRate?.metresPerYear as number, 7.5e-3, { abs: 1e-3 });
  });

  it('La Jolla, five months of 2010: near the published', () => {
    const fit = fitHarmonics(hourlySeries('la-jolla-observed-2010'), {
      ...OLD,
      errorModel: 'independent',
    });
    expectPublished(fit, '9410230', { M2: [5e-3, 1], O1: [6e-3, 1.5] });
  });
});
