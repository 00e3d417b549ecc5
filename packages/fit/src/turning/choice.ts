/**
 * Which constituents high and low waters can hold.
 *
 * Height and slope at each point are twice what the heights alone hold: all up to a whole turn from one point to the next,
 * four times a day with two tides: M4 too (the theorem of A. Papoulis 1977 for samples with slopes). What turns faster
 * hides: M6 has its crests where M2 has its own, and only the modulation by other tides tells them apart. Left out, M6
 * goes into M2, more than its own size; kept, the error of M2 says so. docs/fitting.md has the experiments.
 * @module
 */
import type { Constituent } from '@staithe/constituents';
import { HOUR, type Progress } from '@staithe/core';
import { usualStep } from '../cadence.js';
import { headCount } from '../design.js';
import { disc95, pairErrors } from '../errors-of.js';
import type { Estimate } from '../estimate.js';
import type { Problem } from '../problem.js';
import { type Choosing, factored, leaveOut, type Solvable } from '../solvable.js';
import { inverseGram, solveScaled } from '../solve.js';
import type { Rows } from '../rows.js';
import type { Candidate } from '../types.js';
import { turningErrors } from './errors.js';
import type { Shares, Turn } from './turn.js';

const REACH = 1.2; // turns between points: S4 turns 1.04 times
const LEAST_DAYS = 354; // the annual neighbours part: what they would leave of each other moves times more than M6 does
// M6 is a few hundredths of M2 in shallow water: kept while it is known to within this share.
const SIXTH = 'M6';
const KNOWN = 0.04;
const TWICE = 9 * HOUR; // between the 6.2 h of two tides a day and the 12.4 h of one

/** Compound tides that turn too fast from one point to the next. */
function hiding(taken: readonly Constituent[], times: Float64Array): Constituent[] {
  const limit = (REACH * 360 * HOUR) / usualStep(times);
  return taken.filter(({ kind, speed }) => kind === 'compound' && speed > limit);
}

function without(problem: Problem, left: readonly Candidate[]): Problem {
  const names = new Set(left.map(({ name }) => name));
  const { taken, candidates } = problem.selection;
  const selection = {
    ...problem.selection,
    taken: taken.filter(({ name }) => !names.has(name)),
    candidates: [...candidates.filter(({ name }) => !names.has(name)), ...left],
  };
  return { ...problem, selection };
}

/** The problem without what hides: where the search begins, so that no crest can be flattened by it. */
export function plainly(problem: Problem, times: Float64Array): Problem {
  const left = hiding(problem.selection.taken, times)
    .filter(({ name }) => !problem.choosing.parents.has(name))
    .map(
      ({ name }): Candidate => ({
        name,
        decision: 'left',
        reason: `hides behind slower tides at high and low waters, and ${LEAST_DAYS} days are needed to see it; name it to fit it`,
      }),
    );
  return left.length < problem.selection.taken.length ? without(problem, left) : problem;
}

/** Whether a record is long enough for what hides. */
export function mayHide({ choosing: { ours, record } }: Problem): boolean {
  return !ours || record.days >= LEAST_DAYS;
}

function millimetres(metres: number): string {
  const size = 1000 * metres;
  return `${size < 10 ? size.toPrecision(2) : size.toFixed(0)} mm`;
}

/** Whether the points are those of two tides a day: M6 then hides behind the largest tide. */
function twiceDaily(times: Float64Array): boolean {
  return usualStep(times) < TWICE;
}

/** The least sure of those that hide, against white noise, if its error is above its amplitude. */
function faintest(
  { design, selection, factor, scaled, sides }: Solvable,
  names: ReadonlySet<string>,
  variance: number,
): { name: string; amplitude: number; radius95: number } | undefined {
  const count = design.order.length;
  const head = headCount(design);
  const x = solveScaled(factor, scaled, sides[0] as Float64Array);
  const inverse = inverseGram(factor, scaled);
  const faint = selection.taken.flatMap(({ name }, j) => {
    if (!names.has(name)) return [];
    const at = head + 2 * j;
    const [a, b] = [x[at] as number, x[at + 1] as number];
    const amplitude = Math.sqrt(a * a + b * b);
    const radius95 = pairRadius(inverse, count, at, variance);
    return amplitude < radius95 ? [{ name, amplitude, radius95 }] : [];
  });
  return faint.sort(
    (one, other) => one.amplitude / one.radius95 - other.amplitude / other.radius95,
  )[0];
}

