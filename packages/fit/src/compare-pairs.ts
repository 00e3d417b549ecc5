/**
 * What a document says about each constituent as a pair of coefficients (H cos G, H sin G) with its errors.
 * @module
 */
import { constituent } from '@staithe/constituents';
import {
  type Degrees,
  degreesToRadians,
  type HarmonicConstant,
  type HarmonicConstants,
  InputError,
  isStaitheError,
  type Metres,
  refuse,
  wrapDegrees,
} from '@staithe/core';
import { cos, sin } from '@staithe/core/trig';
import type { PairCovariance } from './error-ellipse.js';
import { disc95 } from './errors-of.js';

/** One constituent of a document. */
export interface ConstantPair {
  /** Canonical. */
  readonly name: string;
  readonly amplitude: Metres;
  readonly phaseLag: Degrees;
  /** H cos G and H sin G. */
  readonly a: Metres;
  readonly b: Metres;
  readonly errors: PairCovariance | undefined;
  readonly borrowed: boolean;
}

function checked(value: number, path: string, low: number): number {
  if (Number.isFinite(value) && value >= low) return value;
  const expected = low === 0 ? 'a finite number, 0 or more' : 'a finite number';
  return refuse(Number.isFinite(value) ? 'OUT_OF_RANGE' : 'NOT_FINITE', path, expected, value);
}

function canonicalName(name: string, path: string): string {
  try {
    return constituent(name).name;
  } catch (error) {
    if (!isStaitheError(error) || error.name !== 'InputError') throw error;
    const { code, message, details } = error as InputError;
    throw new InputError(code, path, message.replace(/^constituent: /, ''), details);
  }
}

/** Gives the covariance of two coefficients by name, undefined where either is not in the document's list. */
function coefficientReader(
  { uncertainty }: HarmonicConstants,
  path: string,
): (row: string, column: string) => number | undefined {
  if (!uncertainty) return () => undefined;
  const { order, covariance } = uncertainty;
  const length = (order.length * (order.length + 1)) / 2;
  if (covariance.length !== length) {
    const at = `${path}.uncertainty.covariance`;
    refuse('LENGTH_MISMATCH', at, `${length} numbers`, covariance);
  }
  const places = new Map(order.map((name, i) => [name, i]));
  return (row, column) => {
    const [i, j] = [places.get(row), places.get(column)];
    if (i === undefined || j === undefined) return undefined;
    const [low, high] = [Math.min(i, j), Math.max(i, j)];
    const at = (high * (high + 1)) / 2 + low;
    const lowest = i === j ? 0 : -Infinity;
    return checked(covariance[at] as number, `${path}.uncertainty.covariance[${at}]`, lowest);
  };
}

/** From errors along H and across it, turned to G. */
function turned(along: number, across: number, unitA: number, unitB: number): PairCovariance {
  return {
    aa: unitA * unitA * along + unitB * unitB * across,
    ab: unitA * unitB * (along - across),
    bb: unitB * unitB * along + unitA * unitA * across,
  };
}

/** The standard errors of H and G as a pair; of one alone, or of a disc, a round one. */
function fromSigmas(
  own: HarmonicConstant,
  path: string,
  unitA: number,
  unitB: number,
): PairCovariance | undefined {
  const read = (key: 'amplitudeSigma' | 'phaseLagSigma' | 'radius95'): number | undefined => {
    const value = own[key];
    return value === undefined ? undefined : checked(value, `${path}.${key}`, 0);
  };
  const sigmaH = read('amplitudeSigma');
  const sigmaG = read('phaseLagSigma');
  const radius = read('radius95');
  // The phase lag of nothing has no length.
  const arc =
    sigmaG === undefined || own.amplitude === 0
      ? undefined
      : own.amplitude * degreesToRadians(sigmaG);
  const along = sigmaH ?? arc;
  const across = arc ?? sigmaH;
  if (along !== undefined && across !== undefined) {
    return turned(along * along, across * across, unitA, unitB);
  }
  if (radius === undefined) return undefined;
  const variance = (radius * radius) / disc95(0);
  return { aa: variance, ab: 0, bb: variance };
}

/** Reads the constituents of a document by their canonical names, with the best errors that it states. */
export function pairsOf(constants: HarmonicConstants, path: string): Map<string, ConstantPair> {
  const covarianceOf = coefficientReader(constants, path);
  const pairs = new Map<string, ConstantPair>();
  constants.constituents.forEach((own, i) => {
    const at = `${path}.constituents[${i}]`;
    const amplitude = checked(own.amplitude, `${at}.amplitude`, 0);
    const phaseLag = wrapDegrees(checked(own.phaseLag, `${at}.phaseLag`, -Infinity));
    const name = canonicalName(own.name, `${at}.name`);
    if (pairs.has(name)) refuse('DUPLICATE', `${at}.name`, 'each constituent once', own.name);
    const unitA = cos(degreesToRadians(phaseLag));
    const unitB = sin(degreesToRadians(phaseLag));
    const aa = covarianceOf(`${own.name}.cos`, `${own.name}.cos`);
    const ab = covarianceOf(`${own.name}.cos`, `${own.name}.sin`);
    const bb = covarianceOf(`${own.name}.sin`, `${own.name}.sin`);
    const known = aa !== undefined && ab !== undefined && bb !== undefined;
    // Rounding may bring a correlation of 1 a little beyond it.
    if (known && ab * ab > 1.000001 * aa * bb) {
      const text = `a covariance of ${name}.cos and ${name}.sin within what their variances allow`;
      refuse('OUT_OF_RANGE', `${path}.uncertainty.covariance`, text, ab);
    }
    pairs.set(name, {
      name,
      amplitude,
      phaseLag,
      a: amplitude * unitA,
      b: amplitude * unitB,
      errors: known ? { aa, ab, bb } : fromSigmas(own, at, unitA, unitB),
      borrowed: own.standing === 'borrowed',
    });
  });
  return pairs;
}

/** Standard error of the mean level, where the document has it. */
export function meanLevelSigma(constants: HarmonicConstants, path: string): Metres | undefined {
  const variance = coefficientReader(constants, path)('meanLevel', 'meanLevel');
  return variance === undefined ? undefined : Math.sqrt(variance);
}

/** The same constituent with H on another scale. */
export function scaled(pair: ConstantPair, scale: number): ConstantPair {
  if (scale === 1) return pair;
  const { errors } = pair;
  const square = scale * scale;
  return {
    ...pair,
    amplitude: pair.amplitude * scale,
    a: pair.a * scale,
    b: pair.b * scale,
    errors: errors && { aa: errors.aa * square, ab: errors.ab * square, bb: errors.bb * square },
  };
}
