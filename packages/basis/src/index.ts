/**
 * The time functions that fitting and predicting share, and the kernels over them.
 * @packageDocumentation
 */
export { type Basis, type BasisOptions, makeBasis } from './basis.js';
export { columnCount, gram, projectInto, synthesizeInto } from './operators.js';
export type { TimeGrid } from './tiles.js';
