/** Two sets of constants side by side: the table for people and the CSV. The comparison is invented. */
import type { ComparedConstant, ConstantsComparison } from '@staithe/fit';
import { describe, expect, test } from 'vitest';
import { caution, comparisonCsv, comparisonText } from '../src/index.js';

type Row = [name: string, apart: number, h: [number, number], g: [number, number], disc?: number];

/** Millimetres; the disc is that of round errors, so the row is beyond them where it is beyond the disc. */
const rowOf = ([name, apart, h, g, disc]: Row): ComparedConstant => ({
  name,
  first: { amplitude: h[0] / 1000, phaseLag: g[0] },
  second: { amplitude: h[1] / 1000, phaseLag: g[1] },
  amplitudeChange: (h[1] - h[0]) / 1000,
  phaseLagChange: g[1] - g[0],
  distance: apart / 1000,
  ...(disc === undefined
    ? { errorsFrom: 'neither' as const }
    : {
        sigma: disc / 2448,
        radius95: disc / 1000,
        exceeds: apart > disc,
        errorsFrom: 'both' as const,
      }),
});

const ROWS: readonly Row[] = [
  ['M2', 48, [1482, 1454], [93.1, 94.6], 9],
  ['K1', 12, [73, 79], [112.6, 120.2], 5.7],
  ['S2', 6, [512, 509], [128.4, 127.8], 8.8],
  ['O1', 0.4, [66, 66.4], [359.97, 0.2], 5.7],
  ['T2', 0.3, [30, 30], [122.2, 122.7]],
];

const invented = (more: Partial<ConstantsComparison> = {}): ConstantsComparison => ({
  rows: ROWS.map(rowOf),
  onlyFirst: [],
  onlySecond: [],
  notResolved: [],
  rootSumSquare: 0.0352,
  largest: { name: 'M2', distance: 0.048 },
  exceeding: 2,
  judged: 4,
  byChance: 0.2,
  significance: 0.05,
  meanLevelChange: -0.042,
  meanLevelSigma: 0.006,
  warnings: [],
  ...more,
});

const NAMES = { first: 'Quenby Haven, 2011', second: 'Quenby Haven, 2031' };
const textOf = (more: Partial<ConstantsComparison> = {}): string =>
  comparisonText(invented(more), NAMES);
/** What a label says, lines joined. */
const saidBy = (label: string, text: string): string =>
  new RegExp(`^${label} +(.*(?:\\n {10}.*)*)`, 'm').exec(text)?.[1]?.replace(/\n {10}/g, ' ') ?? '';

