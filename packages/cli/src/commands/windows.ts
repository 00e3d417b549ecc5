/**
 * staithe windows: when is there enough water?
 * @module
 */
import { formatInstant, InputError, MINUTE } from '@staithe/core';
import { tideCurve } from '@staithe/predict';
import { caution, windowsCsv, windowsText } from '@staithe/report';
import type { Command } from 'commander';
import { checkOutput, deliver } from '../deliver.js';
import { inFile } from '../failure.js';
import { withHelp } from '../help.js';
import { readConstants } from '../input.js';
import { momentText } from '../local-time.js';
import {
  type CommonOptions,
  numberOf,
  readSpan,
  type SpanOptions,
  withOutput,
  withSpan,
} from '../options.js';
import { datumName, placeJson, placeName, sayOf } from '../place.js';
import { remark, row } from '../terminal.js';

interface Options extends CommonOptions, SpanOptions {
  readonly above?: number;
  readonly below?: number;
}

async function run(file: string, options: Options): Promise<number> {
  const { above, below } = options;
  if (above === undefined && below === undefined) {
    throw new InputError('MISSING', '--above', 'expected --above or --below, got neither');
  }
  if (above !== undefined && below !== undefined && above > below) {
    throw new InputError('CONFLICT', '--above', `expected up to --below ${below}, got ${above}`);
  }
  const span = readSpan(options, 30);
  const rules = await checkOutput(options, [file]);
  const constants = await readConstants(file);
  const curve = await inFile(file, () => tideCurve(constants));
  const windows = curve.windows({ above, below }, span);
  const naming = { place: placeName(constants), datum: datumName(constants.datum) };
  const text = windowsText({ ...naming, windows, above, below, timeZone: span.zone.name });
  if (!options.json) remark(row('searched', sayOf(constants, span)).trimEnd());
  await deliver(
    {
      text: `${text}\n`,
      file: () => [windowsCsv(windows)],
      json: () => ({
        ...placeJson(constants, span),
        ...(above === undefined ? {} : { above }),
        ...(below === undefined ? {} : { below }),
        windows: windows.map(({ from, to, openStart, openEnd, join }) => ({
          opens: formatInstant(from),
          closes: formatInstant(to),
          minutes: Math.round((to - from) / (MINUTE / 10)) / 10,
          opensLocal: momentText(from, span.zone),
          closesLocal: momentText(to, span.zone),
          cutAtStart: openStart,
          cutAtEnd: openEnd,
          ...(join ? { join } : {}),
        })),
        caution: caution('windows'),
      }),
    },
    options,
    rules,
  );
  return windows.length > 0 ? 0 : 1;
}

/** Adds the command. */
export function addWindows(program: Command, settle: (exit: number) => void): void {
  const height = (flag: string): ((text: string) => number) => numberOf(flag, -100, 100, 'metres');
  const command = program
    .command('windows')
    .argument('<CONSTANTS>', 'a constants document, or -')
    .option('--above <METRES>', 'water at least this high above the datum', height('--above'))
    .option('--below <METRES>', 'water at most this high above the datum', height('--below'));
  withOutput(withSpan(command, '30 days'), 'also write a CSV of the windows');
  withHelp(command, {
    question: 'when is there enough water?',
    have: 'constants.json',
    ask: '--above 4.2 --from 2031-06-01 --until 2031-07-01',
    get: 'start, end, minutes open; exit code 1 where there is no window',
    example: 'staithe windows quenby.constants.json --above 4.2',
  });
  command.action(async (file: string, options: Options) => settle(await run(file, options)));
}
