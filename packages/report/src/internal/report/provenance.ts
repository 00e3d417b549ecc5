/**
 * Question 7: where does each number come from?
 * @module
 */
import { formatInstant, type NodalHold, toInstant } from '@staithe/core';
import { format } from 'd3-format';
import { conditionText } from '../../windows-text.js';
import { type Child, element } from '../markup.js';
import { count, metres } from '../numbers.js';
import { cleanText } from '../text.js';
import { zoneText } from '../zone.js';
import type { Facts } from './facts.js';
import { type Question, table } from './page.js';

const ARGUMENTS = {
  iers2010: 'the longitudes of Moon and Sun of the IERS Conventions (2010)',
  schureman1940: 'the longitudes of Moon and Sun of Schureman (1940)',
} as const;
const NODAL = {
  potential: 'f and u from the lines of the tidal potential',
  schureman1940: 'f and u of Schureman (1940)',
  none: 'no nodal correction',
} as const;

function holdText(hold: NodalHold | undefined): string {
  if (hold === undefined || hold === 'continuous') return 'running continuously';
  if (hold === 'calendar-year') return 'held for each calendar year';
  return `held at ${cleanText(hold.heldAt)}`;
}

function modelsText({ input }: Facts): string {
  const { argumentModel, nodalModel, nodalHold } = input.fit.constants;
  const held = nodalModel === 'none' ? '' : `, ${holdText(nodalHold)}`;
  return `${ARGUMENTS[argumentModel]}; ${NODAL[nodalModel]}${held}`;
}

function recordRows({ input, record }: Facts): Child[][] {
  const { file, sha256 } = input.generatedFrom;
  const named = file === undefined ? 'no file was named' : cleanText(file);
  const sum =
    sha256 === undefined
      ? undefined
      : element('span', { class: 'mono' }, `SHA-256 ${cleanText(sha256, 80)}`);
  const rows: Child[][] = [['Source', [named, sum && element('br', {}), sum]]];
  if (record) {
    rows.push([
      'Samples',
      `${count(record.read)} read of ${count(record.due)}, ${formatInstant(record.from)} to ${formatInstant(record.to)}; flags are those of the open standard QARTOD with its titles as reasons`,
    ]);
  }
  return rows;
}

function discsText({ input }: Facts): string {
  const { diagnostics, errorModel } = input.fit;
  if (errorModel === 'redrawn') return 'the fit repeated on what is not tide, redrawn';
  return (diagnostics?.noise ?? []).some(({ bins }) => bins > 0)
    ? 'the noise beside each line in the spectrum of what is not tide'
    : 'the size of what is not tide, samples taken as independent';
}

function fitRows(facts: Facts): Child[][] {
  const { constants, diagnostics, resistant } = facts.input.fit;
  const rows: Child[][] = [];
  if (diagnostics) {
    rows.push([
      'H and G of each line',
      `least squares over ${count(diagnostics.samples)} samples, ${diagnostics.days.toFixed(1)} days, ${diagnostics.unknowns} unknowns, rank ${diagnostics.rank}, condition ${diagnostics.condition.toFixed(1)}`,
    ]);
    if (resistant) {
      const { curve, cutoff, scale } = resistant;
      const turns = curve === 'biweight' ? 'falling to none at' : 'falling beyond';
      rows.push([
        'Weights',
        `resistant (${curve}): ${turns} ${format('~g')(cutoff)} scales of ${(scale * 1000).toFixed(1)} mm`,
      ]);
    }
    rows.push(['95 % discs', discsText(facts)]);
    rows.push(['What is not tide', 'observed minus fitted, on the samples of the fit']);
  } else {
    rows.push([
      'H and G of each line',
      cleanText(constants.source ?? 'the constants document, which names no source'),
    ]);
  }
  const borrowed = constants.constituents.filter(({ standing }) => standing === 'borrowed');
  if (borrowed.length > 0) {
    const pairs = borrowed.map(
      ({ name, borrowedFrom }) =>
        `${cleanText(name, 12)}${borrowedFrom ? ` from ${cleanText(borrowedFrom, 12)}` : ''}`,
    );
    rows.push([
      'Borrowed lines',
      `a fixed ratio and lag to the parent, not from this record: ${pairs.join(', ')}`,
    ]);
  }
  rows.push(['Models', modelsText(facts)]);
  return rows;
}

function predictionRows({ input, datum, zone }: Facts): Child[][] {
  const times = input.turningPoints.map(({ time }) => time);
  const rows: Child[][] = [
    [
      'Heights and times',
      `predicted from the constants with the same models, above ${datum}; weather left out`,
    ],
  ];
  if (times.length > 0)
    rows.push([
      'Local time',
      zoneText(zone, times[0] as number, times[times.length - 1] as number),
    ]);
  if (input.windows)
    rows.push(['Windows', `where the predicted curve is ${conditionText(input.windows)}`]);
  for (const { name, height, sigma, grounds, missing } of input.levels ?? []) {
    const from =
      missing === undefined
        ? cleanText(grounds ?? 'grounds not stated')
        : `missing: ${cleanText(missing)}`;
    const value =
      height === undefined || missing !== undefined
        ? ''
        : `${metres(height)} m${sigma === undefined ? '' : ` ± ${metres(sigma)}`}: `;
    rows.push([cleanText(name, 40), value + from]);
  }
  return rows;
}

export function provenance(facts: Facts): Question {
  const { program, at } = facts.input.generatedFrom;
  const made = at === undefined ? '' : `, ${formatInstant(toInstant(at, 'generatedFrom.at'))}`;
  const rows = [
    ...recordRows(facts),
    ...fitRows(facts),
    ...predictionRows(facts),
    ['Made by', cleanText(program) + made],
  ];
  return {
    title: 'Where does each number come from?',
    body: table([{ head: 'number' }, { head: 'comes from' }], rows, false),
  };
}
