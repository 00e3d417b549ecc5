import { beforeAll, describe, expect, it } from 'vitest';
import { useCommand } from './command.js';
import { CONSTANTS_JSON, recordCsv } from './inputs.js';

const { run, put } = useCommand();
beforeAll(() => {
  put('constants.json', CONSTANTS_JSON);
  put('record.csv', recordCsv());
  put('empty.json', '');
  put('feet.json', CONSTANTS_JSON.replace('"unit":"m"', '"unit":"ft"'));
  put('empty.csv', '');
  // Every fiftieth sample comes a minute late.
  const late = recordCsv().replace(
    /^(.*?:\d)\d(,)/gm,
    (line, head: string, tail: string, at: number) => (at % 50 === 0 ? `${head}1${tail}` : line),
  );
  put('uneven.csv', late);
  put('nozone.csv', 'time,height_m\n2031-01-01 00:00,1.2\n');
});

const ASKED = [
  ...['check', 'fit', 'currents', 'predict', 'table', 'levels', 'windows', 'compare', 'report'],
];

describe.concurrent('help', () => {
  it.each(ASKED)('%s says what you have, ask and get, and one line to try', async (name) => {
    const { code, out, err } = await run([name, '--help']);
    expect(code).toBe(0);
    expect(err).toBe('');
    const lines = out.split('\n');
    expect(lines[0]).toMatch(new RegExp(`^staithe ${name}: .*\\?$`));
    expect(lines.slice(1, 5).map((line) => line.slice(0, 13).trim())).toEqual([
      'you have',
      'you ask',
      'you get',
      'try',
    ]);
    expect(lines[4]).toContain(`staithe ${name} `);
    for (const [flag] of out.matchAll(/^ {2}-\w(?= |,)/gm)) expect(flag.trim()).toBe('-h');
    expect(out).toContain('--json');
  });
  it('lists the questions', async () => {
    const { code, out } = await run(['--help']);
    expect(code).toBe(0);
    for (const name of ASKED) expect(out).toMatch(new RegExp(`\\n {2}${name} +.*\\?\\n`));
  });
  it('has a version, and wants a command', async () => {
    expect((await run(['--version'])).out).toMatch(/^\d+\.\d+\.\d+\n$/);
    const nothing = await run([]);
    expect(nothing.code).toBe(2);
    expect(nothing.err).toContain('you ask');
  });
});

