import {
  chmodSync,
  existsSync,
  linkSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  symlinkSync,
  statSync,
} from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, it } from 'vitest';
import { useCommand } from './command.js';
import { CONSTANTS, CONSTANTS_JSON, recordCsv } from './inputs.js';

const { run, start, put, path, folder } = useCommand();
const DAY_OF_JUNE = ['--from', '2031-06-01', '--until', '2031-06-02'];
beforeAll(() => {
  put('constants.json', CONSTANTS_JSON);
});
/** A folder of its own. */
const own = (name: string): string => {
  mkdirSync(path(name));
  return path(name);
};

describe.concurrent('output files', () => {
  it('are not written over one that is there, but replace it when asked', async () => {
    const there = put('there.csv', 'mine\n');
    const call = ['predict', 'constants.json', ...DAY_OF_JUNE, '--write', there];
    const refused = await run([...call, '--json']);
    expect(refused.code).toBe(2);
    expect(JSON.parse(refused.out).error.code).toBe('ALREADY_THERE');
    expect(readFileSync(there, 'utf8')).toBe('mine\n');
    expect((await run([...call, '--replace'])).code).toBe(0);
    expect(readFileSync(there, 'utf8')).toMatch(/^instant_utc,height_m\n/);
  });

  it('are never written over an input, by whatever name', async () => {
    const at = own('inputs');
    const input = put('inputs/record.csv', recordCsv());
    symlinkSync(input, join(at, 'soft.csv'));
    linkSync(input, join(at, 'hard.csv'));
    const before = readFileSync(input, 'utf8');
    for (const target of [
      input,
      join(at, 'soft.csv'),
      join(at, 'hard.csv'),
      `${at}/../inputs/record.csv`,
    ]) {
      const { code, out } = await run(['fit', input, '--write', target, '--replace', '--json']);
      expect(code).toBe(2);
      expect(JSON.parse(out).error.code).toBe('OVER_INPUT');
    }
    expect(readFileSync(input, 'utf8')).toBe(before);
    expect(readdirSync(at).sort()).toEqual(['hard.csv', 'record.csv', 'soft.csv']);
  });

  it('go through a link to the file that it names', async () => {
    const at = own('links');
    const real = put('links/real.csv', 'old\n');
    symlinkSync(real, join(at, 'link.csv'));
    const call = ['predict', 'constants.json', ...DAY_OF_JUNE, '--replace'];
    expect((await run([...call, '--write', join(at, 'link.csv')])).code).toBe(0);
    expect(readFileSync(real, 'utf8')).toMatch(/^instant_utc/);
    expect(readdirSync(at).sort()).toEqual(['link.csv', 'real.csv']);
  });

  it('are refused with words in a folder that is not there or not to be written to', async () => {
    const at = own('locked');
    const call = ['predict', 'constants.json', ...DAY_OF_JUNE, '--json', '--write'];
    const none = await run([...call, path('nowhere/x.csv')]);
    expect(none.code).toBe(2);
    expect(JSON.parse(none.out).error).toMatchObject({ code: 'NOT_WRITABLE' });
    expect(none.err).toContain('expected a place that can be written to, got no such folder');
    // Nothing is locked for the superuser: then the command runs as nobody, who does not own the folder.
    chmodSync(at, 0o555);
    const nobody = process.getuid?.() === 0 ? { uid: 65534, gid: 65534 } : {};
    const locked = await run([...call, join(at, 'x.csv')], '', nobody);
    expect(locked.code).toBe(2);
    expect(JSON.parse(locked.out).error).toMatchObject({ code: 'NOT_WRITABLE' });
    expect(readdirSync(at)).toEqual([]);
  });
});

