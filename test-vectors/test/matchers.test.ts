/**
 * The matchers refuse what they should, and say what they saw.
 */
import { describe, expect, it } from 'vitest';
import { expectAngleWithin, expectWithin, mergeDifferences } from '../src/index.js';

describe('expectWithin', () => {
  it('takes a number or numbers and returns the differences', () => {
    expect(expectWithin(1.25, 1, { abs: 0.25 })).toEqual({ cases: 1, worst: 0.25, typical: 0.25 });
    const seen = expectWithin(new Float64Array([1, 2, 3.5]), [1, 2, 3], { abs: 0.5 });
    expect(seen.worst).toBe(0.5);
    expect(seen.typical).toBe(Math.sqrt(0.25 / 3));
  });

  it('takes the wider of abs and rel', () => {
    expect(expectWithin(110, 100, { abs: 1, rel: 0.1 }).worst).toBe(10);
    expect(() => expectWithin(110, 100, { abs: 1, rel: 0.05 })).toThrow();
  });

  it('refuses by default, names index, values and label', () => {
    expect(() => expectWithin([1, 2], [1, 2.5], { abs: 0.1 }, 'height')).toThrowError(/height/);
    expect(() => expectWithin(1.0001, 1, {})).toThrow();
  });

  it('lets NaN fit NaN alone', () => {
    expect(expectWithin([Number.NaN, 1], [Number.NaN, 1], { abs: 0 }).cases).toBe(1);
    expect(() => expectWithin(Number.NaN, 1, { abs: 10 })).toThrow();
    expect(() => expectWithin(1, Number.NaN, { abs: 10 })).toThrow();
  });

  it('refuses arrays of unequal length, and empty ones', () => {
    expect(() => expectWithin([1], [1, 2], { abs: 1 })).toThrow();
    expect(() => expectWithin([], [], { abs: 1 })).toThrow();
  });
});

describe('expectAngleWithin', () => {
  it('goes the short way round', () => {
    expect(expectAngleWithin(359.5, 0.5, { abs: 1 }).worst).toBe(1);
    expect(expectAngleWithin([359, 10], [1, 370], { abs: 2 }).cases).toBe(2);
  });

  it('refuses what lies outside', () => {
    expect(() => expectAngleWithin(359, 1, { abs: 1.9 })).toThrow();
    expect(() => expectAngleWithin(Number.NaN, 1, { abs: 180 })).toThrow();
  });
});

describe('mergeDifferences', () => {
  it('equals one comparison of everything', () => {
    const whole = expectWithin([1, 2, 3.5], [1, 2.25, 3], { abs: 1 });
    const parts = [expectWithin(1, 1, { abs: 1 }), expectWithin([2, 3.5], [2.25, 3], { abs: 1 })];
    expectWithin(mergeDifferences(parts).typical, whole.typical, { rel: 1e-14 });
    expect(mergeDifferences(parts)).toMatchObject({ cases: 3, worst: 0.5 });
  });
});
