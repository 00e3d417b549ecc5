/**
 * The constants document of a fit.
 * @module
 */
import {
  formatInstant,
  type HarmonicConstant,
  type HarmonicConstants,
  radiansToDegrees,
  wrapDegrees,
} from '@staithe/core';
import { atan2 } from '@staithe/core/trig';
import { type Design, headCount } from './design.js';
import { disc95, pairErrors } from './errors-of.js';
import type { LineNoise } from './noise.js';
import type { RecordSummary } from './record.js';
import type { FitOptions } from './types.js';

/** The constants, fitted and borrowed. */
export function constantsOf(
  design: Design,
  solution: Float64Array,
  covariance: Float64Array,
  noise: readonly LineNoise[],
): HarmonicConstant[] {
  const count = design.order.length;
  const head = headCount(design);
  const { names } = design.basis;
  const fitted: HarmonicConstant[] = [];
  for (let j = 0; j < design.fitted - design.free; j++) {
    const at = head + 2 * j;
    const [a, b] = [solution[at] as number, solution[at + 1] as number];
    const read = (row: number, column: number): number =>
      covariance[(at + row) * count + at + column] as number;
    const { amplitudeSigma, phaseSigma, radius95 } = pairErrors(
      a,
      b,
      read(0, 0),
      read(0, 1),
      read(1, 1),
      disc95((noise[1 + j] as LineNoise).bins),
    );
    const amplitude = Math.sqrt(a * a + b * b);
    fitted.push({
      name: names[j] as string,
      amplitude,
      phaseLag: wrapDegrees(radiansToDegrees(atan2(b, a))),
      amplitudeSigma,
      phaseLagSigma: radiansToDegrees(phaseSigma),
      radius95,
      standing: amplitude > radius95 ? 'firm' : 'faint',
    });
  }
  const borrowed = design.folds.map(({ child, parent, ratio, difference }): HarmonicConstant => {
    const from = fitted[parent] as HarmonicConstant;
    return {
      name: names[child] as string,
      amplitude: ratio * from.amplitude,
      phaseLag: wrapDegrees(from.phaseLag + difference),
      amplitudeSigma: ratio * (from.amplitudeSigma as number),
      phaseLagSigma: from.phaseLagSigma,
      radius95: ratio * (from.radius95 as number),
      standing: 'borrowed',
      borrowedFrom: from.name,
    };
  });
  return [...fitted, ...borrowed];
}

/** The middle of a record as text: where the secular rate counts from and f and u are held. */
export function middleOf(record: RecordSummary): string {
  return formatInstant(Math.round((record.from + record.to) / 2));
}

/** Lower triangle of a symmetric matrix, row by row. */
export function packed(matrix: Float64Array, count: number): number[] {
  const out: number[] = [];
  for (let i = 0; i < count; i++) {
    for (let j = 0; j <= i; j++) out.push(matrix[i * count + j] as number);
  }
  return out;
}

/** The models of a fit, as its document carries them. */
export function modelsOf(
  options: FitOptions,
  record: RecordSummary,
): Pick<HarmonicConstants, 'argumentModel' | 'nodalModel' | 'nodalHold' | 'nodalLatitude'> {
  const { place, nodalHold, nodalModel = 'potential', argumentModel = 'iers2010' } = options;
  return {
    argumentModel,
    nodalModel,
    ...(nodalHold === 'calendar-year' ? { nodalHold } : {}),
    ...(nodalHold === 'span-middle' ? { nodalHold: { heldAt: middleOf(record) } } : {}),
    ...(nodalModel === 'potential' && place?.latitude !== undefined
      ? { nodalLatitude: place.latitude }
      : {}),
  };
}

/** Where the constants come from. */
export function originOf(
  { source }: FitOptions,
  record: RecordSummary,
): Pick<HarmonicConstants, 'source' | 'record'> {
  return {
    ...(source === undefined ? {} : { source }),
    record: {
      from: formatInstant(record.from),
      to: formatInstant(record.to),
      samples: record.samples,
    },
  };
}

export function documentOf(
  design: Design,
  record: RecordSummary,
  options: FitOptions,
  solution: Float64Array,
  covariance: Float64Array,
  noise: readonly LineNoise[],
): HarmonicConstants {
  const { place, datum } = options;
  const rated = design.rateFrom !== undefined;
  return {
    format: 'staithe-constants',
    version: 1,
    unit: 'm',
    ...(place ? { place } : {}),
    ...(datum === undefined ? {} : { datum }),
    meanLevel: solution[0] as number,
    ...(rated
      ? { secularRate: { metresPerYear: solution[1] as number, at: middleOf(record) } }
      : {}),
    ...(design.steps.length > 0
      ? {
          steps: design.steps.map((at, i) => ({
            at: formatInstant(at),
            change: solution[(rated ? 2 : 1) + i] as number,
          })),
        }
      : {}),
    ...modelsOf(options, record),
    constituents: constantsOf(design, solution, covariance, noise),
    uncertainty: { order: design.order, covariance: packed(covariance, design.order.length) },
    ...originOf(options, record),
  };
}
