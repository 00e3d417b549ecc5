/**
 * Reads what a command is given: a constants document or a gauge record, from a file or standard input.
 * @module
 */
import { type HarmonicConstants, InputError, type LongWork, parseConstants } from '@staithe/core';
import { type GaugeRecord, type ReadOptions, readGaugeCsv } from '@staithe/gauge';
import type { Command } from 'commander';
import { open } from 'node:fs/promises';
import { callError, fileError, inFile } from './failure.js';
import { choiceOf, textOf } from './options.js';

/** How the times of a record are to be read, as options. */
export interface TimeOptions {
  readonly timeZone?: string;
  readonly dateColumn?: string;
  readonly timeColumn?: string;
  readonly dateOrder?: 'day-first' | 'month-first';
  readonly whenTwice?: 'refuse' | 'first' | 'second' | 'by-order';
  readonly conflict?: 'refuse' | 'first';
  readonly disorder?: 'refuse' | 'sort';
}

/** How a record of heights is to be read, as options. */
export interface RecordOptions extends TimeOptions {
  readonly unit?: 'm' | 'cm' | 'mm' | 'ft';
  readonly valueColumn?: string;
  readonly datum?: string;
}

/** Adds the options that say of times what a record's file does not. */
export function withTimes(command: Command): Command {
  const add = (flag: string, value: string, choices: readonly string[], text: string): Command =>
    command.option(`${flag} <${value}>`, `${text}: ${choices.join(', ')}`, choiceOf(flag, choices));
  command
    .option(
      '--time-zone <ZONE>',
      "zone of the record's times, where the file names none",
      textOf('--time-zone'),
    )
    .option('--date-column <NAME>', 'column of dates, where date and time stand apart')
    .option('--time-column <NAME>', 'column of times');
  add('--date-order', 'ORDER', ['day-first', 'month-first'], 'how to read dates like 03/04/2012');
  add(
    '--when-twice',
    'RULE',
    ['refuse', 'first', 'second', 'by-order'],
    'a local time that occurs twice',
  );
  add('--conflict', 'RULE', ['refuse', 'first'], 'two values at one time');
  return add('--disorder', 'RULE', ['refuse', 'sort'], 'time that goes backwards');
}

/** Adds the options that say what the file of a record of heights does not. */
export function withRecord(command: Command): Command {
  const units = ['m', 'cm', 'mm', 'ft'];
  return withTimes(command)
    .option('--value-column <NAME>', 'column of heights')
    .option(
      '--unit <UNIT>',
      `unit of the heights, where the file names none: ${units.join(', ')}`,
      choiceOf('--unit', units),
    )
    .option('--datum <NAME>', "vertical datum of the record's heights", textOf('--datum'));
}

/** The bytes of a file or of standard input, as they come. */
export async function* bytesOf(path: string): AsyncGenerator<Uint8Array, void, void> {
  if (path === '-') {
    for await (const piece of process.stdin) yield piece as Uint8Array;
    return;
  }
  try {
    const handle = await open(path);
    try {
      if ((await handle.stat()).isDirectory()) throw Object.assign(new Error(), { code: 'EISDIR' });
      for await (const piece of handle.createReadStream()) yield piece as Uint8Array;
    } finally {
      await handle.close().catch(() => undefined); // the stream may have closed it
    }
  } catch (error) {
    // Errors of the system have an upper-case code and a call; what the reader throws passes through.
    const { code, syscall } = error as { code?: unknown; syscall?: unknown };
    if (code !== 'EISDIR' && syscall === undefined) throw error;
    throw fileError(error, path, 'read');
  }
}

/** The times of a record, and the column of its values, as the reader takes them. */
export function readingOf(options: TimeOptions, value: string | undefined): ReadOptions {
  return {
    timeZone: options.timeZone,
    columns: {
      ...(options.dateColumn === undefined ? {} : { date: options.dateColumn }),
      ...(options.timeColumn === undefined ? {} : { time: options.timeColumn }),
      ...(value === undefined ? {} : { value }),
    },
    dateOrder: options.dateOrder,
    whenTwice: options.whenTwice,
    onConflict: options.conflict,
    onDisorder: options.disorder,
  };
}

/** Reads a gauge record. */
export function readRecord(
  path: string,
  options: RecordOptions,
  work: LongWork,
): Promise<GaugeRecord> {
  const { unit, datum, valueColumn } = options;
  const reading = { ...readingOf(options, valueColumn), unit, datum, onProgress: work.onProgress };
  return inFile(path, () => readGaugeCsv(bytesOf(path), reading));
}

/** Reads a constants document, or what `staithe fit --json` printed with one inside. */
export async function readConstants(path: string): Promise<HarmonicConstants> {
  const pieces: Uint8Array[] = [];
  for await (const piece of bytesOf(path)) pieces.push(piece);
  const text = Buffer.concat(pieces)
    .toString('utf8')
    .replace(/^\ufeff/, '');
  return inFile(path, () => {
    let json: unknown;
    try {
      json = JSON.parse(text);
    } catch (error) {
      const got = text.trim() === '' ? 'an empty file' : (error as Error).message;
      throw new InputError('INVALID_DOCUMENT', 'document', `expected JSON, got ${got}`);
    }
    const inside = (json as { constants?: unknown; format?: unknown } | null)?.constants;
    const isWrapped = typeof inside === 'object' && !(json as { format?: unknown }).format;
    return parseConstants(isWrapped ? inside : json);
  });
}

/** Standard input can be read once. */
export function checkInputs(...paths: readonly (string | undefined)[]): void {
  if (paths.filter((path) => path === '-').length < 2) return;
  throw callError('WRONG_CALL', '-', 'expected standard input for one file only, got it for two');
}