/** Starts a prediction that takes minutes to write and waits until it has begun to write. */
async function startLong(at: string, ...more: string[]) {
  const long = ['--from', '1990-01-01', '--until', '2030-01-01', '--every', '10s'];
  const child = start([
    'predict',
    'constants.json',
    ...long,
    '--write',
    join(at, 'x.csv'),
    ...more,
  ]);
  const left = new Promise<number | null>((resolve) => child.on('close', (code) => resolve(code)));
  const begun = (): string | undefined =>
    readdirSync(at).find(
      (name) => name.includes('.unfinished-') && statSync(join(at, name)).size > 0,
    );
  for (let tries = 0; tries < 1000 && begun() === undefined; tries++) {
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
  expect(begun()).toMatch(/^\.x\.csv\.unfinished-[0-9a-f]{8}$/);
  return { child, left };
}

describe.concurrent('a kill while writing', () => {
  it.each([
    ['SIGTERM', 143],
    ['SIGINT', 130],
  ] as const)('%s leaves nothing', async (signal, code) => {
    const at = own(`killed-${signal}`);
    const { child, left } = await startLong(at);
    child.kill(signal);
    expect(await left).toBe(code);
    expect(readdirSync(at)).toEqual([]);
  });

  it('leaves the file that was to be replaced as it was', async () => {
    const at = own('kept');
    put('kept/x.csv', 'old\n');
    const { child, left } = await startLong(at, '--replace');
    child.kill('SIGTERM');
    expect(await left).toBe(143);
    expect(readdirSync(at)).toEqual(['x.csv']);
    expect(readFileSync(join(at, 'x.csv'), 'utf8')).toBe('old\n');
  });

  it('that cannot be caught leaves no file by the name, only one that says it is unfinished', async () => {
    const at = own('killed-hard');
    const { child, left } = await startLong(at);
    child.kill('SIGKILL');
    await left;
    expect(existsSync(join(at, 'x.csv'))).toBe(false);
    expect(readdirSync(at).every((name) => name.includes('.unfinished-'))).toBe(true);
  });
});

describe.concurrent('the terminal', () => {
  // Colour, clear the screen, the one-byte form, a bell, a title, text turned round.
  const NASTY = '\u001b[31mRed\u001b[2J\u009b1mX\u0007\u001b]0;title\u0007\u202egnol';
  // eslint-disable-next-line no-control-regex -- control codes are what is looked for
  const UNSAFE = /[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069]/;

  it.each([
    ['table', '--month', '2031-06'],
    ['windows', '--above', '3', ...DAY_OF_JUNE],
    ['predict', ...DAY_OF_JUNE],
    ['levels'],
    ['predict', '--json', ...DAY_OF_JUNE],
  ])('%s never gets control codes of a place or datum', async (name, ...args) => {
    const nasty = JSON.stringify({ ...CONSTANTS, place: { name: NASTY }, datum: NASTY });
    const { code, out, err } = await run([name as string, '-', ...args], nasty);
    expect(code).toBe(0);
    expect(out + err).toContain('Red');
    expect(out).not.toMatch(UNSAFE);
    expect(err).not.toMatch(UNSAFE);
    if (args.includes('--json')) expect(JSON.parse(out).place.name).toBe(NASTY);
  });

  it('never gets those of a file, an option, a column or a constituent', async () => {
    const column = `Time (UTC),${NASTY}\n2031-01-01 00:00,1\n`;
    const strange = CONSTANTS_JSON.replace('"M2"', JSON.stringify(NASTY));
    const outcomes = await Promise.all([
      run(['fit', `${NASTY}.csv`]),
      run(['fit', `--${NASTY}`]),
      run([NASTY]),
      run(['check', '-'], column),
      run(['predict', '-'], strange),
      run(['fit', '-', '--json', '--value-column', NASTY], recordCsv()),
    ]);
    for (const { code, out, err } of outcomes) {
      expect(code).toBeGreaterThan(0);
      expect(err.length).toBeGreaterThan(10);
      expect(out + err).not.toMatch(UNSAFE);
    }
  });

  it('sees no progress where it is none', async () => {
    const { err } = await run(['fit', '-', '--constituents', 'M2,S2,K1,O1'], recordCsv());
    expect(err).toBe('');
  });

  it('may leave early: a closed pipe is no failure', async () => {
    const child = start(['predict', 'constants.json', '--every', '1s', ...DAY_OF_JUNE], {
      cwd: folder,
    });
    const left = new Promise<number | null>((resolve) =>
      child.on('close', (code) => resolve(code)),
    );
    let err = '';
    child.stderr?.on('data', (text: Buffer) => (err += text.toString()));
    child.stdout?.once('data', () => child.stdout?.destroy());
    expect(await left).toBe(0);
    expect(err).not.toContain('EPIPE');
  });
});
