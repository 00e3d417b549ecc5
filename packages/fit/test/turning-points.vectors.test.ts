import { angleDifference, MINUTE } from '@staithe/core';
import {
  expectAngleWithin,
  expectWithin,
  highLowRows,
  publishedConstants,
  recordAccuracy,
} from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { fitTurningPoints, type TurningPointFit } from '../src/turning-points.js';
import type { TurningPoint } from '../src/turning/read.js';

const VECTOR = 'new-london-predicted-high-low';
const YEAR = 2001;
const ROUNDED = { height: 0.01 /* m */, time: MINUTE };
const NAVD88 = -0.092; // m below mean sea level (README of the source)
const AMPLITUDE = 1e-3; // m: 95 % discs of the rounding reach 0.8 mm, and the published set is rounded to 0.3 mm
const PHASE = 0.2; // degrees
const NAMES = ['M2', 'S2', 'N2', 'K1', 'O1'];
// As the official tables were made.
const TABLES = {
  argumentModel: 'schureman1940',
  nodalModel: 'schureman1940',
  nodalHold: 'calendar-year',
} as const;

const published = publishedConstants('8461490').rows;

function year(): TurningPoint[] {
  const { times, heights, kinds } = highLowRows(VECTOR);
  return kinds.flatMap((kind, i) => {
    const time = times[i] as number;
    const inside = time >= Date.UTC(YEAR, 0, 1) && time < Date.UTC(YEAR + 1, 0, 1);
    return inside ? [{ time, height: heights[i] as number, kind }] : [];
  });
}

function compare(fit: TurningPointFit, how: string): void {
  const found = NAMES.map((name) => fit.constants.constituents.find((c) => c.name === name));
  const wanted = NAMES.map((name) => published.find((row) => row.name === name));
  const compared = `New London ${YEAR}: ${NAMES.join(', ')} as published, ${how}`;
  recordAccuracy(VECTOR, {
    capability: 'amplitudes fitted to the high and low waters of a year',
    compared,
    ...expectWithin(
      found.map((one) => one?.amplitude as number),
      wanted.map((one) => one?.amplitude as number),
      { abs: AMPLITUDE },
      how,
    ),
    tolerance: AMPLITUDE,
    unit: 'm',
  });
  recordAccuracy(VECTOR, {
    capability: 'phase lags fitted to the high and low waters of a year',
    compared,
    ...expectAngleWithin(
      found.map((one) => one?.phaseLag as number),
      wanted.map((one) => one?.phaseLag as number),
      { abs: PHASE },
      how,
    ),
    tolerance: PHASE,
    unit: 'degrees',
  });
  expectWithin(fit.constants.meanLevel, NAVD88, { abs: 1e-3 });
  // Errors of rounding are uniform: their size over √12.
  expectWithin(fit.sigmas.height, ROUNDED.height / Math.sqrt(12), { rel: 0.05 });
  expectWithin(fit.sigmas.time, ROUNDED.time / Math.sqrt(12), { rel: 0.05 });
  expect([fit.timing.astray, fit.timing.contrary]).toEqual([[], []]);
}

describe('official high and low waters of New London, one year', () => {
  const points = year();

  it('give the published constants by the published list', () => {
    const constituents = published.map(({ name }) => name);
    const fit = fitTurningPoints(points, { ...TABLES, constituents });
    compare(fit, 'by the published list');
    // All of them, also M6 and the others that hide at high and low waters.
    for (const { name, amplitude, phaseLag } of published) {
      const got = fit.constants.constituents.find((c) => c.name === name);
      const turn = (angleDifference(phaseLag, got?.phaseLag as number) * Math.PI) / 180;
      const off = Math.hypot(
        (got?.amplitude as number) * Math.cos(turn) - amplitude,
        (got?.amplitude as number) * Math.sin(turn),
      );
      expectWithin(off, 0, { abs: AMPLITUDE }, name);
    }
  });

  it('give the published constants by our own choice', () => {
    const fit = fitTurningPoints(points, TABLES);
    compare(fit, 'by our own choice');
    const taken = fit.constants.constituents.map(({ name }) => name);
    expect(taken).toEqual(expect.arrayContaining(['M4', 'MS4', 'MN4', 'M6']));
  });
});
