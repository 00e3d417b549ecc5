/**
 * The currents that tables and pictures show: checked, grouped by species, with the words for mean, axis and turn.
 * @module
 */
import {
  type CurrentConstants,
  degreesToRadians,
  describe,
  InputError,
  radiansToDegrees,
  wrapDegrees,
} from '@staithe/core';
import type { CurrentEllipse, FitDiagnostics, FittedEllipse, PrincipalAxis } from '@staithe/fit';
import { format } from 'd3-format';
import { groupLines, type Line, type SpeciesGroup } from './species.js';

/** One constituent of a current as it is shown: of `fitCurrents`, or of `ellipseOf` with a name. @public */
export type ShownEllipse = CurrentEllipse &
  Pick<FittedEllipse, 'name' | 'borrowedFrom'> &
  Partial<Pick<FittedEllipse, 'standing'>>;

/** Currents as they are shown: what `fitCurrents` gives, or as much of it as there is. @public */
export interface ShownCurrents {
  /** Place and mean; with `uncertainty` the error of the mean. */
  readonly constants: Pick<CurrentConstants, 'mean' | 'place' | 'uncertainty'>;
  readonly ellipses: readonly ShownEllipse[];
  readonly principalAxis?: PrincipalAxis | undefined;
  /** For what was left out. */
  readonly diagnostics?: Pick<FitDiagnostics, 'candidates'> | undefined;
}

const CHI_SQUARED_2 = 5.991464547107979; // two degrees of freedom at 95 %: −2·ln 0.05
const NORMAL_95 = 1.959963984540054; // a normal variable stays within so many sigmas in 95 of 100

function check(value: number, path: string, least: number): void {
  if (!Number.isFinite(value)) {
    throw new InputError('NOT_FINITE', path, `expected a finite number, got ${describe(value)}`);
  }
  if (value >= least) return;
  const text = `expected metres per second, 0 or more, got ${describe(value)}`;
  throw new InputError('OUT_OF_RANGE', path, text);
}

/** Checks the numbers that are drawn, and groups the ellipses by species, the longest first. */
export function groupCurrents({
  constants,
  ellipses,
  principalAxis,
}: ShownCurrents): SpeciesGroup<ShownEllipse>[] {
  for (const side of ['east', 'north'] as const) {
    check(constants.mean[side], `constants.mean.${side}`, -Infinity);
  }
  if (principalAxis) check(principalAxis.bearing, 'principalAxis.bearing', -Infinity);
  ellipses.forEach((own, i) => {
    for (const key of ['major', 'minor', 'radius95'] as const) {
      const value = own[key];
      if (value !== undefined) check(value, `ellipses[${i}].${key}`, 0);
    }
    for (const key of ['bearing', 'phaseLag'] as const) {
      check(own[key], `ellipses[${i}].${key}`, -Infinity);
    }
  });
  return groupLines(ellipses, ({ major }) => major);
}

export const isFaint = ({ own }: Line<ShownEllipse>): boolean => own.standing === 'faint';

/** `left`, `right`, or `either` where the least speed is within its error, so that the sense is not known. */
export function turnOf({ turning, minor, minorSigma = 0 }: ShownEllipse): string {
  return minor > 0 && minor >= NORMAL_95 * minorSigma ? turning : 'either';
}

/** Speed in cm/s; below 0.1 a second decimal still says something. */
export function speedText(speed: number | undefined): string {
  if (speed === undefined) return '–';
  return format(speed > 0 && speed < 0.000995 ? '.2f' : '.1f')(speed * 100);
}

/** The mean current. */
export interface Mean {
  readonly speed: number;
  /** Degrees clockwise from north. */
  readonly bearing: number;
  /** Radius of the 95 % disc, metres per second. */
  readonly radius95?: number;
}

/** Largest variance in any direction of the two components of the mean. */
function meanVariance({ uncertainty }: ShownCurrents['constants']): number | undefined {
  const { order = [], covariance = [] } = uncertainty ?? {};
  const [e, n] = [order.indexOf('mean.east'), order.indexOf('mean.north')];
  if (e < 0 || n < 0) return undefined;
  const entry = (i: number, j: number): number =>
    covariance[(Math.max(i, j) * (Math.max(i, j) + 1)) / 2 + Math.min(i, j)] as number;
  const [a, b, c] = [entry(e, e), entry(n, n), entry(e, n)];
  return (a + b) / 2 + Math.sqrt(((a - b) / 2) ** 2 + c * c);
}

export function meanOf(constants: ShownCurrents['constants']): Mean {
  const { east, north } = constants.mean;
  const variance = meanVariance(constants);
  return {
    speed: Math.hypot(east, north),
    bearing: wrapDegrees(radiansToDegrees(Math.atan2(east, north))),
    ...(variance === undefined ? {} : { radius95: Math.sqrt(CHI_SQUARED_2 * variance) }),
  };
}

/** Whole degrees in [0, 360). */
const wholeDegrees = (angle: number): string => format('d')(wrapDegrees(Math.round(angle)));

/** `12.3 cm/s towards 217°`, and its error where that is known. */
export function meanText({ speed, bearing, radius95 }: Mean): string {
  const text = `${speedText(speed)} cm/s towards ${wholeDegrees(bearing)}°`;
  if (radius95 === undefined) return text;
  const disc = `95 % disc of ${speedText(radius95)}`;
  return speed > radius95 ? `${text}, ${disc}` : `${text}, within its ${disc}`;
}

/** `47° and 227°, 93 % of what varies`. */
export function axisText({ bearing, share }: PrincipalAxis): string {
  const both = `${wholeDegrees(bearing)}° and ${wholeDegrees(bearing + 180)}°`;
  return `${both}, ${format('.0f')(share * 100)} % of what varies`;
}

/** A point east and north as a picture has it: x to the right, y down. */
export function towards(length: number, bearing: number): [x: number, y: number] {
  const angle = degreesToRadians(bearing);
  return [length * Math.sin(angle), -length * Math.cos(angle)];
}

/** Where the tip of the arrow is at θ = V + u, degrees; north up. */
export function pointAt(
  { major, minor, turning, bearing, phaseLag }: ShownEllipse,
  theta: number,
): [x: number, y: number] {
  const angle = degreesToRadians(theta - phaseLag);
  const [x, y] = towards(major * Math.cos(angle), bearing);
  // A quarter turn later the tip is to the left of the axis, or to its right.
  const [across, down] = towards(
    minor * Math.sin(angle),
    turning === 'left' ? bearing - 90 : bearing + 90,
  );
  return [x + across, y + down];
}
