import { angleDifference } from '@staithe/core';
import { caution } from '@staithe/report';
import { readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { useCommand } from './command.js';
import { currentsCsv, ELLIPSES, MEAN, PER_UNIT } from './currents-inputs.js';

const { run, put, path } = useCommand();
const NAMES = ['--constituents', 'M2,S2,K1,M4'];
const APART = ['--east', 'east (m/s)', '--north', 'north (m/s)'];
const TURNED = ['--speed', 'speed', '--towards', 'towards'];
const turned = (perUnit = 1, more: object = {}): string =>
  currentsCsv({ heads: ['speed', 'towards'], as: 'directions', perUnit, ...more });

beforeAll(() => {
  put('sound.csv', currentsCsv());
  put('turned.csv', turned());
  put('directions.csv', currentsCsv({ heads: ['speed_kn', 'towards'], as: 'directions' }));
  put('empty.csv', '');
  put('short.csv', currentsCsv().split('\n').slice(0, 2).join('\n'));
});

interface Result {
  readonly constants: { mean: { east: number; north: number }; east: unknown[]; unit: string };
  readonly ellipses: readonly {
    name: string;
    major: number;
    minor: number;
    turning: string;
    bearing: number;
    phaseLag: number;
    radius95: number;
  }[];
  readonly record: Record<string, unknown>;
  readonly [key: string]: unknown;
}

/** Within the 95 % region of the fit, which is one of four dimensions and so wider than that of a length alone. */
function expectEllipses({ ellipses, constants }: Result): void {
  expect(ellipses.map(({ name }) => name).sort()).toEqual(ELLIPSES.map(({ name }) => name).sort());
  for (const want of ELLIPSES) {
    const got = ellipses.find(({ name }) => name === want.name) as Result['ellipses'][number];
    expect(got.turning).toBe(want.turning);
    // √(9.49·2/1080)·20 mm/s is 2.7 mm/s; Student's factor of some 8 bins makes it 3.1.
    expect(got.radius95).toBeLessThan(0.004);
    expect(Math.abs(got.major - want.major)).toBeLessThan(got.radius95);
    expect(Math.abs(got.minor - want.minor)).toBeLessThan(got.radius95);
    const across = (degrees: number): number => (Math.abs(degrees) * Math.PI * want.major) / 180;
    expect(across(got.bearing - want.bearing)).toBeLessThan(2 * got.radius95);
    expect(across(angleDifference(got.phaseLag, want.phaseLag))).toBeLessThan(2 * got.radius95);
  }
  // 2155 samples of noise with 1.2 cm/s: 0.25 mm/s; four times that.
  expect(Math.abs(constants.mean.east - MEAN.east)).toBeLessThan(0.001);
  expect(Math.abs(constants.mean.north - MEAN.north)).toBeLessThan(0.001);
}

const resultOf = async (args: readonly string[], stdin?: string): Promise<Result> => {
  const { code, out, err } = await run(['currents', ...args, ...NAMES, '--json'], stdin);
  expect(err).toBe('');
  expect(code).toBe(0);
  return JSON.parse(out) as Result;
};

describe.concurrent('currents', () => {
  it('prints what was read, held and left over, and the ellipses', async () => {
    const place = ['--place', 'Quenby Sound', '--write', 'sound.json'];
    const { code, out } = await run(['currents', 'sound.csv', ...APART, ...NAMES, ...place]);
    expect(code).toBe(0);
    expect(out).toMatch(/^read {6}2\u00a0155 of 2\u00a0160 pairs, 5 missing in 1 gap\n/);
    expect(out).toMatch(/\nfound {5}times UTC, east and north in m\/s\n/);
    expect(out).toMatch(/\nheld {6}4 lines: 4 firm\n/);
    // Uniform noise of 4 cm/s from end to end in both: √2 · 4/√12 cm/s, at most √2 · 2.
    expect(out).toMatch(/\nnot tide {2}1\.6 cm\/s typical, 2\.[78] cm\/s worst \(2030-0\d-/);
    expect(out).toMatch(/\n {2}M2 {4}█{10} {4} 1\d\d\.\d +\d\d\.\d {2}left +4[67]\.\d +9[23]\.\d/);
    expect(out).toMatch(/\nmean {6}10\.\d cm\/s towards 21\d°, 95 % disc of /);
    expect(out).toMatch(/\naxis {6}47° and 227°, 9\d % of what varies\n/);
    expect(out).toContain(`\n${caution('currents')}\n`);
    expect(out).toMatch(/\nwrote {5}sound\.json\n$/);
    const document = JSON.parse(readFileSync(path('sound.json'), 'utf8'));
    expect(document).toMatchObject({
      format: 'staithe-constants',
      quantity: 'current',
      unit: 'm/s',
      place: { name: 'Quenby Sound' },
      source: 'fitted to sound.csv',
    });
    expect(document.east).toHaveLength(4);
  });

  it('gives the same as JSON', async () => {
    const json = await resultOf(['sound.csv', ...APART]);
    expect(Object.keys(json)).toEqual([
      ...['constants', 'ellipses', 'principalAxis', 'diagnostics', 'warnings', 'notTide'],
      ...['record', 'caution'],
    ]);
    expectEllipses(json);
    expect(json.record).toMatchObject({
      pairs: 2160,
      read: 2155,
      missing: 5,
      gaps: 1,
      unit: 'm/s',
      timeZone: 'UTC',
    });
  });

  it.each([
    [
      'components in cm/s, said by the columns',
      'components',
      'cm/s',
      ['east_cm_s', 'north_cm_s'],
      [],
    ],
    ['components in knots', 'components', 'kn', ['east', 'north'], ['--unit', 'kn']],
    ['directions in cm/s', 'directions', 'cm/s', ['Speed (cm/s)', 'Dir (deg)'], []],
    ['directions in knots', 'directions', 'kn', ['speed, knots', 'towards'], []],
    ['directions in m/s', 'directions', 'm/s', ['v', 'd'], ['--unit', 'm/s']],
  ] as const)('reads %s', async (_, as, unit, [one, other], more) => {
    const heads = [`"${one}"`, `"${other}"`] as const;
    const csv = currentsCsv({ heads, as, perUnit: PER_UNIT[unit] });
    const flags = as === 'components' ? ['--east', '--north'] : ['--speed', '--towards'];
    const columns = [flags[0] as string, one, flags[1] as string, other];
    const json = await resultOf(['-', ...columns, ...more], csv);
    expect(json.record['unit']).toBe(unit);
    expectEllipses(json);
  });

  it('takes a stream that stands still without direction, and marks of what is missing as gaps', async () => {
    const change = (cells: [string, string], i: number): [string, string] => {
      if (i === 100) return ['0', ''];
      if (i === 200) return ['999', '99'];
      if (i === 300) return ['9999.9', '120'];
      if (i === 400) return [cells[0], '999'];
      return i === 600 ? ['', '40'] : cells;
    };
    const csv = turned(100, { change });
    const json = await resultOf(['-', ...TURNED, '--unit', 'cm/s'], csv);
    // Two marks among speeds, one among directions, one empty speed, and the five that are not there.
    expect(json.record).toMatchObject({ read: 2151, missing: 9 });
    expectEllipses(json);
  });

  it('keeps 99 and 99.9, which are speeds and directions', async () => {
    const change = (cells: [string, string], i: number): [string, string] =>
      i % 500 === 7 ? ['99', '99.9'] : cells;
    const json = await resultOf(
      ['-', ...TURNED, '--unit', 'cm/s', '--weighting', 'resistant'],
      turned(100, { change }),
    );
    expect(json.record['read']).toBe(2155);
    // Five strange pairs, each far from the tide at its time.
    expect(json['resistant']).toMatchObject({ curve: 'biweight', doubted: 5 });
    expectEllipses(json);
  });

  it('says how many pairs were doubted', async () => {
    const spikes = (cells: [string, string], i: number): [string, string] =>
      i % 700 === 5 ? ['4', cells[1]] : cells;
    const csv = currentsCsv({ change: spikes });
    const call = ['currents', '-', ...APART, ...NAMES, '--weighting', 'resistant'];
    const { out } = await run(call, csv);
    expect(out).toMatch(/\ndoubted {3}4 pairs of less than half weight, 4 of none\n/);
  });

  it('borrows, and leaves predict to refuse what is no height', async () => {
    const rule = ['--borrow', 'K2:S2:0.27:3.5'];
    const { out } = await run(['currents', 'sound.csv', ...APART, ...NAMES, ...rule, '--json']);
    expect(JSON.parse(out).ellipses.at(-1)).toMatchObject({ name: 'K2', borrowedFrom: 'S2' });
    const refused = await run(['predict', '-', '--from', '2031-06-01'], out);
    expect(refused.code).toBe(1);
    expect(refused.err).toMatch(/^standard input, .*: expected .*height/);
  });

  it('never prints control codes of a place or a column', async () => {
    const nasty = '\u001b[31mRed\u202egnol';
    const csv = currentsCsv({ heads: [nasty, 'north'] });
    const columns = ['--east', nasty, '--north', 'north', '--unit', 'm/s', '--place', nasty];
    for (const call of [
      [...columns, ...NAMES],
      [...columns, ...NAMES, '--json'],
      columns.slice(0, 4),
    ]) {
      const { out, err } = await run(['currents', '-', ...call], csv);
      // eslint-disable-next-line no-control-regex -- control codes are what is looked for
      expect(out + err).not.toMatch(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u202a-\u202e]/);
    }
  });
});

/** Calls, the exit code, the code of the failure, and what the one line begins with. */
const WRONG: readonly (readonly [readonly string[], number, string, string])[] = [
  [
    ['sound.csv'],
    2,
    'MISSING',
    '--east: expected --east and --north, or --speed and --towards, got none of them',
  ],
  [
    ['sound.csv', '--north', 'north (m/s)'],
    2,
    'MISSING',
    '--east: expected a column beside --north, got none',
  ],
  [
    ['turned.csv', '--speed', 'speed'],
    2,
    'MISSING',
    '--towards: expected a column beside --speed, got none',
  ],
  [
    ['sound.csv', ...APART, '--speed', 'speed'],
    2,
    'CONFLICT',
    '--speed: expected it without --east, got both',
  ],
  [
    ['turned.csv', '--speed', 'speed', '--towards', 'speed'],
    2,
    'DUPLICATE',
    '--towards: expected another column than --speed, got the same',
  ],
  [['sound.csv', '--east', ' ', '--north', 'n'], 2, 'MISSING', '--east: expected a text, got " "'],
  [
    ['sound.csv', '--east', 'u', '--north', 'v', '--unit', 'm/s'],
    2,
    'UNKNOWN_COLUMN',
    '--east: expected one of the columns "Time (UTC)", "east (m/s)", "north (m/s)", got "u"',
  ],
  [
    ['turned.csv', '--speed', 'speed', '--towards', 'dir', '--unit', 'm/s'],
    2,
    'UNKNOWN_COLUMN',
    '--towards: expected one of the columns',
  ],
  [
    ['turned.csv', ...TURNED],
    2,
    'MISSING',
    '--unit: expected m/s, cm/s or kn since "speed" names no unit, got nothing',
  ],
  [
    ['turned.csv', ...TURNED, '--unit', 'mph'],
    2,
    'UNKNOWN_CHOICE',
    '--unit: expected m/s, cm/s or kn, got "mph"',
  ],
  [
    ['sound.csv', ...APART, '--unit', 'kn'],
    2,
    'CONFLICT',
    '--unit: expected m/s as the column "east (m/s)" says, got kn',
  ],
  [
    ['sound.csv', '--east', 'east (m/s)', '--north', 'north (cm/s)'],
    2,
    'CONFLICT',
    '--north: expected a column in m/s as the other one, got "north (cm/s)"',
  ],
  [
    ['sound.csv', ...APART, '--error-model', 'redrawn'],
    2,
    'UNKNOWN_CHOICE',
    '--error-model: expected residual-spectrum or independent, got "redrawn"',
  ],
  [
    ['sound.csv', ...APART, '--cutoff', '5'],
    2,
    'CONFLICT',
    '--cutoff: expected --weighting resistant beside it, got nothing',
  ],
  [
    ['sound.csv', ...APART, '--steps', '2030-01-05'],
    2,
    'UNKNOWN_OPTION',
    '--steps: expected an option listed by --help',
  ],
  [
    ['sound.csv', ...APART, '--constituents', 'M2,XX9'],
    2,
    'UNKNOWN_CONSTITUENT',
    '--constituents[1]: expected the name of a constituent',
  ],
  [['gone.csv', ...APART], 2, 'NO_SUCH_FILE', 'gone.csv: expected a file, got none by this name'],
  [['empty.csv', ...APART], 1, 'EMPTY_INPUT', 'empty.csv: expected a header and lines of data'],
  [['short.csv', ...APART], 1, 'TOO_FEW_SAMPLES', 'expected'],
  [
    ['sound.csv', ...APART, '--write', 'sound.csv', '--replace'],
    2,
    'OVER_INPUT',
    'sound.csv: expected another file than the one read',
  ],
];

describe.concurrent('currents, wrong calls and data that say no', () => {
  it.each(WRONG)('%j leaves with %i, %s', async (args, exit, code, message) => {
    const { code: left, out, err } = await run(['currents', '--json', ...args]);
    expect(left).toBe(exit);
    const { error } = JSON.parse(out);
    expect([error.code, error.message.slice(0, message.length)]).toEqual([code, message]);
    expect(error.message.startsWith(error.path)).toBe(true);
    expect(err).toBe(`${error.message}\n`);
  });

  it.each([
    [
      'a speed below 0',
      { change: (cells: [string, string], i: number) => (i === 3 ? ['-0.2', '40'] : cells) },
      'OUT_OF_RANGE',
      'standard input, column "speed": expected speeds of 0 or more, got -0.2 at 2030-01-01T01:30Z',
    ],
    [
      'a direction beyond 360°',
      { change: (cells: [string, string], i: number) => (i === 3 ? ['0.2', '361'] : cells) },
      'OUT_OF_RANGE',
      'standard input, column "towards": expected degrees from 0 to 360, got 361 at 2030-01-01T01:30Z',
    ],
    [
      'a word',
      { change: (cells: [string, string], i: number) => (i === 3 ? ['0.2', 'north'] : cells) },
      'BAD_NUMBER',
      'standard input, line 5, column "towards": expected a number or a gap, got "north"',
    ],
  ] as const)('refuses %s', async (_, more, code, message) => {
    const call = ['currents', '-', ...TURNED, '--unit', 'm/s', '--json'];
    const { code: left, out } = await run(call, turned(1, more));
    expect(left).toBe(1);
    const { error } = JSON.parse(out);
    expect([error.code, error.message]).toEqual([code, message]);
  });

  it('refuses two directions at one time, in terms of no height', async () => {
    const [head, first = '', ...rest] = turned().split('\n');
    const twice = first.replace(/[^,]+$/, '12');
    const call = ['currents', '-', ...TURNED, '--unit', 'm/s'];
    const { code, err } = await run(call, [head, first, twice, ...rest].join('\n'));
    expect(code).toBe(1);
    expect(err).toMatch(
      /^standard input, line 3: expected [\d.]+ at 2030-01-01T00:00Z as on line 2, got 12\n$/,
    );
  });
});
