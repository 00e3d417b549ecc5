/**
 * The constants as a table for people: grouped by species, largest first, bars to scale.
 * @module
 */
import type { HarmonicConstants } from '@staithe/core';
import type { FitDiagnostics } from '@staithe/fit';
import { max } from 'd3-array';
import { degrees, millimetres, returnsEvery } from './internal/numbers.js';
import { groundsOf, groupBySpecies, type Line } from './internal/species.js';
import { cleanText, padLeft, padRight, wrapText } from './internal/text.js';

const BAR = 12;
const EIGHTHS = ['', '▏', '▎', '▍', '▌', '▋', '▊', '▉'] as const;
const WIDTH = 92;

/** A bar in eighths of a character. */
function bar(share: number): string {
  const eighths = Math.round(share * BAR * 8);
  return '█'.repeat(Math.floor(eighths / 8)) + (EIGHTHS[eighths % 8] as string);
}

/** Whole millimetres; below 10 mm a tenth still says something. */
const sizeText = (size: number | undefined): string => {
  if (size === undefined) return '–';
  return size < 0.00995 ? (size * 1000).toFixed(1) : millimetres(size);
};

const row = (
  name: string,
  shown: string,
  every: string,
  size: string,
  lag: string,
  disc: string,
  grounds: string,
): string =>
  `${padRight(name, 8)}${padRight(shown, BAR + 2)}${padLeft(every, 13)}  ${padLeft(size, 8)}  ${padLeft(lag, 7)}  ${padLeft(disc, 13)}   ${grounds}`.trimEnd();

const headText = (title: string): string =>
  `${padRight(title, 8 + BAR + 2)}${row('', '', 'returns every', 'H, mm', 'G, °', '95 % disc, mm', 'grounds').slice(8 + BAR + 2)}`;

function lineText({ own, period }: Line, longest: number): string {
  return row(
    `  ${cleanText(own.name, 12)}`,
    longest > 0 ? bar(own.amplitude / longest) : '',
    returnsEvery(period),
    sizeText(own.amplitude),
    degrees(own.phaseLag),
    sizeText(own.radius95),
    cleanText(groundsOf(own), 40),
  );
}

/**
 * Writes the constants as a table: one block for each species, how often each constituent returns, H in millimetres, G in
 * degrees, the radius of the 95 % disc, the grounds, and what was left out and why.
 *
 * @param constants - The document.
 * @param diagnostics - Of the fit, for what was left out.
 * @returns Lines of at most 92 characters where words allow it, joined by `\n`.
 * @throws InputError of `parseConstants` and `constituent`.
 * @example
 * constantsText(constants).split('\n')[0]?.startsWith('TWICE A DAY'); // true
 * @public
 */
export function constantsText(
  constants: HarmonicConstants,
  diagnostics?: Pick<FitDiagnostics, 'candidates'>,
): string {
  const groups = groupBySpecies(constants);
  const longest = max(groups, ({ lines }) => lines[0]?.own.amplitude) ?? 0;
  const out: string[] = [];
  groups.forEach(({ words, lines }, i) => {
    const title = words.toUpperCase();
    out.push(i === 0 ? headText(title) : title);
    for (const line of lines) out.push(lineText(line, longest));
  });
  const left = (diagnostics?.candidates ?? []).filter(({ decision }) => decision === 'left');
  if (left.length > 0) {
    const list = left
      .map(({ name, reason }) => `${cleanText(name, 12)} (${cleanText(reason)})`)
      .join(', ');
    out.push(...wrapText(`Left out: ${list}`, WIDTH));
  }
  return out.join('\n');
}
