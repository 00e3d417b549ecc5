/**
 * Dials: one for each species, each constituent an arrow of length H at angle G.
 * @module
 */
import { degreesToRadians, type HarmonicConstants } from '@staithe/core';
import { max, median } from 'd3-array';
import { format } from 'd3-format';
import { scaleLinear } from 'd3-scale';
import { arc, symbol, symbolTriangle } from 'd3-shape';
import { type Child, element } from './internal/markup.js';
import {
  headHeight,
  type Picture,
  type PictureOptions,
  readOptions,
  standalone,
  textWidth,
  wrapNote,
} from './internal/picture.js';
import { groupBySpecies, type Line } from './internal/species.js';
import { spread } from './internal/spread.js';
import { cleanText } from './internal/text.js';

/** Options of the dials. @public */
export interface DialsOptions extends PictureOptions {
  /** Default: `The constants of` and the place. */
  readonly title?: string | undefined;
}

interface Dial {
  readonly words: string;
  readonly lines: readonly Line[];
  /** Metres at the rim. */
  readonly rim: number;
}

const SMALL = 0.15; // of the rim: shorter arrows get a dial of their own, drawn larger
const MOST_NAMES = 9;

/** The dials of a document: one a species, and one more where the small arrows would not be seen. */
function dialsOf(constants: HarmonicConstants): Dial[] {
  const dials: Dial[] = [];
  for (const { words, lines } of groupBySpecies(constants)) {
    const longest = max(lines, ({ own }) => own.amplitude) as number;
    if (longest === 0) continue;
    const small = lines.filter(({ own }) => own.amplitude < SMALL * longest);
    // Small ones that are nothing but noise are not worth a dial.
    const split = lines.length > 3 && small.length > 1 && !small.every(isFaint);
    const large = split ? lines.filter((line) => !small.includes(line)) : lines;
    dials.push({ words, lines: large, rim: rimOf(large) });
    if (split) dials.push({ words: `${words}, the small ones`, lines: small, rim: rimOf(small) });
  }
  return dials;
}

const isFaint = ({ own }: Line): boolean => own.standing === 'faint';

/** The rim has room for each arrow, and for the disc of each that stands out of the noise, if any does. */
function rimOf(lines: readonly Line[]): number {
  const noise = lines.every(isFaint);
  const reaches = lines.map((line) => {
    return line.own.amplitude + (noise || !isFaint(line) ? (line.own.radius95 ?? 0) : 0);
  });
  return 1.04 * Math.max(...reaches);
}

/** Where an arrow ends: the angle runs as a clock does, 0° at the top. */
function tip(line: Line, scale: (metres: number) => number): [number, number] {
  const angle = degreesToRadians(line.own.phaseLag);
  const long = scale(line.own.amplitude);
  return [long * Math.sin(angle), -long * Math.cos(angle)];
}

/** The 95 % disc at a tip; that of a faint line is an outline, for it says no more than the noise does. */
function disc(line: Line, scale: (metres: number) => number, radius: number): Child {
  const [cx, cy] = tip(line, scale);
  const r = line.own.radius95 === undefined ? 0 : scale(line.own.radius95);
  const inside = Math.abs(cx) + r < radius + 34 && Math.abs(cy) + r < radius + 34;
  if (r < 0.8 || !inside) return undefined;
  if (isFaint(line)) {
    return element('circle', { class: 'line-grid', cx, cy, r, 'stroke-width': 0.8 });
  }
  return [
    element('circle', { class: 'doubtful', cx, cy, r, 'fill-opacity': 0.7 }),
    element('circle', { class: 'line-muted', cx, cy, r, 'stroke-width': 0.7 }),
  ];
}

function arrow(line: Line, scale: (metres: number) => number): Child {
  const [x, y] = tip(line, scale);
  const { standing, amplitude, phaseLag } = line.own;
  const head = symbol(symbolTriangle, Math.min(34, 8 + scale(amplitude))).digits(1)();
  const faint = standing === 'faint';
  const dashed = standing === 'borrowed' ? ' dashed' : '';
  return [
    element('line', {
      class: faint ? 'line-muted' : `line-water${dashed}`,
      'stroke-width': faint ? 1.2 : 1.8,
      x1: 0,
      y1: 0,
      x2: x,
      y2: y,
    }),
    element('path', {
      class: faint ? 'muted' : 'water',
      d: head ?? undefined,
      transform: `translate(${x.toFixed(2)} ${y.toFixed(2)}) rotate(${phaseLag.toFixed(1)}) translate(0 2.4)`,
    }),
  ];
}

interface Name {
  readonly text: string;
  readonly tip: readonly [number, number];
  readonly x: number;
  readonly y: number;
  readonly leader: boolean;
}

const CROWD = 4; // names on one side that still fit at their tips

