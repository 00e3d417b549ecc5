/**
 * The ladder of levels for the terminal, to scale.
 * @module
 */
import { caution } from './caution.js';
import { metres } from './internal/numbers.js';
import { readRungs } from './internal/rungs.js';
import { padLeft, padRight, requiredText } from './internal/text.js';
import type { LevelsLadderInput } from './levels-ladder.js';

const ROWS = 24; // that the ladder would take if nothing crowded
const NUMBER = 7;

/**
 * Writes the levels as a ladder to scale: heights left, names with one standard error and grounds right, the gap between each
 * two rungs on the pole. Where rungs crowd, the pole is drawn longer than to scale and shows it (┊). A level that is missing
 * has a dashed rung and the reason.
 *
 * @param input - Rungs in any order, metres above the datum.
 * @returns Lines joined by `\n`, closed by the caution.
 * @throws InputError as `levelsLadderSvg`.
 * @example
 * const rungs = [{ name: 'HAT', height: 4.21 }, { name: 'MSL', height: 2.08 }];
 * levelsText({ rungs, datum: 'chart datum' }).includes('│ 2.13'); // true
 * @public
 */
export function levelsText(input: LevelsLadderInput): string {
  const datum = requiredText(input.datum, 'datum');
  const { placed, unplaced } = readRungs(input.rungs);
  const names = Math.max(
    4,
    ...placed.map(({ name }) => name.length),
    ...unplaced.map(({ name }) => name.length),
  );
  const high = placed[0]?.height ?? 0;
  const low = placed[placed.length - 1]?.height ?? 0;
  const scale = high > low ? ROWS / (high - low) : 0;
  const out = [`above ${datum}, m`];
  let stretched = false;
  placed.forEach(({ name, height, sure, grounds, missing }, i) => {
    const bar = missing === undefined ? '─' : '╌';
    const joint = i === 0 ? '┬' : i === placed.length - 1 && unplaced.length === 0 ? '┴' : '┼';
    const words =
      missing === undefined ? `${padRight(sure, 5)}  ${grounds}` : `about; missing: ${missing}`;
    out.push(
      `${padLeft(metres(height), NUMBER)} ${bar}${joint}${bar} ${padRight(name, names)}  ${words}`.trimEnd(),
    );
    const next = placed[i + 1];
    if (next === undefined) return;
    const wanted = Math.round((height - next.height) * scale) - 1;
    const pole = wanted < 1 ? '┊' : '│';
    stretched ||= wanted < 1;
    const rows = Math.max(1, wanted);
    for (let k = 0; k < rows; k++) {
      const gap = k === Math.floor((rows - 1) / 2) ? ` ${metres(height - next.height)}` : '';
      out.push(`${' '.repeat(NUMBER + 2)}${pole}${gap}`);
    }
  });
  for (const { name, missing } of unplaced) {
    out.push(`${padLeft('?', NUMBER)} ╌┼╌ ${padRight(name, names)}  missing: ${missing}`);
  }
  if (stretched) out.push('┊ longer than to scale');
  out.push(caution('levels'));
  return out.join('\n');
}
