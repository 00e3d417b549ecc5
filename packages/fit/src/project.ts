/**
 * AᵀW^½y of many right-hand sides in one pass over the design.
 * @module
 */
import { TILE } from '@staithe/basis/kernels';
import type { Progress } from '@staithe/core';
import { columnsBuffer, type Design, designTiles } from './design.js';
import type { Rows } from './rows.js';

/** Adds the products of four sides with all columns of a tile: a loaded column serves four. */
function productsOfFour(
  out: readonly Float64Array[],
  first: number,
  columns: Float64Array,
  sides: Float64Array,
  count: number,
  n: number,
): void {
  const p0 = out[first] as Float64Array;
  const p1 = out[first + 1] as Float64Array;
  const p2 = out[first + 2] as Float64Array;
  const p3 = out[first + 3] as Float64Array;
  const b = first * TILE;
  for (let j = 0; j < count; j++) {
    const a = j * TILE;
    let s0 = 0;
    let s1 = 0;
    let s2 = 0;
    let s3 = 0;
    for (let i = 0; i < n; i++) {
      const x = columns[a + i] as number;
      s0 += x * (sides[b + i] as number);
      s1 += x * (sides[b + TILE + i] as number);
      s2 += x * (sides[b + 2 * TILE + i] as number);
      s3 += x * (sides[b + 3 * TILE + i] as number);
    }
    p0[j] = (p0[j] as number) + s0;
    p1[j] = (p1[j] as number) + s1;
    p2[j] = (p2[j] as number) + s2;
    p3[j] = (p3[j] as number) + s3;
  }
}

/**
 * @param design - Of the fit.
 * @param rows - Whose times and weights W.
 * @param sides - One value a time each; a multiple of four of them.
 */
export function* projectionsOf(
  design: Design,
  rows: Rows,
  sides: readonly Float64Array[],
): Generator<Progress, Float64Array[], void> {
  const count = design.order.length;
  const { weights } = rows;
  const columns = columnsBuffer(design);
  const scratch = new Float64Array(sides.length * TILE);
  const roots = new Float64Array(TILE).fill(1);
  const out = sides.map(() => new Float64Array(count));
  let done = 0;
  for (const { indices, n } of designTiles(design, rows, columns)) {
    if (weights) {
      for (let i = 0; i < n; i++) roots[i] = Math.sqrt(weights[indices[i] as number] as number);
    }
    for (let k = 0; k < sides.length; k++) {
      const side = sides[k] as Float64Array;
      const at = k * TILE;
      for (let i = 0; i < n; i++) {
        scratch[at + i] = (side[indices[i] as number] as number) * (roots[i] as number);
      }
    }
    for (let k = 0; k < sides.length; k += 4) {
      productsOfFour(out, k, columns, scratch, count, n);
    }
    done += n;
    yield { done, total: rows.times.length, stage: 'projection' };
  }
  return out;
}
