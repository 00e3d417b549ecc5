/**
 * Samples on their way in: order, duplicates, differences.
 * @module
 */
import { formatInstant, InputError } from '@staithe/core';
import type { ReadOptions } from '../record.js';
import { type NumberColumn, numberColumn } from './columns.js';
import type { WarningList } from './warnings.js';

export interface Samples {
  readonly times: NumberColumn;
  readonly values: NumberColumn;
  /** How often each difference between times occurs; at most 4096 different ones. */
  readonly steps: ReadonlyMap<number, number>;
}

export interface Collector {
  readonly push: (time: number, value: number, line: number) => void;
  readonly finish: () => Samples;
}

const MOST_STEPS = 4096;

/** Takes samples in rising order. Equal duplicates become one; a gap and a height become the height. */
function risingCollector(options: ReadOptions, warnings: WarningList): Collector {
  const times = numberColumn('steady');
  const values = numberColumn('decimal');
  const steps = new Map<number, number>();
  let heldTime = Number.NaN;
  let heldValue = Number.NaN;
  let heldLine = 0;

  const flush = (): void => {
    times.push(heldTime);
    values.push(heldValue);
  };
  const push = (time: number, value: number, line: number): void => {
    if (time > heldTime) {
      const step = time - heldTime;
      const count = steps.get(step);
      if (count !== undefined || steps.size < MOST_STEPS) steps.set(step, (count ?? 0) + 1);
      flush();
    } else if (time === heldTime) {
      if (value !== heldValue && !Number.isNaN(value) && !Number.isNaN(heldValue)) {
        if (options.onConflict !== 'first') {
          throw new InputError(
            'CONFLICT',
            `line ${line}`,
            `expected ${heldValue} m at ${formatInstant(time)} as on line ${heldLine}, got ${value} m`,
            { line, earlierLine: heldLine },
          );
        }
        warnings.add('CONFLICTS_RESOLVED', 'two heights at one time, the first kept', line);
        return;
      }
      warnings.add('DUPLICATES', 'a time given twice with one height', line);
      if (!Number.isNaN(value)) heldValue = value;
      return;
    } else if (time < heldTime) {
      throw new InputError(
        'NOT_RISING',
        `line ${line}`,
        `expected a time after ${formatInstant(heldTime)}, got ${formatInstant(time)}`,
        { line },
      );
    }
    heldTime = time;
    heldValue = value;
    heldLine = line;
  };
  const finish = (): Samples => {
    if (!Number.isNaN(heldTime)) flush();
    return { times, values, steps };
  };
  return { push, finish };
}

/** Takes samples in any order and hands them on sorted; of equal times the earlier line comes first. */
function sortingCollector(options: ReadOptions, warnings: WarningList): Collector {
  const times = numberColumn('steady');
  const values = numberColumn('decimal');
  const lines = numberColumn('steady');
  let latest = Number.NEGATIVE_INFINITY;
  const push = (time: number, value: number, line: number): void => {
    if (time < latest) warnings.add('SORTED', 'a time before an earlier line, sorted', line);
    else latest = time;
    times.push(time);
    values.push(value);
    lines.push(line);
  };
  const finish = (): Samples => {
    const order = new Uint32Array(times.length());
    for (let i = 0; i < order.length; i++) order[i] = i;
    order.sort((a, b) => times.at(a) - times.at(b) || a - b);
    const rising = risingCollector(options, warnings);
    for (const i of order) rising.push(times.at(i), values.at(i), lines.at(i));
    return rising.finish();
  };
  return { push, finish };
}

/** The collector that the options ask for. */
export function sampleCollector(options: ReadOptions, warnings: WarningList): Collector {
  return options.onDisorder === 'sort'
    ? sortingCollector(options, warnings)
    : risingCollector(options, warnings);
}
