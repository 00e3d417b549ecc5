/**
 * The shared ground of the Staithe packages: instants, series, angles, units, constants documents, errors.
 * @packageDocumentation
 */
export {
  angleDifference,
  type Degrees,
  degreesToRadians,
  radiansToDegrees,
  wrapDegrees,
} from './angles.js';
export type {
  ArgumentModel,
  CurrentConstants,
  Finding,
  HarmonicConstant,
  HarmonicConstants,
  NodalHold,
  NodalModel,
  Standing,
} from './constants-document.js';
export {
  ComputationError,
  type ComputationErrorCode,
  describe,
  type ErrorDetails,
  InputError,
  type InputErrorCode,
  isStaitheError,
  refuse,
} from './errors.js';
export type { AbortSignalLike, LongWork, Progress } from './long-work.js';
export { parseConstants } from './parse-constants.js';
export { fromGreenwichPhaseLag, type PhaseConvention, toGreenwichPhaseLag } from './phase-lag.js';
export {
  checkSeries,
  fromJson,
  readSampling,
  type SampledSeries,
  type Sampling,
  sampledSeries,
  type Series,
  type SeriesJson,
  seriesTimes,
  toJson,
  toTimes,
  type UniformSeries,
  uniformSeries,
} from './series.js';
export {
  DAY,
  EARLIEST,
  formatInstant,
  HOUR,
  type Instant,
  type InstantLike,
  LATEST,
  MINUTE,
  SECOND,
  type Span,
  toInstant,
  toSpan,
  toStep,
  YEAR,
} from './time.js';
export {
  feetFromMetres,
  knotsFromMetresPerSecond,
  type Metres,
  metresFromFeet,
  metresPerSecondFromKnots,
} from './units.js';
