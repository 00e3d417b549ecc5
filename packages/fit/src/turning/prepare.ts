/**
 * From the posed problem to the one that is solved in the end, and to what its rows stand on.
 *
 * First without what hides, whose crests the errors of the times would flatten; then with it, from there; then with what of it
 * was seen.
 * @module
 */
import type { Progress } from '@staithe/core';
import { type Estimate, estimate } from '../estimate.js';
import { normalEquations } from '../normal.js';
import type { Problem } from '../problem.js';
import type { Rows } from '../rows.js';
import { mayHide, plainly, seen, unlessKnown } from './choice.js';
import { type Footing, firstFooting, rowsOn } from './footing.js';
import { type Book, type Shares, sharesOf, type Turn, turn } from './turn.js';

const TURNS = 12;

/** Turns until the footing stands still; the last of them. */
function* settled(
  book: Book,
  { solved }: Pick<Turn, 'solved'>,
  { choosing }: Problem,
  from: Footing,
): Generator<Progress, Turn, void> {
  let last = yield* turn(book, solved, choosing, from);
  for (let k = 1; k < TURNS && !last.settled; k++) {
    last = yield* turn(book, solved, choosing, last.next);
  }
  return last;
}

/**
 * The constituents to turn with: whether small ones are worth their place is judged once, in the end.
 *
 * @param problem - Of which.
 * @param blocks - Rows.
 * @param whole - Not thinned by the condition: M6 would go before what is less.
 */
function* begun(
  problem: Problem,
  blocks: readonly Rows[],
  whole = false,
): Generator<Progress, Estimate, void> {
  const selection = { ...problem.selection, expected: [] };
  const choosing = whole ? { ...problem.choosing, ours: false } : problem.choosing;
  return yield* estimate({ ...problem, selection, choosing }, blocks);
}

/** The shares of the two kinds of rows in a fit. */
export function* sharesIn({ solved, blocks }: Estimate): Generator<Progress, Shares, void> {
  return sharesOf(solved, yield* normalEquations(solved.design, blocks.slice(0, 1)));
}

/** A problem and what its rows stand on. */
export interface Prepared {
  readonly problem: Problem;
  readonly footing: Footing;
}

/**
 * @param posed - With all that is asked for.
 * @param book - The points.
 * @param spectral - Whether the noise beside each line counts.
 */
export function* prepare(
  posed: Problem,
  book: Book,
  spectral: boolean,
): Generator<Progress, Prepared, void> {
  const { times } = book.points.record;
  const on = (footing: Footing): readonly Rows[] => rowsOn(book.points, book.given, footing);
  const plain = plainly(posed, times);
  const first = firstFooting(book.points, book.stated);
  const bare = yield* settled(book, yield* begun(plain, on(first)), plain, first);
  if (plain === posed || !mayHide(posed)) return { problem: plain, footing: bare.next };
  const all = yield* settled(book, yield* begun(posed, on(bare.next), true), posed, bare.next);
  const problem = yield* seen(posed, times, all, on(all.next));
  const found = yield* begun(problem, on(all.next));
  const unknown = yield* unlessKnown(problem, times, found, yield* sharesIn(found), spectral);
  if (unknown) return { problem: unknown, footing: bare.next };
  const last = problem === posed ? all : yield* settled(book, found, problem, all.next);
  return { problem, footing: last.next };
}
