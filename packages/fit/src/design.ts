/**
 * The design of a fit: one column for the mean level, one each for secular rate and steps, two for each constituent,
 * with borrowed ones folded into their parents.
 *
 * A child with H = ρ·H(parent) and G = G(parent) + Δ adds ρ·e^{−iΔ}·z(child) to z(parent).
 * @module
 */
import { type Basis } from '@staithe/basis';
import { columnsInto, TILE, type Tile, tiles } from '@staithe/basis/kernels';
import { degreesToRadians, type Instant, wrapDegrees, YEAR } from '@staithe/core';
import { cos, sin } from '@staithe/core/trig';

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
  readonly folds: readonly Fold[];
  /** The secular rate counts from here; undefined: none is fitted. */
  readonly rateFrom: Instant | undefined;
  readonly steps: readonly Instant[];
  readonly order: readonly string[];
}

export function makeDesign(
  basis: Basis,
  fitted: number,
  folds: readonly Fold[],
  rateFrom: Instant | undefined,
  steps: readonly Instant[],
): Design {
  const order = [
    'meanLevel',
    ...(rateFrom === undefined ? [] : ['secularRate']),
    ...steps.map((_, i) => `step[${i}]`),
    ...basis.names.slice(0, fitted).flatMap((name) => [`${name}.cos`, `${name}.sin`]),
  ];
  return { basis, fitted, folds, rateFrom, steps, order };
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

function headInto(columns: Float64Array, design: Design, tile: Tile): void {
  const { rateFrom, steps } = design;
  const { n, offsets, stretch } = tile;
  let at = 0;
  columns.fill(1, 0, n);
  const start = stretch.from; // a mean counts at its middle
  if (rateFrom !== undefined) {
    at += TILE;
    for (let i = 0; i < n; i++)
      columns[at + i] = (start + (offsets[i] as number) - rateFrom) / YEAR;
  }
  for (const step of steps) {
    at += TILE;
    for (let i = 0; i < n; i++) columns[at + i] = start + (offsets[i] as number) >= step ? 1 : 0;
  }
}

/** Buffers of one pass: rows of TILE numbers, one a column of the design, then those of borrowed constituents. */
export function columnsBuffer(design: Design): Float64Array {
  return new Float64Array((headCount(design) + 2 * design.basis.speeds.length) * TILE);
}

/**
 * The design, tile by tile, over the samples that are there. Row k of `columns` is column k of the design.
 *
 * @param design - Of {@link makeDesign}.
 * @param times - Instants.
 * @param step - Milliseconds between them where they are uniform, else 0.
 * @param values - NaN is a gap.
 * @param columns - Of {@link columnsBuffer}; written anew for each tile.
 */
export function* designTiles(
  design: Design,
  times: Float64Array,
  step: number,
  values: Float64Array,
  columns: Float64Array,
): Generator<Tile, void, void> {
  const pair = new Float64Array(2);
  const grid = step > 0 ? { start: times[0] ?? 0, step, count: times.length } : { times };
  const waves = columns.subarray(headCount(design) * TILE);
  for (const tile of tiles(design.basis, grid, (i) => !Number.isNaN(values[i]))) {
    columnsInto(waves, design.basis, tile, pair);
    foldInto(waves, design, tile.n);
    headInto(columns, design, tile);
    yield tile;
  }
}
