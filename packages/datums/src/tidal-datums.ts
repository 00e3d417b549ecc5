/**
 * Tidal datums from tabulated tides: MHHW, MHW, DTL, MTL, MSL, MLW, MLLW.
 *
 * Definitions as published by NOAA CO-OPS (test-vectors/from-memory/datum-methods). Sigma is the standard error of the
 * mean of calendar months, which carries the correlation of the weather within a month; below three months that of
 * single tides.
 * @module
 */
import { ComputationError, type Instant } from '@staithe/core';
import type {
  DatumLevel,
  DatumWarning,
  TabulatedTide,
  TabulatedTides,
  TidalDatums,
} from './types.js';

const EPOCH_MONTHS = 228; // 19 years
const FEW = 20;

function monthOf(t: Instant): number {
  const date = new Date(t);
  return date.getUTCFullYear() * 12 + date.getUTCMonth();
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

function standardError(values: readonly number[]): number {
  if (values.length < 2) return Infinity;
  const centre = mean(values);
  const squares = values.reduce((sum, value) => sum + (value - centre) * (value - centre), 0);
  return Math.sqrt(squares / (values.length - 1) / values.length);
}

function levelOf(tides: readonly TabulatedTide[], name: string): DatumLevel {
  if (tides.length < 2) {
    throw new ComputationError(
      'TOO_FEW_SAMPLES',
      `expected 2 tides or more for ${name}, got ${tides.length}`,
      {
        level: name,
        count: tides.length,
      },
    );
  }
  const months = new Map<number, number[]>();
  for (const { time, height } of tides) {
    const list = months.get(monthOf(time));
    if (list) list.push(height);
    else months.set(monthOf(time), [height]);
  }
  const heights = tides.map(({ height }) => height);
  const blocks = months.size >= 3 ? [...months.values()].map(mean) : heights;
  return { height: mean(heights), sigma: standardError(blocks), count: tides.length };
}

function middle(a: DatumLevel, b: DatumLevel): DatumLevel {
  return {
    height: (a.height + b.height) / 2,
    // High and low waters share their weather: the errors are taken as fully correlated.
    sigma: (a.sigma + b.sigma) / 2,
    count: a.count + b.count,
  };
}

/**
 * Tidal datums.
 *
 * @param tabulated - Of `tabulateTide`.
 * @returns Levels in metres above the datum of the record, each with standard error and count; ranges; epoch.
 * @throws ComputationError `TOO_FEW_SAMPLES` with fewer than two tides of a kind.
 * @example
 * const { levels, ranges } = tidalDatums(tabulateTide(record));
 * Math.abs(levels.MHHW.height - levels.MLLW.height - ranges.GT) < 1e-12; // true
 * @public
 */
export function tidalDatums(tabulated: TabulatedTides): TidalDatums {
  const { tides } = tabulated;
  const of = (kind: 'high' | 'low'): TabulatedTide[] => tides.filter((tide) => tide.kind === kind);
  const best = (kind: 'high' | 'low', name: 'higher' | 'lower'): TabulatedTide[] =>
    of(kind).filter((tide) => tide.class === name || tide.class === 'only');
  const MHW = levelOf(of('high'), 'MHW');
  const MLW = levelOf(of('low'), 'MLW');
  const MHHW = levelOf(best('high', 'higher'), 'MHHW');
  const MLLW = levelOf(best('low', 'lower'), 'MLLW');
  const months = monthOf(tabulated.to) - monthOf(tabulated.from) + 1;
  const MTL = middle(MHW, MLW);
  const warnings: DatumWarning[] = [...tabulated.warnings];
  if (months < EPOCH_MONTHS) {
    warnings.push({
      code: 'LESS_THAN_AN_EPOCH',
      message: `${months} months of 228 (19 years): levels of this record, not accepted datums`,
    });
  }
  if (MHW.count < FEW)
    warnings.push({ code: 'FEW_TIDES', message: `${MHW.count} high waters only` });
  return {
    levels: {
      MHHW,
      MHW,
      DTL: middle(MHHW, MLLW),
      MTL,
      MSL: { height: tabulated.meanSeaLevel, sigma: MTL.sigma, count: tabulated.samples },
      MLW,
      MLLW,
    },
    ranges: {
      GT: MHHW.height - MLLW.height,
      MN: MHW.height - MLW.height,
      DHQ: MHHW.height - MHW.height,
      DLQ: MLW.height - MLLW.height,
    },
    epoch: { from: tabulated.from, to: tabulated.to, months },
    warnings,
  };
}
