/**
 * From a record of water levels to numbers a person can stand behind: the everyday functions by name. Everything else
 * stands in subpaths: `staithe/fit`, `staithe/predict`, `staithe/arguments` …
 *
 * Predictions leave out weather and are not for navigation by themselves: official tables, notices and the local
 * authority come first.
 * @packageDocumentation
 */
export { constituent } from '@staithe/constituents';
export {
  DAY,
  type HarmonicConstants,
  HOUR,
  isStaitheError,
  MINUTE,
  parseConstants,
  sampledSeries,
  type Series,
  type Span,
  uniformSeries,
} from '@staithe/core';
export {
  astronomicalTideLimits,
  harmonicLevels,
  tabulateTide,
  tidalDatums,
} from '@staithe/datums';
export { fitHarmonics, fitHarmonicsAsync, type FitOptions, type HarmonicFit } from '@staithe/fit';
export { applyFlags, checkRecord, parseGaugeCsv, readGaugeCsv } from '@staithe/gauge';
export { nodalCorrection } from '@staithe/nodal';
export { type TideCurve, tideCurve } from '@staithe/predict';
export { reportHtml } from '@staithe/report';
