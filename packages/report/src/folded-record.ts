/**
 * The record: time folded into rows of a fortnight, each a thin curve, with what was flagged shaded and named.
 * @module
 */
import { DAY, describe, InputError, type InstantLike, type Series, toInstant } from '@staithe/core';
import { extent } from 'd3-array';
import { scaleLinear } from 'd3-scale';
import { line } from 'd3-shape';
import { utcDay } from 'd3-time';
import {
  captions,
  doubted,
  FLAG_WORDS,
  HALF,
  marginNames,
  type Row,
  thinned,
} from './internal/folds.js';
import { type Child, element } from './internal/markup.js';
import { counted, metres, signedMillimetres } from './internal/numbers.js';
import {
  headHeight,
  type Picture,
  type PictureOptions,
  readOptions,
  standalone,
  textWidth,
} from './internal/picture.js';
import { covering, readSamples } from './internal/samples.js';
import { requiredText } from './internal/text.js';
import type { FlaggedRun, RecordGap, ZeroStep } from './types.js';

/** A record with what was found in it. @public */
export interface FoldedRecordInput {
  readonly series: Series;
  readonly runs: readonly FlaggedRun[];
  /** Gaps that are not among the runs (flag 9). */
  readonly gaps?: readonly RecordGap[] | undefined;
  readonly steps?: readonly ZeroStep[] | undefined;
  /** Of a resistant fit, one a sample of the series: those of less than half weight are marked. */
  readonly weights?: ArrayLike<number> | undefined;
  readonly title: string;
}

/** Options of the folded record. @public */
export interface FoldedRecordOptions extends PictureOptions {
  /** Where to begin in a long record; 30 rows are drawn. Default: where it begins. */
  readonly from?: InstantLike | undefined;
}

const FORTNIGHT = 14 * DAY;
const MOST_ROWS = 30; // thirteen months fit, and so does a sheet of A4
const RING = 2.6; // pixels: the mark of a doubted sample
const SHADES: Readonly<Record<number, string>> = { 3: 'doubtful', 4: 'rejected', 9: 'blank' };

function readWeights({ weights }: FoldedRecordInput, count: number): ArrayLike<number> {
  if (weights === undefined || weights.length === count) return weights ?? [];
  const text = `expected ${count}, one a sample, got ${describe(weights.length)}`;
  throw new InputError('LENGTH_MISMATCH', 'weights', text);
}

