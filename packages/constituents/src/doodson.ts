/**
 * Doodson numbers and XDO letters: the written forms of the six multipliers of τ, s, h, p, N′, p_s.
 *
 * Source: A. T. Doodson (1921), Proc. R. Soc. A 100, 305-329 (digits, 5 added to all but the first; letters beyond 0 to 9 ours);
 * the extended form in letters (Z is 0, A is 1, Y is −1) with a seventh for the quarter turns: common practice.
 * @module
 */
import { refuse } from '@staithe/core';

/** Multipliers of τ, s, h, p, N′, p_s. @public */
export type DoodsonNumbers = readonly [number, number, number, number, number, number];

const LARGEST = 25; // a digit P
const SMALLEST = -10; // a digit Q

/** 0 to 9, A to P for 10 to 25, Z back to Q for −1 to −10; undefined beyond. */
function toDigit(value: number): string | undefined {
  if (!Number.isInteger(value) || value > LARGEST || value < SMALLEST) return undefined;
  if (value < 0) return String.fromCharCode(91 + value);
  return value < 10 ? String(value) : String.fromCharCode(55 + value);
}

function fromDigit(digit: string): number {
  if (digit <= '9') return Number(digit);
  return digit.charCodeAt(0) - (digit <= 'P' ? 55 : 91);
}

/**
 * Reads a Doodson number such as `255.555`. Letters go on beyond the digits: A to P are 10 to 25, Z to Q −1 to −10.
 *
 * @param text - Six digits or letters, a point after the third allowed; the first is never negative.
 * @returns The six multipliers.
 * @throws InputError `BAD_NUMBER`, path `doodsonNumber`.
 * @example
 * parseDoodsonNumber('245.655'); // [2, -1, 0, 1, 0, 0]
 * @public
 */
export function parseDoodsonNumber(text: string): DoodsonNumbers {
  const digits = /^([0-9A-P][0-9A-Z]{2})\.?([0-9A-Z]{3})$/.exec(text);
  if (!digits) refuse('BAD_NUMBER', 'doodsonNumber', 'six digits or letters like 255.555', text);
  const numbers = Array.from(`${digits[1]}${digits[2]}`, (c, i) => fromDigit(c) - (i > 0 ? 5 : 0));
  return numbers as unknown as DoodsonNumbers;
}

/**
 * Writes a Doodson number.
 *
 * @param of - A constituent, or its six multipliers: the first 0 to 25, the others −15 to 20.
 * @returns Text such as `255.555`.
 * @throws InputError `OUT_OF_RANGE`, path `doodsonNumbers[i]`.
 * @example
 * formatDoodsonNumber([2, -1, 0, 1, 0, 0]); // '245.655'
 * @public
 */
export function formatDoodsonNumber(
  of: DoodsonNumbers | { readonly doodsonNumbers: DoodsonNumbers },
): string {
  const numbers = 'doodsonNumbers' in of ? of.doodsonNumbers : of;
  const text = numbers.map((n, i) => {
    const range = i > 0 ? '-15 to 20' : '0 to 25';
    const digit = i > 0 || n >= 0 ? toDigit(n + (i > 0 ? 5 : 0)) : undefined;
    return (
      digit ?? refuse('OUT_OF_RANGE', `doodsonNumbers[${i}]`, `a whole number from ${range}`, n)
    );
  });
  return `${text.slice(0, 3).join('')}.${text.slice(3).join('')}`;
}

/**
 * Reads XDO letters: six for the multipliers, and a seventh for the quarter turns.
 *
 * @param text - Six or seven letters; Z is 0, A to L are 1 to 12, Y to M are −1 to −13. The first, the species, is
 *   never negative: there A to Y are 1 to 25.
 * @returns The multipliers and the quarter turns (0 where the seventh letter is absent).
 * @throws InputError `BAD_NUMBER`, path `xdo`.
 * @example
 * parseXdo('AYZZZZY').quarterTurns; // -1
 * @public
 */
export function parseXdo(text: string): {
  readonly doodsonNumbers: DoodsonNumbers;
  readonly quarterTurns: number;
} {
  if (!/^[A-Z]{6,7}$/.test(text)) {
    refuse('BAD_NUMBER', 'xdo', 'six or seven letters', text);
  }
  const values = Array.from(text, (letter, i) => {
    const place = letter === 'Z' ? 0 : letter.charCodeAt(0) - 64;
    return i > 0 && place > 12 ? place - 26 : place;
  });
  const doodsonNumbers = values.slice(0, 6) as unknown as DoodsonNumbers;
  return { doodsonNumbers, quarterTurns: values[6] ?? 0 };
}

/**
 * Writes XDO letters.
 *
 * @param constituent - Six multipliers (the first 0 to 25, the others −13 to 12) and quarter turns.
 * @returns Seven letters.
 * @throws InputError `OUT_OF_RANGE`, path `doodsonNumbers[i]` or `quarterTurns`.
 * @example
 * formatXdo({ doodsonNumbers: [1, 1, 0, 0, 0, 0], quarterTurns: 1 }); // 'AAZZZZA'
 * @public
 */
export function formatXdo(constituent: {
  readonly doodsonNumbers: DoodsonNumbers;
  readonly quarterTurns: number;
}): string {
  const values = [...constituent.doodsonNumbers, constituent.quarterTurns];
  const letters = values.map((n, i) => {
    if (Number.isInteger(n) && (i === 0 ? n >= 0 && n <= 25 : n >= -13 && n <= 12)) {
      return n === 0 ? 'Z' : String.fromCharCode(n > 0 ? 64 + n : 90 + n);
    }
    const path = i < 6 ? `doodsonNumbers[${i}]` : 'quarterTurns';
    const range = i === 0 ? '0 to 25' : '-13 to 12';
    return refuse('OUT_OF_RANGE', path, `a whole number from ${range}`, n);
  });
  return letters.join('');
}
