/**
 * The tide curve of a place: the everyday face of this package.
 * @module
 */
import {
  type HarmonicConstants,
  HOUR,
  type InstantLike,
  type Span,
  toInstant,
  type UniformSeries,
} from '@staithe/core';
import { makeCursor } from './cursor.js';
import {
  type Crossing,
  findCrossings,
  findTurningPoints,
  findWindows,
  type TideWindow,
  type TurningPoint,
} from './events.js';
import { heightsAtTimes, heightsOnGrid } from './heights.js';
import { type CurveOptions, makePlan, type TidePlan } from './plan.js';

/** A tide curve. Heights in metres above the datum of the constants. @public */
export interface TideCurve {
  /** Plain data, for a worker. */
  readonly plan: TidePlan;
  /** Height at an instant, metres. */
  height(t: InstantLike): number;
  /** Rate of rise, metres per hour. */
  rate(t: InstantLike): number;
  /** Heights at a uniform step of milliseconds. */
  heights(grid: {
    readonly start: InstantLike;
    readonly step: number;
    readonly count: number;
  }): UniformSeries;
  /** Heights at any instants. */
  heightsAt(times: ArrayLike<number> | readonly InstantLike[]): Float64Array;
  /** Every high and low water of a span. */
  turningPoints(span: Span): TurningPoint[];
  /** Every crossing of a level, metres. */
  crossings(level: number, span: Span): Crossing[];
  /** The windows during which a condition holds. */
  windows(
    condition: { readonly above?: number | undefined; readonly below?: number | undefined },
    span: Span,
  ): TideWindow[];
}

/**
 * Makes the tide curve of a constants document. Predictions leave out weather and are not for navigation by themselves:
 * official tables, notices and the local authority come first.
 *
 * @param constants - The document. It is read once; later changes of it have no effect.
 * @param options - Other models on purpose; sampling.
 * @returns The curve; each method is one line over a function exported alone.
 * @throws InputError of `makePlan`.
 * @example
 * tideCurve(constants).crossings(99, { from: 0, to: DAY }).length; // 0
 * @public
 */
export function tideCurve(constants: HarmonicConstants, options: CurveOptions = {}): TideCurve {
  const plan = makePlan(constants, options);
  const cursor = makeCursor(plan);
  const point = new Float64Array(3);
  const at = (t: InstantLike): Float64Array => {
    const instant = toInstant(t, 't');
    cursor.readInto(point, cursor.pieceAt(instant), instant);
    return point;
  };
  return {
    plan,
    height: (t) => at(t)[0] as number,
    rate: (t) => (at(t)[1] as number) * HOUR,
    heights: (grid) => heightsOnGrid(plan, grid),
    heightsAt: (times) => heightsAtTimes(plan, times),
    turningPoints: (span) => findTurningPoints(plan, span),
    crossings: (level, span) => findCrossings(plan, level, span),
    windows: (condition, span) => findWindows(plan, condition, span),
  };
}
