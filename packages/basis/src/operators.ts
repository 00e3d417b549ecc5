/**
 * The three operators over a basis: synthesize, its adjoint project, and gram.
 *
 * Coefficients: the mean level, then H cos G and H sin G of each constituent; columns in the same order.
 * <synthesize(c), x> = <c, project(x)> holds to rounding (property test).
 * @module
 */
import { InputError } from '@staithe/core';
import type { Basis } from './basis.js';
import { rankUpdate } from './kernels/rank-update.js';
import { columnsInto, gridCount, TILE, type TimeGrid, tiles } from './tiles.js';

/**
 * Columns of a basis.
 *
 * @param basis - Of `makeBasis`.
 * @returns 1 + 2K.
 * @example
 * columnCount(makeBasis({ constituents: ['M2'] })); // 3
 * @public
 */
export function columnCount(basis: Basis): number {
  return 1 + 2 * basis.speeds.length;
}

function checkLength(path: string, expected: number, got: number): void {
  if (got === expected) return;
  throw new InputError('LENGTH_MISMATCH', path, `expected ${expected} numbers, got ${got}`);
}

/**
 * Heights from coefficients.
 *
 * @param out - Written to: one height a time, length of the grid.
 * @param basis - Of `makeBasis`.
 * @param coefficients - Level, then H cos G and H sin G of each constituent: length 1 + 2K.
 * @param grid - Times.
 * @throws InputError `LENGTH_MISMATCH`, path `out` or `coefficients`.
 * @example
 * const heights = new Float64Array(2);
 * synthesizeInto(heights, makeBasis({ constituents: [] }), Float64Array.of(1.5), { start: 0, step: 60000, count: 2 });
 * heights[1]; // 1.5
 * @public
 */
export function synthesizeInto(
  out: Float64Array,
  basis: Basis,
  coefficients: Float64Array,
  grid: TimeGrid,
): void {
  const count = columnCount(basis);
  checkLength('coefficients', count, coefficients.length);
  checkLength('out', gridCount(grid), out.length);
  const columns = new Float64Array((count - 1) * TILE);
  const pair = new Float64Array(2);
  const sums = new Float64Array(TILE);
  for (const tile of tiles(basis, grid, () => true)) {
    columnsInto(columns, basis, tile, pair);
    sums.fill(0);
    for (let k = 1; k < count; k++) {
      const weight = coefficients[k] as number;
      const at = (k - 1) * TILE;
      for (let i = 0; i < tile.n; i++)
        sums[i] = (sums[i] as number) + weight * (columns[at + i] as number);
    }
    for (let i = 0; i < tile.n; i++) {
      out[tile.indices[i] as number] = (coefficients[0] as number) + (sums[i] as number);
    }
  }
}

/**
 * The adjoint of {@link synthesizeInto}: each column's sum of products with the values. Gaps (NaN) take no part.
 *
 * @param out - Written to: length 1 + 2K.
 * @param basis - Of `makeBasis`.
 * @param values - One value a time; NaN is a gap.
 * @param grid - Times.
 * @throws InputError `LENGTH_MISMATCH`, path `out` or `values`.
 * @example
 * const sums = new Float64Array(1);
 * projectInto(sums, makeBasis({ constituents: [] }), Float64Array.of(1, NaN, 2), { start: 0, step: 60000, count: 3 });
 * sums[0]; // 3
 * @public
 */
export function projectInto(
  out: Float64Array,
  basis: Basis,
  values: Float64Array,
  grid: TimeGrid,
): void {
  const count = columnCount(basis);
  checkLength('out', count, out.length);
  checkLength('values', gridCount(grid), values.length);
  out.fill(0);
  const columns = new Float64Array((count - 1) * TILE);
  const pair = new Float64Array(2);
  for (const tile of tiles(basis, grid, (i) => !Number.isNaN(values[i]))) {
    columnsInto(columns, basis, tile, pair);
    for (let k = 0; k < count; k++) {
      const at = (k - 1) * TILE;
      let sum = 0;
      for (let i = 0; i < tile.n; i++) {
        const value = values[tile.indices[i] as number] as number;
        sum += k === 0 ? value : value * (columns[at + i] as number);
      }
      out[k] = (out[k] as number) + sum;
    }
  }
}

/**
 * The products of all pairs of columns over the times that take part.
 *
 * @param basis - Of `makeBasis`.
 * @param grid - Times.
 * @param mask - 1 where a time takes part, 0 where not; absent: all.
 * @returns Row-major symmetric matrix, (1 + 2K) × (1 + 2K).
 * @throws InputError `LENGTH_MISMATCH`, path `mask`.
 * @example
 * gram(makeBasis({ constituents: [] }), { start: 0, step: 60000, count: 5 })[0]; // 5
 * @public
 */
export function gram(basis: Basis, grid: TimeGrid, mask?: Uint8Array): Float64Array {
  const count = columnCount(basis);
  if (mask) checkLength('mask', gridCount(grid), mask.length);
  const out = new Float64Array(count * count);
  const columns = new Float64Array(count * TILE);
  const pair = new Float64Array(2);
  columns.fill(1, 0, TILE);
  for (const tile of tiles(basis, grid, (i) => mask?.[i] !== 0)) {
    columnsInto(columns.subarray(TILE), basis, tile, pair);
    rankUpdate(out, columns, count, TILE, tile.n);
  }
  for (let i = 0; i < count; i++) {
    for (let j = 0; j < i; j++) out[j * count + i] = out[i * count + j] as number;
  }
  return out;
}
