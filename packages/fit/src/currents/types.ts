/**
 * What a fit of currents takes and gives.
 * @module
 */
import type { CurrentConstants, Series } from '@staithe/core';
import type { CurrentEllipse, RotaryPair } from '../ellipse.js';
import type { PrincipalAxis } from '../principal-axis.js';
import type {
  CovariateResult,
  FitDiagnostics,
  FitOptions,
  FitWarning,
  RecordFit,
  ResistantWeights,
} from '../types.js';

/** Options of a fit of currents: those of heights without what belongs to a vertical datum. @public */
export type CurrentFitOptions = Omit<
  FitOptions,
  'secularRate' | 'steps' | 'datum' | 'sideLines' | 'redraw' | 'errorModel'
> & {
  readonly errorModel?: 'residual-spectrum' | 'independent' | undefined;
};

/** One constituent of a current. @public */
export interface FittedEllipse extends CurrentEllipse {
  readonly name: string;
  /** The same as two vectors that turn left and right. */
  readonly rotary: RotaryPair;
  /** Whether the ellipse reaches beyond its 95 % region. */
  readonly standing: 'firm' | 'faint' | 'borrowed';
  readonly borrowedFrom?: string | undefined;
}

/** What a fit of currents gives. @public */
export interface CurrentFit {
  readonly constants: CurrentConstants;
  /** In the order of `constants.east`. */
  readonly ellipses: readonly FittedEllipse[];
  /** Of the record as it was observed. */
  readonly principalAxis: PrincipalAxis;
  /** Row-major, order.length², of 'mean.east' …, 'east.M2.cos' …, then the same of north; m²/s². */
  readonly covariance: { readonly order: readonly string[]; readonly matrix: Float64Array };
  /** Observed minus fitted, metres per second; gaps stay NaN. */
  readonly residuals: { readonly east: Series; readonly north: Series };
  readonly covariates?:
    | { readonly east: readonly CovariateResult[]; readonly north: readonly CovariateResult[] }
    | undefined;
  /** Where the weighting was resistant; `scale` of each component, metres per second. */
  readonly resistant?:
    | (Omit<ResistantWeights, 'scale'> & {
        readonly scale: { readonly east: number; readonly north: number };
      })
    | undefined;
  /** Common to both components; sizes and noise apart. */
  readonly diagnostics: Omit<FitDiagnostics, 'residual' | 'noise' | 'effectiveSamples'> & {
    readonly east: Pick<RecordFit['diagnostics'], 'residual' | 'noise' | 'effectiveSamples'>;
    readonly north: Pick<RecordFit['diagnostics'], 'residual' | 'noise' | 'effectiveSamples'>;
  };
  readonly warnings: readonly FitWarning[];
}
