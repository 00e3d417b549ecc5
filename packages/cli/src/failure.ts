/**
 * What goes wrong, as one line and an exit code: 1 where the data say no, 2 where the call is wrong.
 * @module
 */
import { describe, InputError, isStaitheError } from '@staithe/core';
import { CommanderError } from 'commander';
import { onOneLine } from './printable.js';

/** Codes of failures that only a command has. */
export type CallCode =
  | 'NO_SUCH_FILE'
  | 'NOT_READABLE'
  | 'NOT_WRITABLE'
  | 'ALREADY_THERE'
  | 'OVER_INPUT'
  | 'UNKNOWN_OPTION'
  | 'UNKNOWN_COMMAND'
  | 'WRONG_CALL';

interface CallError extends Error {
  readonly code: CallCode;
  readonly path: string;
}

/** A wrong call: `path: expected …, got …`. */
export function callError(code: CallCode, path: string, text: string): CallError {
  return Object.assign(new Error(`${path}: ${text}`), { name: 'CallError', code, path });
}

/** The failure of a file operation, in words. */
export function fileError(error: unknown, path: string, purpose: 'read' | 'write'): CallError {
  const { code = 'unknown reason' } = error as { code?: string };
  if (purpose === 'read' && code === 'ENOENT') {
    return callError('NO_SUCH_FILE', path, 'expected a file, got none by this name');
  }
  const reasons: Readonly<Record<string, string>> = {
    EACCES: 'no permission',
    EPERM: 'no permission',
    EROFS: 'a read-only place',
    EISDIR: 'a folder',
    ENOENT: 'no such folder',
    ENOTDIR: 'no such folder',
    ENOSPC: 'no space left',
  };
  const got = reasons[code] ?? code;
  return purpose === 'read'
    ? callError('NOT_READABLE', path, `expected a file that can be read, got ${got}`)
    : callError('NOT_WRITABLE', path, `expected a place that can be written to, got ${got}`);
}

/** A failure as the command shows it. */
export interface Failure {
  readonly exit: 1 | 2;
  readonly code: string;
  readonly path: string;
  readonly message: string;
}

/** The options of the packages by the names they have here. */
const OPTION_NAMES: Readonly<Record<string, string>> = {
  timeZone: '--time-zone',
  unit: '--unit',
  'columns.date': '--date-column',
  'columns.time': '--time-column',
  'columns.value': '--value-column',
  dateOrder: '--date-order',
  whenTwice: '--when-twice',
  onConflict: '--conflict',
  onDisorder: '--disorder',
  constituents: '--constituents',
  borrow: '--borrow',
  steps: '--steps',
  argumentModel: '--argument-model',
  nodalModel: '--nodal-model',
  nodalHold: '--nodal-hold',
  weighting: '--weighting',
  resistant: '--weighting',
  errorModel: '--error-model',
  'redraw.by': '--redraw-by',
  span: '--from and --until',
  place: '--latitude and --longitude',
};

function renamed(text: string): string {
  return text
    .replace(/\boptions\.([a-zA-Z]+(?:\.[a-zA-Z]+)?)/g, (whole, key: string) => {
      return OPTION_NAMES[key] ?? OPTION_NAMES[key.split('.')[0] as string] ?? whole;
    })
    .replace(/\bspan\.from\b/g, '--from')
    .replace(/\bspan\.to\b/g, '--until');
}

/** Puts the name of a file before the place in it that an error names; options keep their own. */
export async function inFile<T>(file: string, work: () => T | Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (!isStaitheError(error) || !(error.name === 'InputError')) throw error;
    const { code, path, message, details } = error as InputError;
    if (/^(options|span)\b|^--/.test(path)) throw error;
    const name = file === '-' ? 'standard input' : file;
    const place = path === 'text' || path === 'document' || path === '' ? name : `${name}, ${path}`;
    throw new InputError(code, place, message.slice(path.length + 2), details);
  }
}

/** Commander's complaints by their codes. */
function ofCommander({ code, message }: CommanderError): Failure {
  const [, named = ''] = /'([^']*)'/.exec(message) ?? [];
  const flag = (/--?[\w-]+/.exec(named) ?? [named])[0];
  const near = /Did you mean (?:one of )?([^?]+)\?/.exec(message)?.[1];
  const make = (own: CallCode, path: string, text: string): Failure => {
    return { exit: 2, code: own, path, message: `${path}: ${text}` };
  };
  const hint = near === undefined ? '' : ` (near: ${near})`;
  switch (code) {
    case 'commander.unknownOption':
      return make(
        'UNKNOWN_OPTION',
        named,
        `expected an option listed by --help, got another${hint}`,
      );
    case 'commander.unknownCommand':
      return make(
        'UNKNOWN_COMMAND',
        named,
        `expected a command listed by --help, got another${hint}`,
      );
    case 'commander.optionMissingArgument':
      return make('WRONG_CALL', flag, 'expected a value after it, got nothing');
    case 'commander.missingMandatoryOptionValue':
      return make('WRONG_CALL', flag, 'expected this option, got nothing');
    case 'commander.missingArgument':
      return make('WRONG_CALL', named, 'expected a file or -, got nothing');
    case 'commander.excessArguments':
      return make('WRONG_CALL', 'arguments', 'expected one file or -, got more');
    case 'commander.conflictingOption': {
      const [, other = ''] = /with option '(--[\w-]+)/.exec(message) ?? [];
      return make('WRONG_CALL', flag, `expected it without ${other}, got both`);
    }
    default:
      return make('WRONG_CALL', 'call', message.replace(/^error: /, ''));
  }
}

/** Any caught value as a failure. */
export function failureOf(error: unknown): Failure {
  if (error instanceof CommanderError) return cleaned(ofCommander(error));
  if (isStaitheError(error)) {
    const path = renamed(error.name === 'InputError' ? (error as InputError).path : '');
    const exit = path.startsWith('--') ? 2 : 1;
    return cleaned({ exit, code: error.code, path, message: renamed(error.message) });
  }
  const { name, code, path, message } = error as Partial<CallError>;
  if (name === 'CallError' && code !== undefined && path !== undefined) {
    return cleaned({ exit: 2, code, path, message: message ?? path });
  }
  const text = error instanceof Error ? `${error.name} ${error.message}` : describe(error);
  const told = `staithe: expected to get through, got ${text}`;
  return cleaned({ exit: 1, code: 'UNEXPECTED', path: 'staithe', message: told });
}

function cleaned(failure: Failure): Failure {
  return { ...failure, path: onOneLine(failure.path), message: onOneLine(failure.message) };
}
