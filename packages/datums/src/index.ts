/**
 * Levels that follow from constants or from a record.
 * @packageDocumentation
 */
export { harmonicLevels } from './harmonic-levels.js';
export { type TabulateOptions, tabulateTide } from './tabulate.js';
export { astronomicalTideLimits } from './tide-limits.js';
export { tidalDatums } from './tidal-datums.js';
export type {
  AbsentLevel,
  DatumLevel,
  DatumWarning,
  HarmonicLevels,
  TabulatedTide,
  TabulatedTides,
  TidalDatums,
  TideClass,
  TideLimit,
  TideLimits,
} from './types.js';
