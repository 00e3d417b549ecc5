/**
 * Two sets of constants side by side, for people: how far apart each constituent stands, and whether errors allow it.
 * @module
 */
import type { ComparedConstant, ConstantsComparison } from '@staithe/fit';
import { max } from 'd3-array';
import { format } from 'd3-format';
import { caution } from './caution.js';
import { bar, sizeText } from './internal/bar.js';
import { counted, degrees, millimetres, signedMillimetres } from './internal/numbers.js';
import { groupLines } from './internal/species.js';
import { cleanText, labelled, padLeft, padRight, requiredText } from './internal/text.js';

const BAR = 12;
const NAME = 8;
const LEFT = NAME + BAR + 2;
const WIDTH = 92;

const row = (left: string, apart: string, disc: string, h: string, g: string, words: string) =>
  `${padRight(left, LEFT)}${padLeft(apart, 9)}  ${padLeft(disc, 8)}   ${padRight(h, 13)}   ${padRight(g, 13)}   ${words}`.trimEnd();

const headText = (title: string): string =>
  row(title, 'apart, mm', 'disc, mm', 'H, mm', ' G, °', 'errors');

const fromTo = (one: string, other: string): string => `${padLeft(one, 5)} → ${padRight(other, 5)}`;

function verdict({ exceeds }: ComparedConstant): string {
  if (exceeds === undefined) return 'not stated';
  return exceeds ? 'do not allow it' : 'allow it';
}

function lineText(compared: ComparedConstant, longest: number): string {
  const { name, first, second, distance, radius95 } = compared;
  const share = longest > 0 ? distance / longest : 0;
  return row(
    `${padRight(`  ${cleanText(name, 12)}`, NAME)}${bar(share, BAR)}`,
    sizeText(distance),
    sizeText(radius95),
    fromTo(sizeText(first.amplitude), sizeText(second.amplitude)),
    fromTo(degrees(first.phaseLag), degrees(second.phaseLag)),
    verdict(compared),
  );
}

const said = (label: string, text: string): string => labelled(label, text, WIDTH);

function judgedText({ rows, exceeding, judged, byChance, significance }: ConstantsComparison) {
  if (judged === 0) return `none of ${counted(rows.length, 'line')}: neither set states errors`;
  const stands = exceeding === 1 ? 'stands' : 'stand';
  const share = format('.3~r')(significance * 100);
  return `${exceeding} of ${counted(judged, 'line')} ${stands} further apart than errors allow; chance alone would bring ${share} %, about ${format('.1f')(byChance)}`;
}

function levelText(comparison: ConstantsComparison): string {
  const { meanLevelChange, meanLevelSigma, meanLevelReason = 'no reason given' } = comparison;
  if (meanLevelChange === undefined) return `not compared: ${cleanText(meanLevelReason)}`;
  const sigma = meanLevelSigma === undefined ? '' : ` ± ${millimetres(meanLevelSigma)}`;
  return `mean level ${signedMillimetres(meanLevelChange)}${sigma} mm from first to second`;
}

const listed = (names: readonly string[]): string =>
  names.map((name) => cleanText(name, 12)).join(', ');

function footLines(comparison: ConstantsComparison): string[] {
  const { rows, onlyFirst, onlySecond, notResolved, rootSumSquare, largest } = comparison;
  const most = `most in ${cleanText(largest.name, 12)}: ${sizeText(largest.distance)} mm`;
  const lone = [
    ...(onlyFirst.length > 0 ? [`first: ${listed(onlyFirst)}`] : []),
    ...(onlySecond.length > 0 ? [`second: ${listed(onlySecond)}`] : []),
  ];
  return [
    said(
      'apart',
      'from the point (H cos G, H sin G) of the first to that of the second; errors alone keep it within the disc in 95 of 100',
    ),
    said(
      'differ',
      `${sizeText(rootSumSquare)} mm typical in height, from ${counted(rows.length, 'line')}; ${most}`,
    ),
    said('judged', judgedText(comparison)),
    said('level', levelText(comparison)),
    ...(lone.length > 0 ? [said('only in', lone.join('; '))] : []),
    ...(notResolved.length > 0
      ? [said('left out', `${listed(notResolved)} (0 in a set: not resolved there)`)]
      : []),
    ...comparison.warnings.map(({ message }) => said('note', cleanText(message, 400))),
  ];
}

/**
 * Writes a comparison of two sets of constants: by species, the furthest apart first, the distance of each constituent
 * with a bar to scale, the disc of its errors, H and G from first to second, and whether errors allow it; below, what the two
 * tides differ by, how many lines stand further apart than errors allow and how many chance would bring, the mean level, and
 * what could not be compared.
 *
 * @param comparison - Of `compareConstants`.
 * @param names - What to call the two sets.
 * @returns Lines of at most 92 characters where words allow it, joined by `\n`, closed by the caution.
 * @throws InputError `MISSING` or `WRONG_TYPE`, paths `names.first` and `names.second`; those of `constituent`.
 * @example
 * const later = { ...constants, constituents: [{ name: 'M2', amplitude: 1.53, phaseLag: 140 }] };
 * const text = comparisonText(compareConstants(constants, later), { first: '2011', second: '2031' });
 * text.includes('1500 → 1530'); // true
 * @public
 */
export function comparisonText(
  comparison: ConstantsComparison,
  names: { readonly first: string; readonly second: string },
): string {
  const groups = groupLines(comparison.rows, ({ distance }) => distance);
  const longest = max(comparison.rows, ({ distance }) => distance) ?? 0;
  const out = [
    said('first', requiredText(names.first, 'names.first')),
    said('second', requiredText(names.second, 'names.second')),
    '',
  ];
  groups.forEach(({ words, lines }, i) => {
    const title = words.toUpperCase();
    out.push(i === 0 ? headText(title) : title);
    for (const { own } of lines) out.push(lineText(own, longest));
  });
  return [...out, '', ...footLines(comparison), caution('levels')].join('\n');
}
