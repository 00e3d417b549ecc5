import { angleDifference } from '@staithe/core';
import {
  expectAngleWithin,
  expectWithin,
  hourlySeries,
  publishedConstants,
  recordAccuracy,
} from '@staithe/test-vectors';
import { uniformSeries, type UniformSeries } from '@staithe/core';
import { describe, expect, it } from 'vitest';
import { fitHarmonics, type HarmonicFit } from '../src/index.js';

// The published sets are made with these factors.
const OLD = { argumentModel: 'schureman1940', nodalModel: 'schureman1940' } as const;

function year(series: UniformSeries, wanted: number): UniformSeries {
  const from = (Date.UTC(wanted, 0, 1) - series.start) / series.step;
  const to = (Date.UTC(wanted + 1, 0, 1) - series.start) / series.step;
  return uniformSeries({
    start: Date.UTC(wanted, 0, 1),
    step: series.step,
    values: series.values.slice(from, to),
  });
}

interface Row {
  readonly name: string;
  /** Fitted figure of the source's README, metres. */
  readonly amplitude: number;
  /** Published phase lag must be met within this, degrees; undefined: not compared. */
  readonly phase?: number;
}

function compare(
  vector: string,
  place: string,
  station: string,
  fit: HarmonicFit,
  rows: readonly Row[],
  abs: number,
): void {
  const published = publishedConstants(station).rows;
  const got = rows.map(
    ({ name }) => fit.constants.constituents.find((c) => c.name === name)?.amplitude as number,
  );
  const seen = expectWithin(
    got,
    rows.map(({ amplitude }) => amplitude),
    { abs },
    place,
  );
  recordAccuracy(vector, {
    capability: 'amplitudes fitted to a year',
    compared: `${place}: ${rows.map(({ name }) => name).join(', ')} of an independent fit`,
    ...seen,
    tolerance: abs,
    unit: 'm',
    ...(place === 'La Jolla 2012' ? { headline: true as const } : {}),
  });
  const phased = rows.filter(({ phase }) => phase !== undefined);
  const fitted = phased.map(
    ({ name }) => fit.constants.constituents.find((c) => c.name === name)?.phaseLag as number,
  );
  const wanted = phased.map(
    ({ name }) => published.find((row) => row.name === name)?.phaseLag as number,
  );
  phased.forEach(({ name, phase }, i) => {
    expectAngleWithin(
      fitted[i] as number,
      wanted[i] as number,
      { abs: phase as number },
      `${place} ${name}`,
    );
  });
  const largest = Math.max(...phased.map(({ phase }) => phase as number));
  recordAccuracy(vector, {
    capability: 'phase lags fitted to a year',
    compared: `${place}: ${phased.map(({ name }) => name).join(', ')} as published`,
    ...expectAngleWithin(fitted, wanted, { abs: largest }, place),
    tolerance: largest,
    unit: 'degrees',
  });
}

