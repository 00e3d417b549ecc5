/**
 * Harmonic analysis by least squares: constants with error bars, and the grounds for each of them.
 * @packageDocumentation
 */
export { fitHarmonics, fitHarmonicsAsync } from './fit-harmonics.js';
export type {
  Borrowing,
  Candidate,
  FitDiagnostics,
  FitOptions,
  FitWarning,
  HarmonicFit,
} from './types.js';
