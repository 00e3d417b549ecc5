/** Tables for people and CSV for programs. */
import { HOUR, uniformSeries } from '@staithe/core';
import { tideCurve } from '@staithe/predict';
import { describe, expect, test } from 'vitest';
import {
  caution,
  constantsCsv,
  constantsText,
  heightsCsv,
  levelsText,
  monthText,
  turningPointsCsv,
  windowsCsv,
  windowsText,
} from '../src/index.js';
import { inventedConstants, inventedRecord, inventedRungs } from './invented.js';

const constants = inventedConstants();

describe('constantsText', () => {
  const lines = constantsText(constants).split('\n');
  const rows = lines.filter((line) => line.startsWith('  '));
  test('a row for each constituent, grouped by species, largest first', () => {
    expect(rows.map((line) => line.trim().split(' ')[0])).toEqual([
      ...['M2', 'S2', 'N2', 'K2', 'NU2', 'MU2', '2N2', 'L2', 'T2', 'LAM2'],
      ...['K1', 'O1', 'P1', 'Q1', 'S1', 'J1', 'Sa', 'Ssa', 'Mf', 'Mm'],
      ...['M4', 'MS4', 'MN4', 'S4', 'M6', '2MS6', 'M3'],
    ]);
    expect(
      lines.filter((line) => !line.startsWith('  ')).map((line) => line.split('  ')[0]),
    ).toEqual([
      'TWICE A DAY',
      'ONCE A DAY',
      'SLOWER THAN A DAY',
      'FOUR TIMES A DAY',
      'SIX TIMES A DAY',
      'THREE TIMES A DAY',
    ]);
  });
  test('columns stand under their heads and no line is longer than 92', () => {
    const head = lines[0] as string;
    for (const [title, pattern] of [
      ['returns every', /(min| d)$/],
      ['H, mm', /\d$/],
      ['G, °', /\d\.\d$/],
      ['95 % disc, mm', /(\d|–)$/],
    ] as const) {
      const end = head.indexOf(title) + title.length;
      for (const row of rows) expect(row.slice(0, end)).toMatch(pattern);
    }
    for (const row of rows) {
      expect(row.slice(head.indexOf('grounds'))).toMatch(/^(firm|faint|borrowed from (S2|K1))$/);
      expect(row.length).toBeLessThanOrEqual(92);
    }
  });
  test('bars are to scale, in eighths of a character', () => {
    const eighths = (row: string | undefined): number =>
      [...(row ?? '')].reduce(
        (sum, c) => sum + (c === '█' ? 8 : Math.max(0, '▏▎▍▌▋▊▉'.indexOf(c) + 1)),
        0,
      );
    expect(eighths(rows[0])).toBe(96);
    expect(eighths(rows[1])).toBe(Math.round((512 / 1482) * 96));
    expect(eighths(rows[10])).toBe(Math.round((73 / 1482) * 96));
  });
  test('M2 returns every 12 h 25.2 min, K1 every 23 h 56.1 min (periods of the trade)', () => {
    expect(rows[0]).toContain('12 h 25.2 min');
    expect(rows[10]).toContain('23 h 56.1 min');
  });
  test('what was left out stands below with its reason', () => {
    const text = constantsText(constants, inventedRecord(20).diagnostics);
    expect(text).toContain('Left out: T2 (record too short beside S2 by 12 days)');
    expect(text).not.toContain('longer than 14.8 days');
  });
  test('an unknown constituent is refused with its name', () => {
    const bad = { ...constants, constituents: [{ name: 'M2x', amplitude: 1, phaseLag: 0 }] };
    expect(() => constantsText(bad)).toThrow(
      expect.objectContaining({ code: 'UNKNOWN_CONSTITUENT' }),
    );
  });
});