describe('fits of real records', () => {
  it('La Jolla 2012', () => {
    const fit = fitHarmonics(year(hourlySeries('la-jolla-observed'), 2012), OLD);
    compare(
      'la-jolla-observed',
      'La Jolla 2012',
      '9410230',
      fit,
      [
        { name: 'M2', amplitude: 0.502, phase: 0.3 },
        { name: 'S2', amplitude: 0.202 },
        { name: 'N2', amplitude: 0.12 },
        { name: 'K1', amplitude: 0.331, phase: 0.3 },
        { name: 'O1', amplitude: 0.213, phase: 0.3 },
      ],
      3e-3,
    );
    expect(fit.diagnostics.missing).toBe(0);
    expectWithin(fit.diagnostics.residual.rms, 0.043, { abs: 3e-3 });
  });

  it('Eastport 2019', () => {
    const fit = fitHarmonics(hourlySeries('eastport-observed-2019'), OLD);
    compare(
      'eastport-observed-2019',
      'Eastport 2019',
      '8410140',
      fit,
      [
        { name: 'M2', amplitude: 2.642, phase: 0.5 },
        { name: 'S2', amplitude: 0.412 },
        { name: 'N2', amplitude: 0.567 },
        { name: 'K1', amplitude: 0.155, phase: 3 },
        { name: 'O1', amplitude: 0.118, phase: 3 },
      ],
      3e-3,
    );
  });

  it('Grand Isle 1990, with its gaps, against published', () => {
    const fit = fitHarmonics(hourlySeries('grand-isle-observed-1990'), OLD);
    expect(fit.diagnostics.missing).toBe(870);
    const published = publishedConstants('8761724').rows;
    const amplitudes: [number, number][] = [];
    for (const [name, amplitude, phase] of [
      ['K1', 4e-3, 1.2],
      ['O1', 4e-3, 1.2],
      ['M2', 1.5e-3, 4.5],
    ] as const) {
      const want = published.find((row) => row.name === name);
      const got = fit.constants.constituents.find((c) => c.name === name);
      expectWithin(got?.amplitude as number, want?.amplitude as number, { abs: amplitude }, name);
      expectAngleWithin(got?.phaseLag as number, want?.phaseLag as number, { abs: phase }, name);
      amplitudes.push([got?.amplitude as number, want?.amplitude as number]);
    }
    const seen = expectWithin(
      amplitudes.map(([got]) => got),
      amplitudes.map(([, want]) => want),
      { abs: 4e-3 },
    );
    recordAccuracy('grand-isle-observed-1990', {
      capability: 'amplitudes fitted to a year with gaps',
      compared: 'Grand Isle 1990: K1, O1, M2 as published',
      ...seen,
      tolerance: 4e-3,
      unit: 'm',
    });
  });

  it.each([
    ['grand-isle-observed-2001', 0.1098, 0.1094, 37.4, 31.4],
    ['grand-isle-observed-2010', 0.118, 0.1127, 35.3, 28.4],
    ['grand-isle-observed-2012', 0.1193, 0.1164, 36.2, 29.7],
  ])('%s reproduces the independent fit of its source', (id, k1, o1, k1Lag, o1Lag) => {
    const { constituents } = fitHarmonics(hourlySeries(id), OLD).constants;
    const of = (name: string): { amplitude: number; phaseLag: number } =>
      constituents.find((c) => c.name === name) as { amplitude: number; phaseLag: number };
    const seen = expectWithin([of('K1').amplitude, of('O1').amplitude], [k1, o1], { abs: 3e-3 });
    expectAngleWithin([of('K1').phaseLag, of('O1').phaseLag], [k1Lag, o1Lag], { abs: 1 });
    recordAccuracy(id, {
      capability: 'amplitudes fitted to a year',
      compared: 'K1 and O1 of an independent fit',
      ...seen,
      tolerance: 3e-3,
      unit: 'm',
    });
  });

  it.each([
    ['sewells-point-observed-1929', { M2: [0.367, 50.1] }],
    ['sewells-point-observed-1935', { M2: [0.365, 49.2], K1: [0.05, 200.1] }],
    ['sewells-point-observed-1940', { M2: [0.36, 49.8] }],
  ])('%s reproduces the independent fit of its source', (id, wanted) => {
    const { constituents } = fitHarmonics(hourlySeries(id), OLD).constants;
    const names = Object.keys(wanted);
    const rows = names.map((name) => constituents.find((c) => c.name === name));
    const seen = expectWithin(
      rows.map((row) => row?.amplitude as number),
      Object.values(wanted).map(([amplitude]) => amplitude as number),
      { abs: 3e-3 },
    );
    expectAngleWithin(
      rows.map((row) => row?.phaseLag as number),
      Object.values(wanted).map(([, phaseLag]) => phaseLag as number),
      { abs: 1 },
    );
    recordAccuracy(id, {
      capability: 'amplitudes fitted to a year',
      compared: `${names.join(' and ')} of an independent fit`,
      ...seen,
      tolerance: 3e-3,
      unit: 'm',
    });
  });

  it('has error bars of the size by which neighbouring years differ', () => {
    // The sea itself changes from year to year: the scatter of M2, K1, O1 over nine years against the stated sigma.
    const record = hourlySeries('la-jolla-observed');
    const fits = [2011, 2012, 2013, 2014, 2015, 2016, 2017, 2018, 2019].map(
      (y) => fitHarmonics(year(record, y), OLD).constants.constituents,
    );
    for (const name of ['K1', 'O1']) {
      const rows = fits.map((list) => list.find((c) => c.name === name));
      const amplitudes = rows.map((row) => row?.amplitude as number);
      const mean = amplitudes.reduce((a, b) => a + b, 0) / amplitudes.length;
      const scatter = Math.sqrt(
        amplitudes.reduce((sum, a) => sum + (a - mean) * (a - mean), 0) / (amplitudes.length - 1),
      );
      const sigma = Math.sqrt(
        rows.reduce((sum, row) => sum + (row?.amplitudeSigma as number) ** 2, 0) / rows.length,
      );
      expect(scatter / sigma, name).toBeGreaterThan(0.4);
      expect(scatter / sigma, name).toBeLessThan(4);
      const lags = rows.map((row) =>
        angleDifference(rows[0]?.phaseLag as number, row?.phaseLag as number),
      );
      expect(Math.max(...lags) - Math.min(...lags), name).toBeLessThan(3);
    }
  });
});
