/**
 * A small record of currents: invented ellipses, predicted component by component for 45 days, every half hour, with a gap.
 */
import { HOUR, toInstant } from '@staithe/core';
import { componentsOf, type CurrentEllipse } from '@staithe/fit';
import { tideCurve } from '@staithe/predict';

type Named = CurrentEllipse & { readonly name: string };

export const ELLIPSES: readonly Named[] = [
  { name: 'M2', major: 1.1, minor: 0.2, turning: 'left', bearing: 47, phaseLag: 93 },
  { name: 'S2', major: 0.4, minor: 0.06, turning: 'left', bearing: 50, phaseLag: 131 },
  { name: 'K1', major: 0.06, minor: 0.03, turning: 'right', bearing: 140, phaseLag: 212 },
  { name: 'M4', major: 0.1, minor: 0.02, turning: 'right', bearing: 12, phaseLag: 275 },
];
export const MEAN = { east: -0.06, north: -0.08 };
const START = toInstant('2030-01-01T00:00Z');
const STEP = HOUR / 2;
const COUNT = 45 * 48;
const KNOT = 1852 / 3600; // m/s

/** A seeded generator of uniform numbers (Park and Miller 1988, minimal standard). */
function seeded(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 16807) % 2147483647;
    return state / 2147483647;
  };
}

/** Metres per second of one component, with noise of up to 2 cm/s either way. */
function component(side: 'east' | 'north'): number[] {
  const curve = tideCurve({
    format: 'staithe-constants',
    version: 1,
    unit: 'm',
    meanLevel: MEAN[side],
    argumentModel: 'iers2010',
    nodalModel: 'potential',
    constituents: ELLIPSES.map((own) => ({ name: own.name, ...componentsOf(own)[side] })),
  });
  const { values } = curve.heights({ start: START, step: STEP, count: COUNT });
  const random = seeded(side === 'east' ? 20300101 : 20300102);
  return Array.from(values, (value) => value + 0.04 * (random() - 0.5));
}

export interface CurrentsFile {
  /** The heads of the two columns. */
  readonly heads?: readonly [string, string];
  /** How the two columns are written. */
  readonly as?: 'components' | 'directions';
  /** Of m/s in the file's unit. */
  readonly perUnit?: number;
  /** Puts other cells in their place. */
  readonly change?: (cells: [string, string], i: number) => readonly [string, string];
}

export const PER_UNIT = { 'm/s': 1, 'cm/s': 100, kn: 1 / KNOT } as const;

/** The record as CSV; five samples are missing on the tenth day. */
export function currentsCsv({
  heads = ['east (m/s)', 'north (m/s)'],
  as = 'components',
  perUnit = 1,
  change = (cells) => cells,
}: CurrentsFile = {}): string {
  const [east, north] = [component('east'), component('north')];
  const lines = east.flatMap((e, i) => {
    if (i >= 480 && i < 485) return [];
    const n = north[i] as number;
    const bearing = ((Math.atan2(e, n) * 180) / Math.PI + 360) % 360;
    const cells: [string, string] =
      as === 'components'
        ? [(e * perUnit).toFixed(5), (n * perUnit).toFixed(5)]
        : [(Math.hypot(e, n) * perUnit).toFixed(5), bearing.toFixed(3)];
    const time = new Date(START + i * STEP).toISOString().slice(0, 16).replace('T', ' ');
    return [`${[time, ...change(cells, i)].join(',')}\n`];
  });
  return `${['Time (UTC)', ...heads].join(',')}\n${lines.join('')}`;
}
