/**
 * The quality tests of the open standard over a record, a flag a sample and a reason each.
 *
 * Source: U.S. IOOS QARTOD, Manual for Real-Time Quality Control of Water Level Data (version 2.1, 2021): the tests and
 * the flags. How limits are derived from a record is our own and is written beside each in `limits.ts`.
 * @module
 */
import { checkSeries, DAY, describe, InputError, type Series } from '@staithe/core';
import type { ClockOff, ZeroMoved } from './findings.js';
import { gapRuns } from './gaps.js';
import { findClockFaults } from './internal/checks/clock-faults.js';
import { checkJump } from './internal/checks/jump.js';
import { checkCalm, checkSlope, checkStuck } from './internal/checks/motion.js';
import { checkBesides, checkInstrument, checkSeason } from './internal/checks/ranges.js';
import { type CheckSignal, type Note, runCollector, signalOf } from './internal/checks/signal.js';
import { findZeroMoves } from './internal/checks/zero-moves.js';
import { checkLimits } from './internal/check-limits.js';
import { type CheckLimits, resolveLimits, type UsedLimits } from './limits.js';
import type { GaugeWarning, QualityReason, Run } from './record.js';

/** The tests by their key in the limits. @public */
export type CheckName =
  | 'instrument'
  | 'season'
  | 'jump'
  | 'slope'
  | 'stuckFor'
  | 'tooCalm'
  | 'besides';

/** What {@link checkRecord} takes. @public */
export interface CheckOptions {
  readonly limits?: CheckLimits | undefined;
  /**
   * The expected heights at given instants, metres: a prediction or a neighbour. Finds spikes hidden in the tide,
   * steps of the zero and clock faults.
   */
  readonly expected?: ((times: Float64Array) => Float64Array) | undefined;
}

/** What {@link checkRecord} gives. @public */
export interface RecordCheck {
  /** A flag a sample: the worst of all tests in the order 4, 3, 1, 2; 9 where the sample is missing. */
  readonly flags: Uint8Array;
  /** The flags of each test by itself. */
  readonly tests: Readonly<Record<CheckName, Uint8Array>>;
  /** Runs of samples that are suspect, fail or are missing, in order of time. */
  readonly reasons: readonly Run[];
  /** The limits as used. */
  readonly limits: UsedLimits;
  /** What is wrong with a stretch, not with a sample. Only with `expected`. */
  readonly findings: readonly (ZeroMoved | ClockOff)[];
  readonly warnings: readonly GaugeWarning[];
}

const TITLES: Readonly<Record<CheckName, QualityReason>> = {
  instrument: 'gross range',
  season: 'climatology',
  jump: 'spike',
  slope: 'rate of change',
  stuckFor: 'flat line',
  tooCalm: 'attenuated signal',
  besides: 'neighbour',
};
const TRUSTED_BELOW = 3; // a finding rests on samples that nobody doubts

/** The worst of two flags in the order 4, 3, 1, 2. */
function worse(a: number, b: number): number {
  if (a === 2) return b;
  return b === 2 || a > b ? a : b;
}

function findFaults(
  signal: CheckSignal,
  flags: Uint8Array,
  expected: (times: Float64Array) => Float64Array,
): readonly (ZeroMoved | ClockOff)[] {
  const { times, heights, places, step } = signal;
  const residual = signal.residual as Float64Array;
  const isKept = (_: number, i: number): boolean =>
    (flags[places[i] as number] as number) < TRUSTED_BELOW;
  const keptTimes = times.filter(isKept);
  const clocks = findClockFaults(keptTimes, heights.filter(isKept), step, expected);
  // A stretch on a wrong clock would look like a moved zero at each of its ends.
  const isSound = (t: number): boolean =>
    !clocks.some(({ from, to }) => t >= from - 2 * DAY && t <= to + 2 * DAY);
  const keptResidual = residual.filter(isKept).filter((_, i) => isSound(keptTimes[i] as number));
  const zeros = findZeroMoves({ times: keptTimes.filter(isSound), residual: keptResidual, step });
  const startOf = (f: ZeroMoved | ClockOff): number => (f.kind === 'clock-off' ? f.from : f.at);
  return [...clocks, ...zeros].sort((a, b) => startOf(a) - startOf(b));
}

