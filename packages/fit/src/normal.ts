/**
 * The passes over the data: normal equations, and residuals with their projection for refinement. Several right-hand sides
 * share a pass.
 * @module
 */
import { rankUpdate, TILE, type Tile } from '@staithe/basis/kernels';
import type { Progress } from '@staithe/core';
import { columnsBuffer, type Design, designTiles } from './design.js';
import type { Rows } from './rows.js';

/** Lower triangle of [A Y]ᵀW[A Y], row-major, size². */
export interface Products {
  readonly matrix: Float64Array;
  readonly size: number;
}

const present = ({ sides: [first] }: Rows): number =>
  (first as Float64Array).reduce((n, value) => (Number.isNaN(value) ? n : n + 1), 0);

/** √w over the rows of a tile, or undefined where all weigh 1. */
function rootsInto(roots: Float64Array, { weights }: Rows, { indices, n }: Tile): void {
  if (!weights) return;
  for (let i = 0; i < n; i++) roots[i] = Math.sqrt(weights[indices[i] as number] as number);
}

/** Adds the products of rows to those that are there. */
export function* addProducts(
  design: Design,
  rows: Rows,
  { matrix, size }: Products,
): Generator<Progress, void, void> {
  const count = design.order.length;
  const all = columnsBuffer(design);
  const scratch = new Float64Array(size * TILE);
  const roots = new Float64Array(TILE);
  const total = present(rows);
  let done = 0;
  for (const tile of designTiles(design, rows, all)) {
    const { indices, n } = tile;
    for (let at = 0; at < count * TILE; at += TILE) {
      for (let i = at; i < at + n; i++) scratch[i] = all[i] as number;
    }
    rows.sides.forEach((values, k) => {
      const at = (count + k) * TILE;
      for (let i = 0; i < n; i++) scratch[at + i] = values[indices[i] as number] as number;
    });
    if (rows.weights) {
      rootsInto(roots, rows, tile);
      for (let k = 0; k < size; k++) {
        const at = k * TILE;
        for (let i = 0; i < n; i++) {
          scratch[at + i] = (scratch[at + i] as number) * (roots[i] as number);
        }
      }
    }
    rankUpdate(matrix, scratch, size, TILE, n);
    done += n;
    yield { done, total, stage: 'normal equations' };
  }
}

/** Normal equations of all rows. */
export function* normalEquations(
  design: Design,
  blocks: readonly Rows[],
): Generator<Progress, Products, void> {
  const size = design.order.length + (blocks[0] as Rows).sides.length;
  const products = { matrix: new Float64Array(size * size), size };
  for (const rows of blocks) yield* addProducts(design, rows, products);
  return products;
}

/** Residuals of each right-hand side (gaps stay NaN) and their projections AᵀWr. */
export interface Residuals {
  readonly residuals: readonly Float64Array[];
  readonly projections: readonly Float64Array[];
}

/** Residuals of one block of rows; projections are added to those given. */
export function* residualsOf(
  design: Design,
  rows: Rows,
  solutions: readonly Float64Array[],
  projections: readonly Float64Array[] = solutions.map((x) => new Float64Array(x.length)),
): Generator<Progress, Residuals, void> {
  const count = design.order.length;
  const columns = columnsBuffer(design);
  const residuals = rows.sides.map((side) => new Float64Array(side.length).fill(Number.NaN));
  const r = new Float64Array(TILE);
  const total = present(rows);
  let done = 0;
  for (const { indices, n } of designTiles(design, rows, columns)) {
    rows.sides.forEach((side, k) => {
      const solution = solutions[k] as Float64Array;
      const projection = projections[k] as Float64Array;
      const out = residuals[k] as Float64Array;
      for (let i = 0; i < n; i++) r[i] = side[indices[i] as number] as number;
      for (let j = 0; j < count; j++) {
        const weight = solution[j] as number;
        const at = j * TILE;
        for (let i = 0; i < n; i++) r[i] = (r[i] as number) - weight * (columns[at + i] as number);
      }
      for (let i = 0; i < n; i++) out[indices[i] as number] = r[i] as number;
      if (rows.weights) {
        for (let i = 0; i < n; i++) {
          r[i] = (r[i] as number) * (rows.weights[indices[i] as number] as number);
        }
      }
      for (let j = 0; j < count; j++) {
        const at = j * TILE;
        let sum = 0;
        for (let i = 0; i < n; i++) sum += (r[i] as number) * (columns[at + i] as number);
        projection[j] = (projection[j] as number) + sum;
      }
    });
    done += n;
    yield { done, total, stage: 'residuals' };
  }
  return { residuals, projections };
}
