/**
 * Doodson numbers and XDO letters: the written forms of the six multipliers of τ, s, h, p, N′, p_s.
 *
 * Source: A. T. Doodson (1921), Proc. R. Soc. A 100, 305-329 (digits, 5 added to all but the first);
 * the extended form in letters (Z is 0, A is 1, Y is −1) with a seventh for the quarter turns: common practice.
 * @module
 */
import { refuse } from '@staithe/core';

/** Multipliers of τ, s, h, p, N′, p_s. @public */
export type DoodsonNumbers = readonly [number, number, number, number, number, number];

const DIGITS = '0123456789ABCDEFGHIJKLMNOPQRSTUVWXYZ';

/**
 * Reads a Doodson number such as `255.555`; letters stand for 10 and beyond.
 *
 * @param text - Six digits or letters, a point after the third allowed.
 * @returns The six multipliers.
 * @throws InputError `BAD_NUMBER`, path `doodsonNumber`.
 * @example
 * parseDoodsonNumber('245.655'); // [2, -1, 0, 1, 0, 0]
 * @public
 */
export function parseDoodsonNumber(text: string): DoodsonNumbers {
  const digits = /^([0-9A-Z]{3})\.?([0-9A-Z]{3})$/.exec(text);
  if (!digits) {
    refuse('BAD_NUMBER', 'doodsonNumber', 'six digits or letters like 255.555', text);
  }
  const numbers = Array.from(
    `${digits[1]}${digits[2]}`,
    (c, i) => DIGITS.indexOf(c) - (i > 0 ? 5 : 0),
  );
  return numbers as unknown as DoodsonNumbers;
}

/**
 * Writes a Doodson number.
 *
 * @param of - A constituent, or its six multipliers: the first 0 to 35, the others −5 to 30.
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
    const range = i > 0 ? '-5 to 30' : '0 to 35';
    return (
      DIGITS[n + (i > 0 ? 5 : 0)] ??
      refuse('OUT_OF_RANGE', `doodsonNumbers[${i}]`, `a whole number from ${range}`, n)
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
