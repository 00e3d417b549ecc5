/**
 * The accuracy tables: order, rounding, the excerpt, and the record of long checks.
 */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { readLong, recordLong } from '../../tools/accuracy/long.mjs';
import {
  accuracyPage,
  orderRows,
  parseLines,
  replaceExcerpt,
  summaryTable,
  threeDigits,
} from '../../tools/accuracy/rows.mjs';

const row = (over) => ({
  package: 'core',
  vector: 'some-source',
  title: 'A handbook, Table 1',
  kind: 'published',
  capability: 'phase lags',
  compared: 'six rows',
  cases: 6,
  worst: 0.0698765,
  typical: 0.04,
  tolerance: 0.1,
  unit: 'degrees',
  ...over,
});

describe('threeDigits', () => {
  it.each([
    [0, '0'],
    [0.0698765, '0.0699'],
    [0.000123456, '0.000123'],
    [4.44089e-16, '4.44e-16'],
    [1e-9, '1e-9'],
    [12, '12.0'],
    [12345.6, '12300'],
    [1234567, '1.23e+6'],
    [-0.5, '-0.500'],
  ])('%d is written %s', (number, text) => {
    expect(threeDigits(number)).toBe(text);
  });
});

describe('orderRows', () => {
  it('goes by floor, then capability, whatever order the tests ran in', () => {
    const rows = [
      row({ package: 'tools' }),
      row({ package: 'fit' }),
      row({ capability: 'b' }),
      row({ capability: 'a' }),
    ];
    const wanted = ['core a', 'core b', 'fit phase lags', 'tools phase lags'];
    for (const given of [rows, [...rows].reverse()]) {
      const ordered = orderRows(given, ['core', 'fit']);
      expect(ordered.map((r) => `${r.package} ${r.capability}`)).toEqual(wanted);
    }
  });

  it('keeps one of two equal rows and refuses two that contradict each other', () => {
    expect(orderRows([row(), row()], ['core'])).toHaveLength(1);
    expect(() => orderRows([row(), row({ worst: 0.01 })], ['core'])).toThrowError(/two different/);
  });
});

describe('the page and the excerpt', () => {
  it('shows a row with its source, kind and bound', () => {
    const page = accuracyPage([row({ capability: 'a | b' })], []);
    expect(page).toContain('## core\n');
    expect(page).toContain(
      '| a \\| b | six rows: A handbook, Table 1 (published) | 6 | 0.0699 | 0.0400 | 0.100 | degrees |',
    );
    expect(page).toContain('## Long checks');
    expect(page).toContain('None is on record.');
  });

  it('shows long checks with their date', () => {
    expect(accuracyPage([], [row({ date: '2026-01-31' })])).toMatch(
      /\| core \| phase lags .* \| degrees \| 2026-01-31 \|/,
    );
  });

  it('takes one row a package: the headline, else the strongest kind, else the most cases', () => {
    const rows = [
      row({ capability: 'weak', kind: 'from-memory', cases: 1000 }),
      row({ capability: 'few' }),
      row({ capability: 'many', cases: 7 }),
      row({ package: 'fit', capability: 'main', kind: 'from-memory', headline: true }),
      row({ package: 'fit', capability: 'other' }),
    ];
    const lines = summaryTable(rows, ['core', 'fit', 'predict']).split('\n').slice(2);
    expect(lines.map((line) => line.split(' | ')[1])).toEqual(['many', 'main']);
  });

  it('replaces what stands between the marks, and refuses a page without them', () => {
    const page = 'a\n<!-- accuracy:begin -->\nold\n<!-- accuracy:end -->\nb\n';
    const once = replaceExcerpt(page, 'new');
    expect(once).toBe('a\n<!-- accuracy:begin -->\nnew\n<!-- accuracy:end -->\nb\n');
    expect(replaceExcerpt(once, 'new')).toBe(once);
    expect(() => replaceExcerpt('nothing', 'new')).toThrowError(/accuracy:begin/);
  });

  it('reads JSON lines', () => {
    expect(parseLines('{"a":1}\n{"a":2}\n')).toEqual([{ a: 1 }, { a: 2 }]);
  });
});

describe('recordLong', () => {
  it('replaces the older result of a comparison and dates it', () => {
    const folder = mkdtempSync(join(tmpdir(), 'long-'));
    const path = join(folder, 'long.json');
    const entry = row({ vector: 'phase-conversion', title: undefined, kind: undefined });
    recordLong(entry, { path, now: new Date('2026-01-30T12:00Z') });
    recordLong({ ...entry, worst: 0.05 }, { path, now: new Date('2026-01-31T12:00Z') });
    recordLong({ ...entry, capability: 'a' }, { path, now: new Date('2026-02-01T12:00Z') });
    const rows = readLong(path);
    expect(() => recordLong({ ...entry, worst: 0.2 }, { path })).toThrowError(/<= 0.1/);
    expect(() => recordLong({ ...entry, vector: 'none' }, { path })).toThrowError(/got none/);
    expect(readLong(path)).toEqual(rows);
    rmSync(folder, { recursive: true });
    expect(rows.map((r) => [r.capability, r.worst, r.date, r.kind])).toEqual([
      ['a', 0.0698765, '2026-02-01', 'published'],
      ['phase lags', 0.05, '2026-01-31', 'published'],
    ]);
  });

  it('is empty where nothing was kept', () => {
    expect(readLong(join(tmpdir(), 'no-such-folder', 'long.json'))).toEqual([]);
  });
});
