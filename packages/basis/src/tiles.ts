/**
 * Walks through times in tiles: runs of up to 512 samples inside one stretch.
 * @module
 */
import type { Basis } from './basis.js';
import { phasorInto } from './kernels/phasor.js';
import { phasorSlopeInto } from './kernels/phasor-slope.js';
import { makeStretcher, type Stretch, type Stretcher } from './stretches.js';

/** Times of samples: a uniform grid, or a list of instants in any order. @public */
export type TimeGrid =
  | {
      readonly start: number;
      readonly step: number;
      readonly count: number;
      readonly times?: never;
    }
  | { readonly times: Float64Array; readonly start?: never };

/** Samples in a tile, at most. @public */
export const TILE = 512;

/** Samples of one tile. @public */
export interface Tile {
  /** Index in the grid of each sample, length n. */
  readonly indices: Int32Array;
  /** Milliseconds from the start of the stretch, length n. */
  readonly offsets: Float64Array;
  readonly n: number;
  /** Milliseconds between samples where they are uniform, else 0. */
  readonly step: number;
  readonly stretch: Stretch;
}

/**
 * How many samples a grid has.
 *
 * @param grid - Times.
 * @returns Samples.
 * @example
 * gridCount({ start: 0, step: 60000, count: 5 }); // 5
 * @public
 */
export function gridCount(grid: TimeGrid): number {
  return grid.times ? grid.times.length : grid.count;
}

/**
 * The tiles of a grid, one after the other. The buffers of a tile are used again for the next.
 *
 * @param basis - Whose stretches.
 * @param grid - Times.
 * @param present - Tells whether the sample at an index takes part.
 * @param stretcher - Of `makeStretcher`, where the caller has one.
 * @returns One tile after another.
 * @example
 * const basis = makeBasis({ constituents: ['M2'] });
 * [...tiles(basis, { start: 0, step: 60000, count: 5 }, () => true)].length; // 1
 * @public
 */
export function* tiles(
  basis: Basis,
  grid: TimeGrid,
  present: (index: number) => boolean,
  stretcher: Stretcher = makeStretcher(basis),
): Generator<Tile, void, void> {
  const count = gridCount(grid);
  const indices = new Int32Array(TILE);
  const offsets = new Float64Array(TILE);
  let i = 0;
  while (i < count) {
    let n = 0;
    let stretch: Stretch | undefined;
    let whole = grid.times === undefined;
    for (; i < count && n < TILE; i++) {
      if (!present(i)) {
        whole = whole && n === 0;
        continue;
      }
      const t = (grid.times ? (grid.times[i] as number) : grid.start + i * grid.step) + basis.delay;
      if (!stretch) stretch = stretcher(t);
      else if (t < stretch.from || t >= stretch.to) break;
      indices[n] = i;
      offsets[n] = t - stretch.from;
      n++;
    }
    if (stretch)
      yield {
        indices,
        offsets,
        n,
        step: whole && grid.times === undefined ? grid.step : 0,
        stretch,
      };
  }
}

/**
 * Writes the columns of a tile: row 2j the cosine, row 2j + 1 the sine function of constituent j.
 *
 * @param out - Written to: 2K rows of {@link TILE} numbers.
 * @param basis - Of `makeBasis`.
 * @param tile - Of {@link tiles}.
 * @param pair - Scratch, length 2.
 * @example
 * const basis = makeBasis({ constituents: ['S2'], nodalModel: 'none' });
 * const columns = new Float64Array(2 * TILE);
 * for (const tile of tiles(basis, { start: 0, step: 60000, count: 1 }, () => true)) {
 *   columnsInto(columns, basis, tile, new Float64Array(2));
 * }
 * columns[0]; // 1
 * @public
 */
export function columnsInto(out: Float64Array, basis: Basis, tile: Tile, pair: Float64Array): void {
  const { stretch, offsets, n, step } = tile;
  for (let j = 0; j < basis.speeds.length; j++) {
    phasorInto(
      out.subarray(2 * j * TILE, (2 * j + 1) * TILE),
      out.subarray((2 * j + 1) * TILE, (2 * j + 2) * TILE),
      stretch.cubics,
      8 * j,
      basis.speeds[j] as number,
      stretch.to - stretch.from,
      offsets,
      n,
      step,
      pair,
    );
  }
}

/**
 * Writes the slopes of the columns of a tile, per millisecond: row 2j of the cosine, row 2j + 1 of the sine function.
 *
 * @param out - Written to: 2K rows of {@link TILE} numbers.
 * @param basis - Of `makeBasis`.
 * @param tile - Of {@link tiles}.
 * @param pair - Scratch, length 2.
 * @example
 * const basis = makeBasis({ constituents: ['S2'], nodalModel: 'none' });
 * const slopes = new Float64Array(2 * TILE);
 * for (const tile of tiles(basis, { start: 0, step: 60000, count: 1 }, () => true)) {
 *   slopeColumnsInto(slopes, basis, tile, new Float64Array(2));
 * }
 * Math.round(slopes[TILE] * 43200000 * 1000); // 6283
 * @public
 */
export function slopeColumnsInto(
  out: Float64Array,
  basis: Basis,
  tile: Tile,
  pair: Float64Array,
): void {
  const { stretch, offsets, n } = tile;
  for (let j = 0; j < basis.speeds.length; j++) {
    phasorSlopeInto(
      out.subarray(2 * j * TILE, (2 * j + 1) * TILE),
      out.subarray((2 * j + 1) * TILE, (2 * j + 2) * TILE),
      stretch.cubics,
      8 * j,
      basis.speeds[j] as number,
      stretch.to - stretch.from,
      offsets,
      n,
      pair,
    );
  }
}
