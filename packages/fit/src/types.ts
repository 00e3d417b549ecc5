/**
 * What a fit takes and gives: plain data throughout.
 * @module
 */
import type { ConstituentName } from '@staithe/constituents';
import type {
  ArgumentModel,
  Degrees,
  HarmonicConstants,
  Instant,
  InstantLike,
  Metres,
  NodalModel,
  Series,
} from '@staithe/core';

/** One constituent borrowed from another (the trade's inference), inside the design. @public */
export interface Borrowing {
  readonly name: ConstituentName;
  /** The parent, which must be fitted. */
  readonly from: ConstituentName;
  /** H(name) / H(from). */
  readonly amplitudeRatio: number;
  /** G(name) − G(from), degrees. */
  readonly phaseLagDifference: Degrees;
}

/** Options of a fit; every default is what a practitioner would choose. @public */
export interface FitOptions {
  /** `resolvable` (default) picks by length, gaps and sampling and says why; a list is obeyed or refused. */
  readonly constituents?: 'resolvable' | readonly ConstituentName[] | undefined;
  readonly borrow?: readonly Borrowing[] | undefined;
  /** Fit a secular rate of mean level. Default false. */
  readonly secularRate?: boolean | undefined;
  /** Instants at which the zero of the gauge may have moved. */
  readonly steps?: readonly InstantLike[] | undefined;
  /** Every sample alike: the one weighting so far. */
  readonly weighting?: 'equal' | undefined;
  /** Default `residual-spectrum`: noise density at each line from the residual beside it. */
  readonly errorModel?: 'residual-spectrum' | 'independent' | undefined;
  /** Default iers2010. */
  readonly argumentModel?: ArgumentModel | undefined;
  /** Default potential. */
  readonly nodalModel?: NodalModel | undefined;
  /** Default continuous. `span-middle` holds f and u at the middle of the record. */
  readonly nodalHold?: 'continuous' | 'span-middle' | 'calendar-year' | undefined;
  /** Goes into the constants; with a latitude and `potential` the lines of degree 3 enter. */
  readonly place?: HarmonicConstants['place'];
  /** The vertical datum that the record is counted from. */
  readonly datum?: string | undefined;
  readonly source?: string | undefined;
}

/** A constituent that was considered, and what became of it. @public */
export interface Candidate {
  readonly name: string;
  readonly decision: 'taken' | 'borrowed' | 'left';
  /** In words and numbers. */
  readonly reason: string;
  /** The constituent it stands too near to. */
  readonly beside?: string | undefined;
  /** Days of record that would tell the two apart. */
  readonly separationDays?: number | undefined;
}

/** A finding that does not stop the work. @public */
export interface FitWarning {
  readonly code:
    | 'SHORT_RECORD'
    | 'MANY_GAPS'
    | 'POORLY_CONDITIONED'
    | 'WEAK_DEGREE_2'
    | 'FEW_SPECTRUM_BINS'
    | 'CLOSE_PAIR';
  readonly message: string;
}

/** The grounds of a fit. @public */
export interface FitDiagnostics {
  /** Samples that took part, and gaps among the times given. */
  readonly samples: number;
  readonly missing: number;
  readonly from: Instant;
  readonly to: Instant;
  /** Days from the first to the last sample, one step included. */
  readonly days: number;
  readonly candidates: readonly Candidate[];
  readonly unknowns: number;
  readonly rank: number;
  /** Condition number of the design with columns of unit length. */
  readonly condition: number;
  readonly residual: {
    /** Root mean square, metres. */
    readonly rms: Metres;
    readonly largest: Metres;
    readonly largestAt: Instant;
  };
  /** Noise per sample that each line feels, metres: √(power density · sampling), `meanLevel` first. */
  readonly noise: readonly {
    readonly name: string;
    readonly sigma: Metres;
    readonly bins: number;
  }[];
  /** Independent samples that the mean level is worth. */
  readonly effectiveSamples: number;
}

/** What a fit gives. @public */
export interface HarmonicFit {
  readonly constants: HarmonicConstants;
  /** Row-major, order.length², of 'meanLevel', 'secularRate' (metres a year), 'step[0]' …, 'M2.cos', 'M2.sin' …; m². */
  readonly covariance: { readonly order: readonly string[]; readonly matrix: Float64Array };
  /** Observed minus fitted, metres; gaps stay NaN. */
  readonly residuals: Series;
  readonly diagnostics: FitDiagnostics;
  readonly warnings: readonly FitWarning[];
}
