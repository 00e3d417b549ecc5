/**
 * What is in a water-level record: reading, checking, flagging, filtering, resampling.
 * @packageDocumentation
 */
export { applyFlags } from './apply-flags.js';
export {
  type CheckName,
  type CheckOptions,
  checkRecord,
  type RecordCheck,
} from './check-record.js';
export { doodsonWeights, filterResponse, filterSeries, godinWeights } from './filter.js';
export type { ClockOff, ZeroMoved } from './findings.js';
export { gapRuns } from './gaps.js';
export type {
  CalmLimits,
  CheckLimits,
  Ends,
  JumpLimits,
  StuckLimits,
  UsedLimits,
} from './limits.js';
export { parseGaugeCsv } from './parse-gauge-csv.js';
export {
  type BlobLike,
  type ByteStreamLike,
  type GaugeSource,
  readGaugeCsv,
} from './read-gauge-csv.js';
export type {
  GaugeRecord,
  GaugeUnit,
  GaugeWarning,
  GaugeWarningCode,
  QualityFlag,
  QualityReason,
  ReadOptions,
  Run,
} from './record.js';
export { hourlyFrom, thin } from './resample.js';
