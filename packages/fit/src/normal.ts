/**
 * The passes over the data: normal equations, and residuals with their projection for refinement.
 * @module
 */
import { rankUpdate, TILE } from '@staithe/basis/kernels';
import type { Progress } from '@staithe/core';
import { columnsBuffer, type Design, designTiles } from './design.js';
import type { FitRecord } from './record.js';

const REPORT_EVERY = 16; // tiles

/** Lower triangle of [A y]ᵀ[A y], row-major, (columns + 1)². */
export function* normalEquations(
  design: Design,
  record: FitRecord,
): Generator<Progress, Float64Array, void> {
  const count = design.order.length;
  const size = count + 1;
  const all = columnsBuffer(design);
  const rows = new Float64Array(size * TILE);
  const out = new Float64Array(size * size);
  let done = 0;
  let visited = 0;
  for (const tile of designTiles(design, record.times, record.step, record.values, all)) {
    rows.set(all.subarray(0, count * TILE));
    for (let i = 0; i < tile.n; i++) {
      rows[count * TILE + i] = record.values[tile.indices[i] as number] as number;
    }
    rankUpdate(out, rows, size, TILE, tile.n);
    done += tile.n;
    if (++visited % REPORT_EVERY === 0) {
      yield { done, total: record.samples, stage: 'normal equations' };
    }
  }
  return out;
}

/** Residuals (gaps stay NaN) and their projection Aᵀr. */
export function* residualsOf(
  design: Design,
  record: FitRecord,
  solution: Float64Array,
): Generator<Progress, { residuals: Float64Array; projection: Float64Array }, void> {
  const count = design.order.length;
  const columns = columnsBuffer(design);
  const residuals = new Float64Array(record.values.length).fill(Number.NaN);
  const projection = new Float64Array(count);
  const r = new Float64Array(TILE);
  let done = 0;
  let visited = 0;
  for (const { indices, n } of designTiles(
    design,
    record.times,
    record.step,
    record.values,
    columns,
  )) {
    for (let i = 0; i < n; i++) r[i] = record.values[indices[i] as number] as number;
    for (let k = 0; k < count; k++) {
      const weight = solution[k] as number;
      const at = k * TILE;
      for (let i = 0; i < n; i++) r[i] = (r[i] as number) - weight * (columns[at + i] as number);
    }
    for (let k = 0; k < count; k++) {
      const at = k * TILE;
      let sum = 0;
      for (let i = 0; i < n; i++) sum += (r[i] as number) * (columns[at + i] as number);
      projection[k] = (projection[k] as number) + sum;
    }
    for (let i = 0; i < n; i++) residuals[indices[i] as number] = r[i] as number;
    done += n;
    if (++visited % REPORT_EVERY === 0) yield { done, total: record.samples, stage: 'residuals' };
  }
  return { residuals, projection };
}
