/**
 * The constants of a current as a table for people: an ellipse a line, grouped by species, longest first, bars to scale.
 * @module
 */
import { max } from 'd3-array';
import { caution } from './caution.js';
import { bar } from './internal/bar.js';
import {
  axisText,
  groupCurrents,
  meanOf,
  meanText,
  type ShownCurrents,
  type ShownEllipse,
  speedText,
  turnOf,
} from './internal/currents.js';
import { leftOutText } from './internal/left-out.js';
import { degrees } from './internal/numbers.js';
import { groundsOf, type Line } from './internal/species.js';
import { cleanText, labelled, padLeft, padRight, wrapText } from './internal/text.js';

const BAR = 10;
const NAME = 8;
const LEFT = NAME + BAR + 2;
const WIDTH = 92;

const row = (
  left: string,
  [most, least, turning, bearing, lag, disc]: readonly [
    string,
    string,
    string,
    string,
    string,
    string,
  ],
  grounds: string,
): string =>
  `${padRight(left, LEFT)}${padLeft(most, 8)}${padLeft(least, 8)}  ${padRight(turning, 7)}${padLeft(bearing, 9)}${padLeft(lag, 8)}${padLeft(disc, 11)}  ${grounds}`.trimEnd();

/** Two lines: what each column is, and its unit beside the first species. */
const headLines = (title: string): string[] => [
  row('', ['greatest', 'least', 'turning', 'towards', 'G', '95 % disc'], 'grounds'),
  row(title, ['cm/s', 'cm/s', '', '°', '°', 'cm/s'], ''),
];

function lineText({ own }: Line<ShownEllipse>, longest: number): string {
  const { name, major, minor, bearing, phaseLag, radius95 } = own;
  const shown = longest > 0 ? bar(major / longest, BAR) : '';
  return row(
    `${padRight(`  ${cleanText(name, 12)}`, NAME)}${shown}`,
    [
      speedText(major),
      speedText(minor),
      turnOf(own),
      degrees(bearing),
      degrees(phaseLag),
      speedText(radius95),
    ],
    cleanText(groundsOf(own), 40),
  );
}

/**
 * Writes the constants of a current as a table: one block for each species, for each constituent the greatest and the least
 * speed, which way the stream turns (`either` where the least speed is within its error), where the greatest speed runs and
 * its Greenwich phase lag, the 95 % disc, the grounds; below, the mean current, the axis of greatest variance and what was
 * left out.
 *
 * @param fit - Of `fitCurrents`, or as much of it as there is.
 * @returns Lines of at most 92 characters where words allow it, joined by `\n`, closed by the caution.
 * @throws InputError `NOT_FINITE`, `OUT_OF_RANGE` (a speed below 0), paths `ellipses[2].major` …, `constants.mean.east` …;
 *   those of `constituent`.
 * @example
 * const fit = fitCurrents({ east: record, north: record }, { constituents: ['M2', 'S2'] });
 * currentsText(fit).split('\n')[1]?.startsWith('TWICE A DAY'); // true
 * @public
 */
export function currentsText(fit: ShownCurrents): string {
  const groups = groupCurrents(fit);
  const longest = max(groups, ({ lines }) => lines[0]?.own.major) ?? 0;
  const out: string[] = [];
  groups.forEach(({ words, lines }, i) => {
    const title = words.toUpperCase();
    out.push(...(i === 0 ? headLines(title) : [title]));
    for (const line of lines) out.push(lineText(line, longest));
  });
  const left = leftOutText(fit.diagnostics);
  if (left !== undefined) out.push(...wrapText(`Left out: ${left}`, WIDTH));
  const { constants, ellipses, principalAxis } = fit;
  out.push('', labelled('mean', meanText(meanOf(constants)), WIDTH));
  if (principalAxis) out.push(labelled('axis', axisText(principalAxis), WIDTH));
  if (ellipses.some((own) => turnOf(own) === 'either')) {
    const text = 'either way: the least speed is within its error, so the sense is not known';
    out.push(labelled('turning', text, WIDTH));
  }
  return [...out, caution('currents')].join('\n');
}
