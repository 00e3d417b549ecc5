/** Properties of the parts that all pictures stand on. */
import { DAY, HOUR } from '@staithe/core';
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { element } from '../src/internal/markup.js';
import { spread } from '../src/internal/spread.js';
import { cleanText } from '../src/internal/text.js';
import { localDays, readZone } from '../src/internal/zone.js';
import { parse } from './parse.js';

const ROUNDING = 1e-6; // pixels

test('labels keep their distance and their order, within the ends when there is room', () => {
  fc.assert(
    fc.property(
      fc.array(fc.double({ min: 0, max: 500, noNaN: true }), { minLength: 1, maxLength: 20 }),
      fc.double({ min: 1, max: 24, noNaN: true }),
      (positions, distance) => {
        const wanted = [...positions].sort((a, b) => a - b);
        const out = spread(wanted, distance, 0, 500);
        expect(out).toHaveLength(wanted.length);
        for (let i = 1; i < out.length; i++) {
          expect((out[i] as number) - (out[i - 1] as number)).toBeGreaterThanOrEqual(
            distance - ROUNDING,
          );
        }
        // 19 gaps of 24 at most are 456: there is room.
        expect(Math.min(...out)).toBeGreaterThanOrEqual(-ROUNDING);
        expect(Math.max(...out)).toBeLessThanOrEqual(500 + ROUNDING);
      },
    ),
  );
});

test('labels that do not crowd stay where they are', () => {
  fc.assert(
    fc.property(
      fc.array(fc.integer({ min: 0, max: 9 }), { minLength: 1, maxLength: 9 }),
      (steps) => {
        let at = 0;
        const wanted = steps.map((step) => (at += 10 + step));
        expect(spread(wanted, 10, 0, at)).toEqual(wanted);
      },
    ),
  );
});

test('any text becomes well-formed markup that reads back as the clean text', () => {
  fc.assert(
    fc.property(fc.string({ unit: 'binary', maxLength: 60 }), (text) => {
      const node = parse(element('text', { title: text, x: 1 }, text).markup);
      expect(node.text.trim()).toBe(cleanText(text));
      expect(node.attributes['title'] ?? '').toBe(cleanText(text));
      expect(node.children.every(({ name }) => name === '#text')).toBe(true);
    }),
    { numRuns: 500 },
  );
});

test('local days follow each other without gap or overlap, in any zone', () => {
  const zones = [
    'UTC',
    '+05:45',
    'Europe/Lisbon',
    'Australia/Lord_Howe',
    'America/St_Johns',
    'Asia/Beirut',
    'Pacific/Apia',
  ];
  fc.assert(
    fc.property(
      fc.constantFrom(...zones),
      fc.integer({ min: Date.UTC(1990, 0, 1) / HOUR, max: Date.UTC(2040, 0, 1) / HOUR }),
      fc.integer({ min: 1, max: 40 }),
      (name, hour, count) => {
        const from = hour * HOUR;
        const days = localDays(readZone(name), from, from + count * DAY);
        expect(days[0]?.from).toBeLessThanOrEqual(from);
        expect(days[days.length - 1]?.to).toBeGreaterThanOrEqual(from + count * DAY);
        for (let i = 1; i < days.length; i++) expect(days[i]?.from).toBe(days[i - 1]?.to);
      },
    ),
    { numRuns: 200 },
  );
});
