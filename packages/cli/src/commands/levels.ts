/**
 * staithe levels: which levels follow, and how sure are they?
 * @module
 */
import { formatInstant, type HarmonicConstants } from '@staithe/core';
import { harmonicLevels } from '@staithe/datums';
import { caution, levelsText } from '@staithe/report';
import type { Command } from 'commander';
import { checkOutput, deliver } from '../deliver.js';
import { callError, inFile } from '../failure.js';
import { withHelp } from '../help.js';
import {
  checkInputs,
  readConstants,
  readRecord,
  type RecordOptions,
  withRecord,
} from '../input.js';
import { readMoment, readZone } from '../local-time.js';
import { type CommonOptions, withOutput, withZone, type ZoneOptions } from '../options.js';
import { datumName } from '../place.js';
import { type Levels, levelsOf } from '../rungs.js';
import { judge } from '../study.js';
import { progress, row } from '../terminal.js';

interface Options extends CommonOptions, RecordOptions, ZoneOptions {
  readonly record?: string;
  readonly from?: string;
  readonly until?: string;
}

function levelsJson(constants: HarmonicConstants, { rungs, limits, notes }: Levels): object {
  const { formFactor, tideClass } = harmonicLevels(constants);
  const limit = ({ height, time }: { height: number; time: number }): object => {
    return { height, time: formatInstant(time) };
  };
  return {
    place: constants.place ?? null,
    datum: constants.datum ?? null,
    unit: 'm',
    levels: rungs,
    limits: {
      HAT: limit(limits.HAT),
      LAT: limit(limits.LAT),
      from: formatInstant(limits.from),
      until: formatInstant(limits.to),
    },
    formFactor: formFactor ?? null,
    tideClass: tideClass ?? null,
    notes,
    caution: caution('levels'),
  };
}

async function run(file: string, options: Options): Promise<number> {
  checkInputs(file, options.record);
  const zone = readZone(options.zone);
  const { from, until } = options;
  if ((from === undefined) !== (until === undefined)) {
    const missing = from === undefined ? '--from' : '--until';
    throw callError('WRONG_CALL', missing, 'expected both --from and --until, got one');
  }
  const span =
    from === undefined || until === undefined
      ? undefined
      : { from: readMoment(from, zone, '--from'), to: readMoment(until, zone, '--until') };
  const rules = await checkOutput(options, [file, options.record]);
  const constants = await readConstants(file);
  const work = progress();
  const record =
    options.record === undefined ? undefined : await readRecord(options.record, options, work);
  work.done();
  const levels = await inFile(file, () => levelsOf(constants, record && judge(record).kept, span));
  const ladder = levelsText({ rungs: levels.rungs, datum: datumName(constants.datum) });
  const notes = levels.notes.map((note) => row('note', note)).join('');
  const text = `${notes}${notes === '' ? '' : '\n'}${ladder}\n`;
  await deliver({ file: () => [text], json: () => levelsJson(constants, levels) }, options, rules);
  return 0;
}

/** Adds the command. */
export function addLevels(program: Command, settle: (exit: number) => void): void {
  const command = program
    .command('levels')
    .argument('<CONSTANTS>', 'a constants document, or -')
    .option('--record <RECORD>', 'a record on the same datum: its mean waters enter')
    .option('--from <TIME>', 'start of the 19 years or more of HAT and LAT')
    .option('--until <TIME>', 'their end');
  withOutput(withZone(withRecord(command)), 'write the ladder to FILE in place of standard output');
  withHelp(command, {
    question: 'which levels follow, and how sure are they?',
    have: 'constants.json, and a record if there is one',
    ask: '--record quenby.csv',
    get: 'a ladder to scale: HAT, mean waters, mean level, LAT, each with its grounds, and what is missing and why',
    example: 'staithe levels quenby.constants.json --record quenby.csv',
  });
  command.action(async (file: string, options: Options) => settle(await run(file, options)));
}
