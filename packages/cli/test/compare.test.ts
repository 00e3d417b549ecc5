import { caution } from '@staithe/report';
import { readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { useCommand } from './command.js';
import { CONSTANTS, recordCsv } from './inputs.js';

const { run, put, path } = useCommand();
const sure = { amplitudeSigma: 0.002, phaseLagSigma: 0.2 };
const EARLIER = {
  ...CONSTANTS,
  record: { from: '2011-01-01T00:00Z', to: '2012-01-01T00:00Z', samples: 8760 },
  constituents: CONSTANTS.constituents.map((own) => ({ ...own, ...sure })),
};
// M2 grows by 50 mm and comes 2° later; the rest stays.
const LATER = {
  ...CONSTANTS,
  meanLevel: 2.45,
  record: { from: '2031-01-01T00:00Z', to: '2032-01-01T00:00Z', samples: 8760 },
  constituents: [
    { name: 'M2', amplitude: 1.25, phaseLag: 95, ...sure },
    ...EARLIER.constituents.slice(1, 5),
    { name: 'N2', amplitude: 0.2, phaseLag: 70 },
  ],
};
beforeAll(() => {
  put('earlier.json', JSON.stringify(EARLIER));
  put('later.json', JSON.stringify(LATER));
  put('elsewhere.json', JSON.stringify({ ...LATER, constituents: LATER.constituents.slice(5) }));
  put('strange.json', JSON.stringify(EARLIER).replace('"S2"', '"S2x"'));
  put('quenby.csv', recordCsv());
});

describe.concurrent('compare', () => {
  it('prints how far apart the lines stand and whether errors allow it', async () => {
    const { code, out, err } = await run(['compare', 'earlier.json', 'later.json']);
    expect(code).toBe(0);
    expect(err).toBe('');
    expect(out).toMatch(
      /^first {5}Quenby Haven, 2011-01-01 to 2012-01-01 \(earlier\.json\)\nsecond {4}Quenby Haven, 2031-01-01 to 2032-01-01 \(later\.json\)\n/,
    );
    expect(out).toMatch(/\n {2}M2 .* 1200 → 1250 +93\.0 → 95\.0 +do not allow it\n/);
    expect(out).toMatch(/\njudged {4}1 of 5 lines stands /);
    expect(out).toMatch(/\nlevel {5}mean level \+50 mm from first to second\n/);
    expect(out).toMatch(/\nonly in {3}first: Ssa; second: N2\n/);
    expect(out).toContain(caution('levels'));
  });

  it('gives the same as JSON', async () => {
    const { code, out } = await run(['compare', 'earlier.json', 'later.json', '--json']);
    expect(code).toBe(0);
    const json = JSON.parse(out);
    expect(json).toMatchObject({
      first: {
        file: 'earlier.json',
        place: { name: 'Quenby Haven' },
        datum: 'chart datum',
        nodalModel: 'potential',
        record: EARLIER.record,
      },
      second: { file: 'later.json' },
      unit: 'm',
      onlyFirst: ['Ssa'],
      onlySecond: ['N2'],
      exceeding: 1,
      judged: 5,
      significance: 0.05,
      warnings: [],
      caution: caution('levels'),
    });
    // The law of cosines.
    const square = 1.2 * 1.2 + 1.25 * 1.25 - 2 * 1.2 * 1.25 * Math.cos((2 * Math.PI) / 180);
    expect(Math.abs(json.rows[0].distance - Math.sqrt(square))).toBeLessThan(1e-12);
    expect(json.rows[0]).toMatchObject({ name: 'M2', exceeds: true, errorsFrom: 'both' });
  });

  it('writes a CSV of the lines', async () => {
    const call = ['compare', 'earlier.json', 'later.json', '--write', 'apart.csv'];
    const { code, out } = await run(call);
    expect(code).toBe(0);
    expect(out).toMatch(/\nwrote {5}apart\.csv\n$/);
    const lines = readFileSync(path('apart.csv'), 'utf8').trimEnd().split('\n');
    expect(lines).toHaveLength(6);
    expect(lines[0]).toMatch(/^line,H_first_m,H_second_m,/);
    expect(lines[1]).toMatch(/^M2,1\.200000,1\.250000,0\.050000,93\.0000,95\.0000,2\.0000,/);
    expect((await run(call)).code).toBe(2);
  });

  it('takes what fit --json printed, and the share that chance may have', async () => {
    const lines = ['--constituents', 'M2,S2,K1,O1'];
    const fit = await run(['fit', 'quenby.csv', '--json', ...lines]);
    const share = ['--significance', '0.01', '--json'];
    const { code, out } = await run(['compare', '-', 'earlier.json', ...share], fit.out);
    expect(code).toBe(0);
    const json = JSON.parse(out);
    expect(json.first.file).toBe('standard input');
    expect(json).toMatchObject({ significance: 0.01, judged: 4, byChance: 0.04 });
    // The record was predicted from these constants, to the millimetre, with a ripple of 3 mm.
    expect(json.largest.distance).toBeLessThan(0.002);
    const text = await run(['compare', '-', 'earlier.json'], fit.out);
    expect(text.out).toMatch(/\(standard input\)\n/);
    expect(text.out).toMatch(/\nlevel {5}not compared: the first set names no datum\n/);
  });

  it('never prints control codes of a place or datum', async () => {
    const nasty = '\u001b[31mRed\u001b[2J\u202egnol';
    const document = JSON.stringify({ ...EARLIER, place: { name: nasty }, datum: nasty });
    for (const more of [[], ['--json']]) {
      const { code, out, err } = await run(['compare', '-', 'later.json', ...more], document);
      expect(code).toBe(0);
      expect(out).toContain('Red');
      // eslint-disable-next-line no-control-regex -- control codes are what is looked for
      expect(out + err).not.toMatch(/[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u202a-\u202e]/);
    }
  });
});

/** Calls, the exit code, the code of the failure, and what the one line begins with. */
const WRONG: readonly (readonly [readonly string[], number, string, string])[] = [
  [[], 2, 'WRONG_CALL', 'FIRST: expected a file or -, got nothing'],
  [['earlier.json'], 2, 'WRONG_CALL', 'SECOND: expected a file or -, got nothing'],
  [
    ['earlier.json', 'later.json', 'elsewhere.json'],
    2,
    'WRONG_CALL',
    'arguments: expected two files, or - for one, got more',
  ],
  [['-', '-'], 2, 'WRONG_CALL', '-: expected standard input for one file only'],
  [['earlier.json', 'gone.json'], 2, 'NO_SUCH_FILE', 'gone.json: expected a file'],
  [
    ['earlier.json', 'later.json', '--significance', '2'],
    2,
    'OUT_OF_RANGE',
    '--significance: expected a share from 0.0001 to 0.5, got "2"',
  ],
  [
    ['earlier.json', 'later.json', '--write', 'later.json', '--replace'],
    2,
    'OVER_INPUT',
    'later.json: expected',
  ],
  [
    ['earlier.json', 'elsewhere.json'],
    1,
    'MISSING',
    'elsewhere.json, constituents: expected constituents that both sets resolve, got none in common',
  ],
  [
    ['strange.json', 'later.json'],
    1,
    'UNKNOWN_CONSTITUENT',
    'strange.json, constituents[1].name: expected the name of a constituent, got "S2x"',
  ],
];

describe.concurrent('compare, wrong calls and data that say no', () => {
  it.each(WRONG)('%j leaves with %i, %s', async (args, exit, code, message) => {
    const { code: left, out, err } = await run(['compare', '--json', ...args]);
    expect(left).toBe(exit);
    const { error } = JSON.parse(out);
    expect([error.code, error.message.slice(0, message.length)]).toEqual([code, message]);
    expect(error.message.startsWith(error.path)).toBe(true);
    expect(err).toBe(`${error.message}\n`);
  });
});
