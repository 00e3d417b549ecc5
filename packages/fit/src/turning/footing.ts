/**
 * What the rows of a turn stand on, and the rows.
 *
 * A height holds at the true time of its high or low water, which is not known; the fitted curve's own turning point is
 * the best guess of it. Both rows are taken there, t − x for a time t that is x late: h = height, and h′ = −h″·x, so that
 * the curve turns at t. At the times as they are written, errors would flatten the curve (errors in variables): on crests
 * of M6 without bound.
 * @module
 */
import { HOUR, type Metres, SECOND } from '@staithe/core';
import { usualStep } from '../cadence.js';
import type { Rows } from '../rows.js';
import { guessCurvature } from './curvature.js';
import type { ReadPoints } from './read.js';

/** Standard errors of one height and of one time. */
export interface Sigmas {
  readonly height: Metres;
  /** Milliseconds. */
  readonly time: number;
}

/** Those that the caller states. */
export type StatedSigmas = { readonly [K in keyof Sigmas]?: Sigmas[K] | undefined };

/** What the rows stand on. */
export interface Footing {
  /** Of the curve at each point, m/h². */
  readonly curvature: Float64Array;
  /** By how much each time is late, milliseconds. */
  readonly late: Float64Array;
  /** 1 where the curve has no turning point near: the time counts for nothing, the height where it was read. */
  readonly astray: Float64Array;
  readonly sigmas: Sigmas;
}

// What is written is rounded: residuals that show less are chance.
export const LEAST_HEIGHT = 1e-3; // m
export const LEAST_TIME: number = SECOND;
const USUAL_SHARE = 20; // of the range, for a height

/** How far a time can be off, milliseconds: beyond a quarter of the usual time between points it belongs to no turn. */
export function furthestOf({ record: { times } }: ReadPoints): number {
  return usualStep(times) / 4;
}

/** Before any fit: the times are right to an eighth of the usual time between points, the heights to a twentieth of the usual range. */
export function firstFooting(points: ReadPoints, stated: StatedSigmas): Footing {
  const { values } = points.record;
  const ranges = values
    .slice(1)
    .map((value, i) => Math.abs(value - (values[i] as number)))
    .filter((range) => range > 0)
    .sort();
  const usual = (ranges[ranges.length >> 1] ?? 1) / USUAL_SHARE;
  return {
    curvature: guessCurvature(points),
    late: new Float64Array(values.length),
    astray: new Float64Array(values.length),
    sigmas: {
      height: stated.height ?? Math.max(LEAST_HEIGHT, usual),
      time: stated.time ?? furthestOf(points) / 2,
    },
  };
}

/**
 * Rows of heights, weight 1, and rows of slopes, weighed against them; the caller's weights on both.
 *
 * @param points - Of `readPoints`.
 * @param given - Covariates: they move the heights, and their slopes count as an error of the times.
 * @param footing - What the rows stand on.
 */
export function rowsOn(
  { record, level }: ReadPoints,
  given: readonly Float64Array[],
  { curvature, late, astray, sigmas }: Footing,
): readonly [Rows, Rows] {
  const { values, weights } = record;
  const times = record.times.map((t, i) => t - (late[i] as number));
  const still = new Float64Array(times.length);
  return [
    { times, step: 0, sides: [values], weights, given },
    {
      times,
      step: 0,
      sides: [
        level.map((zero, i) => zero - ((curvature[i] as number) * (late[i] as number)) / HOUR),
      ],
      weights: curvature.map((c, i) => {
        const ratio = (sigmas.height * HOUR) / (c * sigmas.time);
        return astray[i] ? 0 : ratio * ratio * (weights?.[i] ?? 1);
      }),
      given: given.map(() => still),
      slope: true,
    },
  ];
}
