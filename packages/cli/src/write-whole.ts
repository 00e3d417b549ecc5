/**
 * Output that is written whole or not at all: to a temporary file in the same folder, to the disk, then by its name.
 * @module
 */
import { randomBytes } from 'node:crypto';
import { rmSync } from 'node:fs';
import {
  access,
  constants,
  type FileHandle,
  link,
  lstat,
  open,
  realpath,
  rename,
  stat,
  unlink,
} from 'node:fs/promises';
import { basename, dirname, join } from 'node:path';
import { callError, fileError } from './failure.js';

/** What an output must not do. */
export interface WriteRules {
  /** May take the place of a file that is there. */
  readonly replace: boolean;
  /** Files that were read: never written over. */
  readonly inputs: readonly string[];
}

const SIGNALS = ['SIGINT', 'SIGTERM', 'SIGHUP'] as const;
const SIGNAL_BASE = 128; // a shell's exit code for a signal is this and its number
const NUMBERS: Readonly<Record<(typeof SIGNALS)[number], number>> = {
  SIGINT: 2,
  SIGTERM: 15,
  SIGHUP: 1,
};

async function isThere(path: string): Promise<boolean> {
  try {
    await lstat(path);
    return true;
  } catch (error) {
    if ((error as { code?: string }).code === 'ENOENT') return false;
    throw fileError(error, path, 'write');
  }
}

async function isSameFile(one: string, other: string): Promise<boolean> {
  const [a, b] = await Promise.all([stat(one), stat(other)]);
  return a.dev === b.dev && a.ino === b.ino;
}

/** Where an output goes, links followed; refused where something stands in its way. */
export async function checkTarget(path: string, { replace, inputs }: WriteRules): Promise<string> {
  if (path === '-' || path === '') {
    throw callError('WRONG_CALL', '--write', `expected the name of a file, got "${path}"`);
  }
  try {
    // Now, and not after a minute of work.
    await access(dirname(path), constants.W_OK | constants.X_OK);
  } catch (error) {
    throw fileError(error, path, 'write');
  }
  if (!(await isThere(path))) return path;
  let real: string;
  try {
    real = await realpath(path);
    if (!(await stat(real)).isFile()) {
      throw callError('NOT_WRITABLE', path, 'expected a file, got something else by this name');
    }
    for (const input of inputs) {
      if (input === '-' || !(await isSameFile(real, input))) continue;
      throw callError('OVER_INPUT', path, 'expected another file than the one read, got the same');
    }
  } catch (error) {
    if ((error as Error).name === 'CallError') throw error;
    throw fileError(error, path, 'write');
  }
  if (replace) return real;
  throw callError('ALREADY_THERE', path, 'expected a new name or --replace, got one that is there');
}

/** Gives the finished file its name; without `replace` never over one that came in between. */
async function settle(temporary: string, target: string, replace: boolean): Promise<void> {
  if (replace) {
    await rename(temporary, target);
    return;
  }
  try {
    await link(temporary, target);
  } catch (error) {
    const { code = '' } = error as { code?: string };
    if (code === 'EEXIST') {
      throw callError(
        'ALREADY_THERE',
        target,
        'expected a new name or --replace, got one that is there',
      );
    }
    if (!['EPERM', 'ENOTSUP', 'ENOSYS', 'EOPNOTSUPP'].includes(code)) throw error;
    await rename(temporary, target); // a file system without hard links
    return;
  }
  await unlink(temporary);
}

/** Makes the new name last; not every system can. */
async function keepFolder(folder: string): Promise<void> {
  try {
    const handle = await open(folder, 'r');
    await handle.sync().finally(() => handle.close());
  } catch {
    // The file itself is on the disk; a folder that cannot be opened or synced takes nothing from it.
  }
}

/**
 * Writes a file whole or not at all.
 *
 * @param path - Where to.
 * @param pieces - The text, in pieces, made as they are written.
 * @param rules - What must not happen.
 */
export async function writeWhole(
  path: string,
  pieces: Iterable<string> | AsyncIterable<string>,
  rules: WriteRules,
): Promise<void> {
  const target = await checkTarget(path, rules);
  const mark = randomBytes(4).toString('hex');
  const temporary = join(dirname(target), `.${basename(target)}.unfinished-${mark}`);
  const stop = (signal: (typeof SIGNALS)[number]): void => {
    rmSync(temporary, { force: true });
    process.exit(SIGNAL_BASE + NUMBERS[signal]);
  };
  for (const signal of SIGNALS) process.on(signal, stop);
  try {
    const handle: FileHandle = await open(temporary, 'wx', 0o666).catch((error: unknown) => {
      throw fileError(error, path, 'write');
    });
    try {
      for await (const piece of pieces) await handle.write(piece);
      await handle.sync();
    } finally {
      await handle.close();
    }
    await settle(temporary, target, rules.replace);
    await keepFolder(dirname(target));
  } catch (error) {
    rmSync(temporary, { force: true });
    if (typeof (error as { syscall?: unknown }).syscall !== 'string') throw error;
    throw fileError(error, path, 'write');
  } finally {
    for (const signal of SIGNALS) process.off(signal, stop);
  }
}
