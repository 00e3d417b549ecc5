/**
 * Two sets of harmonic constants side by side: how far apart, and whether their errors allow it.
 * @module
 */
import {
  angleDifference,
  type Degrees,
  type HarmonicConstants,
  InputError,
  type Metres,
  refuse,
} from '@staithe/core';
import { amplitudeBetweenModels } from '@staithe/nodal';
import { type ConstantPair, meanLevelSigma, pairsOf, scaled } from './compare-pairs.js';
import { type ComparisonWarning, comparisonWarnings } from './compare-warnings.js';
import { addErrors, chiSquared2, isBeyond, lengthSigma, radiusOf } from './error-ellipse.js';

/** Options of a comparison. @public */
export interface CompareOptions {
  /** How often chance alone may put a difference beyond its ellipse: 0.0001 to 0.5, default 0.05. */
  readonly significance?: number | undefined;
}

/** One constituent that both sets have. @public */
export interface ComparedConstant {
  /** Canonical. */
  readonly name: string;
  readonly first: { readonly amplitude: Metres; readonly phaseLag: Degrees };
  /** On the nodal model of the first set: M1 may be carried over. Phase lags in [0, 360). */
  readonly second: { readonly amplitude: Metres; readonly phaseLag: Degrees };
  /** H of the second less H of the first, metres. */
  readonly amplitudeChange: Metres;
  /** G of the second less G of the first, degrees in (-180, 180]: above 0 the second runs later. */
  readonly phaseLagChange: Degrees;
  /** |z2 - z1| with z = H e^{iG}, metres: the amplitude of the difference of the two waves. */
  readonly distance: Metres;
  /** Standard error of `distance`, along it. */
  readonly sigma?: Metres | undefined;
  /** Radius of the disc that holds the 95 % ellipse of the difference. */
  readonly radius95?: Metres | undefined;
  /** Whether the difference lies outside the ellipse of its errors; absent where neither set states an error. */
  readonly exceeds?: boolean | undefined;
  /** Whose errors were known. A set without errors counts as exact. */
  readonly errorsFrom: 'both' | 'first' | 'second' | 'neither';
}

/** What {@link compareConstants} gives: plain data. @public */
export interface ConstantsComparison {
  /** The largest distance first. */
  readonly rows: readonly ComparedConstant[];
  readonly onlyFirst: readonly string[];
  readonly onlySecond: readonly string[];
  /** In both sets, but with amplitude 0 and no error in one of them: not resolved there, which is not "no tide". */
  readonly notResolved: readonly string[];
  /** √(Σ distance² / 2), metres: root mean square in time of the difference of the two tides that `rows` make. */
  readonly rootSumSquare: Metres;
  readonly largest: { readonly name: string; readonly distance: Metres };
  /** Rows beyond the ellipse of their errors. */
  readonly exceeding: number;
  /** Rows with an error to judge by. */
  readonly judged: number;
  /** Rows of `judged` that chance alone would put beyond, on average: `significance` times `judged`. */
  readonly byChance: number;
  readonly significance: number;
  /** Mean level of the second less that of the first, where both count from one datum. */
  readonly meanLevelChange?: Metres | undefined;
  /** Its standard error, of the sets that state one. */
  readonly meanLevelSigma?: Metres | undefined;
  /** Why there is no `meanLevelChange`. */
  readonly meanLevelReason?: string | undefined;
  readonly warnings: readonly ComparisonWarning[];
}

function checkDocument(constants: HarmonicConstants, path: string): void {
  if (typeof constants !== 'object' || !constants)
    refuse('WRONG_TYPE', path, 'an object', constants);
  const { quantity, unit, meanLevel, nodalModel, constituents } = constants;
  if (quantity !== undefined && quantity !== 'height') {
    refuse('UNKNOWN_CHOICE', `${path}.quantity`, 'height', quantity);
  }
  if (unit !== 'm') refuse('UNKNOWN_UNIT', `${path}.unit`, 'm', unit);
  if (!Number.isFinite(meanLevel)) {
    refuse('NOT_FINITE', `${path}.meanLevel`, 'a finite number', meanLevel);
  }
  if (nodalModel !== 'potential' && nodalModel !== 'schureman1940' && nodalModel !== 'none') {
    const choices = 'potential, schureman1940 or none';
    refuse('UNKNOWN_CHOICE', `${path}.nodalModel`, choices, nodalModel);
  }
  if (!Array.isArray(constituents)) {
    refuse('WRONG_TYPE', `${path}.constituents`, 'an array', constituents);
  }
}

function rowOf(first: ConstantPair, second: ConstantPair, chiSquared: number): ComparedConstant {
  const a = second.a - first.a;
  const b = second.b - first.b;
  const errors = addErrors(first.errors, second.errors);
  const one = first.errors ? 'first' : second.errors ? 'second' : 'neither';
  return {
    name: first.name,
    first: { amplitude: first.amplitude, phaseLag: first.phaseLag },
    second: { amplitude: second.amplitude, phaseLag: second.phaseLag },
    amplitudeChange: second.amplitude - first.amplitude,
    phaseLagChange: angleDifference(first.phaseLag, second.phaseLag),
    distance: Math.sqrt(a * a + b * b),
    ...(errors
      ? {
          sigma: lengthSigma(a, b, errors),
          radius95: radiusOf(errors),
          exceeds: isBeyond(a, b, errors, chiSquared),
        }
      : {}),
    errorsFrom: first.errors && second.errors ? 'both' : one,
  };
}

