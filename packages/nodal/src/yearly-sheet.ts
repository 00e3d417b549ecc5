/**
 * A yearly sheet of f and u: what printed tables hold, for comparison with them.
 * @module
 */
import { lunisolarLongitudesInto } from '@staithe/arguments';
import { type ConstituentName, constituent } from '@staithe/constituents';
import {
  type Degrees,
  HOUR,
  type Instant,
  type NodalModel,
  radiansToDegrees,
  refuse,
} from '@staithe/core';
import { atan2 } from '@staithe/core/trig';
import { nodalPhasorsInto, nodalPlan } from './nodal-plan.js';

/** f and u at an instant. @public */
export interface NodalPoint {
  readonly time: Instant;
  readonly f: number;
  /** Degrees, (−180, 180]. */
  readonly u: Degrees;
}

/** One constituent of a sheet. @public */
export interface YearlySheetRow {
  readonly name: string;
  /** At the middle of each month, twelve. */
  readonly months: readonly NodalPoint[];
  /** At 2 July 12:00, where official yearly tables hold it. */
  readonly middle: NodalPoint;
  /** The months in which f is lowest and highest. */
  readonly lowest: NodalPoint;
  readonly highest: NodalPoint;
}

/** Options of {@link yearlySheet}. @public */
export interface YearlySheetOptions {
  /** Default: those that official tables of f and u list. */
  readonly constituents?: readonly ConstituentName[] | undefined;
  /** Default `potential`. */
  readonly model?: NodalModel | undefined;
  /** Degrees north: lets the lines of degree 3 in. */
  readonly latitude?: Degrees | undefined;
}

const USUAL = 'Mm Mf O1 K1 J1 OO1 M1 M2 N2 L2 K2 M3 M4 MK3';
const [FIRST, LAST] = [1700, 2200];

/**
 * f and u through a year.
 *
 * @param year - From 1700 to 2200, UTC.
 * @param options - Constituents, model, latitude.
 * @returns A row a constituent.
 * @throws InputError `OUT_OF_RANGE`, path `year`; those of `constituent` and `nodalPlan`.
 * @example
 * yearlySheet(1984, { model: 'schureman1940' }).find(({ name }) => name === 'M2')?.middle.f.toFixed(3); // '0.984'
 * @public
 */
export function yearlySheet(year: number, options: YearlySheetOptions = {}): YearlySheetRow[] {
  if (!Number.isInteger(year) || year < FIRST || year > LAST) {
    refuse('OUT_OF_RANGE', 'year', `a whole year from ${FIRST} to ${LAST}`, year);
  }
  const model = options.model ?? 'potential';
  const list = (options.constituents ?? USUAL.split(' ')).map((name) => constituent(name));
  const plan = nodalPlan(list, model, options.latitude);
  const six = new Float64Array(6);
  const phasors = new Float64Array(2 * list.length);
  const pointsAt = (time: Instant): NodalPoint[] => {
    const longitudes = model === 'schureman1940' ? 'schureman1940' : 'iers2010';
    lunisolarLongitudesInto(time, longitudes, six);
    nodalPhasorsInto(plan, six[3] as number, six[4] as number, phasors);
    return list.map((_, j) => {
      const [re, im] = [phasors[2 * j] as number, phasors[2 * j + 1] as number];
      return { time, f: Math.sqrt(re * re + im * im), u: radiansToDegrees(atan2(im, re)) };
    });
  };
  const months = Array.from({ length: 12 }, (_, m) => {
    return pointsAt((Date.UTC(year, m, 1) + Date.UTC(year, m + 1, 1)) / 2);
  });
  const middle = pointsAt(Date.UTC(year, 6, 2) + 12 * HOUR);
  return list.map(({ name }, j) => {
    const row = months.map((points) => points[j] as NodalPoint);
    return {
      name,
      months: row,
      middle: middle[j] as NodalPoint,
      lowest: row.reduce((a, b) => (b.f < a.f ? b : a)),
      highest: row.reduce((a, b) => (b.f > a.f ? b : a)),
    };
  });
}
