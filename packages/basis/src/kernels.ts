/**
 * What fitting and predicting build on: tiles of samples, columns, stretches of smooth time and the kernels over them.
 * @packageDocumentation
 */
export type { Basis } from './basis.js';
export { boundsInto, chargeInto, curveInto } from './kernels/curve.js';
export { rankUpdate } from './kernels/rank-update.js';
export { makeStretcher, type Stretch, type Stretcher } from './stretches.js';
export {
  columnsInto,
  gridCount,
  slopeColumnsInto,
  TILE,
  type Tile,
  type TimeGrid,
  tiles,
} from './tiles.js';
