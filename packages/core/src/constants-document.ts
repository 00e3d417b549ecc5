/**
 * The constants document: harmonic constants with the models they belong to, as plain JSON.
 * The JSON Schema in `schema/constants.schema.json` says the same; a test holds the two together.
 * @module
 */
import type { Degrees } from './angles.js';
import type { Metres } from './units.js';

/** Which longitudes of Moon and Sun. Default iers2010. @public */
export type ArgumentModel = 'iers2010' | 'schureman1940';
/** How f and u are found. Default potential. @public */
export type NodalModel = 'potential' | 'schureman1940' | 'none';
/** How f and u run in time. Absent in a document: continuous. @public */
export type NodalHold = 'continuous' | 'calendar-year' | { readonly heldAt: string };
/** The grounds of a constituent: beyond its 95 % disc, within it, or borrowed from another. @public */
export type Standing = 'firm' | 'faint' | 'borrowed';

/** One constituent of a place. @public */
export interface HarmonicConstant {
  readonly name: string;
  /** H, 0 or more, metres; of a current metres per second, and so its errors. */
  readonly amplitude: Metres;
  /** G, the Greenwich phase lag, degrees. */
  readonly phaseLag: Degrees;
  /** Standard error of H, metres. */
  readonly amplitudeSigma?: Metres | undefined;
  /** Standard error of G, degrees. */
  readonly phaseLagSigma?: Degrees | undefined;
  /** Radius of the 95 % disc in the plane of (H cos G, H sin G), metres. */
  readonly radius95?: Metres | undefined;
  readonly standing?: Standing | undefined;
  readonly borrowedFrom?: string | undefined;
}

/** The harmonic constants of a place: what a fit gives and a prediction takes. @public */
export interface HarmonicConstants {
  readonly format: 'staithe-constants';
  readonly version: 1;
  readonly quantity?: 'height' | undefined;
  readonly unit: 'm';
  readonly place?:
    | {
        readonly name: string;
        readonly latitude?: Degrees | undefined;
        readonly longitude?: Degrees | undefined;
      }
    | undefined;
  /** The vertical datum that `meanLevel` is counted from. */
  readonly datum?: string | undefined;
  /** Z₀, metres above the datum; before the first of `steps`. */
  readonly meanLevel: Metres;
  readonly secularRate?: { readonly metresPerYear: number; readonly at: string } | undefined;
  /** The level changes by `change` metres from this instant on. */
  readonly steps?: readonly { readonly at: string; readonly change: Metres }[] | undefined;
  readonly argumentModel: ArgumentModel;
  readonly nodalModel: NodalModel;
  readonly nodalHold?: NodalHold | undefined;
  /** Degrees north: the lines of degree 3 were weighed for this latitude. */
  readonly nodalLatitude?: Degrees | undefined;
  readonly constituents: readonly HarmonicConstant[];
  /** Covariance of the coefficients named in `order` ('M2.cos', 'M2.sin', 'meanLevel' …), m², packed lower triangle. */
  readonly uncertainty?:
    | { readonly order: readonly string[]; readonly covariance: readonly number[] }
    | undefined;
  readonly source?: string | undefined;
  readonly record?:
    | { readonly from: string; readonly to: string; readonly samples: number }
    | undefined;
  readonly validity?:
    | { readonly from?: string | undefined; readonly to?: string | undefined }
    | undefined;
}

/**
 * The harmonic constants of a current at a place: two components, each with the signs of a height. What it shares with
 * heights means the same.
 * @public
 */
export interface CurrentConstants
  extends Omit<
    HarmonicConstants,
    | 'quantity'
    | 'unit'
    | 'datum'
    | 'meanLevel'
    | 'secularRate'
    | 'steps'
    | 'constituents'
    | 'uncertainty'
  > {
  readonly quantity: 'current';
  readonly unit: 'm/s';
  /** The current that remains when the tide is taken out, metres per second. */
  readonly mean: { readonly east: number; readonly north: number };
  /** The component towards true east; amplitudes and their errors in metres per second. */
  readonly east: readonly HarmonicConstant[];
  /** The component towards true north; the names of `east`, in any order. */
  readonly north: readonly HarmonicConstant[];
  /** Covariance of the coefficients named in `order` ('east.M2.cos', 'north.M2.sin', 'mean.east' …), m²/s², packed lower triangle. */
  readonly uncertainty?: HarmonicConstants['uncertainty'];
}

/** One thing that is wrong with a document. @public */
export interface Finding {
  readonly path: string;
  readonly expected: string;
  readonly got: string;
}
