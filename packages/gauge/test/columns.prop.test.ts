/**
 * Columns give back exactly what they were given, across blocks and kinds of blocks.
 */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type NumberColumn, numberColumn } from '../src/internal/columns.js';

function held(column: NumberColumn): { at: number[]; scan: number[]; drain: number[] } {
  const at = Array.from({ length: column.length() }, (_, i) => column.at(i));
  const scan: number[] = [];
  column.scan((value, i) => {
    scan[i] = value;
  });
  const drain: number[] = [];
  column.drain((value, i) => {
    drain[i] = value;
  });
  return { at, scan, drain };
}

function same(kind: 'steady' | 'decimal', numbers: readonly number[]): void {
  const column = numberColumn(kind);
  for (const value of numbers) column.push(value);
  const list = [...numbers];
  expect(held(column)).toEqual({ at: list, scan: list, drain: list });
  expect(column.length()).toBe(0);
}

const heights = fc.oneof(
  fc.integer({ min: -99999, max: 99999 }).map((n) => (n + 0) / 10000),
  fc.constant(Number.NaN),
  fc.double({ noDefaultInfinity: true, noNaN: true }).filter((x) => !Object.is(x, -0)),
);
const times = fc.oneof(
  fc.integer({ min: -8520336000000, max: 7289654400000 }),
  fc.integer({ min: 0, max: 100000 }),
  fc.double({ min: 0, max: 1e12, noNaN: true }).filter((x) => !Object.is(x, -0)),
);

describe('numberColumn', () => {
  it('heights', () => {
    fc.assert(
      fc.property(fc.array(heights, { maxLength: 50 }), (list) => {
        same('decimal', list);
      }),
    );
  });
  it('times in any order', () => {
    fc.assert(
      fc.property(fc.array(times, { maxLength: 50 }), (list) => {
        same('steady', list);
      }),
    );
  });
  it('more than one block, the step broken in the second and far beyond an hour in the third', () => {
    const steady = Array.from({ length: 140000 }, (_, i) => {
      return i * 60000 + (i > 70000 ? 500 : 0) + (i > 135000 ? 5e9 : 0);
    });
    same('steady', steady);
    same(
      'decimal',
      steady.map((t, i) => (i % 1000 === 7 ? Number.NaN : t / 1e10)),
    );
  });
});