/** Calls, the exit code, the code of the failure, and what the one line begins with. */
const WRONG: readonly (readonly [readonly string[], number, string, string])[] = [
  [['paint'], 2, 'UNKNOWN_COMMAND', 'paint: expected a command listed by --help'],
  [['fit'], 2, 'WRONG_CALL', 'RECORD: expected a file or -, got nothing'],
  [['fit', 'a.csv', 'b.csv'], 2, 'WRONG_CALL', 'arguments: expected one file or -, got more'],
  [['fit', 'gone.csv'], 2, 'NO_SUCH_FILE', 'gone.csv: expected a file, got none by this name'],
  [['predict', '.'], 2, 'NOT_READABLE', '.: expected a file that can be read, got a folder'],
  [
    ['predict', 'constants.json', '--frm', '2031-06-01'],
    2,
    'UNKNOWN_OPTION',
    '--frm: expected an option listed by --help, got another (near: --from)',
  ],
  [
    ['predict', 'constants.json', '-z', 'UTC'],
    2,
    'UNKNOWN_OPTION',
    '-z: expected an option listed by --help',
  ],
  [
    ['predict', 'constants.json', '--every', '6'],
    2,
    'OUT_OF_RANGE',
    '--every: expected a time of a second or more like 6min, 1h or 30s, got "6"',
  ],
  [
    ['predict', 'constants.json', '--every', '0.5s'],
    2,
    'OUT_OF_RANGE',
    '--every: expected a time of a second or more',
  ],
  [
    ['predict', 'constants.json', '--from'],
    2,
    'WRONG_CALL',
    '--from: expected a value after it, got nothing',
  ],
  [
    ['predict', 'constants.json', '--from', '1 June'],
    2,
    'BAD_TIME',
    '--from: expected date, time and zone like',
  ],
  [
    ['predict', 'constants.json', '--from', '2031-06-02', '--until', '2031-06-01'],
    2,
    'EMPTY_SPAN',
    '--until: expected a time after --from',
  ],
  [
    ['predict', 'constants.json', '--zone', 'Mars/Base'],
    2,
    'UNKNOWN_CHOICE',
    '--zone: expected an IANA zone like Europe/Lisbon, UTC or an offset like +02:00, got "Mars/Base"',
  ],
  [
    ['predict', 'constants.json', '--zone', 'Europe/Lisbon', '--from', '2031-10-26T01:30'],
    2,
    'AMBIGUOUS_TIME',
    '--from: expected a local time that occurs once in Europe/Lisbon',
  ],
  [
    ['predict', 'constants.json', '--zone', 'Europe/Lisbon', '--from', '2031-03-30T01:30'],
    2,
    'SKIPPED_TIME',
    '--from: expected a local time that occurs once in Europe/Lisbon',
  ],
  [
    ['windows', 'constants.json'],
    2,
    'MISSING',
    '--above: expected --above or --below, got neither',
  ],
  [
    ['windows', 'constants.json', '--above', 'high'],
    2,
    'BAD_NUMBER',
    '--above: expected metres from -100 to 100, got "high"',
  ],
  [
    ['table', 'constants.json', '--month', '2031-13'],
    2,
    'BAD_TIME',
    '--month: expected a month like 2031-06',
  ],
  [
    ['levels', 'constants.json', '--from', '2031-01-01'],
    2,
    'WRONG_CALL',
    '--until: expected both --from and --until, got one',
  ],
  [
    ['levels', '-', '--record', '-'],
    2,
    'WRONG_CALL',
    '-: expected standard input for one file only',
  ],
  [
    ['levels', 'constants.json', '--from', '2031-01-01', '--until', '2033-01-01'],
    2,
    'OUT_OF_RANGE',
    '--from and --until: expected 19 years',
  ],
  [
    ['fit', 'record.csv', '--latitude', '95', '--place', 'X'],
    2,
    'OUT_OF_RANGE',
    '--latitude: expected degrees from -90 to 90, got "95"',
  ],
  [
    ['fit', 'record.csv', '--latitude', '45'],
    2,
    'MISSING',
    '--place: expected a name beside the position, got nothing',
  ],
  [
    ['fit', 'record.csv', '--unit', 'yards'],
    2,
    'UNKNOWN_CHOICE',
    '--unit: expected m, cm, mm or ft, got "yards"',
  ],
  [
    ['fit', 'record.csv', '--unit', 'cm'],
    2,
    'CONFLICT',
    '--unit: expected m as the header says, got cm',
  ],
  [
    ['fit', 'record.csv', '--value-column', 'depth'],
    2,
    'UNKNOWN_COLUMN',
    '--value-column: expected one of the columns',
  ],
  [
    ['fit', 'record.csv', '--constituents', 'M2,XX9'],
    2,
    'UNKNOWN_CONSTITUENT',
    '--constituents[1]: expected the name of a constituent',
  ],
  [
    ['fit', 'record.csv', '--weighting', 'robust'],
    2,
    'UNKNOWN_CHOICE',
    '--weighting: expected equal or resistant, got "robust"',
  ],
  [
    ['fit', 'record.csv', '--cutoff', '4'],
    2,
    'CONFLICT',
    '--cutoff: expected --weighting resistant beside it, got nothing',
  ],
  [
    ['report', 'record.csv', '--weighting', 'equal', '--curve', 'huber'],
    2,
    'CONFLICT',
    '--curve: expected --weighting resistant beside it, got equal',
  ],
  [
    ['fit', 'record.csv', '--weighting', 'resistant', '--cutoff', '0.1'],
    2,
    'OUT_OF_RANGE',
    '--cutoff: expected scales from 0.5 to 100, got "0.1"',
  ],
  [
    ['fit', 'record.csv', '--weighting', 'resistant', '--curve', 'square'],
    2,
    'UNKNOWN_CHOICE',
    '--curve: expected biweight or huber, got "square"',
  ],
  [
    ['fit', 'record.csv', '--error-model', 'guess'],
    2,
    'UNKNOWN_CHOICE',
    '--error-model: expected residual-spectrum, independent or redrawn, got "guess"',
  ],
  [
    ['fit', 'record.csv', '--draws', '50'],
    2,
    'CONFLICT',
    '--draws: expected --error-model redrawn beside it, got nothing',
  ],
  [
    ['fit', 'record.csv', '--error-model', 'independent', '--seed', '5'],
    2,
    'CONFLICT',
    '--seed: expected --error-model redrawn beside it, got independent',
  ],
  [
    ['fit', 'record.csv', '--redraw-by', 'phases'],
    2,
    'CONFLICT',
    '--redraw-by: expected --error-model redrawn beside it, got nothing',
  ],
  [
    ['fit', 'record.csv', '--error-model', 'redrawn', '--redraw-by', 'hand'],
    2,
    'UNKNOWN_CHOICE',
    '--redraw-by: expected phases or blocks, got "hand"',
  ],
  [
    ['fit', 'record.csv', '--error-model', 'redrawn', '--draws', '19'],
    2,
    'OUT_OF_RANGE',
    '--draws: expected a whole number from 20 to 10000, got "19"',
  ],
  [
    ['fit', 'record.csv', '--error-model', 'redrawn', '--seed', '1.5'],
    2,
    'OUT_OF_RANGE',
    '--seed: expected a whole number, got "1.5"',
  ],
  [
    ['fit', 'record.csv', '--error-model', 'redrawn', '--seed', 'luck'],
    2,
    'BAD_NUMBER',
    '--seed: expected a whole number, got "luck"',
  ],
  [
    ['fit', 'uneven.csv', '--error-model', 'redrawn', '--redraw-by', 'phases'],
    2,
    'CONFLICT',
    '--redraw-by: expected blocks for times of their own, got phases',
  ],
  [['fit', 'record.csv', '--write', '-'], 2, 'WRONG_CALL', '--write: expected the name of a file'],
  [
    ['fit', 'empty.csv'],
    1,
    'EMPTY_INPUT',
    'empty.csv: expected a header and lines of data, got nothing',
  ],
  [
    ['fit', 'nozone.csv'],
    1,
    'NO_TIME_ZONE',
    'nozone.csv, line 2, column "time": expected a zone in the times, in the header or in --time-zone',
  ],
  [
    ['predict', 'empty.json'],
    1,
    'INVALID_DOCUMENT',
    'empty.json: expected JSON, got an empty file',
  ],
  [['predict', 'record.csv'], 1, 'INVALID_DOCUMENT', 'record.csv: expected JSON, got'],
  [['predict', 'feet.json'], 1, 'UNKNOWN_UNIT', 'feet.json, unit: expected'],
];

describe.concurrent('wrong calls and data that say no', () => {
  it.each(WRONG)('%j leaves with %i, %s', async ([name, ...rest], exit, code, message) => {
    const { code: left, out, err } = await run([name as string, '--json', ...rest]);
    expect(left).toBe(exit);
    const { error } = JSON.parse(out);
    expect(error.code).toBe(code);
    expect(error.message).toContain(message);
    expect(error.message.startsWith(error.path)).toBe(true);
    expect(err).toBe(`${error.message}\n`);
    expect(err.trimEnd().split('\n')).toHaveLength(1);
  });
});
