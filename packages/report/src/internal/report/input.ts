/**
 * What the report takes.
 * @module
 */
import type {
  Degrees,
  HarmonicConstants,
  Instant,
  InstantLike,
  Metres,
  Series,
} from '@staithe/core';
import type { TideLimits } from '@staithe/datums';
import type { FitDiagnostics, FitOptions, FitWarning, ResistantWeights } from '@staithe/fit';
import type { TideWindow, TurningPoint } from '@staithe/predict';
import type { FlaggedRun, LeftOver, RecordGap, Rung, SkyDay, ZeroStep } from '../../types.js';

/** The record that a report speaks of. @public */
export interface ReportRecord {
  readonly series: Series;
  readonly runs: readonly FlaggedRun[];
  /** Gaps that are not among the runs (flag 9). */
  readonly gaps?: readonly RecordGap[] | undefined;
  readonly steps?: readonly ZeroStep[] | undefined;
  /** Samples read and samples due; else counted in the series. */
  readonly read?: number | undefined;
  readonly missing?: number | undefined;
  /** What the reader found on the way, a sentence each. */
  readonly findings?: readonly string[] | undefined;
}

/** What `fitHarmonics` gives; all but the constants can be left out. @public */
export interface ReportFit {
  readonly constants: HarmonicConstants;
  readonly diagnostics?: FitDiagnostics | undefined;
  /** Observed minus fitted, metres. */
  readonly residuals?: Series | undefined;
  readonly warnings?: readonly Pick<FitWarning, 'message'>[] | undefined;
  readonly leftOver?: readonly LeftOver[] | undefined;
  /** The weights of a resistant fit, one a sample of the record. */
  readonly resistant?: ResistantWeights | undefined;
  /** What the fit was told of its errors; else the diagnostics say whether it was the spectrum. */
  readonly errorModel?: FitOptions['errorModel'];
}

/** Access windows and what they are windows of. @public */
export interface ReportWindows {
  readonly list: readonly TideWindow[];
  readonly above?: Metres | undefined;
  readonly below?: Metres | undefined;
  /** The span that was searched. */
  readonly from: Instant;
  readonly to: Instant;
}

/** What the report was made from. @public */
export interface ReportOrigin {
  /** Name and version. */
  readonly program: string;
  readonly file?: string | undefined;
  /** Of the file, hexadecimal. */
  readonly sha256?: string | undefined;
  /** When it was made; the page does not ask the clock. */
  readonly at?: InstantLike | undefined;
}

/** Everything that a report can show. What is left out is named as missing on the page. @public */
export interface ReportInput {
  readonly place: {
    readonly name: string;
    readonly latitude?: Degrees | undefined;
    readonly longitude?: Degrees | undefined;
  };
  /** What heights are counted from. */
  readonly datum: string;
  /** IANA zone, `UTC` or an offset: never the host's. */
  readonly timeZone: string;
  readonly record?: ReportRecord | undefined;
  readonly fit: ReportFit;
  /** Predicted high and low waters that cover the month. */
  readonly turningPoints: readonly TurningPoint[];
  /** `2031-06`, the month that is shown. Default: the month of the first turning point. */
  readonly month?: string | undefined;
  /** Predicted heights of a week, metres above the datum. */
  readonly weekHeights?: Series | undefined;
  readonly windows?: ReportWindows | undefined;
  readonly levels?: readonly Rung[] | undefined;
  readonly limits?: Pick<TideLimits, 'HAT' | 'LAT' | 'from' | 'to'> | undefined;
  readonly sky?: readonly SkyDay[] | undefined;
  readonly generatedFrom: ReportOrigin;
}
