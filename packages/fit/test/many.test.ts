import { type Series, sampledSeries, uniformSeries } from '@staithe/core';
import { expectWithin, hourlySeries, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import {
  type CellFit,
  fitHarmonics,
  fitMany,
  fitManyAsync,
  type HarmonicFit,
} from '../src/index.js';

const SAME = 1e-12; // m: another order of the sums
const LIST = { constituents: ['M2', 'S2', 'N2', 'K1', 'O1', 'Mf', 'M4'] };
const record = hourlySeries('eastport-observed-2019');
const DAYS = 90 * 24;
const values = record.values.slice(0, DAYS);
const grid = { start: record.start, step: record.step, count: DAYS };

function series(cell: Float64Array): Series {
  return uniformSeries({ start: grid.start, step: grid.step, values: cell });
}

/** Cells that differ in size and gaps: pairs with the same gaps, land between them. */
function cells(): Float64Array[] {
  const gapped = values.map((v, i) => (i > 500 && i < 700 ? Number.NaN : v));
  const land = new Float64Array(DAYS).fill(Number.NaN);
  return [values, values.map((v) => 0.5 * v), gapped, land, gapped.map((v) => 2 - v), values];
}

function expectSame(cell: CellFit, alone: HarmonicFit): void {
  const got = (cell.fit as HarmonicFit).constants;
  const want = alone.constants;
  expect(got.constituents.map(({ name }) => name)).toEqual(want.constituents.map((c) => c.name));
  const sizes = (list: typeof want): number[] => [
    list.meanLevel,
    ...list.constituents.flatMap((c) => [c.amplitude, c.amplitudeSigma as number]),
  ];
  expectWithin(sizes(got), sizes(want), { abs: SAME, rel: 1e-9 });
  expect(cell.fit?.residuals).toBeUndefined();
}

describe('many series over the same times', () => {
  it('each cell is fitted as if it were alone, land has a reason', () => {
    const fits = fitMany(grid, cells(), LIST);
    expect(fits.map(({ index }) => index)).toEqual([0, 1, 2, 3, 4, 5]);
    expect(fits[3]).toMatchObject({ absent: { code: 'TOO_FEW_SAMPLES' } });
    cells().forEach((cell, i) => {
      if (i !== 3) expectSame(fits[i] as CellFit, fitHarmonics(series(cell), LIST));
    });
  });

  it('chooses once, by the times', () => {
    const [first, second] = fitMany(grid, [values, values.map((v) => 1e-6 * v)]);
    const names = (cell: CellFit | undefined): string[] =>
      (cell?.fit as HarmonicFit).constants.constituents.map(({ name }) => name);
    expect(names(first)).toEqual(names(second));
    expect(names(first)).toContain('M2');
  });

  it('takes cells as they come, and times of their own', async () => {
    const times = Float64Array.from(
      { length: DAYS },
      (_, i) => grid.start + i * grid.step + (i % 7) * 1000,
    );
    async function* stream(): AsyncGenerator<Float64Array> {
      for (let i = 0; i < 70; i++) yield values.map((v) => v * (1 + i));
    }
    const seen: number[] = [];
    for await (const { index, fit } of fitManyAsync({ times }, stream(), {
      ...LIST,
      errorModel: 'independent',
    })) {
      seen.push(index);
      if (index > 0) continue;
      const alone = fitHarmonics(sampledSeries({ times, values }), {
        ...LIST,
        errorModel: 'independent',
      });
      expectSame({ index, fit }, alone);
    }
    expect(seen).toEqual(Array.from({ length: 70 }, (_, i) => i));
  });

  it('stops with the reason of the signal', async () => {
    const abort = new AbortController();
    abort.abort(new Error('enough'));
    const work = async (): Promise<void> => {
      for await (const cell of fitManyAsync(grid, [values], { ...LIST, signal: abort.signal })) {
        throw new Error(`expected an abort, got cell ${cell.index}`);
      }
    };
    await expect(work()).rejects.toThrow('enough');
  });

  it('refuses what does not fit', () => {
    const error = (run: () => unknown): string => {
      const { code, path } = refusal(run);
      return `${code} ${path}`;
    };
    expect(error(() => fitMany(grid, [values, values.slice(1)], LIST))).toBe(
      'LENGTH_MISMATCH cells[1]',
    );
    expect(error(() => fitMany(grid, [values.map((v, i) => (i === 5 ? Infinity : v))], LIST))).toBe(
      'NOT_FINITE cells[0].values[5]',
    );
    expect(error(() => fitMany(grid, [values], { ...LIST, weighting: 'resistant' }))).toBe(
      'UNKNOWN_CHOICE options.weighting',
    );
  });
});
