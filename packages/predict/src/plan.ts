/**
 * A plan: all that predicting needs of a constants document, as plain data (workers take plans).
 * @module
 */
import { type Basis, makeBasis } from '@staithe/basis';
import { type Constituent, constituent } from '@staithe/constituents';
import {
  type ArgumentModel,
  degreesToRadians,
  describe,
  type HarmonicConstants,
  InputError,
  type Instant,
  isStaitheError,
  type NodalHold,
  type NodalModel,
  refuse,
  type Sampling,
  toInstant,
  wrapDegrees,
  YEAR,
} from '@staithe/core';
import { cos, sin } from '@staithe/core/trig';

/** Options of a prediction. @public */
export interface CurveOptions {
  /**
   * Other models than those of the document, on purpose only. M1 does not carry over between nodal models: a document
   * that holds it is refused (convert it with `amplitudeBetweenModels`).
   */
  readonly models?:
    | {
        readonly argumentModel?: ArgumentModel | undefined;
        readonly nodalModel?: NodalModel | undefined;
        readonly nodalHold?: NodalHold | undefined;
      }
    | undefined;
  /** Predict means over a time instead of instantaneous heights. */
  readonly sampling?: Sampling | undefined;
}

/** A constituent that takes no part. @public */
export interface LeftOut {
  readonly name: string;
  readonly reason: string;
}

/** Plain data; survives `structuredClone`. @public */
export interface TidePlan {
  readonly basis: Basis;
  /** Mean level, then H cos G and H sin G of each constituent, metres. */
  readonly coefficients: Float64Array;
  /** Secular rate in metres per millisecond, counted from `rateFrom`. */
  readonly ratePerMs: number;
  readonly rateFrom: Instant;
  /** Changes of level, in order of time. */
  readonly steps: readonly { readonly at: Instant; readonly change: number }[];
  readonly leftOut: readonly LeftOut[];
}

function checked(value: number, path: string, low: number, expected: string): number {
  if (Number.isFinite(value) && value >= low) return value;
  const code = Number.isFinite(value) ? 'OUT_OF_RANGE' : 'NOT_FINITE';
  throw new InputError(code, path, `expected ${expected}, got ${describe(value)}`);
}

function named(name: string, path: string): Constituent {
  try {
    return constituent(name);
  } catch (error) {
    if (!isStaitheError(error) || error.name !== 'InputError') throw error;
    const { code, message, details } = error as InputError;
    throw new InputError(code, path, message.replace(/^constituent: /, ''), details);
  }
}

/** What a document that was not parsed could get wrong silently. */
function checkDocument(constants: HarmonicConstants): void {
  const { format, version, unit, constituents } = (constants ?? {}) as Partial<HarmonicConstants>;
  if (format !== 'staithe-constants')
    refuse('UNKNOWN_FORMAT', 'format', 'staithe-constants', format);
  if (version !== 1) refuse('UNKNOWN_VERSION', 'version', '1', version);
  if (unit !== 'm') refuse('UNKNOWN_UNIT', 'unit', 'm', unit);
  if (!Array.isArray(constituents)) refuse('WRONG_TYPE', 'constituents', 'an array', constituents);
}

function checkModels(constants: HarmonicConstants, models: CurveOptions['models']): void {
  if (!models?.nodalModel || models.nodalModel === constants.nodalModel) return;
  const m1 = constants.constituents.findIndex(
    ({ name, amplitude }) => name === 'M1' && amplitude > 0,
  );
  if (m1 < 0) return;
  throw new InputError(
    'MODEL_CROSSED',
    `constituents[${m1}]`,
    `expected M1 converted from ${constants.nodalModel} to ${models.nodalModel} (amplitudeBetweenModels), got it as it was`,
  );
}

/**
 * Makes the plan of a prediction.
 *
 * @param constants - A constants document. An amplitude of 0 means "not resolved": it is left out with a reason.
 * @param options - Other models on purpose; sampling.
 * @returns Plain data.
 * @throws InputError of `constituent` (path `constituents[i].name`), `makeBasis`, `toInstant`; `OUT_OF_RANGE` or
 *   `NOT_FINITE` for numbers, `UNKNOWN_UNIT`, `MODEL_CROSSED`.
 * @example
 * makePlan({ format: 'staithe-constants', version: 1, unit: 'm', meanLevel: 0, argumentModel: 'iers2010',
 *   nodalModel: 'potential', constituents: [{ name: 'MM', amplitude: 0, phaseLag: 0 }] }).leftOut[0]?.name; // 'MM'
 * @public
 */
export function makePlan(constants: HarmonicConstants, options: CurveOptions = {}): TidePlan {
  checkDocument(constants);
  const { models } = options;
  checkModels(constants, models);
  const leftOut: LeftOut[] = [];
  const list: Constituent[] = [];
  const coefficients = [checked(constants.meanLevel, 'meanLevel', -Infinity, 'a finite number')];
  constants.constituents.forEach(({ name, amplitude, phaseLag }, i) => {
    const path = `constituents[${i}]`;
    const size = checked(amplitude, `${path}.amplitude`, 0, 'a finite number, 0 or more');
    const lag = checked(phaseLag, `${path}.phaseLag`, -Infinity, 'a finite number');
    if (size === 0) {
      leftOut.push({ name, reason: 'amplitude 0: not resolved' });
      return;
    }
    const of = named(name, `${path}.name`);
    if (list.some((other) => other.name === of.name)) {
      refuse('DUPLICATE', `${path}.name`, 'each constituent once', name);
    }
    list.push(of);
    const angle = degreesToRadians(wrapDegrees(lag));
    coefficients.push(size * cos(angle), size * sin(angle));
  });
  const { secularRate, steps } = constants;
  return {
    basis: makeBasis({
      constituents: list,
      argumentModel: models?.argumentModel ?? constants.argumentModel,
      nodalModel: models?.nodalModel ?? constants.nodalModel,
      nodalHold: models?.nodalHold ?? constants.nodalHold,
      nodalLatitude: constants.nodalLatitude,
      sampling: options.sampling,
    }),
    coefficients: Float64Array.from(coefficients),
    ratePerMs: secularRate
      ? checked(
          secularRate.metresPerYear,
          'secularRate.metresPerYear',
          -Infinity,
          'a finite number',
        ) / YEAR
      : 0,
    rateFrom: secularRate ? toInstant(secularRate.at, 'secularRate.at') : 0,
    steps: (steps ?? [])
      .map(({ at, change }, i) => ({
        at: toInstant(at, `steps[${i}].at`),
        change: checked(change, `steps[${i}].change`, -Infinity, 'a finite number'),
      }))
      .sort((a, b) => a.at - b.at),
    leftOut,
  };
}
