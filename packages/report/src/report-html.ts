/**
 * The report: one page that answers seven questions. It holds its pictures and its style; it has no script and asks nothing
 * of any server, which its content policy enforces.
 * @module
 */
import { degrees } from './internal/numbers.js';
import { element, styleSheet, together } from './internal/markup.js';
import { entering, levelsHere } from './internal/report/enter.js';
import { type Facts, readFacts } from './internal/report/facts.js';
import type { ReportInput } from './internal/report/input.js';
import { pageCss, soft } from './internal/report/page.js';
import { provenance } from './internal/report/provenance.js';
import { recordFaults } from './internal/report/record.js';
import { reliance } from './internal/report/rely.js';
import { notTide, tideHere } from './internal/report/tide.js';
import { cleanText } from './internal/text.js';

const QUESTIONS = [
  reliance,
  recordFaults,
  tideHere,
  notTide,
  entering,
  levelsHere,
  provenance,
] as const;

/** `51.3° N, 2.1° W`. */
function positionText({ latitude, longitude }: ReportInput['place']): string | undefined {
  if (latitude === undefined || longitude === undefined) return undefined;
  const east = longitude > 180 ? longitude - 360 : longitude;
  return `${degrees(Math.abs(latitude))}° ${latitude < 0 ? 'S' : 'N'}, ${degrees(Math.abs(east))}° ${east < 0 ? 'W' : 'E'}`;
}

function headLine({ input, datum, zone }: Facts): string {
  const parts = [
    positionText(input.place),
    `heights above ${datum}`,
    `times ${zone.name}`,
    cleanText(input.generatedFrom.program),
  ];
  return parts.filter((part) => part !== undefined).join(' · ');
}

/**
 * Makes the report as one self-contained page: no script, no outside request, readable on a phone, in the dark and on A4
 * paper. It answers: what can I rely on, what was wrong with the record, what does the tide do here, what is not tide, when
 * can I enter, which levels and how sure, where does each number come from. What was not given is named as missing.
 *
 * @param input - Place, datum, zone, constants and what else there is. Nothing is written to.
 * @returns HTML, complete from `<!doctype html>`.
 * @throws InputError of `parseConstants`, `constituent`, and of the pictures: `MISSING` paths `place.name`, `datum`,
 * `UNKNOWN_CHOICE` path `timeZone`, `BAD_TIME` path `month`, `LENGTH_MISMATCH` path `weights` (of `fit.resistant`).
 * @example
 * const input = { place: { name: 'Quenby Haven' }, datum: 'chart datum', timeZone: 'UTC', fit: { constants }, turningPoints: [], generatedFrom: { program: 'a test' } };
 * reportHtml(input).includes('<h2 id="question-7">'); // true
 * @public
 */
export function reportHtml(input: ReportInput): string {
  const facts = readFacts(input);
  const questions = QUESTIONS.map((answer) => answer(facts));
  const page = element(
    'html',
    { lang: 'en' },
    element(
      'head',
      {},
      element('meta', { charset: 'utf-8' }),
      element('meta', { name: 'viewport', content: 'width=device-width, initial-scale=1' }),
      element('meta', {
        'http-equiv': 'Content-Security-Policy',
        content: "default-src 'none'; style-src 'unsafe-inline'",
      }),
      element('title', {}, `Tides at ${facts.place}`),
      styleSheet(pageCss()),
    ),
    element(
      'body',
      {},
      element(
        'main',
        {},
        element('h1', {}, `Tides at ${facts.place}`),
        soft(headLine(facts)),
        element(
          'nav',
          {},
          questions.map(({ title }, i) =>
            element('a', { href: `#question-${i + 1}` }, `${i + 1} ${title}`),
          ),
        ),
        questions.map(({ title, body }, i) =>
          element(
            'section',
            {},
            element('h2', { id: `question-${i + 1}` }, element('b', {}, String(i + 1)), title),
            body,
          ),
        ),
      ),
    ),
  );
  return `<!doctype html>\n${together(page).markup}\n`;
}
