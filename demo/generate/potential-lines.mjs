/**
 * The lines of the tide-generating potential: the one table that the generator shares with the packages.
 *
 * Source: Cartwright and Tayler (1971), Cartwright and Edden (1973), in the selection of the IERS Conventions (2010),
 * chapter 7; see the data sheet beside the table.
 * @module
 */
import { readFileSync } from 'node:fs';

const TABLE = new URL(
  '../../packages/constituents/data/cartwright-tayler-edden.csv',
  import.meta.url,
);

/**
 * Lines slower than a month are left out: over 13 months they are the mean level and the seasons, which the weather makes.
 *
 * @returns {{ multipliers: number[], amplitude: number }[]} Multipliers of tau, s, h, p, N', ps; amplitude in metres, sign kept.
 */
export function readPotentialLines() {
  const rows = readFileSync(TABLE, 'utf8')
    .split(/\r?\n/)
    .filter((row) => /^\d/.test(row))
    .map((row) => row.split(',').slice(1, 8).map(Number));
  if (rows.length === 0)
    throw new Error(`${TABLE.pathname}: expected lines of the potential, got none`);
  return rows
    .map((cells) => ({ multipliers: cells.slice(0, 6), amplitude: cells[6] }))
    .filter(({ multipliers: [tau, moon] }) => tau !== 0 || moon !== 0);
}
