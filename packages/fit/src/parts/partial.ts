/**
 * Parts of a fit: what a chunk of a record adds to the normal equations, as plain JSON, in any order.
 * @module
 */
import {
  checkSeries,
  describe,
  InputError,
  type Instant,
  type Progress,
  refuse,
  type LongWork,
  type Series,
  seriesTimes,
} from '@staithe/core';
import { runInSlices, runThrough } from '@staithe/core/long-work';
import { usualStep } from '../cadence.js';
import { addProducts } from '../normal.js';
import { checkPlan, type FitPlan, planDesign } from './plan.js';
import { countRateFrom } from './rate-from.js';

/** Samples that follow each other at one step. @public */
export interface PartRun {
  readonly from: Instant;
  readonly to: Instant;
  readonly count: number;
  /** Milliseconds. */
  readonly step: number;
}

/** What chunks add up to: plain JSON. @public */
export interface FitPartial {
  /** Fingerprint of the plan. */
  readonly plan: string;
  readonly samples: number;
  readonly missing: number;
  /** Metres; of no samples null. */
  readonly lowest: number | null;
  readonly highest: number | null;
  readonly runs: readonly PartRun[];
  /** The secular rate counts from here, where one is fitted. */
  readonly rateFrom: Instant;
  /** Of the columns. */
  readonly order: readonly string[];
  /** Products of all columns and the record, packed lower triangle. */
  readonly products: readonly number[];
}

const LONGER = 1.5; // steps: a longer one begins a new run
const LARGEST = 1e6; // m

function joined(a: PartRun, b: PartRun): PartRun | undefined {
  const apart = b.from - a.to;
  if (!(apart <= LONGER * Math.min(a.step, b.step))) return undefined;
  const count = a.count + b.count;
  return { from: a.from, to: b.to, count, step: (b.to - a.from) / (count - 1) };
}

/** Runs in order, those that touch made one; refused where they overlap. */
function mergeRuns(runs: readonly PartRun[]): PartRun[] {
  const out: PartRun[] = [];
  for (const run of [...runs].sort((a, b) => a.from - b.from)) {
    const last = out[out.length - 1];
    if (last && run.from <= last.to) {
      throw new InputError(
        'CONFLICT',
        'partial.runs',
        `expected chunks that do not overlap, got samples at ${describe(run.from)} twice`,
      );
    }
    const both = last && joined(last, run);
    if (both) out[out.length - 1] = both;
    else out.push(run);
  }
  return out;
}

function runsIn(times: Float64Array, step: number): PartRun[] {
  const usual = step || usualStep(times) || 1;
  const out: PartRun[] = [];
  let start = 0;
  for (let i = 1; i <= times.length; i++) {
    const [before, now] = [times[i - 1] as number, times[i]];
    if (now !== undefined && now - before <= LONGER * usual) continue;
    const from = times[start] as number;
    const count = i - start;
    out.push({ from, to: before, count, step: count > 1 ? (before - from) / (count - 1) : usual });
    start = i;
  }
  return out;
}

function* accumulateSteps(plan: FitPlan, chunk: Series): Generator<Progress, FitPartial, void> {
  checkPlan(plan);
  const series = checkSeries(chunk);
  const { sampling } = plan.options;
  const same =
    sampling?.meanOver === series.sampling?.meanOver && sampling?.stamp === series.sampling?.stamp;
  if (!same) {
    const text = `expected the sampling of the plan, ${JSON.stringify(sampling) ?? 'none'}`;
    throw new InputError(
      'CONFLICT',
      'chunk.sampling',
      `${text}, got ${JSON.stringify(series.sampling) ?? 'none'}`,
    );
  }
  const { values } = series;
  const times = seriesTimes(series);
  let lowest: number | null = null;
  let highest: number | null = null;
  values.forEach((value, i) => {
    if (Number.isNaN(value)) return;
    if (Math.abs(value) > LARGEST) {
      refuse('OUT_OF_RANGE', `chunk.values[${i}]`, `metres up to ${LARGEST}`, value);
    }
    lowest = Math.min(lowest ?? value, value);
    highest = Math.max(highest ?? value, value);
  });
  const kept = times.filter((_, i) => !Number.isNaN(values[i]));
  const rateFrom =
    kept.length > 0 ? ((kept[0] as number) + (kept[kept.length - 1] as number)) / 2 : 0;
  const planned = planDesign(plan).design;
  const design = planned.rateFrom === undefined ? planned : { ...planned, rateFrom };
  const size = design.order.length + 1;
  const products = { matrix: new Float64Array(size * size), size };
  const step = series.times ? 0 : series.step;
  yield* addProducts(design, { times, step, sides: [values], given: [] }, products);
  const packed: number[] = [];
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) packed.push(products.matrix[i * size + j] as number);
  }
  return {
    plan: plan.fingerprint,
    samples: kept.length,
    missing: values.length - kept.length,
    lowest,
    highest,
    runs: runsIn(kept, step),
    rateFrom,
    order: design.order,
    products: packed,
  };
}

