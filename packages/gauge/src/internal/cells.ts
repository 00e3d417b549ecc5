/**
 * Heights as files write them: numbers, the marks of a gap, the numbers that mean a gap.
 * @module
 */
import { describe, InputError, metresFromFeet } from '@staithe/core';
import type { GaugeUnit } from '../record.js';

const GAP_MARKS = /^(?:|-+|nan|null|na|n\/a|none)$/i;
const NUMBER = /^[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?$/;
const DECIMAL_COMMA = /^[+-]?\d*,\d+$/;
const ALL_NINES = /^-?9{2,}(?:\.9+)?$/;
const BEYOND_ANY_TIDE = 20; // m

/** Metres in a number of a unit. Division keeps 123 cm at 1.23 m exactly. */
export function toMetres(value: number, unit: GaugeUnit): number {
  if (unit === 'm') return value;
  if (unit === 'ft') return metresFromFeet(value);
  return unit === 'cm' ? value / 100 : value / 1000;
}

/** Says what numbers mean "missing". */
export type IsSentinel = (value: number, metres: number) => boolean;

/** The caller's list, or the well-known ones where no tide can reach them. */
export function sentinelTest(list: readonly number[] | undefined): IsSentinel {
  if (list) return (value) => list.includes(value);
  return (value, metres) =>
    (metres > BEYOND_ANY_TIDE || metres < -BEYOND_ANY_TIDE) &&
    (value === -32768 || ALL_NINES.test(String(value)));
}

/** What one cell holds. */
export type CellReader = (text: string, path: () => string) => number;

/** A number in the file's unit, NaN for a gap mark. Once a file has shown its decimal mark, the other is refused. */
export function cellReader(commaAllowed: boolean): CellReader {
  let mark: '.' | ',' | undefined;
  return (raw, path) => {
    const text = raw.trim();
    const refuse = (expected: string): never => {
      throw new InputError('BAD_NUMBER', path(), `expected ${expected}, got ${describe(text)}`);
    };
    if (NUMBER.test(text)) {
      if (mark === undefined && text.includes('.')) mark = '.';
      if (mark === ',' && text.includes('.')) return refuse('a decimal comma as before');
      return +text;
    }
    if (GAP_MARKS.test(text)) return Number.NaN;
    const plain = text.replace('\u2212', '-'); // the typographic minus
    if (commaAllowed && DECIMAL_COMMA.test(plain)) {
      if (mark === '.') return refuse('a decimal point as before');
      mark = ',';
      return +plain.replace(',', '.');
    }
    if (NUMBER.test(plain)) return +plain;
    return refuse('a number or a gap');
  };
}
