/**
 * Options of a fit, checked and resolved against the record.
 * @module
 */
import { type Constituent, type ConstituentName, constituent } from '@staithe/constituents';
import {
  ComputationError,
  describe,
  formatInstant,
  InputError,
  type Instant,
  isStaitheError,
  refuse,
  toInstant,
} from '@staithe/core';
import type { Redraw } from './redrawn.js';
import { type Curve, usualCutoff } from './resistant.js';
import type { Borrowing, FitOptions } from './types.js';

/** A constituent by name, with the caller's path in the error. */
export function namedAt(name: ConstituentName, path: string): Constituent {
  try {
    return constituent(name);
  } catch (error) {
    if (!isStaitheError(error) || !(error instanceof InputError)) throw error;
    throw new InputError(
      error.code,
      path,
      error.message.replace(/^constituent: /, ''),
      error.details,
    );
  }
}

/** A borrowing with its constituents looked up. */
export interface Borrowed {
  readonly of: Constituent;
  readonly parent: Constituent;
  readonly rule: Borrowing;
}

/** Looks the borrowings up; a child has one parent, and a parent is no child. */
export function readBorrowings(borrow: FitOptions['borrow']): Borrowed[] {
  const out = (borrow ?? []).map((rule, i) => {
    const path = `options.borrow[${i}]`;
    if (!(rule.amplitudeRatio >= 0 && rule.amplitudeRatio < Infinity)) {
      throw new InputError(
        'OUT_OF_RANGE',
        `${path}.amplitudeRatio`,
        `expected a finite number, 0 or more, got ${describe(rule.amplitudeRatio)}`,
      );
    }
    if (!Number.isFinite(rule.phaseLagDifference)) {
      throw new InputError(
        'NOT_FINITE',
        `${path}.phaseLagDifference`,
        `expected degrees, got ${describe(rule.phaseLagDifference)}`,
      );
    }
    return {
      of: namedAt(rule.name, `${path}.name`),
      parent: namedAt(rule.from, `${path}.from`),
      rule,
    };
  });
  out.forEach(({ of, parent }, i) => {
    const path = `options.borrow[${i}]`;
    if (out.findIndex((other) => other.of.name === of.name) !== i) {
      throw new InputError('DUPLICATE', `${path}.name`, `expected each once, got ${of.name} again`);
    }
    if (out.some((other) => other.of.name === parent.name)) {
      throw new InputError(
        'CONFLICT',
        `${path}.from`,
        `expected a fitted parent, got ${parent.name}, which is borrowed`,
      );
    }
  });
  return out;
}

/** Steps in order, each inside the record. */
export function readSteps(steps: FitOptions['steps'], from: Instant, to: Instant): Instant[] {
  return (steps ?? [])
    .map((step, i) => {
      const at = toInstant(step, `options.steps[${i}]`);
      if (at > from && at <= to) return at;
      throw new InputError(
        'OUT_OF_RANGE',
        `options.steps[${i}]`,
        `expected within the record (${formatInstant(from)} to ${formatInstant(to)}), got ${formatInstant(at)}`,
      );
    })
    .sort((a, b) => a - b);
}

/**
 * Refuses steps that no sample parts: nothing tells how much each of them is.
 *
 * @param steps - In order.
 * @param times - Of the record.
 * @param present - Whether a time takes part.
 */
export function checkStepsSeen(
  steps: readonly Instant[],
  times: Float64Array,
  present: (i: number) => boolean,
): void {
  steps.slice(1).forEach((later, i) => {
    const earlier = steps[i] as Instant;
    if (times.some((t, k) => t >= earlier && t < later && present(k))) return;
    throw new ComputationError(
      'RANK_DEFICIENT',
      `expected a sample between any two of options.steps, got none from ${formatInstant(earlier)} to ${formatInstant(later)}`,
      { pair: [`step[${i}]`, `step[${i + 1}]`] },
    );
  });
}

/** A closed choice. */
export function readChoice<T extends string>(
  value: T | undefined,
  path: string,
  choices: readonly [T, ...T[]],
): T {
  const [usual] = choices;
  const chosen = value ?? usual;
  if (choices.includes(chosen)) return chosen;
  throw new InputError(
    'UNKNOWN_CHOICE',
    path,
    `expected ${choices.join(' or ')}, got ${describe(value)}`,
  );
}

/** Curve and cutoff of a resistant fit; undefined where the weighting is equal. */
export function readCurve(options: FitOptions): Curve | undefined {
  const { weighting, resistant } = options;
  const chosen = readChoice(weighting, 'options.weighting', ['equal', 'resistant']);
  if (chosen === 'equal') {
    if (resistant === undefined) return undefined;
    throw new InputError(
      'CONFLICT',
      'options.resistant',
      'expected nothing beside equal weighting, got a curve; say weighting: resistant',
    );
  }
  const curve = readChoice(resistant?.curve, 'options.resistant.curve', ['biweight', 'huber']);
  const cutoff = resistant?.cutoff ?? usualCutoff(curve);
  if (!(cutoff >= 0.5 && cutoff <= 100)) {
    refuse('OUT_OF_RANGE', 'options.resistant.cutoff', 'scales from 0.5 to 100', cutoff);
  }
  return { curve, cutoff };
}

/** How residuals are redrawn; undefined for the other error models. */
export function readRedraw(options: FitOptions, uniform: boolean): Redraw | undefined {
  const { errorModel, redraw } = options;
  readChoice(errorModel, 'options.errorModel', ['residual-spectrum', 'independent', 'redrawn']);
  if (errorModel !== 'redrawn') {
    if (redraw === undefined) return undefined;
    const text = `expected nothing beside this error model, got a redraw; say errorModel: redrawn`;
    throw new InputError('CONFLICT', 'options.redraw', text);
  }
  const usual = uniform ? 'phases' : 'blocks';
  const by = redraw?.by ?? usual;
  readChoice(by, 'options.redraw.by', ['phases', 'blocks']);
  if (by === 'phases' && !uniform) {
    throw new InputError(
      'CONFLICT',
      'options.redraw.by',
      'expected blocks for times of their own, got phases, which need a uniform step',
    );
  }
  const { seed = 1, draws = 200 } = redraw ?? {};
  if (!Number.isSafeInteger(seed)) {
    refuse('OUT_OF_RANGE', 'options.redraw.seed', 'a whole number', seed);
  }
  if (!(Number.isInteger(draws) && draws >= 20 && draws <= 10000)) {
    refuse('OUT_OF_RANGE', 'options.redraw.draws', 'a whole number from 20 to 10000', draws);
  }
  return { by, seed, draws };
}

const KNOWN =
  'constituents borrow secularRate steps covariates weights weighting resistant errorModel redraw argumentModel nodalModel nodalHold sideLines place datum source signal onProgress';

/** Refuses an option that is not known: a misspelt one would change the result in silence. `more`: others that are known. */
export function checkKeys(options: FitOptions, more = ''): void {
  const known = KNOWN + more;
  for (const key of Object.keys(options)) {
    if (!known.split(' ').includes(key))
      refuse('UNKNOWN_CHOICE', `options.${key}`, `one of ${known}`, key);
  }
}