/**
 * What a chunk of a record adds to a fit.
 *
 * @param plan - Of `planFit`, here or on another machine.
 * @param chunk - A stretch of the record, metres; NaN is a gap.
 * @returns Plain JSON, to be merged.
 * @throws InputError of `checkSeries`; `INVALID_DOCUMENT` for a plan that was changed; `CONFLICT`, path `chunk.sampling`.
 * @example
 * accumulate(planFit({ constituents: ['M2'] }), record).samples; // 1440
 * @public
 */
export function accumulate(plan: FitPlan, chunk: Series): FitPartial {
  return runThrough(accumulateSteps(plan, chunk));
}

/**
 * {@link accumulate} in slices.
 *
 * @param plan - As there.
 * @param chunk - As there.
 * @param work - Signal and progress.
 * @returns The same; rejects with `signal.reason` after an abort.
 * @throws As there, by rejection.
 * @example
 * (await accumulateAsync(planFit({ constituents: ['M2'] }), record)).samples; // 1440
 * @public
 */
export function accumulateAsync(
  plan: FitPlan,
  chunk: Series,
  work: LongWork = {},
): Promise<FitPartial> {
  return runInSlices(accumulateSteps(plan, chunk), work);
}

/** The parts must be of one plan. */
export function checkSamePlan(path: string, expected: string, got: string): void {
  if (expected === got) return;
  throw new InputError('CONFLICT', path, `expected a part of plan ${expected}, got one of ${got}`);
}

const least = (a: number | null, b: number | null): number | null =>
  a === null || b === null ? (a ?? b) : Math.min(a, b);

/**
 * The sum of two parts of one plan.
 *
 * @param a - Of `accumulate` or of this function.
 * @param b - Likewise; their samples must not overlap.
 * @returns Plain JSON.
 * @throws InputError `CONFLICT` for parts of two plans, or that overlap.
 * @example
 * const plan = planFit({ constituents: ['M2'] });
 * const [first, rest] = [{ ...record, values: record.values.slice(0, 700) },
 *   { start: record.start + 700 * record.step, step: record.step, values: record.values.slice(700) }];
 * mergePartials(accumulate(plan, rest), accumulate(plan, first)).samples; // 1440
 * @public
 */
export function mergePartials(a: FitPartial, b: FitPartial): FitPartial {
  checkSamePlan('b.plan', a.plan, b.plan);
  // A part without samples has no middle: the other one's counts.
  const rateFrom = a.samples > 0 ? a.rateFrom : b.rateFrom;
  const first = countRateFrom(a.products, a, a.rateFrom, rateFrom);
  const second = countRateFrom(b.products, b, b.rateFrom, rateFrom);
  const highest = least(a.highest && -a.highest, b.highest && -b.highest);
  return {
    plan: a.plan,
    samples: a.samples + b.samples,
    missing: a.missing + b.missing,
    lowest: least(a.lowest, b.lowest),
    highest: highest && -highest,
    runs: mergeRuns([...a.runs, ...b.runs]),
    rateFrom,
    order: a.order,
    products: first.map((value, i) => value + (second[i] as number)),
  };
}
