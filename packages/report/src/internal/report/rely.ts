/**
 * Question 1: what can I rely on? Five sentences with numbers, each from the data, or saying what is missing.
 * @module
 */
import { max } from 'd3-array';
import { caution } from '../../caution.js';
import { conditionText } from '../../windows-text.js';
import { type Child, element } from '../markup.js';
import { count, counted, duration, metres, millimetres } from '../numbers.js';
import { cleanText } from '../text.js';
import { dateIn, type Facts, momentIn, openTimes } from './facts.js';
import { cautionBox, type Question } from './page.js';

function recordSentence({ record, input, zone }: Facts): string {
  if (record === undefined)
    return 'No record was given, so nothing can be said of the samples behind the constants.';
  const flagged = (flag: number): number =>
    (input.record?.runs ?? []).filter((run) => run.flag === flag).length;
  const share = ((100 * record.read) / record.due).toFixed(1);
  return (
    `The record from ${dateIn(zone, record.from)} to ${dateIn(zone, record.to)} holds ${count(record.read)} of ${count(record.due)} samples (${share} %); ` +
    `${counted(flagged(3), 'run')} of samples ${flagged(3) === 1 ? 'is' : 'are'} flagged doubtful and ${count(flagged(4))} rejected.`
  );
}

function constantsSentence({ input }: Facts): string {
  const { constituents } = input.fit.constants;
  const of = (standing: string): number =>
    constituents.filter((line) => line.standing === standing).length;
  const grounds = ['firm', 'faint', 'borrowed']
    .filter((standing) => of(standing) > 0)
    .map((standing) => `${of(standing)} ${standing}`)
    .join(', ');
  const longest = max(constituents, ({ amplitude }) => amplitude);
  const strongest = constituents.find(({ amplitude }) => amplitude === longest);
  if (strongest === undefined) return 'The document holds no constituents.';
  const sure =
    strongest.radius95 === undefined
      ? ', with no error stated'
      : ` within ${(strongest.radius95 * 1000).toFixed(1)} mm (95 % disc)`;
  return (
    `The strongest of ${counted(constituents.length, 'constituent')} is ${cleanText(strongest.name, 12)} with ${millimetres(strongest.amplitude)} mm${sure}` +
    (grounds === '' ? '.' : `; ${grounds}.`)
  );
}

function residualSentence({ input, zone }: Facts): string {
  const residual = input.fit.diagnostics?.residual;
  if (residual === undefined)
    return 'How far the water strays from the tide is not known here: the fit came without its diagnostics.';
  const { rms, largest, largestAt } = residual;
  const worst =
    largest === undefined || largestAt === undefined
      ? ''
      : ` and was ${millimetres(largest)} mm at its worst, on ${momentIn(zone, largestAt)}`;
  return (
    `What is not tide is ${millimetres(rms)} mm typically (root mean square)${worst}: ` +
    'expect an actual level to stray from a predicted one by as much.'
  );
}

function windowsSentence({ input, zone, datum }: Facts): string {
  const { windows } = input;
  if (windows === undefined) return 'No access windows were asked for.';
  const { all, least, most } = openTimes(windows.list);
  const head = `From ${dateIn(zone, windows.from)} to ${dateIn(zone, windows.to)} the predicted height is ${conditionText(windows)} above ${datum}`;
  if (windows.list.length === 0) return `${head} at no time.`;
  const share = ((100 * all) / (windows.to - windows.from)).toFixed(0);
  return `${head} in ${counted(windows.list.length, 'window')}, ${share} % of the time; the shortest lasts ${duration(least)}, the longest ${duration(most)}.`;
}

function levelsSentence({ input, zone, datum }: Facts): string {
  if (input.limits) {
    const { HAT, LAT, from, to } = input.limits;
    return `From ${dateIn(zone, from)} to ${dateIn(zone, to)} the predicted tide stays between ${metres(LAT.height)} m (${dateIn(zone, LAT.time)}) and ${metres(HAT.height)} m (${dateIn(zone, HAT.time)}) above ${datum}.`;
  }
  const known = (input.levels ?? []).filter(
    ({ height, missing }) => height !== undefined && missing === undefined,
  );
  const sorted = [...known].sort((a, b) => (a.height as number) - (b.height as number));
  const low = sorted[0];
  const high = sorted[sorted.length - 1];
  if (!low || !high) return 'No levels were worked out.';
  return `${counted(known.length, 'level')} ${known.length === 1 ? 'is' : 'are'} given, from ${cleanText(low.name, 20)} at ${metres(low.height as number)} m to ${cleanText(high.name, 20)} at ${metres(high.height as number)} m above ${datum}.`;
}

export function reliance(facts: Facts): Question {
  const sentences = [
    recordSentence,
    constantsSentence,
    residualSentence,
    windowsSentence,
    levelsSentence,
  ];
  const body: Child = [
    element(
      'ol',
      {},
      sentences.map((write) => element('li', {}, write(facts))),
    ),
    cautionBox(caution('heights')),
  ];
  return { title: 'What can I rely on?', body };
}
