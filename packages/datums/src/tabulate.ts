/**
 * Tabulation of a record: its high and low waters, classed by tidal day.
 *
 * A tidal day is 360° of τ. It begins half-way between the usual times of the tides of its kind, so that a tide that is
 * a little early or late stays in its day.
 * @module
 */
import { lunisolarLongitudes } from '@staithe/arguments';
import {
  checkSeries,
  ComputationError,
  degreesToRadians,
  describe,
  HOUR,
  InputError,
  type Instant,
  radiansToDegrees,
  type Series,
  seriesTimes,
} from '@staithe/core';
import { atan2, cos, sin } from '@staithe/core/trig';
import { type Extreme, extremesOf, runsOf } from './extremes.js';
import { blockError } from './means.js';
import type { DatumWarning, TabulatedTide, TabulatedTides } from './types.js';

/** Limits of a tabulation. @public */
export interface TabulateOptions {
  /** Neighbouring high and low waters nearer than this are no tide, metres. Default 0.03. */
  readonly smallestRange?: number | undefined;
  /** Neighbouring high and low waters nearer than this are no tide, hours. Default 2. */
  readonly shortestHours?: number | undefined;
}

const LUNAR_RATE = 14.4920521 / HOUR; // degrees per millisecond, for counting whole days only

/** τ without wrapping, counted from an arbitrary origin. */
function lunarTime(t: Instant): number {
  const { tau } = lunisolarLongitudes(t);
  const rough = t * LUNAR_RATE;
  return tau + 360 * Math.round((rough - tau) / 360);
}

/** Where in τ a tidal day of these tides begins: a quarter day from the mean direction of 2τ. */
function dayStart(tides: readonly Extreme[]): number {
  let s = 0;
  let c = 0;
  for (const { time } of tides) {
    const angle = degreesToRadians(2 * lunisolarLongitudes(time).tau);
    s += sin(angle);
    c += cos(angle);
  }
  return radiansToDegrees(atan2(s, c)) / 2 - 90;
}

/** Tidal days that hold a gap: between the end of one run and the start of the next. */
function gapDays(runs: readonly { times: Float64Array }[], start: number): Set<number> {
  const out = new Set<number>();
  const dayOf = (t: Instant): number => Math.floor((lunarTime(t) - start) / 360);
  const first = runs[0]?.times[0];
  const last = runs[runs.length - 1]?.times;
  if (first !== undefined) out.add(dayOf(first));
  if (last) out.add(dayOf(last[last.length - 1] as number));
  for (let i = 1; i < runs.length; i++) {
    const before = (runs[i - 1] as { times: Float64Array }).times;
    const from = dayOf(before[before.length - 1] as number);
    const to = dayOf((runs[i] as { times: Float64Array }).times[0] as number);
    for (let day = from; day <= to; day++) out.add(day);
  }
  return out;
}

function classed(
  tides: readonly Extreme[],
  runs: readonly { times: Float64Array }[],
): TabulatedTide[] {
  if (tides.length === 0) return [];
  const start = dayStart(tides);
  const unsure = gapDays(runs, start);
  const days = new Map<number, Extreme[]>();
  for (const tide of tides) {
    const day = Math.floor((lunarTime(tide.time) - start) / 360);
    const list = days.get(day);
    if (list) list.push(tide);
    else days.set(day, [tide]);
  }
  return [...days].flatMap(([tidalDay, list]) => {
    const sign = list[0]?.kind === 'high' ? 1 : -1;
    const best = list.reduce((a, b) => ((b.height - a.height) * sign > 0 ? b : a));
    return list.map((tide) => ({
      ...tide,
      tidalDay,
      class: unsure.has(tidalDay)
        ? ('unclassed' as const)
        : list.length === 1
          ? ('only' as const)
          : tide === best
            ? ('higher' as const)
            : ('lower' as const),
    }));
  });
}

/** For low waters the lowest is the "lower" of the pair. */
function lowsNamed(tides: readonly TabulatedTide[]): TabulatedTide[] {
  const turned = {
    higher: 'lower',
    lower: 'higher',
    only: 'only',
    unclassed: 'unclassed',
  } as const;
  return tides.map((tide) => ({ ...tide, class: turned[tide.class] }));
}

function positive(value: number | undefined, path: string, usual: number): number {
  const limit = value ?? usual;
  if (limit >= 0 && limit < Infinity) return limit;
  throw new InputError(
    'OUT_OF_RANGE',
    path,
    `expected a finite number, 0 or more, got ${describe(limit)}`,
  );
}

/**
 * Tabulates the high and low waters of a record.
 *
 * @param series - Metres; NaN is a gap. Any step up to an hour or so.
 * @param options - What is too small or too near to be a tide.
 * @returns The tides in order of time with their class, the mean level, what was dropped.
 * @throws InputError of `checkSeries`, `OUT_OF_RANGE`; ComputationError `NO_TIDE` where no whole tide is found.
 * @example
 * tabulateTide(record).tides[0]?.kind === 'high' || tabulateTide(record).tides[0]?.kind === 'low'; // true
 * @public
 */
export function tabulateTide(series: Series, options: TabulateOptions = {}): TabulatedTides {
  const smallestRange = positive(options.smallestRange, 'options.smallestRange', 0.03);
  const shortest = positive(options.shortestHours, 'options.shortestHours', 2) * HOUR;
  const checkedSeries = checkSeries(series);
  const times = seriesTimes(checkedSeries);
  const { values } = checkedSeries;
  const runs = runsOf(times, values);
  const found = runs.map((run) => extremesOf(run, smallestRange, shortest));
  const all = found.flatMap(({ kept }) => kept);
  let sum = 0;
  let samples = 0;
  for (const value of values) {
    if (Number.isNaN(value)) continue;
    sum += value;
    samples++;
  }
  if (all.length < 2) {
    throw new ComputationError(
      'NO_TIDE',
      `expected a high and a low water or more, got ${all.length} in ${samples} samples`,
      { samples, found: all.length },
    );
  }
  const highs = classed(
    all.filter(({ kind }) => kind === 'high'),
    runs,
  );
  const lows = lowsNamed(
    classed(
      all.filter(({ kind }) => kind === 'low'),
      runs,
    ),
  );
  const tides = [...highs, ...lows].sort((a, b) => a.time - b.time);
  const gaps = Math.max(0, runs.length - 1);
  const unclassed = tides.filter((tide) => tide.class === 'unclassed').length;
  const warnings: DatumWarning[] =
    gaps > 0
      ? [
          {
            code: 'GAPS_LEFT_OUT',
            message: `${gaps} gaps of more than 3 h: ${unclassed} tides in their days are not classed as higher or lower`,
          },
        ]
      : [];
  return {
    tides,
    meanSeaLevel: sum / samples,
    meanSeaLevelSigma: blockError(times, values),
    samples,
    from: (runs[0] as { times: Float64Array }).times[0] as number,
    to: (runs[runs.length - 1] as { times: Float64Array }).times.slice(-1)[0] as number,
    dropped: { small: found.reduce((total, { dropped }) => total + dropped, 0), gaps },
    warnings,
  };
}
