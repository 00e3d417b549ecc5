/**
 * staithe compare: do two sets of constants agree?
 * @module
 */
import { type HarmonicConstants, InputError, isStaitheError } from '@staithe/core';
import { compareConstants, type ConstantsComparison } from '@staithe/fit';
import { caution, comparisonCsv, comparisonText } from '@staithe/report';
import type { Command } from 'commander';
import { checkOutput, deliver } from '../deliver.js';
import { callError } from '../failure.js';
import { withHelp } from '../help.js';
import { checkInputs, readConstants } from '../input.js';
import { type CommonOptions, numberOf, withOutput } from '../options.js';

interface Options extends CommonOptions {
  readonly significance?: number;
}

/** What a file is called in what is said. */
const fileName = (file: string): string => (file === '-' ? 'standard input' : file);

/** `Quenby Haven, 2011-01-01 to 2011-12-31 (quenby-2011.json)`. */
function nameOf(file: string, { place, record, source }: HarmonicConstants): string {
  const from = record ? `${record.from.slice(0, 10)} to ${record.to.slice(0, 10)}` : source;
  const parts = [place?.name, from].filter((part) => part !== undefined);
  return parts.length > 0 ? `${parts.join(', ')} (${fileName(file)})` : fileName(file);
}

function originJson(file: string, constants: HarmonicConstants): object {
  const { place, datum, argumentModel, nodalModel, record } = constants;
  return {
    file: fileName(file),
    place: place ?? null,
    datum: datum ?? null,
    argumentModel,
    nodalModel,
    record: record ?? null,
  };
}

/** Compares; what is refused names the file, not `first` or `second`. */
function compared(
  files: readonly [string, string],
  [first, second]: readonly [HarmonicConstants, HarmonicConstants],
  { significance }: Options,
): ConstantsComparison {
  try {
    return compareConstants(first, second, { significance });
  } catch (error) {
    if (!isStaitheError(error) || error.name !== 'InputError') throw error;
    const { code, path, message, details } = error as InputError;
    const [, side, rest] = /^(first|second)\.(.+)$/.exec(path) ?? [];
    if (side === undefined || rest === undefined) throw error;
    const file = fileName(files[side === 'first' ? 0 : 1]);
    throw new InputError(code, `${file}, ${rest}`, message.slice(path.length + 2), details);
  }
}

async function run(first: string, second: string, options: Options): Promise<number> {
  checkInputs(first, second);
  const rules = await checkOutput(options, [first, second]);
  const sets = [await readConstants(first), await readConstants(second)] as const;
  const comparison = compared([first, second], sets, options);
  const names = { first: nameOf(first, sets[0]), second: nameOf(second, sets[1]) };
  await deliver(
    {
      text: `${comparisonText(comparison, names)}\n`,
      file: () => [comparisonCsv(comparison)],
      json: () => ({
        first: originJson(first, sets[0]),
        second: originJson(second, sets[1]),
        unit: 'm',
        ...comparison,
        caution: caution('levels'),
      }),
    },
    options,
    rules,
  );
  return 0;
}

/** Adds the command. */
export function addCompare(program: Command, settle: (exit: number) => void): void {
  const command = program
    .command('compare')
    .argument('<FIRST>', 'a constants document, or -')
    .argument('<SECOND>', 'another')
    .allowExcessArguments()
    .option(
      '--significance <SHARE>',
      'how often chance alone may call a line apart, 0.0001 to 0.5; 0.05 if absent',
      numberOf('--significance', 0.0001, 0.5, 'a share'),
    );
  withOutput(command, 'also write a CSV of the lines');
  withHelp(command, {
    question: 'do two sets of constants agree?',
    have: 'two constants documents: two dates of one gauge, two gauges, a fit and a published set',
    ask: '--significance 0.01 --write apart.csv',
    get: 'how far apart each line stands, whether errors allow it, and what the two tides differ by',
    example: 'staithe compare quenby-2011.constants.json quenby-2031.constants.json',
  });
  command.action(async (first: string, second: string, options: Options) => {
    // Commander's own words for this speak of one file.
    if (command.args.length > 2) {
      throw callError('WRONG_CALL', 'arguments', 'expected two files, or - for one, got more');
    }
    settle(await run(first, second, options));
  });
}
