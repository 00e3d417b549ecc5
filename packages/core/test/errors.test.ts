import { describe as group, expect, it } from 'vitest';
import {
  ComputationError,
  describe,
  InputError,
  isStaitheError,
  type Progress,
} from '../src/index.js';
import { runInSlices, runThrough } from '../src/long-work.js';

group('errors', () => {
  it('are told by code, also from another copy of the package', () => {
    const error = new InputError('MISSING', 'unit', 'expected m, got nothing');
    expect(error).toBeInstanceOf(RangeError);
    expect(isStaitheError(error)).toBe(true);
    expect(isStaitheError(error, 'MISSING')).toBe(true);
    expect(isStaitheError(error, 'DUPLICATE')).toBe(false);
    const foreign = Object.assign(new Error('x'), { name: 'ComputationError', code: 'NO_TIDE' });
    expect(isStaitheError(foreign, 'NO_TIDE')).toBe(true);
    expect(isStaitheError(new Error('x'))).toBe(false);
    expect(isStaitheError('x')).toBe(false);
    expect(new ComputationError('NO_TIDE', 'flat', { samples: 3 }).details).toEqual({ samples: 3 });
  });

  it('show values safely and in short', () => {
    expect(describe('a\u001b[31mb')).toBe('"a\\u001b[31mb"');
    expect(describe('\u202etxt')).toBe('"\ufffdtxt"');
    expect(describe('x'.repeat(100)).length).toBe(62);
    expect(describe([1, 2])).toBe('an array of 2');
    expect(describe({})).toBe('an object');
    expect(describe(undefined)).toBe('undefined');
  });
});

function* counting(n: number): Generator<Progress, number, void> {
  for (let i = 0; i < n; i++) yield { done: i, total: n, stage: 'counting' };
  return n;
}

group('long work', () => {
  it('gives the same at once and in slices', async () => {
    const seen: number[] = [];
    expect(runThrough(counting(5))).toBe(5);
    expect(await runInSlices(counting(5), { onProgress: ({ done }) => seen.push(done) })).toBe(5);
    expect(seen).toEqual([0, 1, 2, 3, 4]);
  });

  it('rejects with the reason of the signal', async () => {
    const abort = new AbortController();
    const work = runInSlices(counting(1e9), {
      signal: abort.signal,
      onProgress: ({ done }) => {
        if (done === 3) abort.abort('enough');
      },
    });
    await expect(work).rejects.toBe('enough');
  });
});
