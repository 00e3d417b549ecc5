/** What the demo's record generator gives. Instants in truths are ISO 8601 text, UTC; spans are half-open. */

export interface TrueConstituent {
  readonly name: string;
  readonly kind: 'astronomical' | 'compound' | 'meteorological';
  /** Multipliers of tau, s, h, p, N', ps. */
  readonly doodsonNumbers: readonly number[];
  /** Degrees an hour at J2000.0. */
  readonly speed: number;
  /** Metres. */
  readonly amplitude: number;
  /** Greenwich phase lag, degrees. */
  readonly phaseLag: number;
}

export type Fault =
  | { readonly kind: 'gap'; readonly from: string; readonly to: string; readonly missing: number }
  | { readonly kind: 'stuck'; readonly from: string; readonly to: string }
  | { readonly kind: 'spike' | 'step'; readonly at: string; readonly change: number };

export type RecordEvent =
  | {
      readonly kind: 'storm';
      readonly from: string;
      readonly to: string;
      /** Metres at the middle. */
      readonly height: number;
      /** Hectopascals at the middle. */
      readonly pressureFall: number;
    }
  | {
      readonly kind: 'seiche';
      readonly from: string;
      readonly to: string;
      readonly periodMinutes: number;
      readonly amplitude: number;
    };

export interface RecordTruth {
  readonly about: string;
  readonly place: {
    readonly name: string;
    readonly latitude: number;
    readonly longitude: number;
    readonly timeZone: string;
  };
  readonly record: {
    readonly from: string;
    readonly to: string;
    readonly stepMinutes: number;
    readonly samples: number;
    readonly written: number;
  };
  readonly meanLevel: number;
  readonly constituents: readonly TrueConstituent[];
  readonly noise: {
    /** Of all that is not tide, storms included, faults not; metres. */
    readonly rms: number;
    readonly largest: number;
    /** Relative size of the slow changes of the semidiurnal tide. */
    readonly semidiurnalUnrest: number;
    /** Standard deviations: hectopascals, then metres. */
    readonly pressure: number;
    readonly wind: number;
    readonly harbour: number;
    readonly instrument: number;
  };
  readonly faults: readonly Fault[];
  readonly events: readonly RecordEvent[];
}

export type PlaceId = 'quenby-haven' | 'merrowby-lagoon';

export function makeDemoRecords(): {
  readonly files: readonly { readonly name: string; readonly text: string }[];
  readonly truth: Readonly<Record<PlaceId, RecordTruth>>;
};

/** Metres above the datum of the file; `start` and `step` in milliseconds. */
export function trueTide(
  id: PlaceId,
  grid: { readonly start: number; readonly step: number; readonly count: number },
): Float64Array;
