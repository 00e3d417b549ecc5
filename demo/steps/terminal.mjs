/**
 * Rows at the terminal, and where the demo's files go.
 * @module
 */
import { writeFileSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The top folder of the repository. */
export const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
/** Where all files of the demo go. */
export const out = join(root, 'demo', 'out');

/** A file of the demo as people should read it. */
export const shown = (name) => relative(process.cwd(), join(out, name)) || '.';

/** Seconds since a moment of `performance.now()`. */
export const seconds = (since) => `${((performance.now() - since) / 1000).toFixed(1)} s`;

const WIDTH = 96; // where the seconds stand

/** A label, what was done, and how long it took. */
export function row(label, text, since) {
  const line = `${label.padEnd(10)}${text}`;
  console.log(since === undefined ? line : `${line.padEnd(WIDTH)}  ${seconds(since)}`);
}

/** A line of text under a row. */
export const under = (text) => console.log(`${' '.repeat(10)}${text}`);

/** Text of several lines, set in under the rows. */
export const block = (text) => console.log(text.replace(/^(?=.)/gm, '  '));

/** Writes one of the demo's files. */
export const keep = (name, text) => writeFileSync(join(out, name), text);

export const count = (n) => String(n).replace(/\B(?=(\d{3})+$)/g, '\u00a0');
export const millimetres = (metres, digits = 0) =>
  (metres * 1000).toFixed(digits).replace('-', '−');
export const signed = (metres, digits = 0) =>
  metres < 0 ? millimetres(metres, digits) : `+${millimetres(metres, digits)}`;
/** 2030-09-18 10:30Z */
export const moment = (t) => `${new Date(t).toISOString().slice(0, 16).replace('T', ' ')}Z`;
