/**
 * The list of constituents of a fit: the caller's, obeyed or refused, or what the record can hold.
 * @module
 */
import type { Constituent } from '@staithe/constituents';
import { HOUR, InputError } from '@staithe/core';
import { candidatesFor, separationDays, takeResolvable } from './choose.js';
import { type Borrowed, namedAt } from './read-options.js';
import type { FitRecord } from './record.js';
import type { Candidate, FitOptions, FitWarning } from './types.js';

/** What is fitted, and what was considered. */
export interface Selection {
  readonly taken: readonly Constituent[];
  readonly candidates: readonly Candidate[];
}

const CLOSE = 0.5; // turns apart within the record
const SAME = 1e-9; // degrees an hour

/** The caller's list; parents must be in it, borrowed ones must not. */
function obey(names: readonly string[], borrowed: readonly Borrowed[]): Selection {
  const taken = names.map((name, i) => namedAt(name, `options.constituents[${i}]`));
  taken.forEach(({ name, speed }, i) => {
    const path = `options.constituents[${i}]`;
    if (taken.findIndex((other) => other.name === name) !== i) {
      throw new InputError('DUPLICATE', path, `expected each once, got ${name} again`);
    }
    const twin = taken.slice(0, i).find((other) => Math.abs(other.speed - speed) < SAME);
    if (twin) {
      const text = `expected speeds that differ, got ${twin.name} and ${name} at ${speed.toFixed(7)} degrees an hour`;
      throw new InputError('INSEPARABLE', path, text, { pair: [twin.name, name] });
    }
    if (borrowed.some(({ of }) => of.name === name)) {
      throw new InputError(
        'CONFLICT',
        path,
        `expected a constituent that is not borrowed, got ${name}`,
      );
    }
  });
  borrowed.forEach(({ parent }, i) => {
    if (taken.some(({ name }) => name === parent.name)) return;
    throw new InputError(
      'MISSING',
      `options.borrow[${i}].from`,
      `expected one of the fitted constituents, got ${parent.name}`,
    );
  });
  return {
    taken,
    candidates: taken.map(({ name }) => ({ name, decision: 'taken', reason: 'asked for' })),
  };
}

/** Selects the constituents of a fit. */
export function select(
  options: FitOptions,
  record: FitRecord,
  borrowed: readonly Borrowed[],
): Selection {
  const { constituents } = options;
  if (constituents !== undefined && constituents !== 'resolvable')
    return obey(constituents, borrowed);
  const children = new Set(borrowed.map(({ of }) => of.name));
  const parents = [...new Map(borrowed.map(({ parent }) => [parent.name, parent])).values()];
  const { expected, left } = candidatesFor(options.nodalModel ?? 'potential');
  const stepHours = record.step > 0 ? record.step / HOUR : undefined;
  const { taken, candidates } = takeResolvable(
    expected.filter(({ of }) => !children.has(of.name)),
    record.days,
    stepHours,
    parents,
  );
  return { taken, candidates: [...candidates, ...left] };
}

/** Pairs of a caller's list that the record tells apart by less than half a turn. */
export function closePairs(taken: readonly Constituent[], days: number): FitWarning[] {
  const bySpeed = [...taken].sort((a, b) => a.speed - b.speed);
  return bySpeed.flatMap((later, i) => {
    const earlier = bySpeed[i - 1];
    if (!earlier) return [];
    const needed = separationDays(earlier.speed, later.speed);
    if (days >= CLOSE * needed) return [];
    const message = `${earlier.name} and ${later.name} need ${needed.toFixed(1)} days to part by a turn; the record has ${days.toFixed(1)}`;
    return [{ code: 'CLOSE_PAIR' as const, message }];
  });
}
