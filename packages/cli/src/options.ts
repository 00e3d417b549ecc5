/**
 * The options that commands share, and how their values are read.
 * @module
 */
import { DAY, describe, HOUR, InputError, type Instant, MINUTE, SECOND } from '@staithe/core';
import { type Command, Option } from 'commander';
import { dayOf, readMoment, readZone, type Zone } from './local-time.js';

/** What every command takes. */
export interface CommonOptions {
  readonly json?: true;
  readonly write?: string;
  readonly replace?: true;
}

export interface ZoneOptions {
  readonly zone: string;
}

export interface SpanOptions extends ZoneOptions {
  readonly from?: string;
  readonly until?: string;
}

/** A number within limits, for one option. */
export function numberOf(flag: string, low: number, high: number, unit: string) {
  return (text: string): number => {
    const value = Number(text);
    if (text.trim() !== '' && value >= low && value <= high) return value;
    const limits = Number.isFinite(low) && Number.isFinite(high) ? ` from ${low} to ${high}` : '';
    const code = text.trim() === '' || Number.isNaN(value) ? 'BAD_NUMBER' : 'OUT_OF_RANGE';
    throw new InputError(code, flag, `expected ${unit}${limits}, got ${describe(text)}`);
  };
}

/** A whole number within limits, for one option. */
export function wholeOf(flag: string, low: number, high: number) {
  const read = numberOf(flag, low, high, 'a whole number');
  return (text: string): number => {
    const value = read(text);
    if (Number.isSafeInteger(value)) return value;
    const got = describe(text);
    throw new InputError('OUT_OF_RANGE', flag, `expected a whole number, got ${got}`);
  };
}

/** One of some words, for one option. */
export function choiceOf<T extends string>(flag: string, choices: readonly T[]) {
  return (text: string): T => {
    const found = choices.find((choice) => choice === text);
    if (found !== undefined) return found;
    const last = choices[choices.length - 1] as string;
    const list = `${choices.slice(0, -1).join(', ')} or ${last}`;
    throw new InputError('UNKNOWN_CHOICE', flag, `expected ${list}, got ${describe(text)}`);
  };
}

const UNITS: Readonly<Record<string, number>> = { s: SECOND, min: MINUTE, h: HOUR, d: DAY };

/** `6min`, `1h`, `30s`, `1d` as milliseconds. */
export function durationOf(flag: string) {
  return (text: string): number => {
    const [, size = '', unit = ''] = /^(\d+(?:\.\d+)?) ?(s|min|h|d)$/.exec(text) ?? [];
    const value = +size * (UNITS[unit] ?? 0);
    if (value >= SECOND && value <= 366 * DAY) return value;
    const expected = 'expected a time of a second or more like 6min, 1h or 30s';
    throw new InputError('OUT_OF_RANGE', flag, `${expected}, got ${describe(text)}`);
  };
}

/** Names apart by commas. */
export function listOf(flag: string) {
  return (text: string): string[] => {
    const names = text.split(',').map((name) => name.trim());
    if (names.every((name) => name !== '')) return names;
    throw new InputError('MISSING', flag, `expected names apart by commas, got ${describe(text)}`);
  };
}

/** An option that must be a text with something in it. */
export function textOf(flag: string) {
  return (text: string): string => {
    if (text.trim() !== '') return text.trim();
    throw new InputError('MISSING', flag, `expected a text, got ${describe(text)}`);
  };
}

/** Adds `--write`, `--replace`, `--json`. */
export function withOutput(command: Command, written: string): Command {
  return command
    .option('--write <FILE>', written)
    .option('--replace', 'let FILE take the place of one that is there')
    .option('--json', 'the result as JSON on standard output');
}

/** Adds `--zone`. */
export function withZone(command: Command): Command {
  return command.addOption(
    new Option(
      '--zone <ZONE>',
      'zone of dates and printed times: IANA name, UTC or +02:00; UTC if absent',
    ).default('UTC'),
  );
}

/** Adds `--from`, `--until` and `--zone`. */
export function withSpan(command: Command, long: string): Command {
  return withZone(
    command
      .option(
        '--from <TIME>',
        'start: 2031-06-01 (that local day begins) or 2031-06-01T12:00Z; today if absent',
      )
      .option('--until <TIME>', `end, itself left out; ${long} after the start if absent`),
  );
}

/** A span of an option pair, with its zone. */
export interface ReadSpan {
  readonly from: Instant;
  readonly to: Instant;
  readonly zone: Zone;
}

/** Reads `--from` and `--until`; `days` is how long the span is where `--until` is not given. */
export function readSpan(options: SpanOptions, days: number): ReadSpan {
  const zone = readZone(options.zone);
  const { from: first, until: last } = options;
  const from = first === undefined ? dayOf(Date.now(), zone) : readMoment(first, zone, '--from');
  const to = last === undefined ? from + days * DAY : readMoment(last, zone, '--until');
  if (to > from) return { from, to, zone };
  const got = last === undefined ? String(to) : describe(last);
  throw new InputError('EMPTY_SPAN', '--until', `expected a time after --from, got ${got}`);
}
