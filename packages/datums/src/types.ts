/**
 * What the datum functions give: plain data.
 * @module
 */
import type { Instant, Metres } from '@staithe/core';

/** A level that could not be given, and why. @public */
export interface AbsentLevel {
  readonly level: string;
  readonly reason: string;
}

/** The form of the tide, by the form number F = (K1 + O1)/(M2 + S2). @public */
export type TideClass =
  | 'semidiurnal'
  | 'mixed, mainly semidiurnal'
  | 'mixed, mainly diurnal'
  | 'diurnal';

/** Levels that follow from constants, metres above the datum of the constants. @public */
export interface HarmonicLevels {
  readonly levels: {
    readonly MHWS?: Metres;
    readonly MHWN?: Metres;
    readonly MLWN?: Metres;
    readonly MLWS?: Metres;
    /** Approximate mean higher high water of a diurnal tide. */
    readonly MHHW?: Metres;
    /** Approximate mean lower low water of a diurnal tide. */
    readonly MLLW?: Metres;
    readonly MSL: Metres;
    readonly ISLW?: Metres;
  };
  readonly absent: readonly AbsentLevel[];
  /** Absent where M2 and S2 are both. */
  readonly formFactor?: number;
  readonly tideClass?: TideClass;
  /** Mean spring and neap range, metres. */
  readonly ranges: { readonly spring?: Metres; readonly neap?: Metres };
  /** Hours by which spring tides, perigee tides and diurnal tides follow the Moon. */
  readonly ages: { readonly phase?: number; readonly parallax?: number; readonly diurnal?: number };
}

/** An extreme of the predicted tide. @public */
export interface TideLimit {
  readonly height: Metres;
  readonly time: Instant;
}

/** HAT and LAT. @public */
export interface TideLimits {
  readonly HAT: TideLimit;
  readonly LAT: TideLimit;
  /** Highest and lowest of each UTC year of the span. */
  readonly years: readonly {
    readonly year: number;
    readonly highest: TideLimit;
    readonly lowest: TideLimit;
  }[];
  readonly from: Instant;
  readonly to: Instant;
  /** What the heights refer to: the document's mean level, and the record that it is the mean of where it is known. */
  readonly meanLevel: {
    readonly height: Metres;
    readonly datum?: string | undefined;
    readonly epoch?: { readonly from: string; readonly to: string } | undefined;
  };
  /** Constituents of the year that are missing: HAT and LAT are too small without them. */
  readonly warnings: readonly DatumWarning[];
}

/** A finding that does not stop the work. @public */
export interface DatumWarning {
  readonly code: 'NO_SEASONAL_CYCLE' | 'LESS_THAN_AN_EPOCH' | 'GAPS_LEFT_OUT' | 'FEW_TIDES';
  readonly message: string;
}

/** One observed high or low water. @public */
export interface TabulatedTide {
  readonly kind: 'high' | 'low';
  readonly time: Instant;
  readonly height: Metres;
  /** Among its kind in its tidal day. An only high water counts as the higher; unclassed: the day has a gap. */
  readonly class: 'higher' | 'lower' | 'only' | 'unclassed';
  /** Number of the tidal day, 360° of τ each. */
  readonly tidalDay: number;
}

/** The tides of a record. @public */
export interface TabulatedTides {
  readonly tides: readonly TabulatedTide[];
  /** Mean of the samples, metres. */
  readonly meanSeaLevel: Metres;
  /** Its standard error, from monthly means (daily ones below three months). */
  readonly meanSeaLevelSigma: Metres;
  readonly samples: number;
  readonly from: Instant;
  readonly to: Instant;
  /** Turning points dropped because they were too small or too near, and gaps of more than three hours, where the record was cut. */
  readonly dropped: { readonly small: number; readonly gaps: number };
  readonly warnings: readonly DatumWarning[];
}

/** A level with its standard error and the number of tides (samples for MSL) behind it. @public */
export interface DatumLevel {
  readonly height: Metres;
  readonly sigma: Metres;
  readonly count: number;
}

/** Tidal datums of a record. @public */
export interface TidalDatums {
  readonly levels: Readonly<
    Record<'MHHW' | 'MHW' | 'DTL' | 'MTL' | 'MSL' | 'MLW' | 'MLLW', DatumLevel>
  >;
  /** GT = MHHW − MLLW, MN = MHW − MLW, DHQ = MHHW − MHW, DLQ = MLW − MLLW; metres. */
  readonly ranges: Readonly<Record<'GT' | 'MN' | 'DHQ' | 'DLQ', Metres>>;
  readonly epoch: { readonly from: Instant; readonly to: Instant; readonly months: number };
  readonly warnings: readonly DatumWarning[];
}