/** Radius of the disc that holds 95 % of the pair of columns from `at` on. */
function pairRadius(covariance: Float64Array, count: number, at: number, variance: number): number {
  const read = (row: number, column: number): number =>
    variance * (covariance[(at + row) * count + at + column] as number);
  return pairErrors(0, 0, read(0, 0), read(0, 1), read(1, 1), disc95(0)).radius95;
}

/**
 * Leaves out what hides and is not seen, the least sure first: it would cost the slower tides their sureness for nothing. M6
 * stays where there are two tides a day, as its want is felt most.
 *
 * @param problem - With all.
 * @param times - Of the points.
 * @param turn - With all.
 * @param blocks - Rows.
 */
export function* seen(
  problem: Problem,
  times: Float64Array,
  { solved, next: { sigmas } }: Turn,
  blocks: readonly Rows[],
): Generator<Progress, Problem, void> {
  const { choosing } = problem;
  if (!choosing.ours) return problem;
  const names = new Set(hiding(solved.selection.taken, times).map(({ name }) => name));
  choosing.parents.forEach((name) => names.delete(name));
  if (twiceDaily(times)) names.delete(SIXTH);
  const still: Choosing = { ...choosing, ours: false };
  const left: Candidate[] = [];
  let now = solved;
  for (;;) {
    const least = faintest(now, names, sigmas.height * sigmas.height);
    if (!least) return left.length > 0 ? without(problem, left) : problem;
    const found = `${millimetres(least.amplitude)} found, ${millimetres(least.radius95)} its error`;
    const reason = `hides behind slower tides at high and low waters: ${found}`;
    left.push({ name: least.name, decision: 'left', reason });
    now = yield* factored(leaveOut(now, left.slice(-1), still), blocks, still);
  }
}

/**
 * The problem without what hides, where not even M6 is known to a few hundredths of M2; undefined where it is.
 *
 * @param problem - With what hides and is seen.
 * @param times - Of the points.
 * @param found - Its fit.
 * @param shares - Of the rows.
 * @param spectral - As in `turningErrors`.
 */
export function* unlessKnown(
  problem: Problem,
  times: Float64Array,
  found: Estimate,
  shares: Shares,
  spectral: boolean,
): Generator<Progress, Problem | undefined, void> {
  const { design, selection } = found.solved;
  const place = (name: string): number => selection.taken.findIndex((of) => of.name === name);
  const [sixth, second] = [place(SIXTH), place('M2')];
  const hidden = hiding(problem.selection.taken, times);
  const asked = problem.selection.taken.some(({ name }) => name === SIXTH);
  if (!problem.choosing.ours || !asked || !twiceDaily(times)) return undefined;
  let how = 'cannot be told from M2';
  if (sixth >= 0) {
    const at = (j: number): number => headCount(design) + 2 * j;
    const { covariance } = yield* turningErrors(found, shares, times, spectral, [1 + sixth]);
    const radius95 = pairRadius(covariance, design.order.length, at(sixth), 1);
    const [solution] = found.solutions as [Float64Array];
    const [a, b] = [solution[at(second)] ?? 0, solution[at(second) + 1] ?? 0];
    if (radius95 <= KNOWN * Math.sqrt(a * a + b * b)) return undefined;
    how = `is known to ${millimetres(radius95)} only`;
  }
  const reason = `hides behind slower tides at high and low waters, where ${SIXTH} ${how}`;
  return without(
    problem,
    hidden.flatMap(({ name }): Candidate[] =>
      problem.choosing.parents.has(name) ? [] : [{ name, decision: 'left', reason }],
    ),
  );
}
