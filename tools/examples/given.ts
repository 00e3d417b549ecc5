/**
 * What an example in a doc comment may use without making it: `constants`, the constants of an invented harbour, and
 * `record`, two months of hourly heights there.
 */
import {
  degreesToRadians,
  type HarmonicConstants,
  HOUR,
  type UniformSeries,
  uniformSeries,
} from '@staithe/core';
import { cos } from '@staithe/core/trig';

export const constants: HarmonicConstants = {
  format: 'staithe-constants',
  version: 1,
  unit: 'm',
  place: { name: 'Example Quay', latitude: 52, longitude: -4 },
  datum: 'chart datum',
  meanLevel: 2.5,
  argumentModel: 'iers2010',
  nodalModel: 'potential',
  constituents: [
    { name: 'M2', amplitude: 1.5, phaseLag: 140 },
    { name: 'S2', amplitude: 0.5, phaseLag: 185 },
    { name: 'K1', amplitude: 0.1, phaseLag: 20 },
    { name: 'O1', amplitude: 0.08, phaseLag: 330 },
  ],
};

/** Degrees an hour and metres: four waves are tide enough for an example. */
const WAVES: readonly (readonly [speed: number, amplitude: number])[] = [
  [28.9841042, 1.5],
  [30, 0.5],
  [15.0410686, 0.1],
  [13.9430356, 0.08],
];

export const record: UniformSeries = uniformSeries({
  start: '2024-03-01T00:00Z',
  step: HOUR,
  values: Array.from({ length: 1440 }, (_, hour) =>
    WAVES.reduce((sum, [speed, size]) => sum + size * cos(degreesToRadians(speed * hour)), 2.5),
  ),
});
