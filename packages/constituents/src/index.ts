/**
 * The frequencies of the tide: constituents by name, compound tides, Doodson numbers, and the lines of the potential.
 * @packageDocumentation
 */
export { type CompoundMember, formatCompound, parseCompound } from './compound.js';
export {
  type Constituent,
  type ConstituentName,
  constituent,
  equilibriumArgument,
  listConstituents,
} from './constituent.js';
export {
  type DoodsonNumbers,
  formatDoodsonNumber,
  formatXdo,
  parseDoodsonNumber,
  parseXdo,
} from './doodson.js';
export type { KnownConstituent } from './known.js';
export { constituentsNear, groupsResolvableIn, separationTime } from './near.js';
export { type PotentialLine, potentialLines } from './potential.js';