/**
 * Runs the quality tests: gross range (`instrument`), climatology (`season`), spike (`jump`), rate of change
 * (`slope`), flat line (`stuckFor`), attenuated signal (`tooCalm`), neighbour or forecast (`besides`), and gaps.
 *
 * Limits that are not given are derived from the record's own medians and quantiles, meant to leave storms alone and
 * to catch spikes from 1 or 2 decimetres and sensors stuck for some hours. `season` takes limits from other years and
 * is never derived; `besides` needs `expected`. A record under 48 heights is not judged by derived limits.
 *
 * @param series - Metres; NaN is a gap. Not changed.
 * @param options - Limits and the expected curve.
 * @returns Flags (one a sample of the series, gaps included), per-test flags, runs, limits and findings.
 * @throws InputError of `checkSeries`; `WRONG_TYPE`, `LENGTH_MISMATCH`, `OUT_OF_RANGE`, paths `limits.…`, `expected`.
 * @example
 * const values = new Float64Array([1, 1.1, 9.9, 1.3, 1.4]);
 * const check = checkRecord({ start: 0, step: 3600000, values }, { limits: { jump: { doubt: 1, reject: 5 } } });
 * check.reasons[1].reason; // 'spike'
 * @public
 */
export function checkRecord(series: Series, options: CheckOptions = {}): RecordCheck {
  const sound = checkSeries(series);
  const given = options.limits ?? {};
  checkLimits(given);
  const { expected } = options;
  const signal = signalOf(sound, expected && checkedCurve(expected));
  const limits = resolveLimits(given, signal);
  const count = sound.values.length;
  const runs: Run[] = [...gapRuns(sound)];
  const rejected = new Uint8Array(signal.heights.length);

  const run = (
    name: CheckName,
    on: unknown,
    test: (note: Note, own: Uint8Array) => void,
  ): Uint8Array => {
    const own = new Uint8Array(count).fill(9);
    for (const place of signal.places) own[place] = on ? 1 : 2;
    if (on) test(runCollector(signal, TITLES[name], own, runs), own);
    return own;
  };
  const reject = (own: Uint8Array): void => {
    signal.places.forEach((place, i) => {
      if (own[place] === 4) rejected[i] = 1;
    });
  };
  const { instrument: instrumentLimits, jump: jumpLimits, slope: slopeLimits } = limits;
  const instrument = run('instrument', instrumentLimits, (note) => {
    if (instrumentLimits) checkInstrument(signal, instrumentLimits, note);
  });
  reject(instrument);
  const jump = run('jump', jumpLimits, (note, own) => {
    if (!jumpLimits) return;
    checkJump(signal, jumpLimits, rejected, note, (i) => {
      own[signal.places[i] as number] = 2;
    });
  });
  reject(jump);
  const tests: Record<CheckName, Uint8Array> = {
    instrument,
    jump,
    season: run('season', limits.season, (note) => {
      if (limits.season) checkSeason(signal, limits.season, note);
    }),
    slope: run('slope', slopeLimits, (note) => {
      if (slopeLimits) checkSlope(signal, slopeLimits, rejected, note);
    }),
    stuckFor: run('stuckFor', limits.stuckFor, (note) => {
      if (limits.stuckFor) checkStuck(signal, limits.stuckFor, note);
    }),
    tooCalm: run('tooCalm', limits.tooCalm, (note) => {
      if (limits.tooCalm) checkCalm(signal, limits.tooCalm, note);
    }),
    besides: run('besides', limits.besides && signal.residual, (note) => {
      if (limits.besides && signal.residual) checkBesides(signal.residual, limits.besides, note);
    }),
  };
  const flags = new Uint8Array(count).fill(2);
  for (const own of Object.values(tests)) {
    for (let i = 0; i < count; i++) flags[i] = worse(flags[i] as number, own[i] as number);
  }
  const judged = limits.jump !== undefined || limits.instrument !== undefined;
  const warnings: GaugeWarning[] = [];
  if (!judged && given.jump === undefined && given.instrument === undefined) {
    const message = 'too few heights to derive limits from';
    warnings.push({ code: 'TOO_FEW_TO_JUDGE', message, count: signal.heights.length });
  }
  return {
    flags,
    tests,
    reasons: runs.sort((a, b) => a.from - b.from || a.to - b.to),
    limits,
    findings: expected ? findFaults(signal, flags, checkedCurve(expected)) : [],
    warnings,
  };
}

/** The caller's curve, its answers looked at. */
function checkedCurve(
  expected: (times: Float64Array) => Float64Array,
): (times: Float64Array) => Float64Array {
  return (times) => {
    const heights = expected(times);
    if (!(heights instanceof Float64Array)) {
      const got = describe(heights);
      throw new InputError('WRONG_TYPE', 'expected', `expected a Float64Array, got ${got}`);
    }
    if (heights.length !== times.length) {
      const text = `expected ${times.length} heights, got ${heights.length}`;
      throw new InputError('LENGTH_MISMATCH', 'expected', text);
    }
    const bad = heights.findIndex((height) => !Number.isFinite(height));
    if (bad >= 0) {
      throw new InputError(
        'NOT_FINITE',
        `expected[${bad}]`,
        `expected metres, got ${heights[bad]}`,
      );
    }
    return heights;
  };
}
