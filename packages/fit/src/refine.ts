/**
 * Solves normal equations and refines the solution against the data.
 * @module
 */
import type { Progress } from '@staithe/core';
import type { Design } from './design.js';
import { type Residuals, residualsOf } from './normal.js';
import type { Rows } from './rows.js';
import { type Scaled, solveScaled } from './solve.js';

const REFINEMENTS = 2;

/** Coefficients of each right-hand side, and residuals of each block of rows. */
export interface Solved {
  readonly solutions: readonly Float64Array[];
  readonly residuals: readonly (readonly Float64Array[])[];
}

/**
 * @param design - Of the fit.
 * @param blocks - Rows, all with the same number of right-hand sides.
 * @param scaled - Gram matrix of the rows.
 * @param factor - Its lower triangular factor.
 * @param sides - AᵀWy of each right-hand side.
 */
export function* solveRefined(
  design: Design,
  blocks: readonly Rows[],
  scaled: Scaled,
  factor: Float64Array,
  sides: readonly Float64Array[],
): Generator<Progress, Solved, void> {
  const solutions = sides.map((side) => solveScaled(factor, scaled, side));
  for (let turn = 0; ; turn++) {
    const projections = sides.map((side) => new Float64Array(side.length));
    const residuals: Residuals['residuals'][] = [];
    for (const rows of blocks) {
      residuals.push((yield* residualsOf(design, rows, solutions, projections)).residuals);
    }
    if (turn === REFINEMENTS) return { solutions, residuals };
    solutions.forEach((solution, k) => {
      const correction = solveScaled(factor, scaled, projections[k] as Float64Array);
      correction.forEach((value, i) => {
        solution[i] = (solution[i] as number) + value;
      });
    });
  }
}
