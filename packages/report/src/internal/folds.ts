/**
 * The rows of a folded record: what a thin curve can show, and what the margin says.
 * @module
 */
import type { Instant } from '@staithe/core';
import { groups } from 'd3-array';
import type { FlaggedRun } from '../types.js';
import { type Child, element } from './markup.js';
import { duration } from './numbers.js';
import type { Samples } from './samples.js';
import { cleanText } from './text.js';
import { wallText } from './zone.js';

export const FLAG_WORDS: Readonly<Record<number, string>> = {
  3: 'doubtful',
  4: 'rejected',
  9: 'missing',
};

export interface Row {
  readonly from: Instant;
  readonly to: Instant;
  /** Top and bottom of its curve. */
  readonly top: number;
  readonly bottom: number;
}

/** Lowest and highest sample of each column of pixels, in order of time: what a thin curve can show. */
export function thinned(
  samples: Samples,
  first: number,
  row: Row,
  columns: number,
): [Instant, number][] {
  const { times, values, step } = samples;
  const points: [Instant, number][] = [];
  let column = -1;
  let low = -1;
  let high = -1;
  const flush = (): void => {
    if (low < 0) return;
    for (const i of low === high ? [low] : [Math.min(low, high), Math.max(low, high)]) {
      points.push([times[i] as number, values[i] as number]);
    }
    low = -1;
    high = -1;
  };
  let before = Number.NaN;
  for (let i = first; i < times.length && (times[i] as number) < row.to; i++) {
    const t = times[i] as number;
    const value = values[i] as number;
    const here = Math.floor(((t - row.from) / (row.to - row.from)) * columns);
    const broken = Number.isNaN(value) || t - before > 3 * step;
    if (here !== column || broken) flush();
    if (broken) points.push([t, Number.NaN]);
    column = here;
    before = t;
    if (Number.isNaN(value)) continue;
    if (low < 0 || value < (values[low] as number)) low = i;
    if (high < 0 || value > (values[high] as number)) high = i;
  }
  flush();
  return points;
}

export const HALF = 0.5; // of the weight of a sample as good as any

/** Samples of less than half weight in a row, at most one in a few pixels: of those the one of least weight. */
export function doubted(
  { times, values }: Samples,
  weights: ArrayLike<number>,
  first: number,
  row: Row,
  columns: number,
): [Instant, number][] {
  const least = new Map<number, number>();
  for (let i = first; i < times.length && (times[i] as number) < row.to; i++) {
    if (!((weights[i] as number) < HALF) || Number.isNaN(values[i])) continue;
    const share = ((times[i] as number) - row.from) / (row.to - row.from);
    const column = Math.floor(share * columns);
    const held = least.get(column);
    if (held === undefined || (weights[i] as number) < (weights[held] as number)) {
      least.set(column, i);
    }
  }
  return [...least.values()].map((i) => [times[i] as number, values[i] as number]);
}

/** What the margin says of a row: `flat line, rejected, 2.0 d`, the longest first. */
export function marginNames(runs: readonly FlaggedRun[], row: Row, step: number): string[] {
  const here = runs.filter(({ from, to }) => from < row.to && to + step > row.from);
  return groups(here, ({ flag, reason }) => `${flag} ${reason}`)
    .map(([, members]) => {
      const [{ flag, reason }] = members as [FlaggedRun];
      const long = members.reduce((sum, { from, to }) => {
        return sum + Math.min(to + step, row.to) - Math.max(from, row.from);
      }, 0);
      const times = members.length > 1 ? ` ×${members.length}` : '';
      const words = flag === 9 && reason === 'gap' ? '' : `, ${FLAG_WORDS[flag] ?? `flag ${flag}`}`;
      // A run of one sample has no length worth telling.
      const lasting = long > members.length * step ? `, ${duration(long)}` : '';
      return { long, text: `${cleanText(reason, 40)}${times}${words}${lasting}` };
    })
    .sort((a, b) => b.long - a.long)
    .map(({ text }) => text);
}

/** The date of a row and the names of its runs, in the margin or, where there is none, above the curve. */
export function captions(
  row: Row,
  names: readonly string[],
  at: { left: number; plot: number; width: number; narrow: boolean },
): Child[] {
  const date = wallText('%-d %b %Y', row.from);
  if (at.narrow) {
    const room = Math.floor((at.width - 96) / 5.9);
    let text = '';
    let shown = 0;
    for (const name of names) {
      if (text.length + name.length + 2 > room && shown > 0) break;
      text += (shown === 0 ? '' : '; ') + name;
      shown += 1;
    }
    const more = names.length > shown ? ` +${names.length - shown}` : '';
    return [
      element('text', { class: 'ink tiny strong halo', x: at.left, y: row.top - 4 }, date),
      element('text', { class: 'muted tiny halo', x: at.left + 80, y: row.top - 4 }, text + more),
    ];
  }
  const most = 3;
  const shown =
    names.length > most
      ? [...names.slice(0, most - 1), `and ${names.length - most + 1} more kinds`]
      : names;
  const middle = (row.top + row.bottom) / 2;
  const x = at.left + at.plot + 8;
  return [
    element(
      'text',
      { class: 'ink small', x: at.left - 8, y: middle + 4, 'text-anchor': 'end' },
      date,
    ),
    shown.map((name, i) =>
      element(
        'text',
        { class: 'muted tiny', x, y: middle + 3.5 + (i - (shown.length - 1) / 2) * 10.5 },
        name,
      ),
    ),
  ];
}
