/**
 * What fitting and predicting build on: tiles of samples, columns, stretches of smooth time and the kernels over them.
 * @packageDocumentation
 */
export { boundsInto, chargeInto, curveInto } from './kernels/curve.js';
export { rankUpdate } from './kernels/rank-update.js';
export { makeStretcher, type Stretch, type Stretcher } from './stretches.js';
export { columnsInto, gridCount, TILE, type Tile, tiles } from './tiles.js';