/** The picture without its frame. */
export function drawFoldedRecord(input: FoldedRecordInput, options: FoldedRecordOptions): Picture {
  const { width, theme, narrow } = readOptions(options);
  const title = requiredText(input.title, 'title');
  const samples = readSamples(input.series);
  const { step } = samples;
  const weights = readWeights(input, samples.times.length);
  const runs = [
    ...input.runs.filter(({ flag }) => flag in SHADES),
    ...(input.gaps ?? []).map(
      (gap): FlaggedRun => ({ ...gap, to: gap.to - step, flag: 9, reason: 'gap' }),
    ),
  ];
  const asked = options.from === undefined ? samples.from : toInstant(options.from, 'options.from');
  if (asked >= samples.to) {
    const expected = `expected an instant before the record ends at ${samples.to}`;
    throw new InputError('OUT_OF_RANGE', 'options.from', `${expected}, got ${describe(asked)}`);
  }
  const begin = utcDay.floor(new Date(Math.max(asked, samples.from))).getTime();
  const all = Math.max(1, Math.ceil((samples.to - begin) / FORTNIGHT));
  const count = Math.min(all, MOST_ROWS);

  const left = narrow ? 8 : 84;
  const right = narrow ? 8 : 212;
  const plot = width - left - right;
  const pitch = narrow ? 52 : 34;
  const cap = narrow ? 15 : 2; // room above a curve: on a phone the names stand there
  const notes = ['days in UTC, a fortnight a row, all rows on one scale'];
  if (count < all) notes.push(`${count} of ${all} fortnights of the record are drawn`);
  const top = headHeight(notes) + 14;
  const rows = Array.from({ length: count }, (_, i): Row => {
    const y = top + i * pitch;
    const from = begin + i * FORTNIGHT;
    return { from, to: from + FORTNIGHT, top: y + cap, bottom: y + pitch - 3 };
  });

  // What was rejected, and single samples in doubt, must not flatten all the rest: they are cut at the edge of a row.
  const besides = covering(
    runs.filter(({ flag, from, to }) => flag === 4 || (flag === 3 && to - from < 3 * step)),
  );
  const sound = Array.from(samples.values, (value, i) =>
    besides(samples.times[i] as number) ? Number.NaN : value,
  );
  const [low = 0, high = 1] = extent(sound) as [number?, number?];
  const domain: [number, number] = high > low ? [low, high] : [low - 0.5, high + 0.5];
  const heightOf = (row: Row) =>
    scaleLinear().domain(domain).range([row.bottom, row.top]).clamp(true);
  const xOf = (row: Row) =>
    scaleLinear()
      .domain([row.from, row.to])
      .range([left, left + plot])
      .clamp(true);

  const body: Child[] = [];
  const days = scaleLinear()
    .domain([0, 14])
    .range([left, left + plot]);
  const lastBottom = (rows[count - 1] as Row).bottom;
  for (const day of days.ticks(14)) {
    const x = days(day);
    body.push(element('line', { class: 'line-grid', x1: x, x2: x, y1: top, y2: lastBottom }));
    if (day < 14 && (!narrow || day % 2 === 0)) {
      const place = { x: days(day + 0.5), y: top - 4, 'text-anchor': 'middle' };
      const text = day === 0 ? 'day 1' : `${day + 1}`;
      body.push(element('text', { class: 'muted tiny', ...place }, text));
    }
  }
  let first = 0;
  for (const row of rows) {
    const x = xOf(row);
    const y = heightOf(row);
    for (const run of runs) {
      if (run.from >= row.to || run.to + step <= row.from) continue;
      const x1 = x(run.from);
      const wide = Math.max(x(run.to + step) - x1, 1.5);
      const kind = SHADES[run.flag] as string;
      const tall = run.flag === 9 ? 4 : row.bottom - row.top;
      const at = { x: x1, y: run.flag === 9 ? row.bottom - tall : row.top };
      body.push(element('rect', { class: kind, ...at, width: wide, height: tall }));
    }
    while (first < samples.times.length && (samples.times[first] as number) < row.from) first++;
    const path = line()
      .defined(([, value]) => !Number.isNaN(value))
      .x(([t]) => x(t))
      .y(([, value]) => y(value))
      .digits(1)(thinned(samples, first, row, Math.round(plot)));
    if (path) body.push(element('path', { class: 'line-water', 'stroke-width': 0.8, d: path }));
    for (const [t, value] of doubted(samples, weights, first, row, plot / RING)) {
      body.push(element('circle', { class: 'line-reject', cx: x(t), cy: y(value), r: RING }));
    }
    for (const { at, change } of input.steps ?? []) {
      if (at < row.from || at >= row.to) continue;
      const text = `zero ${signedMillimetres(change)} mm`;
      const leftward = x(at) + textWidth(text, 11) + 6 > left + plot;
      body.push(
        element('line', {
          class: 'line-reject dotted',
          'stroke-width': 2,
          x1: x(at),
          x2: x(at),
          y1: row.top - 1,
          y2: row.bottom + 1,
        }),
        element(
          'text',
          {
            class: 'reject small strong halo',
            x: x(at) + (leftward ? -5 : 5),
            y: row.top + 10,
            'text-anchor': leftward ? 'end' : 'start',
          },
          text,
        ),
      );
    }
    body.push(...captions(row, marginNames(runs, row, step), { left, plot, width, narrow }));
  }
  const bar = scaleBar(domain);
  const long = heightOf(rows[0] as Row)(low) - heightOf(rows[0] as Row)(low + bar);
  const legend = lastBottom + 26;
  body.push(
    element('line', {
      class: 'line-ink',
      'stroke-width': 2,
      x1: left,
      x2: left,
      y1: legend - long / 2 - 4,
      y2: legend + long / 2 - 4,
    }),
    element(
      'text',
      { class: 'ink small', x: left + 6, y: legend },
      `${metres(bar, bar < 1 ? 1 : 0)} m`,
    ),
    legendKey(left + 62, legend, narrow),
  );
  let bottom = legend + Math.max(12, long / 2 + 4);
  if (input.weights !== undefined) {
    const below = Array.from(weights).filter((weight) => weight < HALF).length;
    const y = narrow ? bottom + 8 : legend;
    body.push(weightKey(narrow ? left + 62 : left + 350, y, below));
    bottom = Math.max(bottom, y + 12);
  }
  return { width, height: bottom, title, note: notes, theme, body };
}

/** What the circles mean, and how many samples have one, those beside each other counted each. */
function weightKey(x: number, y: number, below: number): Child {
  return [
    element('circle', { class: 'line-reject', cx: x + 7, cy: y - 4, r: RING }),
    element(
      'text',
      { class: 'ink small', x: x + 19, y },
      `less than half weight in the fit: ${counted(below, 'sample')}`,
    ),
  ];
}

/** A round height for the scale bar, about half of what there is. */
function scaleBar([low, high]: readonly [number, number]): number {
  const ticks = scaleLinear()
    .domain([0, high - low])
    .ticks(2);
  return ticks[1] ?? high - low;
}

function legendKey(x: number, y: number, narrow: boolean): Child {
  const gap = narrow ? 78 : 96;
  return Object.entries(FLAG_WORDS).map(([flag, word], i) => [
    element('rect', {
      class: SHADES[+flag],
      x: x + i * gap,
      y: y - 10,
      width: 14,
      height: 12,
    }),
    element('text', { class: 'ink small', x: x + i * gap + 19, y }, word),
  ]);
}

/**
 * Draws the record folded in rows of a fortnight: a thin curve a row, flagged runs shaded and named in the margin, steps of
 * the zero as dotted verticals with their size, samples that a resistant fit gave less than half weight as circles. Days are UTC.
 *
 * @param input - The series in metres, its flagged runs, gaps, steps, weights and a title. Nothing is written to.
 * @param options - Width in pixels, theme, where to begin.
 * @returns SVG.
 * @throws InputError `MISSING` or `WRONG_TYPE` path `title`, `OUT_OF_RANGE` paths `options.width`, `options.from`, `UNKNOWN_CHOICE` path
 * `options.theme`, `LENGTH_MISMATCH` path `weights`; ComputationError `TOO_FEW_SAMPLES` under two samples.
 * @example
 * const series = uniformSeries({ start: '2031-06-01T00:00Z', step: HOUR, values: [1, 2, 3, 2] });
 * foldedRecordSvg({ series, runs: [], title: 'Quenby Haven' }).includes('1 Jun 2031'); // true
 * @public
 */
export function foldedRecordSvg(
  input: FoldedRecordInput,
  options: FoldedRecordOptions = {},
): string {
  return standalone(drawFoldedRecord(input, options));
}
