/**
 * The design of a fit: one column for the mean level, one each for secular rate, steps and given columns (covariates), two
 * for each constituent, with borrowed ones folded into their parents.
 *
 * A child with H = ρ·H(parent) and G = G(parent) + Δ adds ρ·e^{−iΔ}·z(child) to z(parent).
 * @module
 */
import { type Basis } from '@staithe/basis';
import { columnsInto, slopeColumnsInto, TILE, type Tile, tiles } from '@staithe/basis/kernels';
import { degreesToRadians, HOUR, type Instant, wrapDegrees, YEAR } from '@staithe/core';
import { cos, sin } from '@staithe/core/trig';
import type { Rows } from './rows.js';

/** A borrowed constituent by its place in the basis. */
export interface Fold {
  readonly child: number;
  readonly parent: number;
  readonly ratio: number;
  /** Degrees. */
  readonly difference: number;
}

/** Plain data. Fitted constituents come first in the basis, borrowed ones after them. */
export interface Design {
  readonly basis: Basis;
  readonly fitted: number;
  /** How many of the fitted ones, the last, are side-lines and no constituents of the document. */
  readonly free: number;
  readonly folds: readonly Fold[];
  /** The secular rate counts from here; undefined: none is fitted. */
  readonly rateFrom: Instant | undefined;
  readonly steps: readonly Instant[];
  /** Columns whose values the rows bring along. */
  readonly given: number;
  readonly order: readonly string[];
}

export function makeDesign(
  basis: Basis,
  fitted: number,
  folds: readonly Fold[],
  rateFrom: Instant | undefined,
  steps: readonly Instant[],
  given = 0,
  free = 0,
): Design {
  const order = [
    'meanLevel',
    ...(rateFrom === undefined ? [] : ['secularRate']),
    ...steps.map((_, i) => `step[${i}]`),
    ...Array.from({ length: given }, (_, i) => `covariate[${i}]`),
    ...basis.names.slice(0, fitted).flatMap((name) => [`${name}.cos`, `${name}.sin`]),
  ];
  return { basis, fitted, free, folds, rateFrom, steps, given, order };
}

/** Columns before those of the constituents. */
export function headCount(design: Design): number {
  return design.order.length - 2 * design.fitted;
}

function foldInto(columns: Float64Array, { folds }: Design, n: number): void {
  for (const { child, parent, ratio, difference } of folds) {
    const angle = degreesToRadians(wrapDegrees(difference));
    const c = ratio * cos(angle);
    const s = ratio * sin(angle);
    const from = 2 * child * TILE;
    const to = 2 * parent * TILE;
    for (let i = 0; i < n; i++) {
      const re = columns[from + i] as number;
      const im = columns[from + TILE + i] as number;
      columns[to + i] = (columns[to + i] as number) + re * c + im * s;
      columns[to + TILE + i] = (columns[to + TILE + i] as number) + im * c - re * s;
    }
  }
}

function headInto(columns: Float64Array, design: Design, { slope, given }: Rows, tile: Tile): void {
  const { rateFrom, steps } = design;
  const { n, offsets, stretch, indices } = tile;
  let at = 0;
  columns.fill(slope ? 0 : 1, 0, n);
  const start = stretch.from; // a mean counts at its middle
  if (rateFrom !== undefined) {
    at += TILE;
    for (let i = 0; i < n; i++)
      columns[at + i] = slope ? HOUR / YEAR : (start + (offsets[i] as number) - rateFrom) / YEAR;
  }
  for (const step of steps) {
    at += TILE;
    for (let i = 0; i < n; i++) {
      columns[at + i] = !slope && start + (offsets[i] as number) >= step ? 1 : 0;
    }
  }
  for (const values of given) {
    at += TILE;
    for (let i = 0; i < n; i++) columns[at + i] = values[indices[i] as number] as number;
  }
}

/** Buffers of one pass: rows of TILE numbers, one a column of the design, then those of borrowed constituents. */
export function columnsBuffer(design: Design): Float64Array {
  return new Float64Array((headCount(design) + 2 * design.basis.speeds.length) * TILE);
}

/**
 * The design, tile by tile, over the rows that take part. Row k of `columns` is column k of the design.
 *
 * @param design - Of {@link makeDesign}.
 * @param rows - Times and which of them take part.
 * @param columns - Of {@link columnsBuffer}; written anew for each tile.
 */
export function* designTiles(
  design: Design,
  rows: Rows,
  columns: Float64Array,
): Generator<Tile, void, void> {
  const { times, step, slope } = rows;
  const [first] = rows.sides as [Float64Array];
  const pair = new Float64Array(2);
  const grid = step > 0 ? { start: times[0] ?? 0, step, count: times.length } : { times };
  const waves = columns.subarray(headCount(design) * TILE);
  for (const tile of tiles(design.basis, grid, (i) => !Number.isNaN(first[i]))) {
    if (slope) {
      slopeColumnsInto(waves, design.basis, tile, pair);
      for (let row = 0; row < waves.length; row += TILE) {
        for (let i = row; i < row + tile.n; i++) waves[i] = (waves[i] as number) * HOUR;
      }
    } else columnsInto(waves, design.basis, tile, pair);
    foldInto(waves, design, tile.n);
    headInto(columns, design, rows, tile);
    yield tile;
  }
}
