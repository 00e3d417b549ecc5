/**
 * The ladder of levels, to scale, with the gaps between its rungs.
 * @module
 */
import { max, sum } from 'd3-array';
import { scaleLinear } from 'd3-scale';
import { line } from 'd3-shape';
import { type Child, element } from './internal/markup.js';
import { metres } from './internal/numbers.js';
import {
  headHeight,
  type Picture,
  type PictureOptions,
  readOptions,
  standalone,
  textWidth,
  wrapNote,
} from './internal/picture.js';
import { type PlacedRung, readRungs } from './internal/rungs.js';
import { spread } from './internal/spread.js';
import { requiredText } from './internal/text.js';
import type { Rung } from './types.js';

/** Levels above a datum. @public */
export interface LevelsLadderInput {
  readonly rungs: readonly Rung[];
  /** What the heights are counted from. */
  readonly datum: string;
  readonly title?: string | undefined;
}

const POLE = 78; // x of the ladder's pole
const HALF = 13; // half the width of a rung

/** From a rung to its label. */
const leader = (at: number, to: number, left: number): string | null =>
  line().digits(1)([
    [POLE + HALF + 2, at],
    [left - 18, to],
    [left - 5, to],
  ]);

/** What stands beside a rung, and the room that it takes down to the next. */
interface Label {
  readonly rung: PlacedRung;
  readonly lines: readonly string[];
  readonly room: number;
}

/** Where the columns of the labels stand. */
interface Columns {
  readonly name: number;
  readonly height: number;
  readonly grounds: number;
  readonly narrow: boolean;
}

const LINE = 13;

function labelOf(rung: PlacedRung, columns: Columns, width: number): Label {
  const grounds = rung.missing === undefined ? rung.grounds : `missing: ${rung.missing}`;
  const lines = wrapNote(grounds, width - columns.grounds - 8);
  const room = columns.narrow ? 34 + LINE * lines.length : 24 + LINE * Math.max(1, lines.length);
  return { rung, lines, room };
}

function drawLabel({ rung, lines }: Label, columns: Columns, y: number): Child {
  const about = rung.missing === undefined ? '' : '≈\u2009';
  const first = columns.narrow ? y + 18 : y + 4;
  return [
    element('text', { class: 'ink strong', x: columns.name, y: y + 4 }, rung.name),
    element('text', { class: 'ink', x: columns.height, y: y + 4 }, about + metres(rung.height)),
    element('text', { class: 'muted small', x: columns.height + 46, y: y + 4 }, rung.sure),
    lines.map((text, i) =>
      element('text', { class: 'muted small', x: columns.grounds, y: first + i * LINE }, text),
    ),
  ];
}

