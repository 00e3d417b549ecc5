/**
 * What the chapters share: polynomials, sums of periodic terms, sine and cosine of degrees, the two times.
 *
 * Source of all numbers in this folder: J. Meeus, Astronomical Algorithms, 2nd ed. (1998), transcribed from memory;
 * checked against his worked examples and against an independent library (test/sky*). Here: E, eq. 47.6.
 * @module
 */
import { DAY, type Degrees, degreesToRadians, type Instant } from '@staithe/core';
import { sinCosInto } from '@staithe/core/trig';
import { deltaTAt } from '../delta-t.js';

/** 2000-01-01T12:00. */
const J2000_MS = 946728000000;
/** Days in a Julian century. */
export const CENTURY = 36525;

/** Days of UT from J2000.0. */
export function daysAt(instant: Instant): number {
  return (instant - J2000_MS) / DAY;
}

/** Julian centuries TT from J2000.0. */
export function centuriesAt(instant: Instant): number {
  return daysAt(instant + deltaTAt(instant)[0] * 1000) / CENTURY;
}

/** The instant of UT, in whole milliseconds, of Julian centuries TT. */
export function instantOf(t: number): Instant {
  const terrestrial = t * CENTURY * DAY + J2000_MS;
  // Asked for a minute or so late, ΔT is off by less than 0.1 ms.
  return Math.round(terrestrial - deltaTAt(terrestrial)[0] * 1000);
}

/** c₀ + c₁x + c₂x² … */
export function polynomial(coefficients: readonly number[], x: number): number {
  return coefficients.reduceRight((sum, coefficient) => sum * x + coefficient);
}

/** Sine and cosine of degrees. */
export function sinCos(angle: Degrees): readonly [sine: number, cosine: number] {
  const pair = new Float64Array(2);
  sinCosInto(degreesToRadians(angle), pair);
  return pair as unknown as readonly [number, number];
}

/** A table by columns: first the multipliers, one column an angle, then the coefficients. */
export type Columns = readonly (readonly number[])[];

/** Reads a table written as text, a column a line. */
export function table(text: string): Columns {
  return text.split('\n').map((line) => line.split(' ').map(Number));
}

/**
 * Sums the terms of a table.
 *
 * @param columns - The table.
 * @param angles - Degrees. The second is the Sun's mean anomaly, where there is one.
 * @param t - Julian centuries TT, where there is an anomaly: as the Earth's orbit grows rounder, a term that has it n
 * times wanes by Eⁿ.
 * @param ofSine - Which coefficient goes with the sine.
 * @param ofCosine - Which with the cosine.
 * @returns Σ coefficient · sine, and Σ coefficient · cosine.
 */
export function periodic(
  columns: Columns,
  angles: readonly Degrees[],
  t: number = 0,
  ofSine: number = 0,
  ofCosine: number = ofSine,
): readonly [sines: number, cosines: number] {
  const sums: [number, number] = [0, 0];
  columns[0]?.forEach((_, term) => {
    const at = (column: number): number => (columns[column] as readonly number[])[term] as number;
    const pair = sinCos(angles.reduce((sum, angle, column) => sum + angle * at(column), 0));
    // Eⁿ with E = 1 − 0.002516 t, to the first order.
    const weight = 1 - 0.002516 * t * Math.abs(at(1));
    sums[0] += weight * pair[0] * at(angles.length + ofSine);
    sums[1] += weight * pair[1] * at(angles.length + ofCosine);
  });
  return sums;
}
