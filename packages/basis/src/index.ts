/**
 * The time functions that fitting and predicting share, and the kernels over them.
 * @packageDocumentation
 */
export { type Basis, type BasisOptions, makeBasis } from './basis.js';
export { boundsInto, chargeInto, curveInto } from './kernels/curve.js';
export { rankUpdate } from './kernels/rank-update.js';
export { columnCount, gram, projectInto, synthesizeInto } from './operators.js';
export { makeStretcher, type Stretch, type Stretcher } from './stretches.js';
export { columnsInto, gridCount, TILE, type Tile, type TimeGrid, tiles } from './tiles.js';
