/**
 * The frame of every picture: size, title, style sheet with its light and dark colours.
 * @module
 */
import { describe, InputError } from '@staithe/core';
import { type Child, element, type Markup, styleSheet, together } from './markup.js';
import { wrapText } from './text.js';

/** How a picture is drawn. @public */
export interface PictureOptions {
  /** Pixels, 320 to 2000; text keeps its size, so draw a narrow one for a phone. Default 760. */
  readonly width?: number | undefined;
  /** `auto` (default) follows the reader's setting; `light` stays light. */
  readonly theme?: 'auto' | 'light' | undefined;
}

/** A drawn picture without its frame. */
export interface Picture {
  readonly width: number;
  readonly height: number;
  readonly title: string;
  /** A second line under the title: datum, zone, scale. */
  readonly note: readonly string[];
  readonly body: Child;
  readonly theme: 'auto' | 'light';
}

const DEFAULT_WIDTH = 760;
const NARROWEST = 320;
const WIDEST = 2000;

export function readOptions(options: PictureOptions): {
  width: number;
  theme: 'auto' | 'light';
  narrow: boolean;
} {
  const { width = DEFAULT_WIDTH, theme = 'auto' } = options;
  if (!(width >= NARROWEST && width <= WIDEST)) {
    throw new InputError(
      'OUT_OF_RANGE',
      'options.width',
      `expected ${NARROWEST} to ${WIDEST} pixels, got ${describe(width)}`,
    );
  }
  if (theme !== 'auto' && theme !== 'light') {
    throw new InputError(
      'UNKNOWN_CHOICE',
      'options.theme',
      `expected auto or light, got ${describe(theme)}`,
    );
  }
  return { width, theme, narrow: width < 560 };
}

/** Colours: name, light, dark. Contrast of text on paper is above 4.5 in both. */
const COLOURS = {
  paper: ['#ffffff', '#10181f'],
  ink: ['#16242e', '#e3ebf0'],
  muted: ['#586773', '#9aaab5'],
  grid: ['#d5dde3', '#2d3b46'],
  water: ['#14608c', '#74bdea'],
  shallow: ['#d8e9f4', '#1a3b50'],
  open: ['#1b7a5a', '#5fc79e'],
  absent: ['#bcc7cf', '#3d4e5b'],
  doubt: ['#8a5f00', '#e6b84a'],
  doubtful: ['#fae6b4', '#65500f'],
  reject: ['#a83c17', '#f2906a'],
  rejected: ['#f5cfbf', '#75351f'],
} as const;
type Colour = keyof typeof COLOURS;

/** What the classes set: property and colour. */
const CLASSES: Readonly<Record<string, readonly [property: 'fill' | 'stroke', colour: Colour][]>> =
  {
    paper: [['fill', 'paper']],
    ink: [['fill', 'ink']],
    muted: [['fill', 'muted']],
    water: [['fill', 'water']],
    open: [['fill', 'open']],
    shallow: [['fill', 'shallow']],
    doubt: [['fill', 'doubt']],
    doubtful: [['fill', 'doubtful']],
    reject: [['fill', 'reject']],
    rejected: [['fill', 'rejected']],
    blank: [['fill', 'absent']],
    'line-ink': [['stroke', 'ink']],
    'line-muted': [['stroke', 'muted']],
    'line-grid': [['stroke', 'grid']],
    'line-water': [['stroke', 'water']],
    'line-reject': [['stroke', 'reject']],
    'line-open': [['stroke', 'open']],
    halo: [['stroke', 'paper']],
  };

const SHAPES =
  '.staithe-picture{font-family:system-ui,-apple-system,"Segoe UI",Roboto,"Noto Sans",sans-serif;font-size:12px;font-variant-numeric:tabular-nums}' +
  '.staithe-picture .title{font-size:15px;font-weight:600}' +
  '.staithe-picture .small{font-size:11px}' +
  '.staithe-picture .tiny{font-size:10px}' +
  '.staithe-picture .strong{font-weight:600}' +
  '.staithe-picture [class*="line-"]{fill:none}' +
  '.staithe-picture .dashed{stroke-dasharray:4 3}' +
  '.staithe-picture .dotted{stroke-dasharray:1.5 3;stroke-linecap:round}' +
  '.staithe-picture .halo{paint-order:stroke;stroke-width:3px;stroke-linejoin:round}';

/** The style sheet of all pictures. Programs that know no variables take the first, light colour of each pair. */
export function pictureCss(): string {
  const rules = Object.entries(CLASSES).map(([name, sets]) => {
    const body = sets.map(([property, colour]) => {
      const light = COLOURS[colour][0];
      return `${property}:${light};${property}:var(--staithe-${colour},${light})`;
    });
    return `.staithe-picture .${name}{${body.join(';')}}`;
  });
  const dark = Object.entries(COLOURS).map(([name, [, colour]]) => `--staithe-${name}:${colour}`);
  return (
    SHAPES +
    rules.join('') +
    `@media screen and (prefers-color-scheme:dark){.staithe-picture.auto{${dark.join(';')}}}`
  );
}

/** The height that title and notes take. */
export const headHeight = (notes: readonly string[]): number => 28 + 15 * notes.length;

function svg(picture: Picture, style: Child): Markup {
  const { width, height, title, note, body, theme } = picture;
  return element(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      viewBox: `0 0 ${Math.ceil(width)} ${Math.ceil(height)}`,
      width: Math.ceil(width),
      height: Math.ceil(height),
      class: `staithe-picture ${theme}`,
      role: 'img',
    },
    element('title', {}, [title, ...note].join('. ')),
    style,
    element('rect', { class: 'paper', width: Math.ceil(width), height: Math.ceil(height) }),
    element('text', { class: 'ink title', x: 8, y: 20 }, title),
    note.map((line, i) => element('text', { class: 'muted small', x: 8, y: 37 + 15 * i }, line)),
    body,
  );
}

/** A picture that stands alone. */
export const standalone = (picture: Picture): string =>
  together(svg(picture, styleSheet(pictureCss()))).markup;

/** A picture in a page that has the style sheet. */
export const inPage = (picture: Picture): Markup => svg(picture, undefined);

/** About how many pixels a text takes: no more than a wide sans-serif needs. */
export const textWidth = (text: string, size: number = 12): number =>
  [...text].length * size * WIDEST_LETTER;
const WIDEST_LETTER = 0.6;

/** Breaks a note of 11 pixels so that it fits into a width. */
export const wrapNote = (text: string, width: number): string[] =>
  wrapText(text, Math.floor(width / (11 * WIDEST_LETTER)));