type MeanLevel = Pick<
  ConstantsComparison,
  'meanLevelChange' | 'meanLevelSigma' | 'meanLevelReason'
>;

function meanLevels(first: HarmonicConstants, second: HarmonicConstants): MeanLevel {
  if (first.datum === undefined || second.datum === undefined) {
    const one = first.datum === undefined ? 'the first' : 'the second';
    const who = first.datum === second.datum ? 'neither set names a' : `${one} set names no`;
    return { meanLevelReason: `${who} datum` };
  }
  if (first.datum !== second.datum) {
    return { meanLevelReason: `counted from ${first.datum} and from ${second.datum}` };
  }
  const sigmas = [meanLevelSigma(first, 'first'), meanLevelSigma(second, 'second')];
  const known = sigmas.filter((sigma) => sigma !== undefined);
  const variance = known.reduce((sum, sigma) => sum + sigma * sigma, 0);
  return {
    meanLevelChange: second.meanLevel - first.meanLevel,
    ...(known.length > 0 ? { meanLevelSigma: Math.sqrt(variance) } : {}),
  };
}

/** Printed as 0 and nothing said about its error. */
const isUnresolved = ({ amplitude, errors }: ConstantPair): boolean => amplitude === 0 && !errors;

/**
 * Compares two sets of harmonic constants: two dates of one gauge, two gauges, a fit and a published set.
 *
 * G is always Greenwich, so constituents compare as points z = H e^{iG}, whatever the models: V of the two argument models
 * differs by up to 0.022° for M2 from 1950 to 2040, and H and G carry over between nodal models, but for H of M1, which
 * `amplitudeBetweenModels` (`@staithe/nodal`) puts on the scale of the first set. What bears on the judgement otherwise is
 * in `warnings`.
 *
 * The errors of the two sets are taken as independent and added: the covariance of the pair in `uncertainty`; without it
 * the standard errors of H and G, along and across; without one of these a round one; at last `radius95`. A difference is
 * beyond them when its squared Mahalanobis length is over χ² of two degrees of freedom, 5.991 at 0.05. The variances count
 * as known. A fit estimates them from b bins of the residual's spectrum: then chance exceeds in (1 + χ²/2b)^−b, 0.059 for
 * 24 bins and 0.079 for 8, not 0.05.
 *
 * @param first - Constants, parsed.
 * @param second - Constants, parsed.
 * @param options - `significance`.
 * @returns Rows by distance, sums over them, what could not be compared, warnings.
 * @throws InputError `MISSING`, path `second.constituents`: none in common, or none that both resolve; `UNKNOWN_CHOICE` for
 *   currents (path `first.quantity`) and models; `UNKNOWN_UNIT`, `WRONG_TYPE`, `NOT_FINITE`, `OUT_OF_RANGE`,
 *   `LENGTH_MISMATCH`, `DUPLICATE`, and those of `constituent`, each with its path.
 * @example
 * const later = { ...constants, constituents: [{ name: 'M2', amplitude: 1.75, phaseLag: 140 }] };
 * compareConstants(constants, later).largest.distance.toFixed(3); // '0.250'
 * @public
 */
export function compareConstants(
  first: HarmonicConstants,
  second: HarmonicConstants,
  options: CompareOptions = {},
): ConstantsComparison {
  const { significance = 0.05 } = options;
  if (!(significance >= 0.0001 && significance <= 0.5)) {
    refuse('OUT_OF_RANGE', 'options.significance', 'a number from 0.0001 to 0.5', significance);
  }
  checkDocument(first, 'first');
  checkDocument(second, 'second');
  const chiSquared = chiSquared2(significance);
  const ours = pairsOf(first, 'first');
  const theirs = pairsOf(second, 'second');
  const common: (readonly [ConstantPair, ConstantPair])[] = [];
  for (const pair of ours.values()) {
    const other = theirs.get(pair.name);
    if (!other) continue;
    const scale = amplitudeBetweenModels(pair.name, 1, second.nodalModel, first.nodalModel);
    common.push([pair, scaled(other, scale)]);
  }
  const resolved = common.filter((both) => !both.some(isUnresolved));
  const rows = resolved
    .map(([one, other]) => rowOf(one, other, chiSquared))
    .sort((a, b) => b.distance - a.distance);
  const [furthest] = rows;
  if (!furthest) {
    const got = common.length > 0 ? 'only such as one of them prints as 0' : 'none in common';
    const text = 'constituents that both sets resolve';
    throw new InputError('MISSING', 'second.constituents', `expected ${text}, got ${got}`);
  }
  const judged = rows.filter(({ exceeds }) => exceeds !== undefined).length;
  const squares = rows.reduce((sum, { distance }) => sum + distance * distance, 0);
  return {
    rows,
    onlyFirst: [...ours.keys()].filter((name) => !theirs.has(name)),
    onlySecond: [...theirs.keys()].filter((name) => !ours.has(name)),
    notResolved: common.filter((both) => both.some(isUnresolved)).map(([{ name }]) => name),
    rootSumSquare: Math.sqrt(squares / 2),
    largest: { name: furthest.name, distance: furthest.distance },
    exceeding: rows.filter(({ exceeds }) => exceeds === true).length,
    judged,
    byChance: significance * judged,
    significance,
    ...meanLevels(first, second),
    warnings: comparisonWarnings(first, second, resolved),
  };
}
