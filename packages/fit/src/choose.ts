/**
 * Which constituents a record can hold: those a full turn (360°) apart within it, the larger of a pair first.
 *
 * Rayleigh's criterion with 3 % leave, so that a record of 365 days holds the annual neighbours (365.24 days).
 * @module
 */
import {
  type Constituent,
  constituent,
  listConstituents,
  potentialLines,
} from '@staithe/constituents';
import { isStaitheError, type NodalModel } from '@staithe/core';
import { nodalPlan } from '@staithe/nodal';
import type { Candidate } from './types.js';

const LEAVE = 0.97;
const CENTURY = 36525; // days
const SMALLEST = 2e-3; // m in the potential: below this a line is not proposed by itself
// Expected sizes where the potential says little, metres in its scale: seasonal and daily weather, shallow water.
const WEATHER_SIZE = 0.012;
const WEATHER = ['Sa', 'Ssa', 'S1'];
const SHALLOW_SIZE = 1e-3;
// Lines within the group of a constituent that is proposed: M1 and L2 stand for them too.
const VARIANTS = ['M1B', 'M1C', 'L2B'];
// Shallow-water terms proposed by themselves, in the order of their usual size (common practice).
const SHALLOW = 'M4 MS4 MN4 M6 2MS6 MK3 2MK3 M8 S4 S6 2SM2 MSN2 SO3 SK3 MK4 2MN6 2SM6 3MS8';

/** A constituent with the size it is expected to have, metres in the scale of the potential. */
export interface Expected {
  readonly of: Constituent;
  readonly size: number;
}

/** Candidates of `resolvable`, largest first. */
export function candidatesFor(nodalModel: NodalModel): { expected: Expected[]; left: Candidate[] } {
  const lines = potentialLines();
  const left: Candidate[] = [];
  const expected: Expected[] = [];
  for (const of of listConstituents()) {
    if (of.kind === 'compound') continue;
    const key = of.doodsonNumbers.join();
    const line = lines.find(
      ({ degree, doodsonNumbers }) =>
        doodsonNumbers.join() === key && degree === (of.species > 2 ? 3 : 2),
    );
    const size = Math.max(
      Math.abs(line?.amplitude ?? 0),
      WEATHER.includes(of.name) ? WEATHER_SIZE : 0,
    );
    if (size < SMALLEST || VARIANTS.includes(of.name)) continue;
    try {
      nodalPlan([of], nodalModel);
      expected.push({ of, size });
    } catch (error) {
      if (!isStaitheError(error, 'NO_NODAL_FORMULA')) throw error;
      left.push({ name: of.name, decision: 'left', reason: `no nodal formula in ${nodalModel}` });
    }
  }
  SHALLOW.split(' ').forEach((name, i) => {
    expected.push({ of: constituent(name), size: SHALLOW_SIZE / (1 + i) });
  });
  return { expected: expected.sort((a, b) => b.size - a.size), left };
}

/** Days that tell two speeds apart by a full turn; the mean level has speed 0. */
export function separationDays(a: number, b: number): number {
  const apart = Math.abs(a - b);
  return apart < 1e-9 ? Infinity : 360 / apart / 24;
}

/** Takes the candidates that stand apart from all larger ones, and says why the others are left. */
export function takeResolvable(
  expected: readonly Expected[],
  days: number,
  stepHours: number | undefined,
  fixed: readonly Constituent[],
): { taken: Constituent[]; candidates: Candidate[] } {
  const taken: Constituent[] = [...fixed];
  const candidates: Candidate[] = fixed.map(({ name }) => ({
    name,
    decision: 'taken',
    reason: 'parent of a borrowed constituent',
  }));
  for (const { of } of expected) {
    const { name, speed } = of;
    if (taken.some((other) => other.name === name)) continue;
    if (stepHours !== undefined && speed * stepHours >= 180) {
      const reason = `turns ${(speed * stepHours).toFixed(0)}° between samples; 180° is the most that they can show`;
      candidates.push({ name, decision: 'left', reason });
      continue;
    }
    const rivals = [{ name: 'mean level', speed: 0 }, ...taken];
    const rival = rivals.reduce((near, other) =>
      Math.abs(other.speed - speed) < Math.abs(near.speed - speed) ? other : near,
    );
    const needed = separationDays(speed, rival.speed);
    if (days >= LEAVE * needed) {
      taken.push(of);
      candidates.push({
        name,
        decision: 'taken',
        reason: `${(days / needed).toFixed(2)} turns apart from ${rival.name}`,
        separationDays: needed,
      });
      continue;
    }
    if (needed > CENTURY) {
      const words = needed === Infinity ? 'same speed as' : 'no record is long enough beside';
      candidates.push({
        name,
        decision: 'left',
        reason: `${words} ${rival.name}`,
        beside: rival.name,
      });
      continue;
    }
    candidates.push({
      name,
      decision: 'left',
      reason: `record too short beside ${rival.name} by ${(needed - days).toFixed(1)} days`,
      beside: rival.name,
      separationDays: needed,
    });
  }
  return { taken, candidates };
}
