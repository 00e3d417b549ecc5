import { HOUR } from '@staithe/core';
import { expectWithin } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { type BasisOptions, makeBasis } from '../src/index.js';
import { columnsInto, slopeColumnsInto, TILE, tiles } from '../src/kernels.js';

const START = Date.UTC(2031, 4, 3, 7);
const APART = 10000; // ms: central differences over it err by h‴·apart²/6, 3e-6 of the slope of M6, whose f reaches 1.12
const DIFFERENCE = 4e-6;

/** The obvious twin: columns a minute later less columns a minute before. */
function differences(options: BasisOptions, times: Float64Array): Float64Array {
  const basis = makeBasis(options);
  const at = (shift: number): Float64Array => {
    const out = new Float64Array(2 * basis.speeds.length * TILE);
    const moved = times.map((t) => t + shift);
    const [tile] = tiles(basis, { times: moved }, () => true);
    if (!tile) throw new Error('expected a tile, got none');
    columnsInto(out, basis, tile, new Float64Array(2));
    return out;
  };
  const later = at(APART);
  return at(-APART).map((value, i) => ((later[i] as number) - value) / (2 * APART));
}

describe('slopes of the columns', () => {
  it.each(['continuous', 'calendar-year'] as const)('are their derivatives, %s', (nodalHold) => {
    const options = { constituents: ['M2', 'K1', 'O1', 'Mf', 'M6'], nodalHold };
    const basis = makeBasis(options);
    const times = Float64Array.from({ length: 20 }, (_, i) => START + i * HOUR + i * i * 997);
    const [tile] = tiles(basis, { times }, () => true);
    if (!tile) throw new Error('expected a tile, got none');
    expect(tile.n).toBe(times.length);
    const slopes = new Float64Array(2 * basis.speeds.length * TILE);
    slopeColumnsInto(slopes, basis, tile, new Float64Array(2));
    const twin = differences(options, times);
    basis.names.forEach((_, j) => {
      const size = basis.speeds[j] as number;
      for (const row of [2 * j, 2 * j + 1]) {
        const part = (of: Float64Array): Float64Array => of.slice(row * TILE, row * TILE + tile.n);
        expectWithin(part(slopes), part(twin), { abs: DIFFERENCE * size });
      }
    });
  });
});
