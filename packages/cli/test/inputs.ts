/**
 * Small inputs: invented constants, and a record predicted from them, with a spike and a gap put in.
 */
import { type HarmonicConstants, MINUTE, toInstant } from '@staithe/core';
import { tideCurve } from '@staithe/predict';

export const CONSTANTS: HarmonicConstants = {
  format: 'staithe-constants',
  version: 1,
  unit: 'm',
  place: { name: 'Quenby Haven' },
  datum: 'chart datum',
  meanLevel: 2.4,
  argumentModel: 'iers2010',
  nodalModel: 'potential',
  constituents: [
    { name: 'M2', amplitude: 1.2, phaseLag: 93 },
    { name: 'S2', amplitude: 0.4, phaseLag: 126 },
    { name: 'K1', amplitude: 0.1, phaseLag: 71 },
    { name: 'O1', amplitude: 0.08, phaseLag: 38 },
    { name: 'Sa', amplitude: 0.05, phaseLag: 220 },
    { name: 'Ssa', amplitude: 0.02, phaseLag: 60 },
  ],
};

export const CONSTANTS_JSON = JSON.stringify(CONSTANTS);
const START = toInstant('2030-01-01T00:00Z');
const STEP = 15 * MINUTE;
const COUNT = 45 * 96;
export const SPIKE_AT = '2030-01-10T12:00Z';

/** 45 days, every 15 minutes; `spike` metres are added on {@link SPIKE_AT}, five samples are missing a day later. */
export function recordCsv({ spike = 1.5, header = 'Time (UTC),Water level (m)' } = {}): string {
  const { values } = tideCurve(CONSTANTS).heights({ start: START, step: STEP, count: COUNT });
  const at = (toInstant(SPIKE_AT) - START) / STEP;
  const rows = Array.from(values, (height, i) => {
    // A ripple of 3 mm that repeats with no tide stands for the instrument's noise.
    const noise = 0.003 * Math.sin(i * 2.399963);
    const level = height + noise + (i === at ? spike : 0);
    const minute = new Date(START + i * STEP).toISOString().slice(0, 16).replace('T', ' ');
    return i > at + 96 && i <= at + 101 ? '' : `${minute},${level.toFixed(3)}\n`;
  });
  return `${header}\n${rows.join('')}`;
}
