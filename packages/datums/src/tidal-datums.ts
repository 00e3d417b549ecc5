/**
 * Tidal datums from tabulated tides: MHHW, MHW, DTL, MTL, MSL, MLW, MLLW.
 *
 * Definitions as published by NOAA CO-OPS (its glossary of tidal datums, copies seen). Sigma is the standard error of the
 * mean of calendar months, which carries the correlation of the weather within a month; below three months that of days.
 * @module
 */
import { ComputationError } from '@staithe/core';
import { blockError, mean, monthOf } from './means.js';
import type {
  DatumLevel,
  DatumWarning,
  TabulatedTide,
  TabulatedTides,
  TidalDatums,
} from './types.js';

const EPOCH_MONTHS = 228; // 19 years
const FEW = 20;

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
  const heights = tides.map(({ height }) => height);
  const times = tides.map(({ time }) => time);
  return { height: mean(heights), sigma: blockError(times, heights), count: tides.length };
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
  // One set of days for all levels: a tide in a day that holds a gap is left out.
  const tides = tabulated.tides.filter((tide) => tide.class !== 'unclassed');
  const of = (kind: 'high' | 'low'): TabulatedTide[] => tides.filter((tide) => tide.kind === kind);
  const best = (kind: 'high' | 'low', name: 'higher' | 'lower'): TabulatedTide[] =>
    of(kind).filter((tide) => tide.class === name || tide.class === 'only');
  const MHW = levelOf(of('high'), 'MHW');
  const MLW = levelOf(of('low'), 'MLW');
  const MHHW = levelOf(best('high', 'higher'), 'MHHW');
  const MLLW = levelOf(best('low', 'lower'), 'MLLW');
  // Months that hold tides: a long gap makes no epoch.
  const months = new Set(tides.map(({ time }) => monthOf(time))).size;
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
      MSL: {
        height: tabulated.meanSeaLevel,
        sigma: tabulated.meanSeaLevelSigma,
        count: tabulated.samples,
      },
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
