/**
 * An invented harbour for tests and for looking at: constants, a record with faults, what is left, levels. All numbers are
 * invented; the noise is seeded.
 */
import {
  DAY,
  type HarmonicConstant,
  type HarmonicConstants,
  HOUR,
  type Series,
  uniformSeries,
} from '@staithe/core';
import type { FitDiagnostics } from '@staithe/fit';
import { tideCurve } from '@staithe/predict';
import type { FlaggedRun, Rung, ZeroStep } from '../src/index.js';

type Row = [name: string, mm: number, lag: number, disc?: number | undefined, from?: string];

function documentOf(name: string, meanLevel: number, rows: readonly Row[]): HarmonicConstants {
  const constituents = rows.map(([line, mm, phaseLag, disc, from]): HarmonicConstant => {
    const standing = from ? 'borrowed' : disc !== undefined && mm > disc ? 'firm' : 'faint';
    return {
      name: line,
      amplitude: mm / 1000,
      phaseLag,
      ...(disc === undefined ? {} : { radius95: disc / 1000 }),
      standing,
      ...(from ? { borrowedFrom: from } : {}),
    };
  });
  return {
    format: 'staithe-constants',
    version: 1,
    unit: 'm',
    place: { name },
    datum: 'chart datum',
    meanLevel,
    argumentModel: 'iers2010',
    nodalModel: 'potential',
    constituents,
  };
}

/** A semidiurnal harbour. */
export const inventedConstants = (): HarmonicConstants =>
  documentOf('Quenby Haven', 2.612, [
    ['M2', 1482, 93.1, 6],
    ['S2', 512, 128.4, 6.2],
    ['N2', 301, 74.2, 6],
    ['K2', 141, 126.0, 11, 'S2'],
    ['NU2', 58, 78.9, 6],
    ['MU2', 47, 131.2, 6.1],
    ['2N2', 40, 55.0, 6],
    ['L2', 38, 118.8, 7.5],
    ['T2', 30, 122.2, undefined, 'S2'],
    ['LAM2', 12, 101, 6],
    ['K1', 73, 112.6, 4],
    ['O1', 66, 320.1, 4],
    ['P1', 24, 105.6, undefined, 'K1'],
    ['Q1', 19, 268.4, 4.1],
    ['J1', 3.1, 160, 4],
    ['S1', 6, 20, 4.6],
    ['M4', 35, 201.5, 2.2],
    ['MS4', 21, 250.2, 2.2],
    ['MN4', 14, 170.9, 2.2],
    ['S4', 1.2, 310.5, 2.2],
    ['M3', 9, 310.2, 1.9],
    ['M6', 11, 40.7, 1.4],
    ['2MS6', 9.4, 88, 1.4],
    ['Sa', 62, 215, 21],
    ['Ssa', 18, 71, 20],
    ['Mf', 11, 170, 14],
    ['Mm', 6, 190, 15],
  ]);

/** A diurnal one. */
export const diurnalConstants = (): HarmonicConstants =>
  documentOf('Port Ansel', 0.61, [
    ['K1', 391, 20.4, 5],
    ['O1', 372, 11.9, 5],
    ['P1', 119, 22.5, undefined, 'K1'],
    ['Q1', 80, 2.2, 5],
    ['M2', 21, 111, 3],
    ['S2', 9, 130, 3.1],
  ]);

/** A seeded generator of uniform numbers (Park and Miller 1988, minimal standard). */
function seeded(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 16807) % 2147483647;
    return state / 2147483647;
  };
}

export interface InventedRecord {
  readonly series: Series;
  readonly residuals: Series;
  readonly runs: readonly FlaggedRun[];
  readonly steps: readonly ZeroStep[];
  readonly diagnostics: FitDiagnostics;
}

const START = Date.UTC(2030, 0, 9, 7);
const STEP = HOUR / 2;

