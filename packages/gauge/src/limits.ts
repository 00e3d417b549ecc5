/**
 * The limits of the quality tests: what a caller may set, and what is derived from the record where nothing is set.
 * @module
 */
import { DAY, HOUR, type Metres } from '@staithe/core';
import type { CheckSignal } from './internal/checks/signal.js';
import { medianOf, quantile, sampleOf, spreadOf } from './internal/robust.js';

/** Lowest and highest height, both allowed. @public */
export type Ends = readonly [low: Metres, high: Metres];

/** Limits of all tests; `false` leaves a test out, absent derives its limits from the record. @public */
export interface CheckLimits {
  /** Gross range, metres: what the instrument can see. */
  readonly instrument?: { readonly doubt: Ends; readonly reject: Ends } | false | undefined;
  /** Climatology, metres: twelve pairs, January first (UTC). Never derived: it takes other years to know. */
  readonly season?:
    | { readonly doubt: readonly Ends[]; readonly reject: readonly Ends[] }
    | false
    | undefined;
  /** Spike, metres. */
  readonly jump?: JumpLimits | false | undefined;
  /** Rate of change, metres per hour, from the sample before. Absent `reject`: never rejected. */
  readonly slope?:
    | { readonly doubt: number; readonly reject?: number | undefined }
    | false
    | undefined;
  /** Flat line, milliseconds. */
  readonly stuckFor?: StuckLimits | false | undefined;
  /** Attenuated signal, metres between highest and lowest in a trailing stretch. */
  readonly tooCalm?: CalmLimits | false | undefined;
  /** Neighbour or forecast, metres from the expected curve, the median difference taken off. */
  readonly besides?: { readonly doubt: Metres; readonly reject: Metres } | false | undefined;
}

/**
 * A sample against what its neighbours say. With `spare` or a reach of 2 or 3, limits grow beside gaps by what the
 * neighbours left there err in this record.
 * @public
 */
export interface JumpLimits {
  readonly doubt: Metres;
  readonly reject: Metres;
  /** So many neighbours on each side; 1 (default) is the standard's mean of two, 2 and 3 follow the tide's curve. */
  readonly reach?: 1 | 2 | 3 | undefined;
  /** Does not blame a neighbour for a spike beside it. Default false: the standard blames it. */
  readonly spare?: boolean | undefined;
  /** Widens both limits by how much rougher than usual the water is around, so that a storm is no spike. Default false. */
  readonly rough?: boolean | undefined;
  /** `residual`: on what is left after the expected curve. Default `level`. */
  readonly of?: 'level' | 'residual' | undefined;
}

/** How long a value may stand. @public */
export interface StuckLimits {
  readonly doubt: number;
  readonly reject: number;
  /** Heights that differ by less than this, metres, are the same. */
  readonly within: Metres;
  /** Flags the stretch from its first sample. Default false: from where the limit is passed, as the standard does. */
  readonly whole?: boolean | undefined;
}

/** How small the range may be. @public */
export interface CalmLimits {
  readonly doubt: Metres;
  readonly reject: Metres;
  /** Length of the trailing stretch, milliseconds. */
  readonly over: number;
}

const FEWEST = 48; // samples to derive limits from
const LUNAR_DAY = 25 * HOUR; // a whole tidal day in whole hours

/** Limits as used, `undefined` where a test was not made. @public */
export interface UsedLimits {
  readonly instrument: { readonly doubt: Ends; readonly reject: Ends } | undefined;
  readonly season:
    | { readonly doubt: readonly Ends[]; readonly reject: readonly Ends[] }
    | undefined;
  readonly jump: JumpLimits | undefined;
  readonly slope: { readonly doubt: number; readonly reject?: number | undefined } | undefined;
  readonly stuckFor: StuckLimits | undefined;
  readonly tooCalm: CalmLimits | undefined;
  readonly besides: { readonly doubt: Metres; readonly reject: Metres } | undefined;
}

/** Seven neighbours' sixth difference over 20: leaves 0.8 mm of a metre of M2 at hourly samples. */
const SIXTH: readonly number[] = /* @__PURE__ */ Object.freeze([0.75, -0.3, 0.05]);

function deriveInstrument(heights: Float64Array): { doubt: Ends; reject: Ends } {
  const low = quantile(heights, 0.01);
  const high = quantile(heights, 0.99);
  const doubt = Math.max(high - low, 1.5);
  const reject = Math.max(3 * (high - low), 5);
  return { doubt: [low - doubt, high + doubt], reject: [low - reject, high + reject] };
}

