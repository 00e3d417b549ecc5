/**
 * Check values with their sources, and what tests need to compare with them.
 * @packageDocumentation
 */
export { decodeInt16 } from './encoding.js';
export { type Differences, expectAngleWithin, expectWithin, mergeDifferences } from './matchers.js';
export {
  canonicalName,
  type PublishedConstant,
  type PublishedConstants,
  publishedConstants,
  type StationDatums,
  stationDatums,
} from './published-constants.js';
export { type Refusal, refusal } from './refusal.js';
export { type Accuracy, type AccuracyRow, recordAccuracy } from './record.js';
export {
  checkVector,
  listVectors,
  loadVector,
  type Tolerance,
  type Vector,
  VECTOR_KINDS,
  type VectorFile,
  type VectorKind,
} from './vector.js';
export { type HighLowRows, highLowRows, hourlySeries } from './water-levels.js';
