/**
 * Dials: one for each species, each constituent an arrow of length H at angle G.
 * @module
 */
import { degreesToRadians, type HarmonicConstant, type HarmonicConstants } from '@staithe/core';
import { median } from 'd3-array';
import { format } from 'd3-format';
import { scaleLinear } from 'd3-scale';
import { symbol, symbolTriangle } from 'd3-shape';
import { type Child, element } from './internal/markup.js';
import {
  cellsOf,
  type DrawnPanel,
  drawName,
  framed,
  inRows,
  type Panel,
  panelsOf,
  placeNames,
  plate,
  rimMarks,
} from './internal/panels.js';
import {
  headHeight,
  type Picture,
  type PictureOptions,
  readOptions,
  standalone,
  wrapNote,
} from './internal/picture.js';
import { groupBySpecies, type Line } from './internal/species.js';
import { cleanText } from './internal/text.js';

/** Options of the dials. @public */
export interface DialsOptions extends PictureOptions {
  /** Default: `The constants of` and the place. */
  readonly title?: string | undefined;
}

const MOST_NAMES = 9;
const CELL = 240; // pixels

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

function drawDial(
  { words, lines }: Panel<HarmonicConstant>,
  size: { readonly cell: number; readonly radius: number },
): DrawnPanel {
  const { radius } = size;
  const rim = rimOf(lines);
  const scale = scaleLinear().domain([0, rim]).range([0, radius]);
  const discs = lines.flatMap(({ own }) =>
    own.standing !== 'borrowed' && own.radius95 !== undefined ? [own.radius95] : [],
  );
  const noise = median(discs);
  const rings = scale.ticks(3).filter((tick) => tick > 0 && tick <= rim);
  const firm = lines.filter((line) => !isFaint(line));
  const named = (firm.length > 0 ? firm : lines).slice(0, MOST_NAMES);
  const unnamed = lines.filter((line) => !named.includes(line));
  const placed = placeNames(
    named.map((line) => ({ text: cleanText(line.own.name, 12), tip: tip(line, scale) })),
    radius,
  );
  const ring = `${format('~g')((rings[0] ?? rim) * 1000)} mm`;
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
  const drawing = [
    plate(radius, rings.map(scale)),
    rimMarks(radius, placed, ['0°', '90°', '180°', '270°']),
    noise !== undefined &&
      scale(noise) > 1 &&
      scale(noise) < radius + 20 &&
      element('circle', { class: 'line-reject dashed', r: scale(noise) }),
    lines.map((line) => disc(line, scale, radius)),
    [...lines].reverse().map((line) => arrow(line, scale)),
    placed.map(drawName),
  ];
  return framed(words, drawing, facts, size);
}

/** The picture without its frame. */
export function drawDials(constants: HarmonicConstants, options: DialsOptions): Picture {
  const { width, theme } = readOptions(options);
  const dials = panelsOf(groupBySpecies(constants), ({ own }) => own.amplitude, isFaint);
  const place = constants.place ? ` of ${cleanText(constants.place.name, 60)}` : '';
  const title = cleanText(options.title ?? `The constants${place}`);
  const note = wrapNote(
    'length H, angle G clockwise from the top; disc: 95 % of the error; dashed: borrowed; grey: faint; ring: noise',
    width - 16,
  );
  const cells = cellsOf(width, dials.length, CELL);
  const radius = Math.min(86, cells.cell / 2 - 50);
  const drawn = dials.map((dial) => drawDial(dial, { ...cells, radius }));
  const { body, bottom: y } = inRows(drawn, cells, headHeight(note) + 6);
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
