/**
 * The constants as a table for people: grouped by species, largest first, bars to scale.
 * @module
 */
import type { HarmonicConstants } from '@staithe/core';
import type { FitDiagnostics } from '@staithe/fit';
import { max } from 'd3-array';
import { bar, sizeText } from './internal/bar.js';
import { leftOutText } from './internal/left-out.js';
import { degrees, returnsEvery } from './internal/numbers.js';
import { groundsOf, groupBySpecies, type Line } from './internal/species.js';
import { cleanText, padLeft, padRight, wrapText } from './internal/text.js';

const BAR = 12;
const WIDTH = 92;

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
    longest > 0 ? bar(own.amplitude / longest, BAR) : '',
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
  const left = leftOutText(diagnostics);
  if (left !== undefined) out.push(...wrapText(`Left out: ${left}`, WIDTH));
  return out.join('\n');
}
