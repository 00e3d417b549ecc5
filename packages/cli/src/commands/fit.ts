/**
 * staithe fit: which constants does this record hold, and how sure are they?
 * @module
 */
import { type LongWork, toInstant } from '@staithe/core';
import { fitHarmonicsAsync, type RecordFit, leftOverAsync, type LeftOverLine } from '@staithe/fit';
import type { GaugeRecord } from '@staithe/gauge';
import { caution, constantsText } from '@staithe/report';
import type { Command } from 'commander';
import { checkOutput, deliver } from '../deliver.js';
import { inFile } from '../failure.js';
import { doubtRows, findingsJson, readRow } from '../findings.js';
import { type FitFlags, fitOptionsOf, originOf, withFit } from '../fit-options.js';
import { doubtedJson, doubtedRow, heldRow } from '../fit-rows.js';
import { withHelp } from '../help.js';
import { readRecord, type RecordOptions, withRecord } from '../input.js';
import { momentText, readZone, type Zone } from '../local-time.js';
import { type CommonOptions, withOutput, withZone, type ZoneOptions } from '../options.js';
import { findingsBy, judge, type Judged } from '../study.js';
import { counted, millimetres, progress, row, signedMillimetres } from '../terminal.js';

interface Options extends CommonOptions, RecordOptions, FitFlags, ZoneOptions {
  readonly everySample?: true;
}

/** A record with its fit. */
export interface Fitted {
  readonly record: GaugeRecord;
  readonly judged: Judged;
  readonly fit: RecordFit;
  readonly findings: ReturnType<typeof findingsBy>;
  /** Lines that stand out of the residual, the largest first. */
  readonly leftOver: readonly LeftOverLine[];
}

const MOST_LEFT_OVER = 3;

/** Reads, judges, fits, and judges again. */
export async function fitRecord(
  file: string,
  options: RecordOptions & FitFlags & { readonly everySample?: true },
  zone: Zone,
  work: LongWork,
): Promise<Fitted> {
  const asked = fitOptionsOf(options, zone);
  const record = await readRecord(file, options, work);
  const judged = judge(record);
  const series = options.everySample ? record.series : judged.kept;
  const fit = await inFile(file, () =>
    fitHarmonicsAsync(series, { ...asked, ...originOf(record, file), onProgress: work.onProgress }),
  );
  const { lines } = await leftOverAsync(fit, { most: MOST_LEFT_OVER, onProgress: work.onProgress });
  return { record, judged, fit, findings: findingsBy(record, fit), leftOver: lines };
}

/** `held      37 lines: 31 firm, 3 faint, 3 borrowed` and the other rows of a fit. */
export function fitRows(
  { record, judged, fit, findings, leftOver }: Fitted,
  zone: Zone,
  all: boolean,
): string {
  const { rms, largest, largestAt } = fit.diagnostics.residual;
  const { order, matrix } = fit.covariance;
  const steps = (fit.constants.steps ?? []).map(({ at, change }, i) => {
    const k = order.indexOf(`step[${i}]`);
    const sigma = Math.sqrt(matrix[k * (order.length + 1)] as number);
    const size = `${signedMillimetres(change)} ± ${millimetres(sigma)} mm`;
    return row('step', `zero moved ${size} on ${momentText(toInstant(at), zone)}`);
  });
  const set = `${counted(judged.failed, 'sample')} that ${judged.failed === 1 ? 'fails' : 'fail'}`;
  return [
    readRow(record),
    ...record.warnings.map(({ message }) => row('note', message)),
    judged.failed === 0
      ? ''
      : row('set aside', all ? `none, not even ${set}` : `${set}; see staithe check`),
    doubtedRow(fit.resistant, 'sample'),
    heldRow(fit.constants.constituents),
    row(
      'not tide',
      `${millimetres(rms)} mm typical, ${millimetres(largest)} mm worst (${momentText(largestAt, zone)})`,
    ),
    ...leftOver.map(({ speed, amplitude, likely }) => {
      const guess = likely === undefined ? '' : `, likely ${likely}`;
      return row('left over', `near ${speed.toFixed(3)}°/h, ${millimetres(amplitude)} mm${guess}`);
    }),
    ...steps,
    ...fit.warnings.map(({ message }) => row('note', message)),
    doubtRows(findings, zone, '--steps'),
  ].join('');
}

async function run(file: string, options: Options): Promise<number> {
  const zone = readZone(options.zone);
  const rules = await checkOutput(options, [file]);
  const work = progress();
  const fitted = await fitRecord(file, options, zone, work);
  work.done();
  const { record, judged, fit, findings, leftOver } = fitted;
  const { constants, diagnostics } = fit;
  await deliver(
    {
      text: `${fitRows(fitted, zone, options.everySample === true)}\n${constantsText(constants, diagnostics)}\n`,
      json: () => ({
        constants,
        diagnostics,
        warnings: fit.warnings,
        leftOver,
        ...doubtedJson(fit),
        setAside: options.everySample ? 0 : judged.failed,
        check: findingsJson(record, judged.check, findings),
        caution: caution('levels'),
      }),
      file: () => [`${JSON.stringify(constants, null, 2)}\n`],
    },
    options,
    rules,
  );
  return 0;
}

/** Adds the command. */
export function addFit(program: Command, settle: (exit: number) => void): void {
  const command = program.command('fit').argument('<RECORD>', 'a gauge record as CSV, or -');
  withRecord(withFit(command)).option('--every-sample', 'fit samples that fail the checks as well');
  withOutput(withZone(command), 'write the constants document');
  withHelp(command, {
    question: 'which constants does this record hold, and how sure are they?',
    have: 'record.csv',
    ask: '--place "Quenby Haven" --latitude 44.62 --longitude -14.25 --write quenby.constants.json',
    get: 'how much was read, held and left over; H and G of each constituent with its 95 % disc; constants.json',
    example:
      'staithe fit quenby.csv --place "Quenby Haven" --latitude 44.62 --write quenby.constants.json',
  });
  command.action(async (file: string, options: Options) => settle(await run(file, options)));
}
