/**
 * The rungs of the ladder: what constants say, and what a record says.
 * @module
 */
import {
  formatInstant,
  type HarmonicConstants,
  type Series,
  seriesTimes,
  toInstant,
} from '@staithe/core';
import {
  astronomicalTideLimits,
  harmonicLevels,
  tabulateTide,
  type TidalDatums,
  tidalDatums,
  type TideLimits,
} from '@staithe/datums';
import type { Rung } from '@staithe/report';

/** Levels with their grounds. */
export interface Levels {
  readonly rungs: readonly Rung[];
  readonly limits: TideLimits;
  readonly observed?: TidalDatums;
  /** Findings, a sentence each. */
  readonly notes: readonly string[];
}

/** Standard error of the mean level, where the document has it. */
function meanLevelSigma({ uncertainty }: HarmonicConstants): number | undefined {
  const at = uncertainty?.order.indexOf('meanLevel') ?? -1;
  const variance = uncertainty?.covariance[(at * (at + 3)) / 2];
  return at < 0 || variance === undefined ? undefined : Math.sqrt(variance);
}

function rungsOf(limits: TideLimits, constants: HarmonicConstants, observed?: TidalDatums): Rung[] {
  const year = (t: number): string => formatInstant(t).slice(0, 4);
  const predicted = `predicted, ${year(limits.from)} to ${year(limits.to - 1)}`;
  const { levels, absent } = harmonicLevels(constants);
  const rungs: Rung[] = [
    { name: 'HAT', height: limits.HAT.height, grounds: predicted },
    { name: 'LAT', height: limits.LAT.height, grounds: predicted },
  ];
  for (const [name, height] of Object.entries(levels)) {
    if (observed && name in observed.levels) continue;
    const sigma = name === 'MSL' ? meanLevelSigma(constants) : undefined;
    rungs.push({ name, height, sigma, grounds: 'from the constants' });
  }
  for (const { level, reason } of absent) {
    if (!(observed && level in observed.levels)) rungs.push({ name: level, missing: reason });
  }
  for (const [name, { height, sigma, count }] of Object.entries(observed?.levels ?? {})) {
    const grounds = name === 'MSL' ? `${count} samples` : `${count} tides`;
    rungs.push({ name, height, sigma, grounds });
  }
  return rungs;
}

/** A record on the zero that it has after the steps of the constants, as the levels and later predictions are. */
function onOneZero(series: Series, { steps = [] }: HarmonicConstants): Series {
  if (steps.length === 0) return series;
  const times = seriesTimes(series);
  const moves = steps.map(({ at, change }) => ({ at: toInstant(at), change }));
  const values = series.values.map((height, i) =>
    moves.reduce(
      (left, { at, change }) => ((times[i] as number) < at ? left + change : left),
      height,
    ),
  );
  return { ...series, values };
}

/** Levels of constants, and of a record cleared of faults where there is one. */
export function levelsOf(
  constants: HarmonicConstants,
  record: Series | undefined,
  span: { readonly from: number; readonly to: number } | undefined,
): Levels {
  const limits = astronomicalTideLimits(constants, { span });
  const observed = record && tidalDatums(tabulateTide(onOneZero(record, constants)));
  const last = constants.steps?.at(-1);
  const moved = last ? [`levels stand on the zero since the step of ${last.at}`] : [];
  const found = [...limits.warnings, ...(observed?.warnings ?? [])].map(({ message }) => message);
  const notes = [...moved, ...found];
  return {
    rungs: rungsOf(limits, constants, observed),
    limits,
    ...(observed ? { observed } : {}),
    notes,
  };
}
