/**
 * Moves the instant from which the secular rate counts, in products that are already summed: the rate's column less `by`
 * times the column of the mean level. Each part counts from its own middle, so that no digits are lost to a far epoch.
 * @module
 */
import { type Instant, YEAR } from '@staithe/core';
import type { Design } from '../design.js';

/**
 * @param packed - Lower triangle of the products, the record as the last column.
 * @param order - Of the design.
 * @param from - Where the rate counts from.
 * @param to - Where it is to count from.
 */
export function countRateFrom(
  packed: readonly number[],
  { order }: Pick<Design, 'order'>,
  from: Instant,
  to: Instant,
): readonly number[] {
  const rate = order.indexOf('secularRate');
  if (rate < 0 || from === to) return packed;
  const by = (to - from) / YEAR;
  const at = (i: number, j: number): number =>
    i >= j ? (i * (i + 1)) / 2 + j : (j * (j + 1)) / 2 + i;
  const size = order.length + 1;
  const out = [...packed];
  const read = (i: number, j: number): number => packed[at(i, j)] as number;
  for (let j = 0; j < size; j++) {
    if (j !== rate) out[at(rate, j)] = read(rate, j) - by * read(0, j);
  }
  out[at(rate, rate)] = read(rate, rate) - by * (2 * read(rate, 0) - by * read(0, 0));
  return out;
}