describe('monthText', () => {
  const curve = tideCurve(constants);
  const turningPoints = curve.turningPoints({ from: '2031-04-29T00:00Z', to: '2031-07-02T00:00Z' });
  const input = {
    place: 'Quenby Haven',
    turningPoints,
    month: '2031-06',
    timeZone: '+02:00',
    datum: 'chart datum',
  };
  const text = monthText(input);
  const days = text.split('\n').filter((line) => /^ ?(Mon|Tue|Wed|Thu|Fri|Sat|Sun) /.test(line));
  test('the head names place, month, unit, datum and zone', () => {
    expect(text.split('\n')[0]).toBe(
      'Quenby Haven   June 2031   heights in m above chart datum   UTC+02:00',
    );
  });
  test('thirty days, each mark at its time to the half hour, times in order', () => {
    expect(days).toHaveLength(30);
    for (const day of days) {
      const times = day.slice(63).match(/\d\d:\d\d/g) ?? [];
      const marks = [...day.matchAll(/[▲▼]/g)].map(({ index }) => (index - 10) / 2);
      expect(times.length).toBeGreaterThanOrEqual(3);
      expect(marks).toHaveLength(times.length);
      expect([...times].sort()).toEqual(times);
      times.forEach((time, i) => {
        const hours = Number(time.slice(0, 2)) + Number(time.slice(3)) / 60;
        // Half an hour a character; printed minutes are rounded to within half a minute.
        expect(marks[i] as number).toBeLessThanOrEqual(hours + 1 / 120);
        expect(marks[i] as number).toBeGreaterThan(hours - 0.5 - 1 / 120);
      });
    }
  });
  test('no range unless asked for, and then with its basis', () => {
    expect(text).not.toMatch(/range/i);
    const asked = monthText({ ...input, range: true });
    expect(asked).toContain('mean range today');
    expect(asked).toContain('Range: mean of the falls and rises that end on the day.');
  });
  test('the sky has a line of its own', () => {
    const sky = [{ date: '2031-06-05', moon: 'full' as const, note: 'Moon 11°S, perigee in 3 d' }];
    const lines = monthText({ ...input, sky }).split('\n');
    const at = lines.findIndex((line) => line.includes('Thu 5'));
    expect(lines[at]).toContain('○');
    expect(lines[at + 1]).toBe('   sky: Moon 11°S, perigee in 3 d');
  });
  test('two turning points within the same hour stay legible: the second moves right, its time does not', () => {
    const near = [
      { kind: 'high' as const, time: Date.UTC(2031, 5, 1, 4), height: 1.25 },
      { kind: 'low' as const, time: Date.UTC(2031, 5, 1, 4, 40), height: -1.24 },
    ];
    const day = monthText({ ...input, turningPoints: near, timeZone: 'UTC' }).split(
      '\n',
    )[2] as string;
    expect(day).toContain('........▲1.3▼−1.2');
    expect(day.endsWith('04:00  04:40')).toBe(true);
  });
  test('it ends with the caution', () => {
    expect(text.endsWith(caution('heights'))).toBe(true);
  });
  test.each(['2031', '2031-13', '2031-00', 'June', '1066-01', ''])(
    'month "%s" is refused',
    (month) => {
      expect(() => monthText({ ...input, month })).toThrow(
        expect.objectContaining({ code: 'BAD_TIME', path: 'month' }),
      );
    },
  );
});

describe('levelsText', () => {
  const lines = levelsText({ rungs: inventedRungs(), datum: 'chart datum' }).split('\n');
  const rowOf = (name: string): number => lines.findIndex((line) => line.includes(` ${name} `));
  test('rungs stand to scale where they do not crowd', () => {
    // 24 rows for 5.27 m from HAT to LAT.
    const perMetre = 24 / (5.21 + 0.06);
    expect(rowOf('MSL') - rowOf('MHW')).toBe(Math.round((4.09 - 2.612) * perMetre));
    expect(rowOf('MHWS') - rowOf('HAT')).toBe(Math.round(0.6 * perMetre));
  });
  test('where they crowd the pole says so', () => {
    expect(lines[rowOf('MSL') + 1]?.trim()).toBe('┊ 0.02');
    expect(lines).toContain('┊ longer than to scale');
  });
  test('a dashed rung says what is missing', () => {
    expect(lines[rowOf('MLW')]).toContain('╌┼╌ MLW');
    expect(lines[rowOf('NTDE')]).toBe(
      '      ? ╌┼╌ NTDE  missing: a full epoch of 19 years is needed, the record has 13 months',
    );
  });
  test('poles stand in one column', () => {
    for (const line of lines.slice(1, rowOf('NTDE') + 1)) expect([...line][9]).toMatch(/[┬┼┴│┊]/);
  });
  test('it ends with the caution', () => {
    expect(lines[lines.length - 1]).toBe(caution('levels'));
  });
});

