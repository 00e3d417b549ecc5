/**
 * The rows and the JSON of what was found in a record.
 * @module
 */
import { formatInstant, HOUR, MINUTE } from '@staithe/core';
import type { GaugeRecord, RecordCheck, Run } from '@staithe/gauge';
import { momentText, type Zone } from './local-time.js';
import { type RecordSize, sizeOf } from './study.js';
import { counted, millimetres, count, row, signedMillimetres } from './terminal.js';

/** `read      94 210 of 94 896 samples, 686 missing in 14 gaps`. */
export function sizeRow({ due, there, missing, gaps }: RecordSize, one: string): string {
  const lost =
    missing > 0 || gaps > 0 ? `, ${count(missing)} missing in ${counted(gaps, 'gap')}` : '';
  return row('read', `${count(there)} of ${counted(due, one)}${lost}`);
}

/** The same of a record of heights. */
export const readRow = (record: GaugeRecord): string => sizeRow(sizeOf(record), 'sample');

/** What the file gave, and what had to be put right. */
export function fileRows(record: GaugeRecord): string {
  const datum = record.datum === undefined ? '' : `, above ${record.datum}`;
  const warnings = record.warnings.map(({ message }) => row('note', message));
  return (
    row('found', `times ${record.timeZone}, heights in ${record.unit}${datum}`) + warnings.join('')
  );
}

/** `doubt     zero moved +79 ± 4 mm on 2031-09-18 10:30Z; see --steps`: `see` names the option that takes the step. */
export function doubtRows(findings: RecordCheck['findings'], zone: Zone, see: string): string {
  return findings
    .map((finding) => {
      if (finding.kind === 'zero-moved') {
        const { change, sigma, at } = finding;
        const size = `${signedMillimetres(change)} ± ${millimetres(sigma)} mm`;
        return row('doubt', `zero moved ${size} on ${momentText(at, zone)}; see ${see}`);
      }
      const { minutes, sigma, from, to } = finding;
      const size = `${Math.abs(minutes).toFixed(0)} ± ${sigma.toFixed(0)} min ${minutes > 0 ? 'late' : 'early'}`;
      return row(
        'doubt',
        `clock ${size} from ${momentText(from, zone)} to ${momentText(to, zone)}`,
      );
    })
    .join('');
}

function spanText(ms: number): string {
  if (ms >= 48 * HOUR) return `${(ms / (24 * HOUR)).toFixed(1)} d`;
  return ms >= 2 * HOUR ? `${(ms / HOUR).toFixed(1)} h` : `${Math.round(ms / MINUTE)} min`;
}

/** A figure of a run in the unit of its test. */
function figureText({ reason }: Run, value: number): string {
  if (reason === 'gap' || reason === 'flat line') return spanText(value);
  if (reason === 'rate of change') return `${value.toFixed(2)} m/h`;
  return reason === 'gross range' || reason === 'climatology'
    ? `${value.toFixed(2)} m`
    : `${millimetres(value)} mm`;
}

function allowedText(run: Run): string {
  const { allowed } = run;
  if (allowed === undefined) return '';
  const list = typeof allowed === 'number' ? [allowed] : allowed;
  return list.map((value) => figureText(run, value)).join(' to ');
}

const FLAG_WORDS: Readonly<Record<number, string>> = { 3: 'suspect', 4: 'fail', 9: 'missing' };

/** The runs as lines in columns: from, to, flag, reason, measured, allowed. */
export function runLines(runs: readonly Run[], zone: Zone): string {
  const cells = runs.map((run) => [
    momentText(run.from, zone),
    momentText(run.to, zone),
    `${run.flag} ${FLAG_WORDS[run.flag] ?? ''}`,
    run.reason,
    run.measured === undefined ? '' : figureText(run, run.measured),
    allowedText(run),
  ]);
  const table = [['from', 'to', 'flag', 'reason', 'measured', 'allowed'], ...cells];
  const widths = (table[0] as string[]).map((_, i) =>
    Math.max(...table.map((line) => (line[i] as string).length)),
  );
  return table
    .map((line) =>
      `  ${line.map((cell, i) => cell.padEnd(widths[i] as number)).join('  ')}`.trimEnd(),
    )
    .map((line) => `${line}\n`)
    .join('');
}

const instants = (value: object): object =>
  Object.fromEntries(
    Object.entries(value).map(([key, part]: [string, unknown]) => {
      const isInstant = key === 'from' || key === 'to' || key === 'at';
      return [key, isInstant ? formatInstant(part as number) : part];
    }),
  );

/** The same as plain data; instants are ISO 8601 text in UTC. */
export function findingsJson(
  record: GaugeRecord,
  check: RecordCheck,
  findings: RecordCheck['findings'],
): object {
  const flags: Record<string, number> = {};
  for (const flag of check.flags) flags[flag] = (flags[flag] ?? 0) + 1;
  const { due, there, missing, gaps } = sizeOf(record);
  return {
    record: {
      samples: due,
      read: there,
      missing,
      gaps,
      unit: record.unit,
      timeZone: record.timeZone,
      ...(record.datum === undefined ? {} : { datum: record.datum }),
      ...(record.step === undefined ? {} : { stepSeconds: record.step / 1000 }),
    },
    flags,
    runs: check.reasons.map(instants),
    findings: findings.map(instants),
    limits: check.limits,
    warnings: [...record.warnings, ...check.warnings],
  };
}
