/**
 * The standard's own series and flags, test by test.
 */
import { expectWithin, loadVector, recordAccuracy } from '@staithe/test-vectors';
import { HOUR, SECOND, uniformSeries } from '@staithe/core';
import { describe, expect, it } from 'vitest';
import { type CheckLimits, type CheckName, checkRecord } from '../src/index.js';

interface Case {
  readonly values: readonly (number | null)[];
  readonly flags: readonly number[];
}
interface Cases {
  readonly spike: Case & { readonly doubt: number; readonly reject: number };
  readonly spikeEnds: Case & { readonly doubt: number; readonly reject: number };
  readonly flatLine: Case & {
    readonly stepSeconds: number;
    readonly doubtSeconds: number;
    readonly rejectSeconds: number;
    readonly within: number;
  };
  readonly rateOfChange: Case & { readonly stepSeconds: number; readonly doubtPerHour: number };
  readonly grossRange: Case & {
    readonly doubt: readonly [number, number];
    readonly reject: readonly [number, number];
  };
}

const vector = loadVector<Cases>('qartod-water-level');
const ALL_OFF: CheckLimits = {
  instrument: false,
  season: false,
  jump: false,
  slope: false,
  stuckFor: false,
  tooCalm: false,
  besides: false,
};

function flagsOf(own: Case, step: number, name: CheckName, limits: CheckLimits): Uint8Array {
  const series = uniformSeries({ start: 0, step, values: own.values });
  return checkRecord(series, { limits: { ...ALL_OFF, ...limits } }).tests[name];
}

function hold(capability: string, flags: Uint8Array, own: Case): void {
  expect([...flags]).toEqual(own.flags);
  const seen = expectWithin(flags, own.flags, vector.tolerance, capability);
  recordAccuracy('qartod-water-level', {
    capability: `flags of the ${capability} test`,
    compared: 'every flag of the printed series',
    ...seen,
    tolerance: vector.tolerance.abs as number,
    unit: 'flag',
  });
}

describe('flags of the standard', () => {
  const { spike, spikeEnds, flatLine, rateOfChange, grossRange } = vector.cases;

  it.each([
    ['spike', spike],
    ['spike (ends)', spikeEnds],
  ] as const)('%s', (title, own) => {
    const { doubt, reject } = own;
    hold(title, flagsOf(own, HOUR, 'jump', { jump: { doubt, reject } }), own);
  });

  it('flat line', () => {
    const { stepSeconds, doubtSeconds, rejectSeconds, within } = flatLine;
    const stuckFor = { doubt: doubtSeconds * SECOND, reject: rejectSeconds * SECOND, within };
    hold('flat line', flagsOf(flatLine, stepSeconds * SECOND, 'stuckFor', { stuckFor }), flatLine);
  });

  it('rate of change, 3 < limit x step < 8', () => {
    const { stepSeconds, doubtPerHour } = rateOfChange;
    const moved = (doubtPerHour * stepSeconds) / 3600;
    expect(moved > 3 && moved < 8).toBe(true);
    const slope = { doubt: doubtPerHour };
    const flags = flagsOf(rateOfChange, stepSeconds * SECOND, 'slope', { slope });
    hold('rate of change', flags, rateOfChange);
  });

  it('gross range, ends included', () => {
    const { doubt, reject } = grossRange;
    const instrument = { doubt, reject };
    hold('gross range', flagsOf(grossRange, HOUR, 'instrument', { instrument }), grossRange);
  });
});
