/**
 * The readers of the frame: encoding, water levels in metres, published constants under the project's names.
 */
import { HOUR, metresFromFeet, toInstant } from '@staithe/core';
import { describe, expect, it } from 'vitest';
import {
  canonicalName,
  decodeInt16,
  highLowRows,
  hourlySeries,
  publishedConstants,
  stationDatums,
} from '../src/index.js';

const mean = (values: Float64Array): number => {
  const present = values.filter((value) => !Number.isNaN(value));
  return present.reduce((sum, value) => sum + value, 0) / present.length;
};

describe('decodeInt16', () => {
  it('reads little-endian integers with their sign', () => {
    // 0x0001, 0xffff, 0x8000, 0x7fff.
    const bytes = Buffer.from([0x01, 0x00, 0xff, 0xff, 0x00, 0x80, 0xff, 0x7f]);
    expect([...decodeInt16(bytes.toString('base64'))]).toEqual([1, -1, -32768, 32767]);
  });

  it('joins lines', () => {
    expect([...decodeInt16(['AQAC', 'AP//'])]).toEqual([1, 2, -1]);
  });
});

describe('hourlySeries', () => {
  it('turns feet into metres: first and last printed prediction of La Jolla', () => {
    const { start, step, values } = hourlySeries('la-jolla-predicted-2010-2020');
    expect(start).toBe(toInstant('2010-08-01T00:00Z'));
    expect(step).toBe(HOUR);
    expect(values.length).toBe(87672);
    expect(values[0]).toBe(metresFromFeet(0.098));
    expect(values[1]).toBe(metresFromFeet(-0.374));
    expect(values.some(Number.isNaN)).toBe(false);
  });

  it('has no gap in the observations of La Jolla before 2020', () => {
    const { start, values } = hourlySeries('la-jolla-observed');
    expect(start).toBe(toInstant('2011-01-01T00:00Z'));
    expect(values.length).toBe(78888);
    expect(values.some(Number.isNaN)).toBe(false);
  });

  it('keeps metres as printed: first and last hour of Eastport', () => {
    const { values } = hourlySeries('eastport-observed-2019');
    expect([values.length, values[0], values[8759]]).toEqual([8760, 5.566, 2.893]);
    expect(Math.abs(mean(values) - 3.0747)).toBeLessThan(0.00005);
  });

  it('marks the missing hours of Grand Isle as NaN: 870 in 1990, 425 in 2012', () => {
    const missing = (id: string): number => hourlySeries(id).values.filter(Number.isNaN).length;
    expect(missing('grand-isle-observed-1990')).toBe(870);
    expect(missing('grand-isle-observed-2001')).toBe(0);
    expect(missing('grand-isle-observed-2010')).toBe(0);
    expect(missing('grand-isle-observed-2012')).toBe(425);
  });

  it('refuses a vector that holds no metres or feet', () => {
    expect(() => hourlySeries('phase-conversion')).toThrowError(/expected m or ft, got degrees/);
  });
});

describe('highLowRows', () => {
  const { times, heights, kinds } = highLowRows('new-london-predicted-high-low');
  const row = (time: string): number => times.indexOf(toInstant(time));

  it('gives all 107,273 rows, the first as printed', () => {
    expect([times.length, heights.length, kinds.length]).toEqual([107273, 107273, 107273]);
    expect([times[0], heights[0], kinds[0]]).toEqual([
      toInstant('1939-01-01T03:46Z'),
      -0.49,
      'low',
    ]);
    expect([heights[1], kinds[1]]).toEqual([0.28, 'high']);
    expect(times[107272]).toBeLessThan(toInstant('2015-01-01T00:00Z'));
    expect(times.every((time, i) => i === 0 || time > (times[i - 1] as number))).toBe(true);
  });

  it('keeps the three places where one is missing', () => {
    const repeated = kinds.flatMap((kind, i) => (kind === kinds[i - 1] ? [i] : []));
    expect(repeated).toEqual(
      ['1966-06-01T06:50Z', '2003-01-01T06:37Z', '2005-01-01T06:04Z'].map(row),
    );
    expect(repeated.map((i) => kinds[i])).toEqual(['low', 'low', 'high']);
  });
});

describe('publishedConstants', () => {
  it('gives metres and canonical names, and names what is not resolved', () => {
    const { rows, leftOut } = publishedConstants('8410140');
    expect(rows[0]).toEqual({
      name: 'M2',
      amplitude: metresFromFeet(8.815),
      phaseLag: 98.7,
      speed: 28.9841042,
    });
    expect(rows.map((row) => row.name)).toContain('RHO1');
    expect(leftOut).toEqual(['MK3', 'S4', 'S6', 'Mm', 'Sa', 'MSf', 'Mf', 'M3']);
    expect(rows.length + leftOut.length).toBe(37);
  });

  it('covers 15 stations of 37 names and Anchorage of 124', () => {
    const sizes = ['9410230', '8461490', '8761724', '9447130', '9455920'].map((station) => {
      const { rows, leftOut } = publishedConstants(station);
      return rows.length + leftOut.length;
    });
    expect(sizes).toEqual([37, 37, 37, 37, 124]);
    expect(publishedConstants('9455920').leftOut).toContain('PSI1');
    expect(canonicalName('SSA')).toBe('Ssa');
    expect(canonicalName('2SM2')).toBe('2SM2');
  });

  it('gives datums of which HAT above MSL is 4.41 ft at La Jolla', () => {
    const { HAT, MSL, name } = stationDatums('9410230');
    expect(Math.abs(HAT - MSL - metresFromFeet(4.41))).toBeLessThan(1e-9);
    expect(name).toBe('La Jolla CA');
  });

  it('refuses an unknown station and names those there are', () => {
    expect(() => publishedConstants('1')).toThrowError(/station: expected one of 8410140,.*got 1/);
  });
});
