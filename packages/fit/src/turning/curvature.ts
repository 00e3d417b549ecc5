/**
 * How sharply the curve turns at each point, m/h²: an hour by which a time is off makes a slope of that size.
 * @module
 */
import { HOUR, MINUTE, type Progress } from '@staithe/core';
import type { Design } from '../design.js';
import { residualsOf } from '../normal.js';
import type { Rows } from '../rows.js';
import type { ReadPoints } from './read.js';

const APART = MINUTE; // either way: right to 1e-5 for M2, 1e-4 for M6
const FLAT = 0.1; // of the median: flatter, the next derivative turns the slope as much within a few minutes
const M2 = 0.5058; // radians an hour

/** The middle one of positive numbers; undefined where there is none. */
function middle(sizes: Float64Array): number | undefined {
  const sorted = sizes.filter((size) => size > 0).sort();
  return sorted[sorted.length >> 1];
}

/** A curvature as weights can take it: at a stand no time is as sharp as the slope would have it. */
function sober(curvature: Float64Array): Float64Array {
  const least = FLAT * (middle(curvature.map((c) => Math.abs(c))) ?? 1);
  return curvature.map((c) => (Math.abs(c) >= least ? c : c < 0 ? -least : least));
}

/**
 * Its size before any fit: between neighbours the tide is taken for half a cosine, which turns with (range/2)·(π/Δt)². The
 * mean of both sides.
 */
export function guessCurvature({ record: { times, values } }: ReadPoints): Float64Array {
  const beside = (i: number, j: number): number => {
    const turn = (Math.PI * HOUR) / ((times[j] as number) - (times[i] as number));
    return (Math.abs((values[j] as number) - (values[i] as number)) / 2) * turn * turn;
  };
  const guess = times.map((_, i) => {
    const sides = [beside(i - 1, i), beside(i, i + 1)].filter((size) => size >= 0);
    return sides.reduce((sum, size) => sum + size, 0) / sides.length;
  });
  const heights = values.filter((value) => !Number.isNaN(value)).sort();
  const range = (heights[heights.length - 1] as number) - (heights[0] as number);
  const usual = middle(guess) ?? (range / 2) * M2 * M2;
  return sober(guess.map((size) => (size >= 0 ? size : usual)));
}

/** Slope of a fitted curve at some times, m/h, and its curvature, above 0 at low waters. */
export interface Bend {
  readonly slope: Float64Array;
  readonly curvature: Float64Array;
}

/** Both from the slopes a minute before and after. */
export function* bendAt(
  design: Design,
  slopes: Rows,
  times: Float64Array,
  solution: Float64Array,
): Generator<Progress, Bend, void> {
  const zeros = [new Float64Array(times.length)];
  const at = function* (shift: number): Generator<Progress, Float64Array, void> {
    const rows = {
      ...slopes,
      times: times.map((t) => t + shift),
      sides: zeros,
      weights: undefined,
    };
    return (yield* residualsOf(design, rows, [solution])).residuals[0] as Float64Array;
  };
  // What is left of 0 is the slope with the other sign.
  const before = yield* at(-APART);
  const after = yield* at(APART);
  return {
    slope: before.map((left, i) => -(left + (after[i] as number)) / 2),
    curvature: sober(before.map((left, i) => (left - (after[i] as number)) / ((2 * APART) / HOUR))),
  };
}
