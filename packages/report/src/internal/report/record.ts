/**
 * Question 2: what was wrong with the record?
 * @module
 */
import { groups, max } from 'd3-array';
import { drawFoldedRecord } from '../../folded-record.js';
import type { FlaggedRun } from '../../types.js';
import type { Child } from '../markup.js';
import { count, counted, duration, metres, signedMillimetres } from '../numbers.js';
import { cleanText } from '../text.js';
import { type Facts, momentIn } from './facts.js';
import { bullets, figure, paragraph, type Question, table } from './page.js';

const FLAGS: Readonly<Record<number, string>> = { 3: 'doubtful', 4: 'rejected', 9: 'missing' };

/** A figure of a run in the unit of its test: lengths of time, metres an hour, or metres. */
function figureOf(reason: string, value: number): string {
  if (reason === 'flat line' || reason === 'gap') return duration(value);
  return reason === 'rate of change' ? `${metres(value)} m/h` : `${metres(value)} m`;
}

function worstOf(reason: string, members: readonly FlaggedRun[]): string {
  const worst = max(members, ({ measured }) =>
    measured === undefined ? undefined : Math.abs(measured),
  );
  if (worst === undefined) return '';
  const run = members.find(
    ({ measured }) => measured !== undefined && Math.abs(measured) === worst,
  ) as FlaggedRun;
  const allowed =
    run.allowed === undefined ? [] : typeof run.allowed === 'number' ? [run.allowed] : run.allowed;
  const limit =
    allowed.length > 0
      ? ` (allowed ${allowed.map((value) => figureOf(reason, value)).join(' to ')})`
      : '';
  return figureOf(reason, run.measured as number) + limit;
}

function faultTable(runs: readonly FlaggedRun[], step: number): Child {
  const kinds = groups(
    runs.filter(({ flag }) => flag in FLAGS),
    ({ flag, reason }) => `${flag} ${reason}`,
  ).map(([, members]) => {
    const [{ flag, reason }] = members as [FlaggedRun];
    const long = members.reduce((sum, { from, to }) => sum + to - from + step, 0);
    return {
      long,
      row: [
        cleanText(reason, 40),
        FLAGS[flag],
        String(members.length),
        duration(long),
        worstOf(reason, members),
      ],
    };
  });
  kinds.sort((a, b) => b.long - a.long);
  if (kinds.length === 0) return paragraph('No sample was flagged.');
  const columns = [
    { head: 'reason' },
    { head: 'so it is' },
    { head: 'runs', class: 'number' },
    { head: 'together', class: 'number' },
    { head: 'worst', class: 'aside' },
  ];
  return table(
    columns,
    kinds.map(({ row }) => row),
  );
}

function doubted({ input }: Facts): string[] {
  const { resistant } = input.fit;
  if (resistant === undefined) return [];
  const { doubted: n, setAside } = resistant;
  if (n === 0) return ['The fit gave no sample less than half weight.'];
  const none = setAside === 0 ? '' : `, ${count(setAside)} of them none`;
  return [`The fit gave ${counted(n, 'sample')} less than half weight${none}.`];
}

export function recordFaults(facts: Facts): Question {
  const title = 'What was wrong with the record?';
  const { record, input, zone, place } = facts;
  if (record === undefined || input.record === undefined) {
    return { title, body: paragraph('No record was given: the constants came as a document.') };
  }
  const { runs, gaps = [], steps = [], findings = [], series } = input.record;
  const weights = input.fit.resistant?.weights;
  const all = [
    ...runs,
    ...gaps.map(
      ({ from, to }): FlaggedRun => ({ from, to: to - record.step, flag: 9, reason: 'gap' }),
    ),
  ];
  const zero = steps.map(({ at, change, sigma }) => {
    const sure = sigma === undefined ? '' : ` ± ${(sigma * 1000).toFixed(0)}`;
    return `The zero moved by ${signedMillimetres(change)}${sure} mm on ${momentIn(zone, at)}.`;
  });
  const body: Child = [
    paragraph(
      `${count(record.missing)} of ${counted(record.due, 'sample')} ${record.missing === 1 ? 'is' : 'are'} missing, one due every ${duration(record.step)}; the longest time without any is ${duration(record.longestGap)}.`,
    ),
    bullets([...zero, ...doubted(facts), ...findings]),
    figure((options) =>
      drawFoldedRecord(
        { series, runs, gaps, steps, weights, title: `The record of ${place}` },
        options,
      ),
    ),
    faultTable(all, record.step),
  ];
  return { title, body };
}
