/**
 * What a fit takes and gives: plain data throughout.
 * @module
 */
import type { Constituent, ConstituentName } from '@staithe/constituents';
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

/** What else moves the level, such as air pressure: a column of the design for each lag. @public */
export interface Covariate {
  readonly name: string;
  /** At any times that reach over the record, lags included; between them a straight line. */
  readonly series?: Series | undefined;
  /** Instead of a series: one value at each time of the record. */
  readonly values?: ArrayLike<number> | undefined;
  /** Milliseconds: the level answers to the covariate this long ago. Default [0]. */
  readonly lags?: readonly number[] | undefined;
  /** The value that the mean level belongs to. Default: the mean over the samples. */
  readonly reference?: number | undefined;
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
  readonly covariates?: readonly Covariate[] | undefined;
  /** One a time of the record, 0 or more: the inverse of a sample's variance in any unit. 0 leaves a sample out. */
  readonly weights?: ArrayLike<number> | undefined;
  /** Default `equal`. `resistant` gives less weight to what stands out: gross errors cannot pull at the constants. */
  readonly weighting?: 'equal' | 'resistant' | undefined;
  /** Of `resistant`: the curve of the weights, default `biweight`, and where it turns down, default 8 (huber 1.345). */
  readonly resistant?:
    | {
        readonly curve?: 'huber' | 'biweight' | undefined;
        /** In scales of the residual, 1.4826 times its median size. */
        readonly cutoff?: number | undefined;
      }
    | undefined;
  /** Default `residual-spectrum`: noise density at each line from the residual beside it. */
  readonly errorModel?: 'residual-spectrum' | 'independent' | 'redrawn' | undefined;
  /** Of `redrawn`: the fit repeated on redrawn residuals. Default phases (blocks at irregular times), seed 1, 200 draws. */
  readonly redraw?:
    | {
        readonly by?: 'blocks' | 'phases' | undefined;
        /** A whole number. */
        readonly seed?: number | undefined;
        /** 20 to 10 000. */
        readonly draws?: number | undefined;
      }
    | undefined;
  /** Default iers2010. */
  readonly argumentModel?: ArgumentModel | undefined;
  /** Default potential. */
  readonly nodalModel?: NodalModel | undefined;
  /** Default continuous. `span-middle` holds f and u at the middle of the record. */
  readonly nodalHold?: 'continuous' | 'span-middle' | 'calendar-year' | undefined;
  /**
   * Constituents whose side-lines of the 18.6-year cycle are left free, in a record of 18.6 years and more: the nodal factor
   * is then found from the record (`sideLines` of the result). With `potential` alone.
   */
  readonly sideLines?: readonly ConstituentName[] | undefined;
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
  /** Days in which it turns once as the samples show it, where they fold its speed; Infinity: it stands still. */
  readonly shownEveryDays?: number | undefined;
  /** Metres: the potential's line times the response of the sea beside it, where it was left for its size. */
  readonly expected?: Metres | undefined;
  /** Metres: its standard error, where it was left for its size. */
  readonly noise?: Metres | undefined;
}

/** A finding that does not stop the work. @public */
export interface FitWarning {
  readonly code:
    | 'SHORT_RECORD'
    | 'MANY_GAPS'
    | 'POORLY_CONDITIONED'
    | 'WEAK_DEGREE_2'
    | 'FEW_SPECTRUM_BINS'
    | 'CLOSE_PAIR'
    | 'ERRORS_PROVISIONAL'
    | 'TIMES_ASTRAY';
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
  /** How the factor was made: of the products, or where the condition forbids, of the columns themselves. */
  readonly solver: 'cholesky' | 'orthogonal';
  readonly residual: {
    /** Root mean square, metres. */
    readonly rms: Metres;
    /** Its size and time; absent before the second pass of a fit in parts. */
    readonly largest?: Metres | undefined;
    readonly largestAt?: Instant | undefined;
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

/** What a covariate explains. @public */
export interface CovariateResult {
  readonly name: string;
  /** Milliseconds. */
  readonly lag: number;
  /** Metres for each unit of the covariate. */
  readonly coefficient: number;
  readonly sigma: number;
  /** The value that the mean level belongs to. */
  readonly reference: number;
}

/** The weights of a resistant fit. @public */
export interface ResistantWeights {
  readonly curve: 'huber' | 'biweight';
  readonly cutoff: number;
  /** From 0 to 1, one a time of the record; NaN at gaps. */
  readonly weights: Float64Array;
  /** Metres: 1.4826 times the median size of the residual. */
  readonly scale: Metres;
  /** Samples of less than half weight, and of none. */
  readonly doubted: number;
  readonly setAside: number;
}

/** A side-line of the node beside its constituent, as the record shows it. @public */
export interface SideLineEstimate {
  readonly doodsonNumbers: Constituent['doodsonNumbers'];
  /** ΔN′ beside the main line. */
  readonly node: number;
  /** Its amplitude over the main line's, in phase (sign kept) and a quarter turn behind. */
  readonly ratio: number;
  readonly quadrature: number;
  /** Of either. */
  readonly ratioSigma: number;
  readonly ratioTheory: number;
  /** Degrees by which it leads what the potential says. */
  readonly turn: Degrees;
}

/** The nodal factor of a constituent as the record shows it. @public */
export interface SideLineResult {
  readonly name: string;
  /** Half the distance between the largest and the smallest f in 18.6 years, by these lines. */
  readonly swing: number;
  readonly swingSigma: number;
  readonly swingTheory: number;
  readonly lines: readonly SideLineEstimate[];
}

/** What a fit gives. @public */
export interface HarmonicFit {
  readonly constants: HarmonicConstants;
  /** Row-major, order.length², of 'meanLevel', 'secularRate' (metres a year), 'step[0]' …, 'M2.cos', 'M2.sin' …; m². */
  readonly covariance: { readonly order: readonly string[]; readonly matrix: Float64Array };
  /** Observed minus fitted, metres; gaps stay NaN. Absent where the record is not at hand: in parts, many at once. */
  readonly residuals?: Series | undefined;
  /** In the order of the options, lag by lag. */
  readonly covariates?: readonly CovariateResult[] | undefined;
  /** Where side-lines were left free. */
  readonly sideLines?: readonly SideLineResult[] | undefined;
  /** Where the weighting was resistant. */
  readonly resistant?: ResistantWeights | undefined;
  readonly diagnostics: FitDiagnostics;
  readonly warnings: readonly FitWarning[];
}

/** A fit of a record that is at hand as a whole. @public */
export interface RecordFit extends HarmonicFit {
  readonly residuals: Series;
  readonly diagnostics: FitDiagnostics & {
    readonly residual: {
      readonly rms: Metres;
      readonly largest: Metres;
      readonly largestAt: Instant;
    };
  };
}
