/**
 * A month of tides as a picture: one ruler a day, heights above the marks, times below them.
 * @module
 */
import { HOUR } from '@staithe/core';
import type { TideWindow } from '@staithe/predict';
import { scaleLinear } from 'd3-scale';
import { symbol, symbolTriangle } from 'd3-shape';
import { type Child, element } from './internal/markup.js';
import { type MonthDay, type MonthInput, moonMark, readMonth } from './internal/month.js';
import { metres } from './internal/numbers.js';
import {
  headHeight,
  type Picture,
  type PictureOptions,
  readOptions,
  standalone,
  wrapNote,
} from './internal/picture.js';
import { spread } from './internal/spread.js';
import { clockText, offsetName, type Zone } from './internal/zone.js';

/** A month of tides, with windows if wanted. @public */
export interface MonthPictureInput extends MonthInput {
  /** Shown as green stretches of the rulers. */
  readonly windows?: readonly TideWindow[] | undefined;
}

const PITCH = 33;
const LEFT = 70;

function drawDay(
  day: MonthDay,
  zone: Zone,
  windows: readonly TideWindow[],
  top: number,
  plot: number,
): Child {
  const hours = (day.to - day.from) / HOUR;
  // A day of 25 hours is a longer ruler, not a denser one.
  const x = scaleLinear()
    .domain([0, 25])
    .range([LEFT, LEFT + plot]);
  const at = (t: number): number => x((Math.min(Math.max(t, day.from), day.to) - day.from) / HOUR);
  const y = top + 17;
  const mark = symbol(symbolTriangle, 26).digits(1)();
  const places = spread(
    day.points.map(({ time }) => at(time)),
    31,
    LEFT + 13,
    LEFT + plot - 4,
  );
  return [
    element('text', { class: 'ink small strong', x: 8, y: y + 4 }, day.name),
    element('text', { class: 'muted small', x: 53, y: y + 4 }, moonMark(day.sky?.moon)),
    element('line', {
      class: 'line-grid',
      'stroke-width': 1.5,
      x1: LEFT,
      x2: x(hours),
      y1: y,
      y2: y,
    }),
    windows
      .filter(({ from, to }) => from < day.to && to > day.from)
      .map(({ from, to }) =>
        element('line', {
          class: 'line-open',
          'stroke-width': 5,
          'stroke-opacity': 0.45,
          x1: at(from),
          x2: at(to),
          y1: y,
          y2: y,
        }),
      ),
    day.change && [
      element('line', {
        class: 'line-reject dotted',
        'stroke-width': 2,
        x1: at(day.change.at),
        x2: at(day.change.at),
        y1: top + 3,
        y2: top + 31,
      }),
    ],
    day.points.map(({ kind, time, height }, i) => {
      const label = { x: places[i] as number, 'text-anchor': 'middle' };
      return [
        element('path', {
          class: kind === 'high' ? 'water' : 'muted',
          d: mark ?? undefined,
          transform: `translate(${at(time).toFixed(1)} ${y})${kind === 'high' ? '' : ' rotate(180)'}`,
        }),
        element(
          'text',
          { class: `ink small${kind === 'high' ? ' strong' : ''}`, ...label, y: y - 6 },
          metres(height, 1),
        ),
        element('text', { class: 'muted tiny', ...label, y: y + 14 }, clockText(zone, time)),
      ];
    }),
  ];
}

/** The picture without its frame. */
export function drawMonth(input: MonthPictureInput, options: PictureOptions): Picture {
  const { width, theme } = readOptions(options);
  const month = readMonth(input);
  const plot = width - LEFT - 8;
  const words = [`heights in m above ${month.datum}; times ${month.zoneWords}`];
  for (const { change } of month.days) {
    if (change)
      words.push(
        `; red: clocks go ${change.after > change.before ? 'forward' : 'back'} to ${offsetName(change.after)}`,
      );
  }
  if (input.windows) words.push('; green: the windows');
  const note = wrapNote(words.join(''), width - 16);
  const top = headHeight(note) + 16;
  const x = scaleLinear()
    .domain([0, 25])
    .range([LEFT, LEFT + plot]);
  const bottom = top + month.days.length * PITCH;
  const body: Child[] = [0, 6, 12, 18, 24].map((hour) => [
    element('line', {
      class: 'line-grid',
      'stroke-width': 0.7,
      x1: x(hour),
      x2: x(hour),
      y1: top,
      y2: bottom,
    }),
    element(
      'text',
      { class: 'muted tiny', x: x(hour), y: top - 4, 'text-anchor': 'middle' },
      `${hour} h`,
    ),
  ]);
  month.days.forEach((day, i) => {
    body.push(drawDay(day, month.zone, input.windows ?? [], top + i * PITCH, plot));
  });
  return { width, height: bottom + 6, title: `${month.place}, ${month.title}`, note, body, theme };
}

/**
 * Draws a month of tides in local time: one ruler a day, as long as the day is, with heights above the marks and times below.
 *
 * @param input - As for `monthText`, and windows.
 * @param options - Width in pixels, theme.
 * @returns SVG.
 * @throws InputError as `monthText`; `OUT_OF_RANGE` path `options.width`.
 * @example
 * monthSvg({ place: 'Quenby Haven', turningPoints: [], month: '2031-06', timeZone: 'UTC', datum: 'LAT' }).includes('Mon 30'); // true
 * @public
 */
export function monthSvg(input: MonthPictureInput, options: PictureOptions = {}): string {
  return standalone(drawMonth(input, options));
}
