/**
 * An invented sound for tests and for looking at: the ellipses of its stream, and two months of a current meter there. All
 * numbers are invented; the noise is seeded.
 */
import { type HarmonicConstants, HOUR, type Series, uniformSeries } from '@staithe/core';
import { componentsOf, type CurrentFit, fitCurrents } from '@staithe/fit';
import { tideCurve } from '@staithe/predict';

export interface InventedEllipse {
  readonly name: string;
  /** Metres per second. */
  readonly major: number;
  readonly minor: number;
  readonly turning: 'left' | 'right';
  readonly bearing: number;
  readonly phaseLag: number;
}

export const INVENTED: readonly InventedEllipse[] = [
  { name: 'M2', major: 1.124, minor: 0.181, turning: 'left', bearing: 47, phaseLag: 93 },
  { name: 'S2', major: 0.402, minor: 0.058, turning: 'left', bearing: 50, phaseLag: 131 },
  { name: 'N2', major: 0.231, minor: 0.044, turning: 'left', bearing: 45, phaseLag: 74 },
  { name: 'MU2', major: 0.041, minor: 0.021, turning: 'right', bearing: 120, phaseLag: 140 },
  { name: 'L2', major: 0.033, minor: 0.001, turning: 'left', bearing: 60, phaseLag: 210 },
  { name: 'K1', major: 0.061, minor: 0.034, turning: 'right', bearing: 140, phaseLag: 212 },
  { name: 'O1', major: 0.048, minor: 0.02, turning: 'right', bearing: 132, phaseLag: 330 },
  { name: 'M4', major: 0.108, minor: 0.02, turning: 'right', bearing: 12, phaseLag: 275 },
  { name: 'MS4', major: 0.071, minor: 0.012, turning: 'right', bearing: 20, phaseLag: 301 },
  { name: 'M6', major: 0.001, minor: 0.0004, turning: 'left', bearing: 80, phaseLag: 12 },
];
const MEAN = { east: -0.072, north: -0.094 };
const START = Date.UTC(2031, 2, 1);
const STEP = HOUR / 2;
const COUNT = 60 * 48;

/** A seeded generator of uniform numbers (Park and Miller 1988, minimal standard). */
function seeded(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 16807) % 2147483647;
    return state / 2147483647;
  };
}

/** One component of the stream as if it were a height: the signs are the same. */
function componentConstants(side: 'east' | 'north'): HarmonicConstants {
  return {
    format: 'staithe-constants',
    version: 1,
    unit: 'm',
    meanLevel: MEAN[side],
    argumentModel: 'iers2010',
    nodalModel: 'potential',
    constituents: INVENTED.map((own) => ({ name: own.name, ...componentsOf(own)[side] })),
  };
}

/** Two months, every half hour, with noise that lasts some hours and a gap. */
function inventedStream(): { readonly east: Series; readonly north: Series } {
  const random = seeded(20310301);
  const noise = { east: 0, north: 0 };
  const sides = { east: new Float64Array(COUNT), north: new Float64Array(COUNT) };
  for (const side of ['east', 'north'] as const) {
    const tide = tideCurve(componentConstants(side)).heights({
      start: START,
      step: STEP,
      count: COUNT,
    });
    for (let i = 0; i < COUNT; i++) {
      noise[side] = 0.8 * noise[side] + 0.06 * (random() + random() + random() - 1.5);
      sides[side][i] = i > 700 && i < 760 ? Number.NaN : (tide.values[i] as number) + noise[side];
    }
  }
  return {
    east: uniformSeries({ start: START, step: STEP, values: sides.east }),
    north: uniformSeries({ start: START, step: STEP, values: sides.north }),
  };
}

/** The fit of that record; K2 is borrowed. */
export function inventedCurrents(): CurrentFit {
  return fitCurrents(inventedStream(), {
    place: { name: 'Quenby Sound', latitude: 44.6, longitude: -14.2 },
    constituents: INVENTED.map(({ name }) => name),
    borrow: [{ name: 'K2', from: 'S2', amplitudeRatio: 0.27, phaseLagDifference: -2 }],
  });
}
