/**
 * What is written as CSV comes back, whatever the unit, the zone and the marks.
 */
import { formatInstant, metresFromFeet } from '@staithe/core';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseGaugeCsv } from '../src/index.js';

const heights = fc.array(fc.option(fc.integer({ min: -1500, max: 1500 }), { nil: undefined }), {
  minLength: 3,
  maxLength: 40,
});
const START = Date.UTC(2031, 5, 1);

describe('parseGaugeCsv', () => {
  it('gives back heights in every unit', () => {
    fc.assert(
      fc.property(heights, fc.constantFrom('m', 'cm', 'mm', 'ft'), (list, unit) => {
        const text = list.map((v, i) => `${formatInstant(START + i * 360000)},${v ?? ''}`);
        const record = parseGaugeCsv(`time,level_${unit}\n${text.join('\n')}`, { sentinels: [] });
        const size = { m: 1, cm: 100, mm: 1000, ft: 1 }[unit];
        const expected = list.map((v) => {
          if (v === undefined) return Number.NaN;
          return unit === 'ft' ? metresFromFeet(v) : v / size;
        });
        expect([...record.series.values]).toEqual(expected.map((v) => v + 0));
        expect(record.series.start).toBe(START);
      }),
    );
  });

  it('reads one instant in every zone by its own clock', () => {
    const zones = [
      'UTC',
      'Asia/Kathmandu',
      'America/St_Johns',
      'Pacific/Apia',
      'Australia/Lord_Howe',
    ];
    const instants = fc.integer({ min: Date.UTC(1975, 0, 1), max: Date.UTC(2035, 0, 1) });
    fc.assert(
      fc.property(instants, fc.constantFrom(...zones), (ms, timeZone) => {
        const instant = Math.floor(ms / 1000) * 1000;
        // The Swedish form of a date is YYYY-MM-DD HH:MM:SS.
        const local = new Date(instant).toLocaleString('sv-SE', { timeZone });
        const read = (whenTwice: 'first' | 'second'): number | undefined =>
          parseGaugeCsv(`time,m\n${local},1\n`, { timeZone, whenTwice }).series.times?.[0];
        expect([read('first'), read('second')]).toContain(instant);
      }),
    );
  });

  it('does not mind the order of lines when told to sort', () => {
    const places = fc.uniqueArray(fc.nat(5000), { minLength: 2, maxLength: 60 });
    fc.assert(
      fc.property(places, (list) => {
        const rows = (order: readonly number[]): string =>
          `time,m\n${order.map((i) => `${formatInstant(START + i * 60000)},${i / 1000}`).join('\n')}`;
        const rising = parseGaugeCsv(rows([...list].sort((a, b) => a - b)));
        expect(parseGaugeCsv(rows(list), { onDisorder: 'sort' }).series).toEqual(rising.series);
      }),
    );
  });
});
