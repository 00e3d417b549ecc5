/**
 * Heights and rates of a plan.
 * @module
 */
import { synthesizeInto, type TimeGrid } from '@staithe/basis';
import { gridCount } from '@staithe/basis/kernels';
import {
  describe,
  HOUR,
  InputError,
  type Instant,
  type InstantLike,
  toInstant,
  toStep,
  toTimes,
  type UniformSeries,
} from '@staithe/core';
import { levelAt, makeCursor } from './cursor.js';
import type { TidePlan } from './plan.js';

const LARGEST_COUNT = 268435456; // 2 GiB of heights

/**
 * Height at an instant.
 *
 * @param plan - Of `makePlan`.
 * @param t - From year 1700 to 2200.
 * @returns Metres above the datum of the constants.
 * @throws InputError of `toInstant`.
 * @example
 * heightAt(makePlan(constants), '2031-06-01T00:00Z') > 0; // true
 * @public
 */
export function heightAt(plan: TidePlan, t: InstantLike): number {
  const instant = toInstant(t, 't');
  const cursor = makeCursor(plan);
  const point = new Float64Array(3);
  cursor.readInto(point, cursor.pieceAt(instant), instant);
  return point[0] as number;
}

/**
 * Rate of rise at an instant.
 *
 * @param plan - Of `makePlan`.
 * @param t - From year 1700 to 2200.
 * @returns Metres per hour.
 * @throws InputError of `toInstant`.
 * @example
 * Math.abs(rateAt(makePlan(constants), '2031-06-01T00:00Z')) < 1; // true
 * @public
 */
export function rateAt(plan: TidePlan, t: InstantLike): number {
  const instant = toInstant(t, 't');
  const cursor = makeCursor(plan);
  const point = new Float64Array(3);
  cursor.readInto(point, cursor.pieceAt(instant), instant);
  return (point[1] as number) * HOUR;
}

/** Heights on any grid into a buffer. */
function heightsInto(out: Float64Array, plan: TidePlan, grid: TimeGrid): void {
  synthesizeInto(out, plan.basis, plan.coefficients, grid);
  if (plan.ratePerMs === 0 && plan.steps.length === 0) return;
  const level = plan.coefficients[0] as number;
  for (let i = 0; i < gridCount(grid); i++) {
    const t = grid.times ? (grid.times[i] as number) : grid.start + i * grid.step;
    out[i] = (out[i] as number) + levelAt(plan, t + plan.basis.delay) - level;
  }
}

/**
 * Heights at a uniform step.
 *
 * @param plan - Of `makePlan`.
 * @param grid - `start`, `step` in milliseconds (1000 or more), `count` of heights.
 * @returns A uniform series in metres, without gaps.
 * @throws InputError of `toInstant`, `STEP_TOO_SHORT`, `OUT_OF_RANGE` path `count`.
 * @example
 * heightsOnGrid(makePlan(constants), { start: '2031-06-01T00:00Z', step: 6 * MINUTE, count: 240 }).values.length; // 240
 * @public
 */
export function heightsOnGrid(
  plan: TidePlan,
  grid: { readonly start: InstantLike; readonly step: number; readonly count: number },
): UniformSeries {
  const start = toInstant(grid.start, 'start');
  const step = toStep(grid.step);
  const { count } = grid;
  if (!Number.isInteger(count) || count < 0 || count > LARGEST_COUNT) {
    throw new InputError(
      'OUT_OF_RANGE',
      'count',
      `expected a whole number from 0 to ${LARGEST_COUNT}, got ${describe(count)}`,
    );
  }
  if (count > 0) toInstant(start + step * (count - 1), 'start + step * (count - 1)');
  const values = new Float64Array(count);
  heightsInto(values, plan, { start, step, count });
  return { start, step, values };
}

/**
 * Heights at any instants, in any order.
 *
 * @param plan - Of `makePlan`.
 * @param times - Instants.
 * @returns Metres, one a time.
 * @throws InputError of `toInstant`, path `times[i]`.
 * @example
 * heightsAtTimes(makePlan(constants), ['2031-06-01T00:00Z']).length; // 1
 * @public
 */
export function heightsAtTimes(
  plan: TidePlan,
  times: ArrayLike<number> | readonly InstantLike[],
): Float64Array {
  const instants: Float64Array = toTimes(times);
  const out = new Float64Array(instants.length);
  heightsInto(out, plan, { times: instants });
  return out;
}

/** Height at an instant that is known to be one. */
export function heightWithin(plan: TidePlan): (t: Instant) => number {
  const cursor = makeCursor(plan);
  const point = new Float64Array(3);
  return (t) => {
    cursor.readInto(point, cursor.pieceAt(t), t);
    return point[0] as number;
  };
}
