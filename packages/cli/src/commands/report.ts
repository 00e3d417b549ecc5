/**
 * staithe report: one page that answers for every number.
 * @module
 */
import { DAY, HOUR, MINUTE, toInstant } from '@staithe/core';
import { tideCurve } from '@staithe/predict';
import { caution, reportHtml } from '@staithe/report';
import type { Command } from 'commander';
import { createHash } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { checkOutput, deliver } from '../deliver.js';
import { inFile } from '../failure.js';
import { type FitFlags, withFit } from '../fit-options.js';
import { withHelp } from '../help.js';
import { type RecordOptions, withRecord } from '../input.js';
import { dayOf, monthOf, readZone } from '../local-time.js';
import {
  type CommonOptions,
  numberOf,
  withOutput,
  withZone,
  type ZoneOptions,
} from '../options.js';
import { datumName } from '../place.js';
import { levelsOf } from '../rungs.js';
import { progress } from '../terminal.js';
import { ownVersion } from '../version.js';
import { type Fitted, fitRecord, fitRows } from './fit.js';
import { readMonth } from './table.js';

interface Options extends CommonOptions, RecordOptions, FitFlags, ZoneOptions {
  readonly month?: string;
  readonly above?: number;
  readonly below?: number;
  readonly everySample?: true;
}

const WEEK = 7 * DAY;
const STEP = 6 * MINUTE;

/** SHA-256 of a file; standard input has been read by now and has none. */
async function digestOf(file: string): Promise<string | undefined> {
  if (file === '-') return undefined;
  const hash = createHash('sha256');
  for await (const piece of createReadStream(file)) hash.update(piece as Uint8Array);
  return hash.digest('hex');
}

async function pageOf(file: string, options: Options, fitted: Fitted): Promise<string> {
  const { record, judged, fit, findings, leftOver } = fitted;
  const { constants } = fit;
  const zone = readZone(options.zone);
  // The month after the record, where nobody asks for another: a report that is made twice is the same twice.
  const { month, span } = readMonth(options.month ?? monthOf(fit.diagnostics.to, zone, 1), zone);
  const curve = tideCurve(constants);
  const { above, below } = options;
  const asksWindows = above !== undefined || below !== undefined;
  const { rungs, limits } = levelsOf(constants, judged.kept, undefined);
  const sha256 = await digestOf(file);
  const weekEnd = dayOf(span.from + WEEK + 12 * HOUR, zone); // whole local days, whatever the clocks do
  return reportHtml({
    place: constants.place ?? { name: 'A place without name' },
    datum: datumName(constants.datum),
    timeZone: zone.name,
    record: {
      series: record.series,
      runs: judged.check.reasons,
      steps: [
        ...(constants.steps ?? []).map(({ at, change }) => ({ at: toInstant(at), change })),
        ...findings.filter((finding) => finding.kind === 'zero-moved'),
      ],
      findings: record.warnings.map(({ message }) => message),
    },
    fit: { ...fit, errorModel: options.errorModel, leftOver },
    turningPoints: curve.turningPoints({ from: span.from - DAY, to: span.to + DAY }),
    month,
    weekHeights: curve.heights({
      start: span.from,
      step: STEP,
      count: Math.round((weekEnd - span.from) / STEP),
    }),
    ...(asksWindows
      ? { windows: { list: curve.windows({ above, below }, span), above, below, ...span } }
      : {}),
    levels: rungs,
    limits,
    generatedFrom: {
      program: `staithe ${ownVersion()}`,
      ...(file === '-' ? {} : { file: file.replace(/^.*[\\/]/, '') }),
      ...(sha256 === undefined ? {} : { sha256 }),
    },
  });
}

async function run(file: string, options: Options): Promise<number> {
  const zone = readZone(options.zone);
  const rules = await checkOutput(options, [file]);
  const work = progress();
  const fitted = await fitRecord(file, options, zone, work);
  work.done();
  const page = await inFile(file, () => pageOf(file, options, fitted));
  const rows = fitRows(fitted, zone, options.everySample === true);
  await deliver(
    {
      ...(options.write === undefined ? {} : { text: rows, caution: caution('heights') }),
      file: () => [page],
      json: () => ({
        ...(options.write === undefined ? { html: page } : { wrote: options.write }),
        characters: page.length,
        caution: caution('heights'),
      }),
    },
    options,
    rules,
  );
  return 0;
}

/** Adds the command. */
export function addReport(program: Command, settle: (exit: number) => void): void {
  const height = (flag: string): ((text: string) => number) => numberOf(flag, -100, 100, 'metres');
  const command = program
    .command('report')
    .argument('<RECORD>', 'a gauge record as CSV, or -')
    .option('--month <MONTH>', 'the month shown, 2031-06; the one after the record if absent')
    .option(
      '--above <METRES>',
      'windows in which the water is at least this high',
      height('--above'),
    )
    .option(
      '--below <METRES>',
      'windows in which the water is at most this high',
      height('--below'),
    );
  withRecord(withFit(command)).option('--every-sample', 'fit samples that fail the checks as well');
  withOutput(withZone(command), 'write the page to FILE in place of standard output');
  withHelp(command, {
    question: 'what can I rely on, and where does each number come from?',
    have: 'record.csv',
    ask: '--place "Quenby Haven" --latitude 44.62 --zone Europe/Lisbon --above 4.2 --write quenby.html',
    get: 'one HTML page that asks for nothing: faults, constants, what is not tide, windows, a month, levels',
    example: 'staithe report quenby.csv --place "Quenby Haven" --above 4.2 --write quenby.html',
  });
  command.action(async (file: string, options: Options) => settle(await run(file, options)));
}
