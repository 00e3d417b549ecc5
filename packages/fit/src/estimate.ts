/**
 * From the posed problem to coefficients: solved, weighted where asked, cleared of what is smaller than its noise, refined.
 * @module
 */
import type { Progress } from '@staithe/core';
import { withDoubtedFilled } from './doubted.js';
import { normalEquations } from './normal.js';
import type { Problem } from './problem.js';
import { readCurve } from './read-options.js';
import { solveRefined } from './refine.js';
import { type Curve, type Resistant, resistantWeights, trusted } from './resistant.js';
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
  /** Of each block of rows, of each right-hand side, as it took part. */
  readonly residuals: readonly (readonly Float64Array[])[];
  /** Of the first block, as it was observed, where doubted samples took part as their neighbours say. */
  readonly observed?: readonly Float64Array[] | undefined;
}

function* solveIt(solved: Solvable, blocks: readonly Rows[]): Generator<Progress, Estimate, void> {
  const { design, scaled, factor, sides } = solved;
  const { solutions, residuals } = yield* solveRefined(design, blocks, scaled, factor, sides);
  return { solved, blocks, resistant: undefined, solutions, residuals };
}

/** Solves with the trust that the residuals of `rows` earn from a start. */
function* withTrust(
  problem: Problem,
  curve: Curve,
  from: Estimate,
  rows: Rows,
): Generator<Progress, Estimate, void> {
  const { solved, solutions } = from;
  const start = { solutions, residuals: from.residuals[0] as readonly Float64Array[] };
  const { design, scaled, factor } = solved;
  const resistant = yield* resistantWeights(design, rows, start, scaled, factor, curve);
  const blocks = [trusted(rows, resistant.trust)];
  const posed = { ...solved, products: yield* normalEquations(design, blocks) };
  const again = yield* solveIt(yield* factored(posed, blocks, problem.choosing), blocks);
  return { ...again, resistant };
}

/**
 * The same with weights that gross errors cannot pull at: once to find what is doubted, then with that put back where its
 * neighbours say.
 */
function* weighted(problem: Problem, first: Estimate): Generator<Progress, Estimate, void> {
  const curve = readCurve(problem.options);
  const [rows] = first.blocks;
  if (!curve || !rows) return first;
  const doubting = yield* withTrust(problem, curve, first, rows);
  const { trust, scales } = doubting.resistant as Resistant;
  const residuals = doubting.residuals[0] as readonly Float64Array[];
  const sides = withDoubtedFilled(rows.times, rows.sides, residuals, trust);
  const start = { ...first, ...doubting, solved: first.solved };
  const second = yield* withTrust(problem, curve, start, { ...rows, sides });
  const resistant = second.resistant as Resistant;
  const shown = trust.map((value, i) => Math.min(value, resistant.trust[i] as number));
  const observed = (second.residuals[0] as readonly Float64Array[]).map((residual, k) => {
    const [was, is] = [rows.sides[k] as Float64Array, sides[k] as Float64Array];
    return residual.map((r, i) => r + (was[i] as number) - (is[i] as number));
  });
  return { ...second, resistant: { ...resistant, scales, shown }, observed };
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
  const last = yield* solveIt(again, second.blocks);
  if (!second.observed) return { ...last, resistant: second.resistant };
  const before = second.residuals[0] as readonly Float64Array[];
  const observed = (last.residuals[0] as readonly Float64Array[]).map((residual, k) => {
    const [was, is] = [second.observed?.[k] as Float64Array, before[k] as Float64Array];
    return residual.map((r, i) => r + (was[i] as number) - (is[i] as number));
  });
  return { ...last, resistant: second.resistant, observed };
}
