/**
 * Round panels in a grid: one for each species, a scale of its own, names at the tips or in a column outside, facts below.
 * @module
 */
import { max } from 'd3-array';
import { arc } from 'd3-shape';
import { type Child, element } from './markup.js';
import { textWidth, wrapNote } from './picture.js';
import type { Line, SpeciesGroup } from './species.js';
import { spread } from './spread.js';

/** What one panel shows. */
export interface Panel<T> {
  readonly words: string;
  readonly lines: readonly Line<T>[];
}

const SMALL = 0.15; // of the largest: smaller ones get a panel of their own, drawn larger

/** The panels of groups: one a species, and one more where the small ones would not be seen. */
export function panelsOf<T>(
  groups: readonly SpeciesGroup<T>[],
  sizeOf: (line: Line<T>) => number,
  isFaint: (line: Line<T>) => boolean,
): Panel<T>[] {
  const panels: Panel<T>[] = [];
  for (const { words, lines } of groups) {
    const largest = max(lines, sizeOf) as number;
    if (largest === 0) continue;
    const small = lines.filter((line) => sizeOf(line) < SMALL * largest);
    // Small ones that are nothing but noise are not worth a panel.
    const split = lines.length > 3 && small.length > 1 && !small.every(isFaint);
    panels.push({ words, lines: split ? lines.filter((line) => !small.includes(line)) : lines });
    if (split) panels.push({ words: `${words}, the small ones`, lines: small });
  }
  return panels;
}

/** A name and the point it belongs to, pixels from the centre. */
export interface Tip {
  readonly text: string;
  readonly tip: readonly [x: number, y: number];
}

/** A name with its place. */
export interface Name extends Tip {
  readonly x: number;
  readonly y: number;
  readonly leader: boolean;
}

const CROWD = 4; // names on one side that still fit at their tips

/** Where names stand: at the tips, or, where a side is crowded, in a column outside the rim. */
export function placeNames(tips: readonly Tip[], radius: number): Name[] {
  return [-1, 1].flatMap((side) => {
    const here = tips.filter(({ tip: [x] }) => (side < 0 ? x < 0 : x >= 0));
    here.sort((a, b) => a.tip[1] - b.tip[1]);
    const wanted = here.map(({ tip: [, y] }) => y + (y < 0 ? -5 : 6));
    const moved = spread(wanted, 13, -radius - 6, radius + 8);
    const near = here.map(
      (name, i): Name => ({
        ...name,
        x: side * (Math.abs(name.tip[0]) + 7),
        y: moved[i] as number,
        leader: false,
      }),
    );
    const crowded =
      here.length > CROWD ||
      moved.some((y, i) => Math.abs(y - (wanted[i] as number)) > 9) ||
      near.some((name) => near.some((other) => other !== name && crossed(name, other.tip)));
    if (!crowded) return near;
    return near.map((name) => ({ ...name, x: side * (radius + 8), leader: true }));
  });
}

/** Whether the way from the centre to a tip passes under a name. */
function crossed({ text, x, y }: Name, [tipX, tipY]: Tip['tip']): boolean {
  const [from, to] = x < 0 ? [x - textWidth(text), x] : [x, x + textWidth(text)];
  return [0.25, 0.4, 0.55, 0.7, 0.85, 1].some(
    (k) => k * tipX > from && k * tipX < to && Math.abs(k * tipY - y) < 4,
  );
}

/** A name, with a thin line to its tip where it stands apart. */
export function drawName({ text, tip: [tipX, tipY], x, y, leader }: Name): Child {
  const side = x < 0 ? -1 : 1;
  const place = { x, y: y + 4, 'text-anchor': side < 0 ? 'end' : 'start' };
  return [
    leader &&
      element('line', {
        class: 'line-muted',
        'stroke-width': 0.6,
        x1: tipX,
        y1: tipY,
        x2: x - 3 * side,
        y2: y,
      }),
    element('text', { class: 'ink strong halo', ...place }, text),
  ];
}

/** What stands at the top, right, bottom and left of the rim, where no name stands. */
export function rimMarks(
  radius: number,
  placed: readonly Name[],
  words: readonly [top: string, right: string, bottom: string, left: string],
): Child {
  const places = [
    [0, -radius - 7, 'middle'],
    [radius + 6, 4, 'start'],
    [0, radius + 15, 'middle'],
    [-radius - 6, 4, 'end'],
  ] as const;
  return places.map(([x, y, anchor], i) => {
    const covered = placed.some((name) => Math.abs(name.y - y) < 15 && Math.abs(name.x - x) < 44);
    if (covered) return undefined;
    return element('text', { class: 'muted tiny', x, y, 'text-anchor': anchor }, words[i]);
  });
}

/** The disc that a panel draws on, with rings of its scale and a cross. */
export function plate(radius: number, rings: readonly number[]): Child {
  const disc = arc<undefined>()
    .innerRadius(0)
    .outerRadius(radius)
    .startAngle(0)
    .endAngle(2 * Math.PI)
    .digits(1)(undefined);
  return [
    element('path', { class: 'shallow', d: disc ?? undefined, 'fill-opacity': 0.35 }),
    rings.map((r) => element('circle', { class: 'line-grid', r })),
    element('line', { class: 'line-grid', x1: -radius, x2: radius, y1: 0, y2: 0 }),
    element('line', { class: 'line-grid', x1: 0, x2: 0, y1: -radius, y2: radius }),
  ];
}

/** A panel as drawn: about its centre, in a cell of a width. */
export interface DrawnPanel {
  readonly body: Child;
  readonly height: number;
}

const HEAD = 44;
const FOOT = 32;

/** Title, drawing and facts of a panel, one above the other. */
export function framed(
  words: string,
  drawing: Child,
  facts: readonly string[],
  { cell, radius }: { readonly cell: number; readonly radius: number },
): DrawnPanel {
  const below = facts.flatMap((fact) => wrapNote(fact, cell - 8));
  const body = element(
    'g',
    { transform: `translate(${(cell / 2).toFixed(1)} ${radius + HEAD})` },
    element('text', { class: 'ink strong', x: 0, y: -radius - 28, 'text-anchor': 'middle' }, words),
    drawing,
    below.map((text, i) =>
      element(
        'text',
        { class: 'muted small', x: 0, y: radius + FOOT + 14 * i, 'text-anchor': 'middle' },
        text,
      ),
    ),
  );
  return { body, height: 2 * radius + HEAD + FOOT + 14 * below.length };
}

/** How many panels stand in a row, and how wide each cell is: `least` pixels or more where the width allows it. */
export function cellsOf(
  width: number,
  count: number,
  least: number,
): { columns: number; cell: number } {
  const columns = Math.min(Math.max(1, Math.floor(width / least)), Math.max(1, count));
  return { columns, cell: width / columns };
}

/** Panels in rows, from `top` down. */
export function inRows(
  panels: readonly DrawnPanel[],
  { columns, cell }: { readonly columns: number; readonly cell: number },
  top: number,
): { body: Child[]; bottom: number } {
  const body: Child[] = [];
  let y = top;
  for (let i = 0; i < panels.length; i += columns) {
    const row = panels.slice(i, i + columns);
    row.forEach((panel, k) => {
      const place = `translate(${(k * cell).toFixed(1)} ${y})`;
      body.push(element('g', { transform: place }, panel.body));
    });
    y += max(row, ({ height }) => height) as number;
  }
  return { body, bottom: y };
}