/** Where names stand: at the tips, or, where a side is crowded, in a column outside the rim. */
function placeNames(
  lines: readonly Line[],
  scale: (metres: number) => number,
  radius: number,
): Name[] {
  const tips = lines.map((line) => ({ text: cleanText(line.own.name, 12), tip: tip(line, scale) }));
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

/** Whether the arrow to a tip passes under a name. */
function crossed({ text, x, y }: Name, [tipX, tipY]: Name['tip']): boolean {
  const [from, to] = x < 0 ? [x - textWidth(text), x] : [x, x + textWidth(text)];
  return [0.25, 0.4, 0.55, 0.7, 0.85, 1].some(
    (k) => k * tipX > from && k * tipX < to && Math.abs(k * tipY - y) < 4,
  );
}

function drawName({ text, tip: [tipX, tipY], x, y, leader }: Name): Child {
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

/** 0° at the top and so on clockwise, where no name stands. */
function angleMarks(radius: number, placed: readonly Name[]): Child {
  const marks = [
    [0, 0, -radius - 7, 'middle'],
    [90, radius + 6, 4, 'start'],
    [180, 0, radius + 15, 'middle'],
    [270, -radius - 6, 4, 'end'],
  ] as const;
  return marks
    .filter(
      ([, x, y]) => !placed.some((name) => Math.abs(name.y - y) < 15 && Math.abs(name.x - x) < 44),
    )
    .map(([angle, x, y, anchor]) =>
      element('text', { class: 'muted tiny', x, y, 'text-anchor': anchor }, `${angle}°`),
    );
}

function drawDial(dial: Dial, cell: number, radius: number): { body: Child; height: number } {
  const scale = scaleLinear().domain([0, dial.rim]).range([0, radius]);
  const discs = dial.lines.flatMap(({ own }) =>
    own.standing !== 'borrowed' && own.radius95 !== undefined ? [own.radius95] : [],
  );
  const noise = median(discs);
  const rings = scale.ticks(3).filter((tick) => tick > 0 && tick <= dial.rim);
  const firm = dial.lines.filter((line) => !isFaint(line));
  const named = (firm.length > 0 ? firm : dial.lines).slice(0, MOST_NAMES);
  const unnamed = dial.lines.filter((line) => !named.includes(line));
  const placed = placeNames(named, scale, radius);
  const ring = `${format('~g')((rings[0] ?? dial.rim) * 1000)} mm`;
  const facts = [rings.length > 1 ? `rings every ${ring}` : `ring ${ring}`];
  if (noise !== undefined && scale(noise) > 0)
    facts.push(`noise ends at ${(noise * 1000).toFixed(1)} mm`);
  for (const [word, list] of [
    ['also', unnamed.filter((line) => !isFaint(line))],
    ['faint', unnamed.filter(isFaint)],
  ] as const) {
    if (list.length === 0) continue;
    facts.push(`${word}: ${list.map(({ own }) => cleanText(own.name, 12)).join(', ')}`);
  }
  const below = facts.flatMap((fact) => wrapNote(fact, cell - 8));
  const axis = arc<undefined>()
    .innerRadius(0)
    .outerRadius(radius)
    .startAngle(0)
    .endAngle(2 * Math.PI)
    .digits(1)(undefined);
  const body = element(
    'g',
    { transform: `translate(${(cell / 2).toFixed(1)} ${radius + 44})` },
    element(
      'text',
      { class: 'ink strong', x: 0, y: -radius - 28, 'text-anchor': 'middle' },
      dial.words,
    ),
    element('path', { class: 'shallow', d: axis ?? undefined, 'fill-opacity': 0.35 }),
    rings.map((ring) => element('circle', { class: 'line-grid', r: scale(ring) })),
    element('line', { class: 'line-grid', x1: -radius, x2: radius, y1: 0, y2: 0 }),
    element('line', { class: 'line-grid', x1: 0, x2: 0, y1: -radius, y2: radius }),
    angleMarks(radius, placed),
    noise !== undefined &&
      scale(noise) > 1 &&
      scale(noise) < radius + 20 &&
      element('circle', { class: 'line-reject dashed', r: scale(noise) }),
    dial.lines.map((line) => disc(line, scale, radius)),
    [...dial.lines].reverse().map((line) => arrow(line, scale)),
    placed.map(drawName),
    below.map((text, i) =>
      element(
        'text',
        { class: 'muted small', x: 0, y: radius + 32 + 14 * i, 'text-anchor': 'middle' },
        text,
      ),
    ),
  );
  return { body, height: 2 * radius + 44 + 32 + 14 * below.length };
}

/** The picture without its frame. */
export function drawDials(constants: HarmonicConstants, options: DialsOptions): Picture {
  const { width, theme } = readOptions(options);
  const dials = dialsOf(constants);
  const place = constants.place ? ` of ${cleanText(constants.place.name, 60)}` : '';
  const title = cleanText(options.title ?? `The constants${place}`);
  const note = wrapNote(
    'length H, angle G clockwise from the top; disc: 95 % of the error; dashed: borrowed; grey: faint; ring: noise',
    width - 16,
  );
  const columns = Math.min(Math.max(1, Math.floor(width / 240)), Math.max(1, dials.length));
  const cell = width / columns;
  const radius = Math.min(86, cell / 2 - 50);
  const body: Child[] = [];
  let y = headHeight(note) + 6;
  for (let i = 0; i < dials.length; i += columns) {
    const drawn = dials.slice(i, i + columns).map((dial) => drawDial(dial, cell, radius));
    drawn.forEach((dial, k) => {
      body.push(element('g', { transform: `translate(${(k * cell).toFixed(1)} ${y})` }, dial.body));
    });
    y += max(drawn, ({ height }) => height) as number;
  }
  if (dials.length === 0)
    body.push(
      element('text', { class: 'muted', x: 8, y: y + 14 }, 'No constituent has an amplitude.'),
    );
  return { width, height: y + (dials.length === 0 ? 26 : 4), title, note, body, theme };
}

/**
 * Draws one round dial for each species: each constituent an arrow of length H at angle G (clockwise from the top), its 95 %
 * disc at the tip, borrowed ones dashed, and a ring where the noise ends (the median of the discs). Where arrows are too
 * short to see beside the longest, a second, larger-scaled dial shows them.
 *
 * @param constants - The document.
 * @param options - Width in pixels, theme, title.
 * @returns SVG.
 * @throws InputError of `parseConstants` and `constituent`; `OUT_OF_RANGE` path `options.width`.
 * @example
 * dialsSvg(constants, { width: 360 }).includes('twice a day'); // true
 * @public
 */
export function dialsSvg(constants: HarmonicConstants, options: DialsOptions = {}): string {
  return standalone(drawDials(constants, options));
}
