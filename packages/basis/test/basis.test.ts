import { HOUR, MINUTE } from '@staithe/core';
import {
  expectWithin,
  hourlySeries,
  publishedConstants,
  recordAccuracy,
  refusal,
} from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { columnCount, gram, makeBasis, projectInto, synthesizeInto } from '../src/index.js';
import { makeStretcher } from '../src/kernels.js';

describe('official hourly predictions of La Jolla, 2010 to 2020', () => {
  const official = hourlySeries('la-jolla-predicted-2010-2020');
  const { rows } = publishedConstants('9410230');

  function differences(
    nodalHold: 'calendar-year' | 'continuous',
    m3Turn = 0,
  ): { rms: number; max: number; mean: number } {
    const basis = makeBasis({
      constituents: rows.map(({ name }) => name),
      argumentModel: 'schureman1940',
      nodalModel: 'schureman1940',
      nodalHold,
    });
    const coefficients = new Float64Array(columnCount(basis));
    rows.forEach(({ name, amplitude, phaseLag }, j) => {
      const angle = ((phaseLag + (name === 'M3' ? m3Turn : 0)) * Math.PI) / 180;
      coefficients[1 + 2 * j] = amplitude * Math.cos(angle);
      coefficients[2 + 2 * j] = amplitude * Math.sin(angle);
    });
    const out = new Float64Array(official.values.length);
    synthesizeInto(out, basis, coefficients, {
      start: official.start,
      step: official.step,
      count: out.length,
    });
    const off = out.map((h, i) => h - (official.values[i] as number));
    const mean = off.reduce((sum, d) => sum + d, 0) / off.length;
    const rms = Math.sqrt(off.reduce((sum, d) => sum + d * d, 0) / off.length);
    return { rms, max: off.reduce((m, d) => Math.max(m, Math.abs(d)), 0), mean };
  }

  it('are met to 0.6 mm rms and 2 mm at most with the hold of official tables', () => {
    const { rms, max, mean } = differences('calendar-year');
    expect(rms).toBeLessThanOrEqual(0.6e-3);
    expect(Math.abs(mean)).toBeLessThanOrEqual(0.05e-3);
    recordAccuracy('la-jolla-predicted-2010-2020', {
      capability: 'hourly heights from published constants',
      compared: 'official predictions, calendar-year hold; typical is the rms',
      cases: official.values.length,
      worst: max * 1000,
      typical: rms * 1000,
      tolerance: 2,
      unit: 'mm',
      headline: true,
    });
  });

  it('are met to 6.5 mm rms with continuous factors', () => {
    expect(differences('continuous').rms).toBeLessThanOrEqual(6.5e-3);
  });

  it('are missed by 4.4 mm without the 180° of M3', () => {
    expectWithin(differences('calendar-year', 180).rms, 4.4e-3, { abs: 0.1e-3 });
  });
});

describe('sampling', () => {
  it('weakens by the published shares: hourly means M2 1.06 %, M4 4.2 %, M8 16 %', () => {
    const { response } = makeBasis({
      constituents: ['M2', 'M4', 'M8'],
      sampling: { meanOver: HOUR, stamp: 'middle' },
    });
    expectWithin(1 - (response[0] as number), 0.0106, { abs: 5e-5 });
    expectWithin(1 - (response[1] as number), 0.042, { abs: 5e-4 });
    expectWithin(1 - (response[2] as number), 0.16, { abs: 5e-3 });
  });

  it('of means equals the mean of many instants, whatever the stamp', () => {
    const coefficients = Float64Array.of(2, 1, 0.5, 0.1, 0.2);
    const constituents = ['M2', 'M4'];
    const fine = new Float64Array(60);
    const start = Date.UTC(2030, 4, 5);
    synthesizeInto(fine, makeBasis({ constituents }), coefficients, {
      start: start + MINUTE / 2,
      step: MINUTE,
      count: 60,
    });
    const mean = fine.reduce((sum, h) => sum + h, 0) / 60;
    for (const [stamp, at] of [
      ['start', start],
      ['middle', start + HOUR / 2],
      ['end', start + HOUR],
    ] as const) {
      const out = new Float64Array(1);
      const basis = makeBasis({ constituents, sampling: { meanOver: HOUR, stamp } });
      synthesizeInto(out, basis, coefficients, { times: Float64Array.of(at) });
      expectWithin(out, mean, { abs: 2e-5 }, stamp);
    }
  });
});

describe('stretches', () => {
  it('join smoothly in continuous holds and may jump between calendar years', () => {
    const smooth = makeStretcher(makeBasis({ constituents: ['O1'] }));
    const first = smooth(0);
    expect(smooth(first.to).from).toBe(first.to);
    expect(first.jumps).toBe(false);
    const yearly = makeStretcher(makeBasis({ constituents: ['O1'], nodalHold: 'calendar-year' }));
    expect(yearly(Date.UTC(2031, 5, 1))).toMatchObject({
      from: Date.UTC(2031, 0, 1),
      to: Date.UTC(2032, 0, 1),
      jumps: true,
    });
    // Going back gives the same as going forward.
    const again = smooth(0);
    expect(Array.from(again.cubics)).toEqual(Array.from(first.cubics));
  });
});

describe('bad input', () => {
  const basis = makeBasis({ constituents: ['M2'] });
  const grid = { start: 0, step: HOUR, count: 3 };
  it.each<[string, () => unknown]>([
    ['DUPLICATE constituents[1]', () => makeBasis({ constituents: ['M2', 'M2'] })],
    ['DUPLICATE constituents[1]', () => makeBasis({ constituents: ['NU2', 'ν2'] })],
    ['UNKNOWN_CONSTITUENT constituent', () => makeBasis({ constituents: ['X9'] })],
    [
      'UNKNOWN_CHOICE nodalHold',
      () => makeBasis({ constituents: [], nodalHold: 'yearly' as 'continuous' }),
    ],
    [
      'UNKNOWN_CHOICE nodalHold',
      () => makeBasis({ constituents: [], nodalHold: {} as unknown as 'continuous' }),
    ],
    [
      'NO_TIME_ZONE nodalHold.heldAt',
      () => makeBasis({ constituents: [], nodalHold: { heldAt: '2031-01-01T00:00' } }),
    ],
    [
      'LENGTH_MISMATCH coefficients',
      () => synthesizeInto(new Float64Array(3), basis, new Float64Array(2), grid),
    ],
    [
      'LENGTH_MISMATCH out',
      () => synthesizeInto(new Float64Array(2), basis, new Float64Array(3), grid),
    ],
    [
      'LENGTH_MISMATCH out',
      () => projectInto(new Float64Array(2), basis, new Float64Array(3), grid),
    ],
    [
      'LENGTH_MISMATCH values',
      () => projectInto(new Float64Array(3), basis, new Float64Array(2), grid),
    ],
    ['LENGTH_MISMATCH mask', () => gram(basis, grid, new Uint8Array(2))],
  ])('is refused with %s', (expected, run) => {
    const { code, path } = refusal(run);
    expect(`${code} ${path}`).toBe(expected);
  });

  it('nothing but plain data: a basis survives structuredClone', () => {
    expect(structuredClone(basis)).toEqual(basis);
  });
});
