/**
 * Which constituents a record can hold: those a full turn (360°) apart within it, the larger of a pair first.
 *
 * Rayleigh's criterion with 3 % leave, so that a record of 365 days holds the annual neighbours (365.24 days). Speeds are
 * those at which the constituents show themselves at the record's step (cadence.ts): seen each 9.9156 days, M2 turns once
 * in 62 days.
 * @module
 */
import {
  type Constituent,
  constituent,
  listConstituents,
  potentialLines,
} from '@staithe/constituents';
import { HOUR, isStaitheError, type NodalModel } from '@staithe/core';
import { nodalPlan } from '@staithe/nodal';
import { shownSpeed } from './cadence.js';
import type { RecordSummary } from './record.js';
import type { Candidate } from './types.js';

const LEAVE = 0.97;
const CENTURY = 36525; // days
const SMALLEST = 2e-3; // m in the potential: below this a line is not proposed by itself
// Expected sizes where the potential says little, metres in its scale: seasonal and daily weather, shallow water.
const WEATHER_SIZE = 0.012;
const WEATHER = ['Sa', 'Ssa', 'S1'];
const SHALLOW_SIZE = 1e-3;
// What the seasons do to M2 is its noise in a short record: its annual side-bands are taken by themselves from here on.
const SEASONAL = ['H1', 'H2'];
const SEASONS = 3 * 365; // days
// Lines within the group of a constituent that is proposed: M1 and L2 stand for them too.
const VARIANTS = ['M1B', 'M1C', 'L2B'];
// Shallow-water terms proposed by themselves, in the order of their usual size (common practice).
const SHALLOW = 'M4 MS4 MN4 M6 2MS6 MK3 2MK3 M8 S4 S6 2SM2 MSN2 SO3 SK3 MK4 2MN6 2SM6 3MS8';

/** A constituent with the size it is expected to have, metres in the scale of the potential. */
export interface Expected {
  readonly of: Constituent;
  readonly size: number;
  /** Whether the size is that of a line of the potential. */
  readonly fromPotential: boolean;
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
    const isSeasonal = SEASONAL.includes(of.name);
    if ((size < SMALLEST && !isSeasonal) || VARIANTS.includes(of.name)) continue;
    try {
      nodalPlan([of], nodalModel);
      expected.push({ of, size, fromPotential: !WEATHER.includes(of.name) });
    } catch (error) {
      if (!isStaitheError(error, 'NO_NODAL_FORMULA')) throw error;
      left.push({ name: of.name, decision: 'left', reason: `no nodal formula in ${nodalModel}` });
    }
  }
  SHALLOW.split(' ').forEach((name, i) => {
    expected.push({ of: constituent(name), size: SHALLOW_SIZE / (1 + i), fromPotential: false });
  });
  return { expected: expected.sort((a, b) => b.size - a.size), left };
}

/** Days that tell two speeds apart by a full turn; the mean level has speed 0. */
export function separationDays(a: number, b: number): number {
  const apart = Math.abs(a - b);
  return apart < 1e-9 ? Infinity : 360 / apart / 24;
}

/** A constituent beside which others must part, with the speed at which it shows itself. */
interface Rival {
  readonly name: string;
  readonly shown: number;
}

/** How a constituent shows itself where the sampling folds it, in words. */
function aliasWords(of: Constituent, shown: number): string {
  if (shown === of.speed) return '';
  return shown > 0
    ? `, seen once in ${(360 / shown / 24).toFixed(1)} days`
    : ', stands still at this step';
}

/** Why a candidate is left, or how far it stands apart. */
function judge(of: Constituent, rivals: readonly Rival[], record: RecordSummary): Candidate {
  const { name } = of;
  const { days, cadence } = record;
  const shown = shownSpeed(of.speed, cadence);
  const alias =
    shown === of.speed ? {} : { shownEveryDays: shown > 0 ? 360 / shown / 24 : Infinity };
  if (of.kind === 'compound' && shown !== of.speed) {
    const turned = (of.speed * cadence) / HOUR;
    const reason = `turns ${turned.toFixed(0)}° between samples and its size is unknown; name it to fit it`;
    return { name, decision: 'left', reason, ...alias };
  }
  if (SEASONAL.includes(name) && days < SEASONS) {
    const reason = `what the seasons do to M2 counts as its noise in ${days.toFixed(0)} days; name it to fit it`;
    return { name, decision: 'left', reason, beside: 'M2' };
  }
  const rival = rivals.reduce((near, other) =>
    Math.abs(other.shown - shown) < Math.abs(near.shown - shown) ? other : near,
  );
  const needed = separationDays(shown, rival.shown);
  const words = aliasWords(of, shown);
  if (days >= LEAVE * needed) {
    const reason = `${(days / needed).toFixed(2)} turns apart from ${rival.name}${words}`;
    return { name, decision: 'taken', reason, separationDays: needed, ...alias };
  }
  if (needed > CENTURY) {
    const text = needed === Infinity ? 'same speed as' : 'no record is long enough beside';
    return {
      name,
      decision: 'left',
      reason: `${text} ${rival.name}${words}`,
      beside: rival.name,
      ...alias,
    };
  }
  const reason = `record too short beside ${rival.name} by ${(needed - days).toFixed(1)} days${words}`;
  return { name, decision: 'left', reason, beside: rival.name, separationDays: needed, ...alias };
}

/** Takes the candidates that stand apart from all larger ones, and says why the others are left. */
export function takeResolvable(
  expected: readonly Expected[],
  record: RecordSummary,
  fixed: readonly Constituent[],
): { taken: Constituent[]; candidates: Candidate[] } {
  const taken: Constituent[] = [...fixed];
  const rivalOf = ({ name, speed }: Constituent): Rival => ({
    name,
    shown: shownSpeed(speed, record.cadence),
  });
  const rivals: Rival[] = [{ name: 'mean level', shown: 0 }, ...fixed.map(rivalOf)];
  const candidates: Candidate[] = fixed.map(({ name }) => ({
    name,
    decision: 'taken',
    reason: 'a borrowed constituent or a free side-line hangs on it',
  }));
  for (const { of } of expected) {
    if (taken.some((other) => other.name === of.name)) continue;
    const candidate = judge(of, rivals, record);
    candidates.push(candidate);
    if (candidate.decision !== 'taken') continue;
    taken.push(of);
    rivals.push(rivalOf(of));
  }
  return { taken, candidates };
}
