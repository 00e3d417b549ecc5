/**
 * The rungs of a ladder of levels, checked and in order.
 * @module
 */
import { describe, InputError } from '@staithe/core';
import type { Rung } from '../types.js';
import { metres } from './numbers.js';
import { cleanText, requiredText } from './text.js';

export interface PlacedRung {
  readonly name: string;
  readonly height: number;
  /** `±0.03`, or nothing. */
  readonly sure: string;
  readonly grounds: string;
  readonly missing: string | undefined;
}

export interface Ladder {
  /** From the top down; those that are missing but have a place among them. */
  readonly placed: readonly PlacedRung[];
  /** Missing, and nobody knows where. */
  readonly unplaced: readonly { readonly name: string; readonly missing: string }[];
}

const LONGEST_NAME = 24;

export function readRungs(rungs: readonly Rung[]): Ladder {
  const placed: PlacedRung[] = [];
  const unplaced: { name: string; missing: string }[] = [];
  rungs.forEach((rung, i) => {
    const name = cleanText(requiredText(rung.name, `rungs[${i}].name`), LONGEST_NAME);
    const missing = rung.missing === undefined ? undefined : cleanText(rung.missing);
    const { height, sigma } = rung;
    if (height === undefined) {
      if (missing === undefined) {
        throw new InputError(
          'MISSING',
          `rungs[${i}].height`,
          'expected metres or a reason why missing, got neither',
        );
      }
      unplaced.push({ name, missing });
      return;
    }
    for (const [key, value] of Object.entries({ height, sigma })) {
      if (value === undefined || Number.isFinite(value)) continue;
      throw new InputError(
        'NOT_FINITE',
        `rungs[${i}].${key}`,
        `expected metres, got ${describe(value)}`,
      );
    }
    const sure = sigma === undefined ? '' : `±${metres(sigma)}`;
    placed.push({ name, height, sure, grounds: cleanText(rung.grounds ?? ''), missing });
  });
  placed.sort((a, b) => b.height - a.height);
  return { placed, unplaced };
}
