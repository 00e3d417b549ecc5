/**
 * staithe check: what is wrong with this record?
 * @module
 */
import { formatInstant, seriesTimes } from '@staithe/core';
import { checkRecord, type GaugeRecord, type RecordCheck } from '@staithe/gauge';
import type { Command } from 'commander';
import { checkOutput, deliver } from '../deliver.js';
import { doubtRows, fileRows, findingsJson, readRow, runLines } from '../findings.js';
import { withHelp } from '../help.js';
import {
  checkInputs,
  readConstants,
  readRecord,
  type RecordOptions,
  withRecord,
} from '../input.js';
import { readZone } from '../local-time.js';
import { type CommonOptions, withOutput, withZone, type ZoneOptions } from '../options.js';
import { expectedBy, findingsBy, judge, tryFit } from '../study.js';
import { counted, progress, row } from '../terminal.js';

interface CheckOptions extends CommonOptions, RecordOptions, ZoneOptions {
  readonly against?: string;
}

interface Verdict {
  readonly check: RecordCheck;
  readonly findings: RecordCheck['findings'];
  /** Why nobody looked for a moved zero. */
  readonly unseen?: string;
}

async function verdictOn(record: GaugeRecord, against: string | undefined): Promise<Verdict> {
  if (against !== undefined) {
    const check = checkRecord(record.series, {
      expected: expectedBy(await readConstants(against)),
    });
    return { check, findings: check.findings };
  }
  const { check, kept } = judge(record);
  const work = progress();
  const fit = await tryFit(kept, {}, work);
  work.done();
  if ('reason' in fit) return { check, findings: [], unseen: fit.reason };
  return { check, findings: findingsBy(record, fit) };
}

/** The flags as a file; the reason is that of the test with the worst flag. */
function* flagRows(record: GaugeRecord, check: RecordCheck): Generator<string, void, void> {
  yield 'instant_utc,height_m,flag,reason\n';
  const times = seriesTimes(record.series);
  const { values } = record.series;
  let piece: string[] = [];
  for (let i = 0; i < values.length; i++) {
    const time = times[i] as number;
    const flag = check.flags[i] as number;
    const run =
      flag < 3
        ? undefined
        : check.reasons.find(
            (r) => r.flag === flag && r.samples > 0 && r.from <= time && r.to >= time,
          );
    const value = values[i] as number;
    const height = Number.isNaN(value) ? '' : value.toFixed(4);
    piece.push(`${formatInstant(time)},${height},${flag},${run?.reason ?? ''}\n`);
    if (piece.length === 4096) {
      yield piece.join('');
      piece = [];
    }
  }
  yield piece.join('');
}

async function run(file: string, options: CheckOptions): Promise<number> {
  checkInputs(file, options.against);
  const zone = readZone(options.zone);
  const rules = await checkOutput(options, [file, options.against]);
  const work = progress();
  const record = await readRecord(file, options, work);
  work.done();
  const { check, findings, unseen } = await verdictOn(record, options.against);
  const bad = check.reasons.filter(({ flag }) => flag === 4).length;
  const doubtful = check.reasons.filter(({ flag }) => flag === 3).length;
  const text = [
    readRow(record),
    fileRows(record),
    ...check.warnings.map(({ message }) => row('note', message)),
    row(
      'flagged',
      `${counted(bad, 'run')} that ${bad === 1 ? 'fails' : 'fail'}, ${counted(doubtful, 'run')} in doubt`,
    ),
    doubtRows(findings, zone, 'fit --steps'),
    unseen === undefined ? '' : row('note', `no look for a moved zero: ${unseen}`),
    check.reasons.length === 0 ? '' : `\n${runLines(check.reasons, zone)}`,
  ].join('');
  await deliver(
    {
      text,
      json: () => findingsJson(record, check, findings),
      file: () => flagRows(record, check),
    },
    options,
    rules,
  );
  return bad > 0 || findings.length > 0 ? 1 : 0;
}

/** Adds the command. */
export function addCheck(program: Command, settle: (exit: number) => void): void {
  const command = program
    .command('check')
    .argument('<RECORD>', 'a gauge record as CSV, or -')
    .option(
      '--against <CONSTANTS>',
      'constants to hold the record against; else its own tide is fitted',
    );
  withOutput(
    withZone(withRecord(command)),
    'also write a CSV of every sample with its flag and reason',
  );
  withHelp(command, {
    question: 'what is wrong with this record?',
    have: 'record.csv',
    ask: '--time-zone Europe/Lisbon --unit m, where the file does not say',
    get: 'runs: from, to, flag, reason, measured, allowed; doubt about the zero and the clock; exit code 1 if any',
    example: 'staithe check quenby.csv',
  });
  command.action(async (file: string, options: CheckOptions) => settle(await run(file, options)));
}
