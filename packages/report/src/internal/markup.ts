/**
 * Builds SVG and HTML as strings. This is the one place where text is escaped: what is not made by `element` is text.
 * @module
 */
import { cleanText } from './text.js';

/** A finished piece; only this module makes one. */
export interface Markup {
  readonly markup: string;
}
export type Child = Markup | string | number | undefined | false | readonly Child[];
export type Attributes = Readonly<Record<string, string | number | undefined | false>>;

const ENTITIES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

const LONGEST = 2000; // characters of one piece of text; attributes may be longer: paths are

function escapeText(text: string, longest: number): string {
  return cleanText(text, longest).replace(/[&<>"']/g, (c) => ENTITIES[c] as string);
}

/** Coordinates to a hundredth of a pixel: enough for the eye, short in the file. */
const short = (value: number): string => String(Math.round(value * 100) / 100);

/** Like escapeText, but spaces at the ends of a piece of a sentence stay. */
function escapeChild(text: string): string {
  const before = /^ /.test(text) ? ' ' : '';
  const after = text.length > 1 && text.endsWith(' ') ? ' ' : '';
  return before + escapeText(text, LONGEST) + after;
}

function written(child: Child): string {
  if (child === undefined || child === false) return '';
  if (typeof child === 'number') return short(child);
  if (typeof child === 'string') return escapeChild(child);
  if ('markup' in child) return child.markup;
  return child.map(written).join('');
}

/** One element with its attributes and children. */
export function element(name: string, attributes: Attributes, ...children: Child[]): Markup {
  let text = `<${name}`;
  for (const [key, value] of Object.entries(attributes)) {
    if (value === undefined || value === false) continue;
    text += ` ${key}="${typeof value === 'number' ? short(value) : escapeText(value, Number.POSITIVE_INFINITY)}"`;
  }
  const inside = children.map(written).join('');
  return { markup: inside === '' && EMPTY.has(name) ? `${text}/>` : `${text}>${inside}</${name}>` };
}

const EMPTY: ReadonlySet<string> = /* @__PURE__ */ new Set([
  'path',
  'line',
  'rect',
  'circle',
  'ellipse',
  'meta',
  'br',
  'hr',
]);

/** A style sheet of our own making: never text of others. */
export const styleSheet = (css: string): Markup => ({ markup: `<style>${css}</style>` });

/** Pieces in a row. */
export const together = (...children: Child[]): Markup => ({
  markup: children.map(written).join(''),
});
