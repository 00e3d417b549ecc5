/**
 * Comparing with check values: scalars, angles, arrays of either. Each gives the differences it saw, for the record.
 * @module
 */
import { angleDifference } from '@staithe/core';
import { expect } from 'vitest';
import type { Tolerance } from './vector.js';

/** The differences seen in a comparison. @public */
export interface Differences {
  /** Number of values compared. */
  readonly cases: number;
  /** Largest absolute difference. */
  readonly worst: number;
  /** Root mean square of the differences. */
  readonly typical: number;
}

type Values = number | ArrayLike<number>;

const SHOWN = 5;

function toArray(values: Values): ArrayLike<number> {
  return typeof values === 'number' ? [values] : values;
}

function compare(
  actual: Values,
  expected: Values,
  difference: (a: number, e: number) => number,
  allowed: (e: number) => number,
  label: string,
): Differences {
  const a = toArray(actual);
  const e = toArray(expected);
  expect(a.length, `${label}: number of values`).toBe(e.length);
  expect(e.length, `${label}: number of values`).toBeGreaterThan(0);
  const misses: string[] = [];
  let worst = 0;
  let sum = 0;
  let cases = 0;
  for (let i = 0; i < e.length; i++) {
    const got = a[i] as number;
    const wanted = e[i] as number;
    if (Number.isNaN(wanted) && Number.isNaN(got)) continue;
    const off = Math.abs(difference(got, wanted));
    cases++;
    sum += off * off;
    // Asked this way round so that NaN on one side alone is a miss.
    if (!(off <= allowed(wanted))) {
      misses.push(
        `[${i}] expected ${wanted} within ${allowed(wanted)}, got ${got} (off by ${off})`,
      );
    }
    if (!(off <= worst)) worst = off;
  }
  const rest = misses.length - SHOWN;
  const shown = misses.slice(0, SHOWN);
  if (rest > 0) shown.push(`and ${rest} more of ${e.length}`);
  expect(shown, label).toEqual([]);
  return { cases, worst, typical: cases > 0 ? Math.sqrt(sum / cases) : 0 };
}

/**
 * Expects numbers within a tolerance. NaN (a gap) fits NaN alone.
 *
 * @param actual - A number, or numbers.
 * @param expected - As many.
 * @param tolerance - `abs` in the unit of the values, `rel` as a share of the expected one; the wider holds.
 * @param label - Shown when it fails.
 * @returns The differences seen.
 * @public
 */
export function expectWithin(
  actual: Values,
  expected: Values,
  tolerance: Tolerance,
  label: string = 'value',
): Differences {
  const { abs = 0, rel = 0 } = tolerance;
  return compare(
    actual,
    expected,
    (a, e) => a - e,
    (e) => Math.max(abs, rel * Math.abs(e)),
    label,
  );
}

/**
 * Expects angles within a tolerance, the short way round.
 *
 * @param actual - Degrees, one or many.
 * @param expected - Degrees, as many.
 * @param tolerance - `abs` in degrees.
 * @param label - Shown when it fails.
 * @returns The differences seen, degrees.
 * @public
 */
export function expectAngleWithin(
  actual: Values,
  expected: Values,
  tolerance: { readonly abs: number },
  label: string = 'angle',
): Differences {
  return compare(
    actual,
    expected,
    (a, e) => angleDifference(e, a),
    () => tolerance.abs,
    label,
  );
}

/**
 * The differences of several comparisons as those of one.
 *
 * @param parts - What the matchers returned, one or more.
 * @returns All cases, the worst of them, the root mean square over all.
 * @public
 */
export function mergeDifferences(parts: readonly Differences[]): Differences {
  const cases = parts.reduce((sum, part) => sum + part.cases, 0);
  const squares = parts.reduce((sum, part) => sum + part.cases * part.typical * part.typical, 0);
  return {
    cases,
    worst: Math.max(0, ...parts.map((part) => part.worst)),
    typical: cases > 0 ? Math.sqrt(squares / cases) : 0,
  };
}
