/**
 * The frequencies of the tide: constituents by name, compound tides, Doodson numbers, and the lines of the potential.
 * @packageDocumentation
 */
export { type CompoundMember, parseCompound } from './compound.js';
export {
  type Constituent,
  type ConstituentName,
  constituent,
  equilibriumArgument,
  type KnownConstituent,
  listConstituents,
} from './constituent.js';
export {
  type DoodsonNumbers,
  formatDoodsonNumber,
  formatXdo,
  parseDoodsonNumber,
  parseXdo,
} from './doodson.js';
export { type PotentialLine, potentialLines } from './potential.js';
