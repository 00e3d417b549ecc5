/**
 * Numbers of a report that several questions share.
 * @module
 */
import { type Instant, parseConstants } from '@staithe/core';
import { max, min, sum } from 'd3-array';
import { readSamples } from '../samples.js';
import { requiredText } from '../text.js';
import { momentText, offsetName, readZone, wallText, type Zone } from '../zone.js';
import type { ReportInput } from './input.js';

export interface Facts {
  readonly input: ReportInput;
  readonly place: string;
  readonly datum: string;
  readonly zone: Zone;
  readonly month: string | undefined;
  readonly record: RecordFacts | undefined;
}

interface RecordFacts {
  readonly due: number;
  readonly read: number;
  readonly missing: number;
  readonly from: Instant;
  readonly to: Instant;
  readonly step: number;
  /** Longest time without samples, milliseconds. */
  readonly longestGap: number;
}

export function readFacts(input: ReportInput): Facts {
  const zone = readZone(input.timeZone);
  parseConstants(input.fit.constants);
  const first = min(input.turningPoints, ({ time }) => time);
  return {
    input,
    place: requiredText(input.place?.name, 'place.name'),
    datum: requiredText(input.datum, 'datum'),
    zone,
    month: input.month ?? (first === undefined ? undefined : wallText('%Y-%m', zone.wallAt(first))),
    record: recordFacts(input),
  };
}

function recordFacts({ record }: ReportInput): RecordFacts | undefined {
  if (record === undefined) return undefined;
  const { values, times, step, from, to } = readSamples(record.series);
  const lost = record.missing ?? values.reduce((n, value) => n + (Number.isNaN(value) ? 1 : 0), 0);
  const read = record.read ?? values.length - lost;
  let longestGap = 0;
  let last = from;
  values.forEach((value, i) => {
    if (Number.isNaN(value)) return;
    longestGap = Math.max(longestGap, (times[i] as number) - last - step);
    last = times[i] as number;
  });
  return { due: read + lost, read, missing: lost, from, to, step, longestGap };
}

/** `3 Feb 2031 05:10 UTC+01:00`. */
export const momentIn = (zone: Zone, t: Instant): string =>
  `${momentText(zone, t, '%-d %b %Y %H:%M')} ${zone.name === 'UTC' ? 'UTC' : offsetName(zone.offsetAt(t))}`;

/** `3 Feb 2031`. */
export const dateIn = (zone: Zone, t: Instant): string => wallText('%-d %b %Y', zone.wallAt(t));

/** Milliseconds that windows are open together, the shortest and the longest. */
export function openTimes(list: readonly { from: Instant; to: Instant }[]): {
  all: number;
  least: number;
  most: number;
} {
  const long = list.map(({ from, to }) => to - from);
  return { all: sum(long), least: min(long) ?? 0, most: max(long) ?? 0 };
}
