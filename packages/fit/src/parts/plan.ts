/**
 * The plan of a fit in parts: options settled once, as plain JSON that travels to every machine that takes a part.
 * @module
 */
import {
  InputError,
  type InputErrorCode,
  type Instant,
  readSampling,
  refuse,
  type Sampling,
  toInstant,
} from '@staithe/core';
import { YEAR } from '@staithe/core';
import type { Design } from '../design.js';
import { designOf } from '../problem.js';
import { type Borrowed, checkKeys, readBorrowings, readChoice } from '../read-options.js';
import type { RecordSummary } from '../record.js';
import { select } from '../select.js';
import type { FitOptions } from '../types.js';
import { fingerprintOf } from './fingerprint.js';

/** Options of a fit in parts. What one pass cannot know is refused. @public */
export interface PlanOptions extends Omit<FitOptions, 'constituents'> {
  /** Names: one pass cannot tell what the record will hold. */
  readonly constituents: NonNullable<Exclude<FitOptions['constituents'], 'resolvable'>>;
  /** Of every chunk. Absent: instantaneous values. */
  readonly sampling?: Sampling | undefined;
}

/** A plan: plain JSON. Two plans are the same if their fingerprints are. @public */
export interface FitPlan {
  readonly format: 'staithe-fit-plan';
  readonly version: 1;
  readonly fingerprint: string;
  readonly options: Omit<PlanOptions, 'steps'> & { readonly steps?: readonly Instant[] };
}

/** Before the ends are known: steps are checked, and the rate is counted from the middle of the record, at the end. */
const ALL_TIME: RecordSummary = {
  samples: 0,
  missing: 0,
  from: -1e4 * YEAR,
  to: 1e4 * YEAR,
  days: 0,
  cadence: 0,
};

function refuseOne(path: string, code: InputErrorCode, what: string): never {
  throw new InputError(code, path, `expected ${what}; fit the record in one piece`);
}

/**
 * Plans a fit in parts.
 *
 * @param options - As of `fitHarmonics`, with a list of constituents; `sampling` of all chunks.
 * @returns The plan.
 * @throws InputError as `fitHarmonics`; `UNKNOWN_CHOICE` or `CONFLICT` for what one pass cannot know: `resolvable`,
 *   `span-middle`, `resistant`, `redrawn`, `weights`, `covariates`, `sideLines`.
 * @example
 * planFit({ constituents: ['M2', 'S2'] }).format; // 'staithe-fit-plan'
 * @public
 */
export function planFit(options: PlanOptions): FitPlan {
  const { sampling, ...rest } = options;
  checkKeys(rest);
  if (!Array.isArray(options.constituents)) {
    const got = JSON.stringify(options.constituents) ?? 'nothing';
    refuseOne('options.constituents', 'UNKNOWN_CHOICE', `a list of names in parts, got ${got}`);
  }
  readChoice(options.weighting, 'options.weighting', ['equal', 'resistant']);
  if (options.weighting === 'resistant' || options.resistant !== undefined) {
    refuseOne('options.weighting', 'CONFLICT', 'equal in parts, got resistant');
  }
  if (options.nodalHold === 'span-middle') {
    refuseOne(
      'options.nodalHold',
      'CONFLICT',
      'continuous or calendar-year in parts, got span-middle',
    );
  }
  readChoice(options.errorModel, 'options.errorModel', [
    'residual-spectrum',
    'independent',
    'redrawn',
  ]);
  if (options.errorModel === 'redrawn' || options.redraw !== undefined) {
    refuseOne(
      'options.errorModel',
      'CONFLICT',
      'residual-spectrum or independent in parts, got redrawn',
    );
  }
  for (const key of ['weights', 'covariates', 'sideLines'] as const) {
    if (options[key] !== undefined) {
      refuseOne(`options.${key}`, 'CONFLICT', `no ${key} in parts, got some`);
    }
  }
  const steps = options.steps?.map((step, i) => toInstant(step, `options.steps[${i}]`));
  const settled = {
    ...rest,
    constituents: Array.from<string>(options.constituents),
    ...(steps ? { steps } : {}),
    ...readSampling(sampling),
  };
  const plain = JSON.parse(JSON.stringify(settled)) as FitPlan['options'];
  const plan = {
    format: 'staithe-fit-plan',
    version: 1,
    fingerprint: fingerprintOf(plain),
    options: plain,
  } as const;
  planDesign(plan, ALL_TIME); // refuses names, models and borrowings
  return plan;
}

/** Checks that a plan is one, whole and of this version. */
export function checkPlan(plan: FitPlan): void {
  if (plan?.format !== 'staithe-fit-plan') {
    refuse('UNKNOWN_FORMAT', 'plan.format', 'staithe-fit-plan', plan?.format);
  }
  if (plan.version !== 1) refuse('UNKNOWN_VERSION', 'plan.version', '1', plan.version);
  const fingerprint = fingerprintOf(plan.options);
  if (plan.fingerprint !== fingerprint) {
    refuse(
      'INVALID_DOCUMENT',
      'plan.fingerprint',
      `${fingerprint} of its options`,
      plan.fingerprint,
    );
  }
}

/** The fit that a plan asks for, over a record of these ends. */
export function planDesign(
  { options }: FitPlan,
  record: RecordSummary = ALL_TIME,
): { readonly design: Design; readonly borrowed: readonly Borrowed[] } {
  const borrowed = readBorrowings(options.borrow);
  const { taken } = select(options, record, borrowed);
  return { design: designOf(taken, borrowed, 0, record, options, options.sampling), borrowed };
}
