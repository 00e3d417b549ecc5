/**
 * A page for each constituent that stands on lines of the potential: its names, how often it returns, what it beats with, its
 * lines as a comb, f and u as a closed loop over a nodal cycle, its source; and yearly sheets of f and u. Written to
 * docs/api/constituents by `npm run docs`.
 */
import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import {
  type Constituent,
  formatDoodsonNumber,
  formatXdo,
  listConstituents,
  separationTime,
} from '@staithe/constituents';
import { DAY, type NodalModel } from '@staithe/core';
import { nodalCorrection, type NodalPoint, sideLines, yearlySheet } from '@staithe/nodal';
import { combSvg, dotsSvg, loopSvg } from './drawing.js';

const folder = process.argv[2];
if (!folder) throw new Error('folder: expected where to write, got nothing');
mkdirSync(folder, { recursive: true });

const NODAL_CYCLE = 6798.4 * DAY;
const START = Date.UTC(2006, 5, 19); // the node at 0°
const SHEETS = [1984, 2031];

const escape = (words: string): string => words.replace(/[&<>"]/g, (c) => `&#${c.charCodeAt(0)};`);

function page(title: string, body: string): string {
  return `<!doctype html><html lang="en"><meta charset="utf-8"><meta name="viewport" content="width=device-width">
<title>${escape(title)}</title><style>
:root { color-scheme: light dark }
body { font: 16px/1.5 system-ui, sans-serif; max-width: 46rem; margin: 2rem auto; padding: 0 1rem }
table { border-collapse: collapse } td, th { padding: .15rem .7rem .15rem 0; text-align: left; vertical-align: top }
svg { width: 100%; background: #fff; border-radius: 6px; padding: .4rem; box-sizing: border-box }
</style><h1>${escape(title)}</h1>${body}</html>
`;
}

const row = (name: string, value: string): string => `<tr><th>${name}<td>${value}`;

function returns({ speed }: Constituent): string {
  const hours = 360 / speed;
  return hours < 48
    ? `${Math.floor(hours)} h ${((hours % 1) * 60).toFixed(1)} min`
    : `${(hours / 24).toFixed(2)} days`;
}

const lines = listConstituents().filter(({ kind }) => kind !== 'compound');

/** The nearest of its species by speed. */
function beats(of: Constituent): string {
  const others = lines.filter(
    ({ species, name, speed }) => species === of.species && name !== of.name && speed !== of.speed,
  );
  const near = others.reduce<Constituent | undefined>(
    (best, other) =>
      !best || Math.abs(other.speed - of.speed) < Math.abs(best.speed - of.speed) ? other : best,
    undefined,
  );
  if (!near) return 'nothing of its species';
  const days = separationTime(of, near) / DAY;
  return `with ${near.name} every ${days < 700 ? `${days.toFixed(1)} days` : `${(days / 365.25).toFixed(1)} years`}`;
}

function loop(of: Constituent, model: NodalModel): NodalPoint[] {
  return Array.from({ length: 120 }, (_, i) => {
    const time = START + (i * NODAL_CYCLE) / 120;
    return { time, ...nodalCorrection(of, time, { model }) };
  });
}

function pageOf(of: Constituent): string {
  const { lines: group } = sideLines(of);
  const facts = [
    row('returns every', returns(of)),
    row('beats', beats(of)),
    row('speed', `${of.speed.toFixed(7)}° an hour at J2000`),
    row('Doodson number', formatDoodsonNumber(of)),
    row('letters', formatXdo(of)),
    row('quarter turns', String(of.quarterTurns)),
    row('also called', of.aliases.map(escape).join(', ') || 'nothing else'),
    row('kind', of.kind),
    row('source', escape(of.source)),
  ];
  const table = `<table>${facts.join('')}</table>`;
  if (group.length === 0)
    return page(
      of.name,
      `${table}<p>No line of the potential: f = 1 and u = 0 in every model.</p>`,
    );
  const loops = [{ label: 'potential', points: loop(of, 'potential') }];
  try {
    loops.push({ label: 'Schureman (1940)', points: loop(of, 'schureman1940') });
  } catch {
    // SP 98 has no formula for it.
  }
  const teeth = group.map(
    ({ degree, perigee, node, ratio }) =>
      `<tr><td>${degree}<td>${perigee}<td>${node}<td>${ratio.toFixed(5)}`,
  );
  return page(
    of.name,
    `${table}<h2>Its lines</h2>${combSvg(of.name, group)}
<table><tr><th>degree<th>Δp<th>ΔN′<th>share of the main line${teeth.join('')}</table>
<h2>f and u over 18.6 years</h2>${loopSvg(of.name, loops)}`,
  );
}

function sheetOf(year: number): string {
  const rows = yearlySheet(year);
  const cells = rows.map(
    (one) =>
      `<tr><th>${one.name}<td>${dotsSvg(one)}<td>${one.middle.f.toFixed(4)}<td>${one.middle.u.toFixed(2)}°`,
  );
  return page(
    `f and u in ${year}`,
    `<p>From the lines of the potential. A dot a month, each row on its own scale, f at its extremes; beside it f and u at 2 July 12:00.</p>
<table><tr><th>line<th>January to December<th>f<th>u${cells.join('')}</table>`,
  );
}

for (const of of lines) writeFileSync(join(folder, `${of.name}.html`), pageOf(of));
for (const year of SHEETS) writeFileSync(join(folder, `sheet-${year}.html`), sheetOf(year));
const species = [...new Set(lines.map((of) => of.species))];
const index = species.map((n) => {
  const links = lines
    .filter((of) => of.species === n)
    .map(({ name }) => `<a href="${name}.html">${name}</a>`);
  return `<h2>${['slower than a day', 'once a day', 'twice a day', 'three times a day'][n] ?? n}</h2><p>${links.join(' · ')}</p>`;
});
const sheets = SHEETS.map((year) => `<a href="sheet-${year}.html">${year}</a>`).join(' · ');
writeFileSync(
  join(folder, 'index.html'),
  page('Constituents', `${index.join('')}<h2>Yearly sheets of f and u</h2><p>${sheets}</p>`),
);
console.log(`${lines.length} constituents and ${SHEETS.length} yearly sheets in ${folder}`);