function deriveJump(signal: CheckSignal): JumpLimits {
  const heights = signal.residual ?? signal.heights;
  const { times, step } = signal;
  const [near = 0, next = 0, far = 0] = SIXTH;
  const differences = sampleOf(heights.length - 6, (k) => {
    const i = k + 3;
    const across = (times[i + 3] as number) - (times[i - 3] as number);
    if (across > 6.5 * step) return Number.NaN; // over a gap it is no sixth difference
    const at = (j: number): number => heights[i + j] as number;
    return at(0) - near * (at(-1) + at(1)) - next * (at(-2) + at(2)) - far * (at(-3) + at(3));
  });
  const spread = spreadOf(differences);
  return {
    doubt: Math.max(12 * spread, 0.08),
    reject: Math.max(25 * spread, 0.16),
    reach: 3,
    spare: true,
    rough: true,
    of: signal.residual ? 'residual' : 'level',
  };
}

function deriveSlope(signal: CheckSignal): { doubt: number; reject: number } {
  const { heights, times, step } = signal;
  const rates = sampleOf(heights.length - 1, (i) => {
    const hours = ((times[i + 1] as number) - (times[i] as number)) / HOUR;
    return ((heights[i + 1] as number) - (heights[i] as number)) / hours;
  });
  const doubt = Math.max(5 * spreadOf(rates), (0.25 * HOUR) / step, 1);
  return { doubt, reject: 3 * doubt };
}

/** Smallest difference between heights that differ: the resolution of the file. */
function resolutionOf(heights: Float64Array): number {
  const sorted = sampleOf(heights.length, (i) => heights[i] as number).sort();
  let least = Infinity;
  for (let i = 1; i < sorted.length; i++) {
    const difference = (sorted[i] as number) - (sorted[i - 1] as number);
    if (difference > 1e-7 && difference < least) least = difference;
  }
  return least;
}

function deriveStuck(signal: CheckSignal): StuckLimits | undefined {
  const { heights, times } = signal;
  const resolution = resolutionOf(heights);
  if (resolution === Infinity)
    return { doubt: 3 * HOUR, reject: 6 * HOUR, within: 1e-6, whole: true };
  // How long equal heights stand in this record, at slack water and by chance.
  const stands: number[] = [];
  let first = 0;
  for (let i = 1; i <= heights.length; i++) {
    if (heights[i] === heights[first]) continue;
    if (i - first > 1) stands.push((times[i - 1] as number) - (times[first] as number));
    first = i;
  }
  const usual = stands.length < 20 ? 0 : quantile(Float64Array.from(stands), 0.9);
  const doubt = Math.max(3 * HOUR, 4 * usual, 4 * signal.step);
  return { doubt, reject: 2 * doubt, within: resolution / 2, whole: true };
}

function deriveCalm(signal: CheckSignal): CalmLimits | undefined {
  const { heights, times } = signal;
  const ranges: number[] = [];
  let first = 0;
  let low = Infinity;
  let high = -Infinity;
  for (let i = 0; i < heights.length; i++) {
    if ((times[i] as number) - (times[first] as number) > LUNAR_DAY) {
      if (high > low) ranges.push(high - low);
      first = i;
      low = Infinity;
      high = -Infinity;
    }
    low = Math.min(low, heights[i] as number);
    high = Math.max(high, heights[i] as number);
  }
  if (ranges.length < 5 || signal.step > 3 * HOUR) return undefined;
  const small = quantile(Float64Array.from(ranges), 0.05);
  return { doubt: 0.3 * small, reject: 0.1 * small, over: LUNAR_DAY };
}

function deriveBesides(residual: Float64Array): { doubt: Metres; reject: Metres } {
  const sample = sampleOf(residual.length, (i) => residual[i] as number);
  const middle = medianOf(sample);
  const spread = spreadOf(sample.map((r) => r - middle));
  return { doubt: Math.max(12 * spread, 1.5), reject: Math.max(24 * spread, 3) };
}

/** The limits to use: the caller's, else derived from the finite samples. */
export function resolveLimits(limits: CheckLimits, signal: CheckSignal): UsedLimits {
  const enough = signal.heights.length >= FEWEST && signal.step > 0 && signal.step <= DAY;
  const use = <T extends object>(
    own: T | false | undefined,
    derive: () => T | undefined,
  ): T | undefined => {
    if (own === false) return undefined;
    return own ?? (enough ? derive() : undefined);
  };
  const { residual } = signal;
  return {
    instrument: use(limits.instrument, () => deriveInstrument(signal.heights)),
    season: limits.season || undefined,
    jump: use(limits.jump, () => deriveJump(signal)),
    slope: use(limits.slope, () => deriveSlope(signal)),
    stuckFor: use(limits.stuckFor, () => deriveStuck(signal)),
    tooCalm: use(limits.tooCalm, () => deriveCalm(signal)),
    besides: residual && use(limits.besides, () => deriveBesides(residual)),
  };
}
