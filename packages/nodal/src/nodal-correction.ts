/**
 * f and u of one constituent at one instant, and what carries over between the models.
 * @module
 */
import { lunisolarLongitudesInto } from '@staithe/arguments';
import { type Constituent, type ConstituentName, constituent } from '@staithe/constituents';
import {
  type ArgumentModel,
  type Degrees,
  type InstantLike,
  type Metres,
  type NodalModel,
  radiansToDegrees,
  toInstant,
} from '@staithe/core';
import { atan2 } from '@staithe/core/trig';
import { nodalPhasorsInto, nodalPlan } from './nodal-plan.js';

/** Options of {@link nodalCorrection}. @public */
export interface NodalOptions {
  /** Default `potential`. */
  readonly model?: NodalModel | undefined;
  /** Degrees north: lets the lines of degree 3 in (`potential` only). */
  readonly latitude?: Degrees | undefined;
  /** Longitudes of perigee and node. Default: those of the same tradition as the model. */
  readonly argumentModel?: ArgumentModel | undefined;
}

/**
 * The nodal factor f and the nodal phase u.
 *
 * @param of - A constituent or its name; compounds by their members.
 * @param t - An instant from year 1700 to 2200.
 * @param options - Model, latitude, longitudes.
 * @returns f (1 without a correction) and u in degrees, (−180, 180].
 * @throws InputError of `constituent`, `toInstant` and `nodalPlan`.
 * @example
 * nodalCorrection('S2', '2031-06-01T00:00Z', { model: 'schureman1940' }); // { f: 1, u: 0 }
 * @public
 */
export function nodalCorrection(
  of: Constituent | ConstituentName,
  t: InstantLike,
  options: NodalOptions = {},
): { readonly f: number; readonly u: Degrees } {
  const model = options.model ?? 'potential';
  const plan = nodalPlan([typeof of === 'string' ? constituent(of) : of], model, options.latitude);
  const six = new Float64Array(6);
  const longitudes =
    options.argumentModel ?? (model === 'schureman1940' ? 'schureman1940' : 'iers2010');
  lunisolarLongitudesInto(toInstant(t, 't'), longitudes, six);
  const pair = new Float64Array(2);
  nodalPhasorsInto(plan, six[3] as number, six[4] as number, pair);
  const [re, im] = pair as unknown as [number, number];
  return { f: Math.sqrt(re * re + im * im), u: radiansToDegrees(atan2(im, re)) };
}

// H(M1) under `potential` over H(M1) under `schureman1940`: f is 1 on another scale in each (docs/nodal.md).
const M1_POTENTIAL_OVER_SCHUREMAN = 1.42;

/**
 * Carries an amplitude over from one nodal model to another. Only M1 changes; phase lags stay.
 *
 * @param name - Canonical name of the constituent.
 * @param amplitude - Metres, under `from`.
 * @param from - The model it was found with.
 * @param to - The model it shall serve.
 * @returns Metres, under `to`.
 * @example
 * amplitudeBetweenModels('M1', 0.1, 'schureman1940', 'potential').toFixed(3); // '0.142'
 * @public
 */
export function amplitudeBetweenModels(
  name: string,
  amplitude: Metres,
  from: NodalModel,
  to: NodalModel,
): Metres {
  if (name !== 'M1' || from === to) return amplitude;
  const scale = (model: NodalModel): number =>
    model === 'schureman1940' ? 1 : M1_POTENTIAL_OVER_SCHUREMAN;
  return (amplitude * scale(to)) / scale(from);
}
