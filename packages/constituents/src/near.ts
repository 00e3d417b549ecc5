/**
 * Constituents by speed, and how long a record tells two of them apart.
 * @module
 */
import { HOUR, refuse } from '@staithe/core';
import {
  type Constituent,
  type ConstituentName,
  constituent,
  listConstituents,
} from './constituent.js';

function speedOf(of: Constituent | ConstituentName): number {
  return typeof of === 'string' ? constituent(of).speed : of.speed;
}

/**
 * The listed constituents nearest to a speed: what a label means that two lists use differently.
 *
 * @param speed - Degrees per mean solar hour, 0 or more.
 * @param within - Degrees per hour on either side. Default 0.0005.
 * @returns Nearest first; lines of the potential before compounds of the same speed.
 * @throws InputError `OUT_OF_RANGE` or `NOT_FINITE`, path `speed`.
 * @example
 * constituentsNear(14.9178647)[0]?.name; // 'PI1'
 * @public
 */
export function constituentsNear(speed: number, within: number = 0.0005): readonly Constituent[] {
  if (!(speed >= 0 && speed < Infinity)) {
    refuse(
      Number.isFinite(speed) ? 'OUT_OF_RANGE' : 'NOT_FINITE',
      'speed',
      '0 degrees an hour or more',
      speed,
    );
  }
  const away = (of: Constituent): number => Math.round(Math.abs(of.speed - speed) * 1e7);
  return listConstituents()
    .filter((of) => Math.abs(of.speed - speed) <= within)
    .sort((a, b) => away(a) - away(b));
}

/**
 * The time in which two constituents part by a full turn (Rayleigh): the length of record that tells them apart.
 *
 * @param a - A constituent or its name.
 * @param b - Another.
 * @returns Milliseconds; Infinity where their speeds are the same.
 * @throws InputError of `constituent`.
 * @example
 * Math.round(separationTime('M2', 'S2') / 8640000) / 10; // 14.8
 * @public
 */
export function separationTime(
  a: Constituent | ConstituentName,
  b: Constituent | ConstituentName,
): number {
  const apart = Math.abs(speedOf(a) - speedOf(b));
  return apart < 1e-9 ? Infinity : (360 / apart) * HOUR;
}

/**
 * The listed lines of the potential in groups that a record of this length cannot tell apart within.
 *
 * @param duration - Milliseconds above 0.
 * @returns Groups in order of speed; each a list in order of speed.
 * @throws InputError `OUT_OF_RANGE` or `NOT_FINITE`, path `duration`.
 * @example
 * const names = groupsResolvableIn(60 * DAY).map((group) => group.map(({ name }) => name).join(' '));
 * names.includes('T2 S2 R2 K2'); // true
 * @public
 */
export function groupsResolvableIn(duration: number): readonly (readonly Constituent[])[] {
  if (!(duration > 0 && duration < Infinity)) {
    refuse(
      Number.isFinite(duration) ? 'OUT_OF_RANGE' : 'NOT_FINITE',
      'duration',
      'milliseconds above 0',
      duration,
    );
  }
  const lines = listConstituents()
    .filter(({ kind }) => kind !== 'compound')
    .sort((a, b) => a.speed - b.speed);
  const out: Constituent[][] = [];
  for (const line of lines) {
    const last = out[out.length - 1];
    const before = last?.[last.length - 1];
    if (last && before && separationTime(before, line) > duration) last.push(line);
    else out.push([line]);
  }
  return out;
}