describe('comparisonText', () => {
  const lines = textOf().split('\n');
  const rows = lines.filter((line) => /^ {2}\w/.test(line));

  test('names both sets, groups by species, the furthest apart first', () => {
    expect(lines.slice(0, 3)).toEqual([
      'first     Quenby Haven, 2011',
      'second    Quenby Haven, 2031',
      '',
    ]);
    const shown = lines.slice(3, 10).map((line) => line.trim().split('  ')[0]?.trim());
    expect(shown).toEqual(['TWICE A DAY', 'M2', 'S2', 'T2', 'ONCE A DAY', 'K1', 'O1']);
  });

  test('columns stand under their heads and no line but the caution is longer than 92', () => {
    const head = lines[3] as string;
    expect(head).toContain('H, mm');
    for (const row of rows) {
      expect(row.slice(0, head.indexOf('apart, mm') + 9)).toMatch(/\d$/);
      expect(row.slice(0, head.indexOf('disc, mm') + 8)).toMatch(/(\d|–)$/);
      expect(row.slice(head.indexOf('errors'))).toMatch(/^(allow it|do not allow it|not stated)$/);
    }
    for (const line of lines.slice(0, -1)) expect([...line].length).toBeLessThanOrEqual(92);
  });

  test('a row says from where to where, and what the errors say', () => {
    expect(rows[0]).toBe(
      '  M2    ████████████         48       9.0    1482 → 1454     93.1 → 94.6    do not allow it',
    );
    expect(rows[1]).toContain(' 512 → 509  ');
    expect(rows[1]?.endsWith('   allow it')).toBe(true);
    expect(rows[2]?.endsWith(' – ')).toBe(false);
    expect(rows[2]?.endsWith('   not stated')).toBe(true);
    // 359.97° reads 0.0, as in the table of constants.
    expect(rows[4]).toContain('  0.0 → 0.2');
  });

  test('bars are to scale, in eighths of a character', () => {
    const eighths = (row: string | undefined): number =>
      [...(row ?? '')].reduce(
        (sum, c) => sum + (c === '█' ? 8 : Math.max(0, '▏▎▍▌▋▊▉'.indexOf(c) + 1)),
        0,
      );
    expect(rows.map(eighths)).toEqual([96, 12, 1, 24, 1]);
  });

  test('two sets that agree to the last digit have no bars', () => {
    const same = invented({ rows: [rowOf(['M2', 0, [1482, 1482], [93.1, 93.1]])] });
    const text = comparisonText(same, NAMES);
    expect(text).toMatch(/\n {2}M2 {24}0\.0 /);
    expect(text).not.toMatch(/[█▏]/);
  });

  test('below stands what the tides differ by, the judgement and the level', () => {
    const text = textOf();
    expect(saidBy('differ', text)).toBe('35 mm typical in height, from 5 lines; most in M2: 48 mm');
    expect(saidBy('judged', text)).toBe(
      '2 of 4 lines stand further apart than errors allow; chance alone would bring 5 %, about 0.2',
    );
    expect(saidBy('level', text)).toBe('mean level −42 ± 6 mm from first to second');
    expect(saidBy('apart', text)).toContain('within the disc in 95 of 100');
    for (const label of ['only in', 'left out', 'note']) expect(saidBy(label, text)).toBe('');
  });

  test('one line, another share, no error of the level', () => {
    const text = textOf({
      exceeding: 1,
      judged: 1,
      byChance: 0.001,
      significance: 0.001,
      meanLevelSigma: undefined,
    });
    expect(saidBy('judged', text)).toBe(
      '1 of 1 line stands further apart than errors allow; chance alone would bring 0.1 %, about 0.0',
    );
    expect(saidBy('level', text)).toBe('mean level −42 mm from first to second');
  });

  test('what could not be compared is said with its reason', () => {
    const text = textOf({
      onlyFirst: ['R2', 'L2'],
      onlySecond: ['M6'],
      notResolved: ['S1'],
      judged: 0,
      meanLevelChange: undefined,
      meanLevelReason: 'neither set names a datum',
      warnings: [
        { code: 'BORROWED', message: 'borrowed in a set' },
        { code: 'NO_NODAL_MODEL', message: 'the second set has no nodal model' },
      ],
    });
    expect(saidBy('only in', text)).toBe('first: R2, L2; second: M6');
    expect(saidBy('left out', text)).toBe('S1 (0 in a set: not resolved there)');
    expect(saidBy('judged', text)).toBe('none of 5 lines: neither set states errors');
    expect(saidBy('level', text)).toBe('not compared: neither set names a datum');
    expect(text).toContain('\nnote      borrowed in a set\n');
    expect(text).toContain('\nnote      the second set has no nodal model\n');
    // Codes are for programs.
    expect(text).not.toMatch(/[A-Z]_[A-Z]/);
  });

  test('it ends with the caution', () => {
    expect(textOf().endsWith(`\n${caution('levels')}`)).toBe(true);
  });

  test('texts of others hold no control code; a name that is missing is refused', () => {
    const nasty = '\u001b[31mRed\u001b[2J\u009b1mX\u0007\u001b]0;title\u0007\u202egnol\r\nend';
    const comparison = invented({
      onlyFirst: [nasty],
      notResolved: [nasty],
      meanLevelChange: undefined,
      meanLevelReason: `counted from ${nasty}`,
      warnings: [{ code: 'BORROWED', message: nasty }],
    });
    const text = comparisonText(comparison, { first: nasty, second: nasty });
    expect(text).toContain('Red');
    expect(text).not.toMatch(
      // eslint-disable-next-line no-control-regex -- control codes are what is looked for
      /[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069]|\[31m/,
    );
    for (const [first, code] of [
      ['', 'MISSING'],
      [undefined as never, 'WRONG_TYPE'],
    ] as const) {
      expect(() => comparisonText(invented(), { first, second: 'b' })).toThrow(
        expect.objectContaining({ code, path: 'names.first' }),
      );
    }
    const strange = invented({ rows: [rowOf([nasty, 1, [1, 1], [0, 0]])] });
    expect(() => comparisonText(strange, NAMES)).toThrow(
      expect.objectContaining({ code: 'UNKNOWN_CONSTITUENT' }),
    );
  });
});

describe('comparisonCsv', () => {
  const table = comparisonCsv(invented())
    .trimEnd()
    .split('\n')
    .map((line) => line.split(','));

  test('a head with units, then numbers with an ASCII minus, the furthest apart first', () => {
    expect(table[0]).toEqual([
      ...['line', 'H_first_m', 'H_second_m', 'H_change_m'],
      ...['G_first_deg', 'G_second_deg', 'G_change_deg'],
      ...['apart_m', 'apart_sigma_m', 'disc95_m', 'errors_from', 'beyond_errors'],
    ]);
    expect(table[1]).toEqual([
      ...['M2', '1.482000', '1.454000', '-0.028000', '93.1000', '94.6000', '1.5000'],
      ...['0.048000', '0.003676', '0.009000', 'both', 'true'],
    ]);
    expect(table.slice(1).map(([name]) => name)).toEqual(['M2', 'K1', 'S2', 'O1', 'T2']);
  });

  test('what is not known is an empty cell', () => {
    expect(table[5]?.slice(-4)).toEqual(['', '', 'neither', '']);
    expect(table.every((cells) => cells.length === 12)).toBe(true);
  });
});
