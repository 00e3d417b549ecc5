/**
 * The triangular factor of a poorly conditioned design by orthogonal reduction, tile by tile: R of [R; tile] again and
 * again, so that the condition is not squared and memory stays flat. With refinement against the data these are the
 * corrected seminormal equations (Å. Björck 1987).
 * @module
 */
import { TILE } from '@staithe/basis/kernels';
import type { Progress } from '@staithe/core';
import { Matrix, QrDecomposition } from 'ml-matrix';
import { columnsBuffer, type Design, designTiles } from './design.js';
import type { Rows } from './rows.js';

/**
 * @param design - Of the fit.
 * @param blocks - Rows.
 * @param lengths - Of the columns: they are divided by these.
 * @returns Lower triangular L, row-major, with L·Lᵀ the Gram matrix of the scaled columns.
 */
export function* triangularFactor(
  design: Design,
  blocks: readonly Rows[],
  lengths: Float64Array,
): Generator<Progress, Float64Array, void> {
  const count = design.order.length;
  const columns = columnsBuffer(design);
  let upper = Matrix.zeros(count, count);
  let done = 0;
  const total = blocks.reduce((sum, { times }) => sum + times.length, 0);
  for (const rows of blocks) {
    for (const { indices, n } of designTiles(design, rows, columns)) {
      const stack = Matrix.zeros(count + n, count);
      for (let i = 0; i < count; i++)
        for (let j = i; j < count; j++) stack.set(i, j, upper.get(i, j));
      for (let i = 0; i < n; i++) {
        const root = Math.sqrt(rows.weights?.[indices[i] as number] ?? 1);
        for (let j = 0; j < count; j++) {
          const value = ((columns[j * TILE + i] as number) * root) / (lengths[j] as number);
          stack.set(count + i, j, value);
        }
      }
      // ml-matrix: Householder reduction; its verdict on the rank is not used.
      upper = new QrDecomposition(stack).upperTriangularMatrix;
      done += n;
      yield { done, total, stage: 'orthogonal reduction' };
    }
  }
  const factor = new Float64Array(count * count);
  for (let i = 0; i < count; i++) {
    for (let j = 0; j <= i; j++) factor[i * count + j] = upper.get(j, i);
  }
  return factor;
}
