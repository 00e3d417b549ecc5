/**
 * staithe table: what does the tide do this month?
 * @module
 */
import { DAY, describe, formatInstant, InputError } from '@staithe/core';
import { tideCurve } from '@staithe/predict';
import { caution, monthText } from '@staithe/report';
import type { Command } from 'commander';
import { checkOutput, deliver } from '../deliver.js';
import { inFile } from '../failure.js';
import { withHelp } from '../help.js';
import { readConstants } from '../input.js';
import { momentText, monthOf, readZone, startOfDay, type Zone } from '../local-time.js';
import {
  type CommonOptions,
  type ReadSpan,
  withOutput,
  withZone,
  type ZoneOptions,
} from '../options.js';
import { datumName, placeJson, placeName } from '../place.js';

interface Options extends CommonOptions, ZoneOptions {
  readonly month?: string;
  readonly range?: true;
}

/** A month of a zone: its name and its span. */
export function readMonth(text: string | undefined, zone: Zone): { month: string; span: ReadSpan } {
  const month = text ?? monthOf(Date.now(), zone);
  const [, year = '', number = ''] = /^(\d{4})-(0[1-9]|1[0-2])$/.exec(month) ?? [];
  if (+year < 1701 || +year > 2199) {
    const expected = 'expected a month like 2031-06, years 1701 to 2199';
    throw new InputError('BAD_TIME', '--month', `${expected}, got ${describe(month)}`);
  }
  const first = startOfDay(Date.UTC(+year, +number - 1, 1), zone);
  return { month, span: { from: first, to: startOfDay(Date.UTC(+year, +number, 1), zone), zone } };
}

async function run(file: string, options: Options): Promise<number> {
  const zone = readZone(options.zone);
  const { month, span } = readMonth(options.month, zone);
  const rules = await checkOutput(options, [file]);
  const constants = await readConstants(file);
  const curve = await inFile(file, () => tideCurve(constants));
  // A day more on both sides: the first range needs the water before, and minutes are rounded.
  const turningPoints = curve.turningPoints({ from: span.from - DAY, to: span.to + DAY });
  const text = `${monthText({
    place: placeName(constants),
    turningPoints,
    month,
    timeZone: zone.name,
    datum: datumName(constants.datum),
    range: options.range,
  })}\n`;
  await deliver(
    {
      file: () => [text],
      json: () => ({
        ...placeJson(constants, span),
        month,
        turningPoints: turningPoints
          .filter(({ time }) => time >= span.from && time < span.to)
          .map(({ kind, time, height }) => {
            return { kind, time: formatInstant(time), local: momentText(time, zone), height };
          }),
        caution: caution('heights'),
      }),
    },
    options,
    rules,
  );
  return 0;
}

/** Adds the command. */
export function addTable(program: Command, settle: (exit: number) => void): void {
  const command = program
    .command('table')
    .argument('<CONSTANTS>', 'a constants document, or -')
    .option('--month <MONTH>', '2031-06, a month of the zone; this month if absent')
    .option('--range', 'the mean range of each day as well');
  withOutput(withZone(command), 'write the table to FILE in place of standard output');
  withHelp(command, {
    question: 'what does the tide do this month?',
    have: 'constants.json',
    ask: '--month 2031-06 --zone Europe/Lisbon',
    get: 'a ruler a day with heights, and the times of high and low water in order',
    example: 'staithe table quenby.constants.json --month 2031-06 --zone Europe/Lisbon',
  });
  command.action(async (file: string, options: Options) => settle(await run(file, options)));
}
