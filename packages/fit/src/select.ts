/**
 * The list of constituents of a fit: the caller's, obeyed or refused, or what the record can hold.
 * @module
 */
import type { Constituent } from '@staithe/constituents';
import { ComputationError, InputError } from '@staithe/core';
import { shownSpeed } from './cadence.js';
import { candidatesFor, type Expected, separationDays, takeResolvable } from './choose.js';
import { type Borrowed, namedAt } from './read-options.js';
import type { RecordSummary } from './record.js';
import type { FreeLine } from './side-lines.js';
import type { Candidate, FitOptions, FitWarning } from './types.js';

/** What is fitted, and what was considered. */
export interface Selection {
  readonly taken: readonly Constituent[];
  readonly candidates: readonly Candidate[];
  /** What was proposed, where the choice is ours. */
  readonly expected: readonly Expected[];
}

// Turns apart within the record. Below an eighth the noise of either counts five times and more: no constants.
const CLOSE = 0.5;
const TOO_CLOSE = 0.125;
const STILL = 1e-6; // turns
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
    expected: [],
  };
}

/** Selects the constituents of a fit. */
export function select(
  options: FitOptions,
  record: RecordSummary,
  borrowed: readonly Borrowed[],
  freed: readonly FreeLine[] = [],
): Selection {
  const { constituents } = options;
  if (constituents !== undefined && constituents !== 'resolvable') {
    const selection = obey(constituents, borrowed);
    const absent = freed.find(({ of }) => !selection.taken.some(({ name }) => name === of.name));
    if (!absent) return selection;
    const text = `expected fitted constituents, got ${absent.of.name}`;
    throw new InputError('MISSING', 'options.sideLines', text);
  }
  const children = new Set(borrowed.map(({ of }) => of.name));
  const needed = [...borrowed.map(({ parent }) => parent), ...freed.map(({ of }) => of)];
  const parents = [...new Map(needed.map((of) => [of.name, of])).values()];
  const { expected, left } = candidatesFor(options.nodalModel ?? 'potential');
  const proposed = expected.filter(({ of }) => !children.has(of.name));
  const { taken, candidates } = takeResolvable(proposed, record, parents);
  return { taken, candidates: [...candidates, ...left], expected: proposed };
}

/** Neighbours in speed, as they show themselves at the record's step, with the turns by which the record parts them. */
function neighbours(
  taken: readonly Constituent[],
  { days, cadence }: RecordSummary,
): { pair: [string, string]; turns: number; needed: number }[] {
  const bySpeed = [
    { name: 'meanLevel', speed: 0 },
    ...taken.map(({ name, speed }) => ({ name, speed: shownSpeed(speed, cadence) })),
  ].sort((a, b) => a.speed - b.speed);
  return bySpeed.slice(1).map((later, i) => {
    const earlier = bySpeed[i] as (typeof bySpeed)[number];
    const needed = separationDays(earlier.speed, later.speed);
    return { pair: [earlier.name, later.name], turns: days / needed, needed };
  });
}

/**
 * Refuses a caller's list with a pair that the record cannot part.
 *
 * @throws ComputationError `RANK_DEFICIENT` with the pair.
 */
export function checkParted(taken: readonly Constituent[], record: RecordSummary): void {
  const worst = neighbours(taken, record)
    .filter(({ turns }) => turns < TOO_CLOSE)
    .sort((one, other) => one.turns - other.turns)[0];
  if (!worst) return;
  const { pair, turns, needed } = worst;
  const [a, b] = pair;
  if (a === 'meanLevel' && turns < STILL) {
    const text = `expected constituents that move between these samples, got ${b}, which stands still`;
    throw new ComputationError('RANK_DEFICIENT', text, { pair, turns });
  }
  const takes = Number.isFinite(needed) ? `; a turn takes ${needed.toFixed(1)} days` : '';
  const text = `expected constituents that ${record.days.toFixed(1)} days of these samples can part, got ${a} and ${b}, ${turns.toFixed(3)} turns apart${takes}`;
  throw new ComputationError('RANK_DEFICIENT', text, { pair, turns });
}

/** Pairs of a caller's list that the record tells apart by less than half a turn. */
export function closePairs(taken: readonly Constituent[], record: RecordSummary): FitWarning[] {
  return neighbours(taken, record)
    .filter(({ pair, turns }) => turns < CLOSE && pair[0] !== 'meanLevel')
    .map(({ pair: [earlier, later], needed }) => ({
      code: 'CLOSE_PAIR' as const,
      message: `${earlier} and ${later} need ${needed.toFixed(1)} days to part by a turn; the record has ${record.days.toFixed(1)}`,
    }));
}
