/**
 * From the posed problem to coefficients: solved, weighted where asked, cleared of what is smaller than its noise, refined.
 * @module
 */
import type { Progress } from '@staithe/core';
import { normalEquations } from './normal.js';
import type { Problem } from './problem.js';
import { readCurve } from './read-options.js';
import { solveRefined } from './refine.js';
import { type Resistant, resistantWeights, trusted } from './resistant.js';
import type { Rows } from './rows.js';
import { smallOnes } from './small-ones.js';
import { factored, leaveOut, type Solvable, solvable } from './solvable.js';

/** What was found. */
export interface Estimate {
  readonly solved: Solvable;
  /** With the final weights. */
  readonly blocks: readonly Rows[];
  readonly resistant: Resistant | undefined;
  /** Coefficients of each right-hand side. */
  readonly solutions: readonly Float64Array[];
  /** Of each block of rows, of each right-hand side. */
  readonly residuals: readonly (readonly Float64Array[])[];
}

function* solveIt(solved: Solvable, blocks: readonly Rows[]): Generator<Progress, Estimate, void> {
  const { design, scaled, factor, sides } = solved;
  const { solutions, residuals } = yield* solveRefined(design, blocks, scaled, factor, sides);
  return { solved, blocks, resistant: undefined, solutions, residuals };
}

/** The same with weights that gross errors cannot pull at. */
function* weighted(problem: Problem, first: Estimate): Generator<Progress, Estimate, void> {
  const curve = readCurve(problem.options);
  const [rows] = first.blocks;
  if (!curve || !rows) return first;
  const { solved, solutions } = first;
  const { design, scaled, factor } = solved;
  const start = { solutions, residuals: first.residuals[0] as readonly Float64Array[] };
  const resistant = yield* resistantWeights(design, rows, start, scaled, factor, curve);
  const blocks = [trusted(rows, resistant.trust)];
  const posed = { ...solved, products: yield* normalEquations(design, blocks) };
  const again = yield* solveIt(yield* factored(posed, blocks, problem.choosing), blocks);
  return { ...again, resistant };
}

/**
 * Estimates the coefficients of a problem.
 *
 * @param problem - Of `pose`.
 * @param blocks - Rows; the first block holds levels.
 */
export function* estimate(
  problem: Problem,
  blocks: readonly Rows[],
): Generator<Progress, Estimate, void> {
  const { choosing, selection } = problem;
  const first = yield* solveIt(yield* solvable(selection, blocks, choosing), blocks);
  const second = yield* weighted(problem, first);
  if (!choosing.ours) return second;
  const left = yield* smallOnes(problem, second);
  if (left.length === 0) return second;
  const posed = leaveOut(second.solved, left, choosing);
  const again = yield* factored(posed, second.blocks, choosing);
  return { ...(yield* solveIt(again, second.blocks)), resistant: second.resistant };
}