/** Thirteen months every half hour with gaps, spikes, a stuck sensor, a surge, a step of the zero. */
export function inventedRecord(days: number = 395): InventedRecord {
  const random = seeded(20310601);
  const count = Math.round((days * DAY) / STEP);
  const { values } = tideCurve(inventedConstants()).heights({ start: START, step: STEP, count });
  const residuals = new Float64Array(count);
  let weather = 0;
  for (let i = 0; i < count; i++) {
    weather = 0.985 * weather + 0.022 * (random() + random() + random() - 1.5);
    const surge = 0.6 * 2 ** -(((i * STEP) / DAY - 26) ** 2);
    residuals[i] = weather + surge + 0.03 * Math.cos((57.968 * i * STEP * Math.PI) / HOUR / 180);
  }
  const at = (day: number): number => START + day * DAY;
  const runs: FlaggedRun[] = [
    { from: at(40.3), to: at(51.9), flag: 9, reason: 'gap', measured: 11.6 * DAY },
    { from: at(120), to: at(120.4), flag: 9, reason: 'gap', measured: 0.4 * DAY },
    {
      from: at(200.5),
      to: at(202.6),
      flag: 4,
      reason: 'flat line',
      measured: 2.1 * DAY,
      allowed: 6 * HOUR,
    },
    {
      from: at(25.3),
      to: at(26.1),
      flag: 3,
      reason: 'climatology',
      measured: 5.9,
      allowed: [-0.5, 5.6],
    },
    {
      from: at(300),
      to: at(306),
      flag: 3,
      reason: 'attenuated signal',
      measured: 0.9,
      allowed: 1.2,
    },
  ];
  for (let k = 0; k < 40; k++) {
    const time = START + Math.floor(random() * count) * STEP;
    runs.push({
      from: time,
      to: time,
      flag: k % 3 === 0 ? 3 : 4,
      reason: 'spike',
      measured: random() * 3,
      allowed: 0.16,
    });
  }
  const moved = at(252.4);
  const heights = values.map(
    (value, i) => value + (residuals[i] as number) + (START + i * STEP >= moved ? 0.079 : 0),
  );
  for (const { from, to, flag, reason } of runs) {
    const [first, last] = [Math.round((from - START) / STEP), Math.round((to - START) / STEP)];
    const stuck = heights[first] as number;
    for (let i = first; i <= last && i < count; i++) {
      if (flag === 9) {
        heights[i] = Number.NaN;
        residuals[i] = Number.NaN;
      } else if (reason === 'flat line') heights[i] = stuck;
      else if (reason === 'spike') heights[i] = stuck + 4 * (random() - 0.5);
    }
  }
  return {
    series: uniformSeries({ start: START, step: STEP, values: heights }),
    residuals: uniformSeries({ start: START, step: STEP, values: residuals }),
    runs,
    steps: [{ at: moved, change: 0.079, sigma: 0.004 }],
    diagnostics: diagnosticsOf(count),
  };
}

const diagnosticsOf = (count: number): FitDiagnostics => ({
  samples: count - 600,
  missing: 600,
  from: START,
  to: START + count * STEP,
  days: (count * STEP) / DAY,
  candidates: [
    { name: 'M2', decision: 'taken', reason: 'longer than 14.8 days' },
    {
      name: 'T2',
      decision: 'left',
      reason: 'record too short beside S2 by 12 days',
      beside: 'S2',
      separationDays: 407,
    },
    {
      name: 'R2',
      decision: 'left',
      reason: 'record too short beside S2 by 12 days',
      beside: 'S2',
      separationDays: 407,
    },
  ],
  unknowns: 54,
  rank: 54,
  condition: 3.7,
  solver: 'cholesky',
  residual: { rms: 0.081, largest: 0.402, largestAt: Date.UTC(2030, 1, 3, 4, 10) },
  noise: [{ name: 'meanLevel', sigma: 0.9, bins: 24 }],
  effectiveSamples: 310,
});

/** A ladder with crowded rungs, a missing one that has a place and one that has none. */
export const inventedRungs = (): Rung[] => [
  { name: 'HAT', height: 5.21, sigma: 0.03, grounds: 'predicted, 19 y' },
  { name: 'MHWS', height: 4.61, sigma: 0.02, grounds: 'harmonic: M2 + S2' },
  { name: 'MHHW', height: 4.2, sigma: 0.02, grounds: '705 tides' },
  { name: 'MHW', height: 4.09, sigma: 0.02, grounds: '705 tides' },
  { name: 'MSL', height: 2.612, sigma: 0.01, grounds: '13 months' },
  { name: 'MTL', height: 2.59, sigma: 0.02, grounds: '1410 tides' },
  { name: 'MLW', height: 1.1, missing: 'low waters below the sill are cut off' },
  { name: 'MLLW', height: 0.98, sigma: 0.02, grounds: '704 tides' },
  { name: 'LAT', height: -0.06, sigma: 0.03, grounds: 'predicted, 19 y' },
  { name: 'NTDE', missing: 'a full epoch of 19 years is needed, the record has 13 months' },
];
