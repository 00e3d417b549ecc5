/**
 * Questions 3 and 4: what does the tide do here, and what is not tide?
 * @module
 */
import { drawDials } from '../../dials.js';
import { drawResidualRaster, leftOverTexts } from '../../residual-raster.js';
import { type Child, element } from '../markup.js';
import { leftOutText } from '../left-out.js';
import { count, degrees, metres, millimetres, returnsEvery } from '../numbers.js';
import { groundsOf, groupBySpecies } from '../species.js';
import { cleanText } from '../text.js';
import { type Facts, momentIn } from './facts.js';
import { bullets, figure, paragraph, type Question, soft } from './page.js';

const COLUMNS = [
  ['line', ''],
  ['', 'bars'],
  ['returns every', 'number aside'],
  ['H, mm', 'number'],
  ['G, °', 'number'],
  ['95 % disc, mm', 'number'],
  ['grounds', ''],
] as const;

function constantsTable({ input }: Facts): Child {
  const groups = groupBySpecies(input.fit.constants);
  const longest = groups[0]?.lines[0]?.own.amplitude ?? 0;
  const rows = groups.map(({ words, lines }) => [
    element(
      'tr',
      { class: 'group' },
      element('th', { colspan: COLUMNS.length, scope: 'rowgroup' }, words),
    ),
    lines.map(({ own, period }) => {
      const share = longest > 0 ? (100 * own.amplitude) / longest : 0;
      const cells: Child[] = [
        cleanText(own.name, 20),
        element('span', { class: 'bar', style: `width:${share.toFixed(1)}px` }),
        returnsEvery(period),
        (own.amplitude * 1000).toFixed(1),
        degrees(own.phaseLag),
        own.radius95 === undefined ? '–' : (own.radius95 * 1000).toFixed(1),
        cleanText(groundsOf(own), 60),
      ];
      return element(
        'tr',
        {},
        cells.map((cell, i) => element('td', { class: COLUMNS[i]?.[1] || undefined }, cell)),
      );
    }),
  ]);
  const head = COLUMNS.map(([text, name]) =>
    element('th', { class: name || undefined, scope: 'col' }, text),
  );
  return element(
    'div',
    { class: 'scroll' },
    element('table', {}, element('thead', {}, element('tr', {}, head)), element('tbody', {}, rows)),
  );
}

export function tideHere(facts: Facts): Question {
  const { input, datum } = facts;
  const { constants, diagnostics } = input.fit;
  const left = leftOutText(diagnostics);
  const rate = constants.secularRate;
  const body: Child = [
    paragraph(
      `Mean level is ${metres(constants.meanLevel, 3)} m above ${datum}${rate ? `, changing by ${(rate.metresPerYear * 1000).toFixed(1).replace('-', '−')} mm a year` : ''}. ` +
        'Each arrow is one constituent: its length is how far it lifts the water, its direction how late it comes.',
    ),
    figure(
      (options) => drawDials(constants, { ...options, title: `The constants of ${facts.place}` }),
      'low',
    ),
    constantsTable(facts),
    left !== undefined && soft(`Left out: ${left}.`),
    bullets((input.fit.warnings ?? []).map(({ message }) => message)),
  ];
  return { title: 'What does the tide do here?', body };
}

function restSentence({ input, zone }: Facts): string {
  const { diagnostics } = input.fit;
  if (diagnostics === undefined) return 'The fit came without the figures of what is left.';
  const { rms, largest, largestAt } = diagnostics.residual;
  const worst =
    largest === undefined || largestAt === undefined
      ? ''
      : `, ${millimetres(largest)} mm at its worst, on ${momentIn(zone, largestAt)}`;
  return (
    `What is left after the tide is ${millimetres(rms)} mm (root mean square)${worst}. ` +
    `For the mean level the record is worth ${count(diagnostics.effectiveSamples)} independent samples.`
  );
}

export function notTide(facts: Facts): Question {
  const title = 'What is not tide?';
  const { residuals, leftOver = [] } = facts.input.fit;
  const sentence = restSentence(facts);
  if (residuals === undefined) {
    return {
      title,
      body: [
        paragraph(sentence),
        bullets(leftOverTexts(leftOver)),
        paragraph('No residuals were given, so there is no picture of them.'),
      ],
    };
  }
  const { longitude } = facts.input.place;
  const body: Child = [
    paragraph(sentence),
    figure((options) =>
      drawResidualRaster(
        { residuals, longitude, leftOver, title: `What is not tide at ${facts.place}` },
        options,
      ),
    ),
    soft(
      'Weather lasts longer than a day and shows as bands from bottom to top. Tide that the constants miss comes back each lunar day and shows as stripes from left to right.',
    ),
  ];
  return { title, body };
}
