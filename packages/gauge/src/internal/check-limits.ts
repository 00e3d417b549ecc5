/**
 * Refuses limits that cannot be meant.
 * @module
 */
import { describe, InputError } from '@staithe/core';
import type { CheckLimits, Ends } from '../limits.js';

function refuse(path: string, expected: string, got: unknown): never {
  throw new InputError('OUT_OF_RANGE', path, `expected ${expected}, got ${describe(got)}`);
}

function checkEnds(ends: Ends, path: string): void {
  if (Array.isArray(ends) && ends.length === 2 && ends[0] <= ends[1]) return;
  refuse(path, 'a low and a high end', ends);
}

function checkSize(value: number, path: string): void {
  if (!(value >= 0)) refuse(path, '0 or more', value);
}

/** Looks at every limit given. */
export function checkLimits(limits: CheckLimits): void {
  const { instrument, season, jump, slope, stuckFor, tooCalm, besides } = limits;
  if (instrument) {
    checkEnds(instrument.doubt, 'limits.instrument.doubt');
    checkEnds(instrument.reject, 'limits.instrument.reject');
  }
  if (season) {
    for (const key of ['doubt', 'reject'] as const) {
      const path = `limits.season.${key}`;
      if (!Array.isArray(season[key]) || season[key].length !== 12)
        refuse(path, '12 pairs', season[key]);
      season[key].forEach((ends: Ends, i: number) => {
        checkEnds(ends, `${path}[${i}]`);
      });
    }
  }
  const pairs = { jump, slope, stuckFor, besides };
  for (const [name, pair] of Object.entries(pairs)) {
    if (!pair) continue;
    checkSize(pair.doubt, `limits.${name}.doubt`);
    const { reject } = pair;
    if (reject !== undefined && !(reject >= pair.doubt)) {
      refuse(`limits.${name}.reject`, `doubt (${pair.doubt}) or more`, reject);
    }
  }
  if (jump && jump.reach !== undefined && ![1, 2, 3].includes(jump.reach)) {
    refuse('limits.jump.reach', '1, 2 or 3', jump.reach);
  }
  if (stuckFor && !(stuckFor.within > 0))
    refuse('limits.stuckFor.within', 'above 0', stuckFor.within);
  if (tooCalm) {
    checkSize(tooCalm.reject, 'limits.tooCalm.reject');
    if (!(tooCalm.doubt >= tooCalm.reject)) {
      refuse('limits.tooCalm.doubt', `reject (${tooCalm.reject}) or more`, tooCalm.doubt);
    }
    if (!(tooCalm.over > 0)) refuse('limits.tooCalm.over', 'above 0', tooCalm.over);
  }
}
