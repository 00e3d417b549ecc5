/**
 * The picture of docs/currents.md: an invented ellipse with the terms of the conventions at their places, and below it the
 * components and the speed along the longest axis over one turn of V + u. Written to the file named; `--check` only tells
 * whether it would change.
 */
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { componentsOf, type CurrentEllipse } from '@staithe/fit';
import { ellipseSvg } from './ellipse.js';

const SHAPE: CurrentEllipse = {
  major: 1,
  minor: 0.42,
  turning: 'left',
  bearing: 55,
  phaseLag: 325,
};

const [, , target, check] = process.argv;
if (!target) throw new Error('target: expected where to write, got nothing');
const picture = `${ellipseSvg(SHAPE, componentsOf(SHAPE))}\n`;
if (check !== '--check') {
  writeFileSync(target, picture);
  console.log(`wrote ${target}`);
} else if (!existsSync(target) || readFileSync(target, 'utf8') !== picture) {
  console.error(`${target}: not up to date; run: node tools/docs/pictures.mjs`);
  process.exitCode = 1;
}