describe('windowsText', () => {
  const base = { place: 'Quenby Haven', above: 4.2, timeZone: 'UTC', datum: 'chart datum' };
  const from = Date.UTC(2031, 5, 1, 23);
  test('ends on another day and ends beyond the span are named', () => {
    const windows = [
      { from: Date.UTC(2031, 5, 1), to: Date.UTC(2031, 5, 1, 2), openStart: true, openEnd: false },
      { from, to: from + 2 * HOUR, openStart: false, openEnd: true },
    ];
    const text = windowsText({ ...base, windows });
    expect(text).toContain(
      'Sun 1 Jun   before 00:00 to 02:00, 2 h 00 min   23:00 to beyond Mon 2 01:00, 2 h 00 min',
    );
    expect(text).toContain('2 windows, 4 h 00 min open together');
    expect(text.endsWith(caution('windows'))).toBe(true);
  });
  test('no window is said', () => {
    expect(windowsText({ ...base, windows: [] })).toContain('no window');
  });
});

describe('CSV', () => {
  const table = (text: string): string[][] =>
    text
      .trimEnd()
      .split('\n')
      .map((line) => line.split(','));
  test('constants: header, numbers, grounds', () => {
    const [head, first, ...rest] = table(constantsCsv(constants));
    expect(head).toEqual(['line', 'returns_every_h', 'H_m', 'G_deg', 'disc95_m', 'grounds']);
    // M2 at 28.9841042°/h (Schureman 1940, table 2): 12.4206012 h.
    expect(first).toEqual(['M2', '12.4206012', '1.482000', '93.1000', '0.006000', 'firm']);
    expect(rest).toHaveLength(constants.constituents.length - 1);
    expect(rest.find(([name]) => name === 'T2')).toEqual([
      'T2',
      expect.any(String),
      '0.030000',
      '122.2000',
      '',
      'borrowed from S2',
    ]);
  });
  test('heights: gaps are empty, minus is ASCII, no band no columns', () => {
    const series = uniformSeries({
      start: '2031-06-01T00:00Z',
      step: HOUR,
      values: [1.23456, null, -0.00001, -2],
    });
    expect(heightsCsv(series)).toBe(
      'instant_utc,height_m\n2031-06-01T00:00Z,1.2346\n2031-06-01T01:00Z,\n2031-06-01T02:00Z,0.0000\n2031-06-01T03:00Z,-2.0000\n',
    );
    const band = { low: [1, 1, 1, 1], high: [2, 2, 2, 2] };
    expect(heightsCsv(series, band).split('\n')[0]).toBe(
      'instant_utc,height_m,band95_low_m,band95_high_m',
    );
    expect(heightsCsv(series, band).split('\n')[1]).toBe('2031-06-01T00:00Z,1.2346,1.0000,2.0000');
    expect(() => heightsCsv(series, { low: [1], high: [2] })).toThrow(
      expect.objectContaining({ code: 'LENGTH_MISMATCH', path: 'band.low' }),
    );
  });
  test('turning points: a high water turns from rising', () => {
    const points = [
      { kind: 'high' as const, time: Date.UTC(2031, 5, 1, 6, 31, 12), height: 3.1 },
      { kind: 'low' as const, time: Date.UTC(2031, 5, 1, 12), height: -0.6 },
    ];
    expect(turningPointsCsv(points)).toBe(
      'turning_at_utc,turns_from,height_m\n2031-06-01T06:31:12Z,rising,3.1000\n2031-06-01T12:00Z,falling,-0.6000\n',
    );
    expect(
      turningPointsCsv(points, { atSigma: [30000, 61000] })
        .split('\n')
        .slice(0, 2),
    ).toEqual([
      'turning_at_utc,turns_from,height_m,at_sigma_s',
      '2031-06-01T06:31:12Z,rising,3.1000,30.0',
    ]);
    expect(() => turningPointsCsv(points, { atSigma: [1] })).toThrow(
      expect.objectContaining({ code: 'LENGTH_MISMATCH' }),
    );
  });
  test('windows', () => {
    expect(windowsCsv([])).toBe('opens_at_utc,closes_at_utc,open_min,cut_at_start,cut_at_end\n');
  });
});

test('an unknown caution is refused', () => {
  expect(() => caution('toString' as 'heights')).toThrow(
    expect.objectContaining({ code: 'UNKNOWN_CHOICE', path: 'kind' }),
  );
});
