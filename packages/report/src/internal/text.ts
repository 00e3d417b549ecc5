/**
 * Text of others (names of places, reasons, titles) made fit to show: no control codes, no marks that turn the reading
 * direction, no half characters.
 * @module
 */
import { InputError, describe } from '@staithe/core';

/** Terminal sequences: CSI, OSC with its end, and two-character escapes; also their one-byte forms. */
const SEQUENCES =
  // eslint-disable-next-line no-control-regex -- control codes are what is looked for
  /(?:\u001b\[|\u009b)[0-?]*[ -/]*[@-~]?|(?:\u001b\]|\u009d)[^\u0007\u001b\u009c]*(?:\u0007|\u001b\\|\u009c)?|\u001b[ -/]*[0-~]?/g;
// eslint-disable-next-line no-control-regex -- control codes are what is looked for
const CONTROLS = /[\u0000-\u001f\u007f-\u009f]/g;
const UNSEEN =
  /[\u061c\u200b\u200e\u200f\u202a-\u202e\u2060-\u2069\ufeff\ufff9-\uffff]|\p{Surrogate}/gu;

/**
 * Text without anything that a terminal or a page would act upon. Line ends become spaces.
 *
 * @param text - Anything a caller gave as text.
 * @param longest - Characters kept; the rest becomes an ellipsis.
 */
export function cleanText(text: string, longest: number = 200): string {
  const clean = text
    .replace(SEQUENCES, '')
    .replace(/[\t\n\v\f\r\u0085\u2028\u2029]+/g, ' ')
    .replace(CONTROLS, '')
    .replace(UNSEEN, '')
    .trim();
  const characters = [...clean];
  return characters.length > longest ? `${characters.slice(0, longest - 1).join('')}…` : clean;
}

/** Text that must be there. */
export function requiredText(value: unknown, path: string): string {
  if (typeof value === 'string') {
    const clean = cleanText(value);
    if (clean !== '') return clean;
    throw new InputError('MISSING', path, `expected a text, got ${describe(value)}`);
  }
  throw new InputError('WRONG_TYPE', path, `expected a text, got ${describe(value)}`);
}

/** Pads to a width counted in characters. */
export const padRight = (text: string, width: number): string =>
  text + ' '.repeat(Math.max(0, width - [...text].length));
export const padLeft = (text: string, width: number): string =>
  ' '.repeat(Math.max(0, width - [...text].length)) + text;

/** Breaks text at spaces so that no line is longer than a width, where words allow it. */
export function wrapText(text: string, width: number): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    if (line !== '' && [...line].length + 1 + [...word].length > width) {
      lines.push(line);
      line = word;
    } else line = line === '' ? word : `${line} ${word}`;
  }
  if (line !== '') lines.push(line);
  return lines;
}

const LABEL = 10; // characters

/** A label and what it says, wrapped beside it. */
export const labelled = (label: string, text: string, width: number): string =>
  wrapText(text, width - LABEL)
    .map((line, i) => padRight(i === 0 ? label : '', LABEL) + line)
    .join('\n');
