/**
 * Bars and sizes of the tables for people.
 * @module
 */
import { millimetres } from './numbers.js';

const EIGHTHS = ['', '▏', '▎', '▍', '▌', '▋', '▊', '▉'] as const;

/** A bar in eighths of a character: `share` of `width` characters. */
export function bar(share: number, width: number): string {
  const eighths = Math.round(share * width * 8);
  return '█'.repeat(Math.floor(eighths / 8)) + (EIGHTHS[eighths % 8] as string);
}

/** Whole millimetres; below 10 mm a tenth still says something; a dash for what is not known. */
export function sizeText(size: number | undefined): string {
  if (size === undefined) return '–';
  return size < 0.00995 ? (size * 1000).toFixed(1) : millimetres(size);
}