/** The picture without its frame. */
export function drawLevelsLadder(input: LevelsLadderInput, options: PictureOptions): Picture {
  const { width, theme, narrow } = readOptions(options);
  const datum = requiredText(input.datum, 'datum');
  const title = input.title ?? 'Levels';
  const note = [`above ${datum}, m; ± is one standard error`];
  const { placed, unplaced } = readRungs(input.rungs);
  const names = [...placed, ...unplaced].map(({ name }) => textWidth(name));
  const left = POLE + 62;
  const columns = {
    name: left,
    height: left + Math.max(66, 10 + (max(names) ?? 0)),
    grounds: narrow ? left + 10 : left + Math.max(66, 10 + (max(names) ?? 0)) + 96,
    narrow,
  };
  const labels = placed.map((rung) => labelOf(rung, columns, width));
  const rooms = labels.map((_, i) => labels[i - 1]?.room ?? 0);
  const top = headHeight(note) + 14;
  const tall = Math.max(narrow ? 280 : 320, sum(rooms));
  const [highest, lowest] = [placed[0]?.height ?? 1, placed[placed.length - 1]?.height ?? 0];
  const y = scaleLinear()
    .domain(highest > lowest ? [lowest, highest] : [lowest - 0.5, highest + 0.5])
    .range([top + tall, top]);
  const wanted = placed.map(({ height }) => y(height));
  const places = spread(wanted, rooms, top, top + tall);
  const body: Child[] = [];
  if (placed.length > 0) {
    body.push(
      element('line', {
        class: 'line-ink',
        'stroke-width': 1.5,
        x1: POLE,
        x2: POLE,
        y1: top,
        y2: top + tall,
      }),
    );
  }
  for (const tick of y.ticks(6)) {
    if (placed.length === 0) break;
    body.push(
      element('line', {
        class: 'line-muted',
        x1: POLE - 22,
        x2: POLE - 17,
        y1: y(tick),
        y2: y(tick),
      }),
      element(
        'text',
        { class: 'muted tiny', x: POLE - 26, y: y(tick) + 3.5, 'text-anchor': 'end' },
        y.tickFormat(6)(tick),
      ),
    );
  }
  labels.forEach((label, i) => {
    const { rung } = label;
    const at = y(rung.height);
    const to = places[i] as number;
    const dashed = rung.missing === undefined ? '' : ' dashed';
    body.push(
      element('line', {
        class: `line-water${dashed}`,
        'stroke-width': 2.4,
        x1: POLE - HALF,
        x2: POLE + HALF,
        y1: at,
        y2: at,
      }),
      element('path', {
        class: 'line-muted',
        'stroke-width': 0.7,
        d: leader(at, to, left) ?? undefined,
      }),
      drawLabel(label, columns, to),
    );
    const next = placed[i + 1];
    if (next === undefined) return;
    const below = narrow ? (places[i + 1] as number) - 17 : (to + (places[i + 1] as number)) / 2;
    const gap = { x: columns.height - 13, y: Math.max(below, to + label.room - 18) + 4 };
    body.push(
      element('text', { class: 'water small', ...gap }, `↕ ${metres(rung.height - next.height)}`),
    );
  });
  let bottom = placed.length > 0 ? top + tall + (labels[labels.length - 1]?.room ?? 0) - 8 : top;
  for (const { name, missing } of unplaced) {
    const lines = wrapNote(`missing: ${missing}`, width - columns.height - 8);
    bottom += 10;
    body.push(
      element('line', {
        class: 'line-muted dashed',
        'stroke-width': 2.4,
        x1: POLE - HALF,
        x2: POLE + HALF,
        y1: bottom,
        y2: bottom,
      }),
      element('text', { class: 'ink strong', x: left, y: bottom + 4 }, name),
      lines.map((text, i) =>
        element('text', { class: 'muted small', x: columns.height, y: bottom + 4 + 14 * i }, text),
      ),
    );
    bottom += 14 * lines.length;
  }
  if (placed.length + unplaced.length === 0) {
    body.push(element('text', { class: 'muted', x: 8, y: bottom + 10 }, 'No levels were given.'));
    bottom += 20;
  }
  return { width, height: bottom + 8, title, note, body, theme };
}

/**
 * Draws a ladder of levels to scale: heights with their standard errors and grounds, the gap between each two rungs, and a
 * dashed rung for a level that is missing, with the reason.
 *
 * @param input - Rungs in any order, metres above the datum.
 * @param options - Width in pixels, theme.
 * @returns SVG.
 * @throws InputError `MISSING` (name, height without reason, datum), `NOT_FINITE` path `rungs[i].height`; `OUT_OF_RANGE` path
 * `options.width`.
 * @example
 * const rungs = [{ name: 'HAT', height: 4.21 }, { name: 'MSL', height: 2.08, sigma: 0.01 }];
 * levelsLadderSvg({ rungs, datum: 'chart datum' }).includes('2.13'); // true
 * @public
 */
export function levelsLadderSvg(input: LevelsLadderInput, options: PictureOptions = {}): string {
  return standalone(drawLevelsLadder(input, options));
}
