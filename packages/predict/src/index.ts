/**
 * Predictions: heights, rates, high and low waters, crossings and windows from harmonic constants.
 * @packageDocumentation
 */
export {
  type Crossing,
  findCrossings,
  findTurningPoints,
  findWindows,
  type TideWindow,
  type TurningPoint,
} from './events.js';
export { heightAt, heightsAtTimes, heightsOnGrid, rateAt } from './heights.js';
export { type CurveOptions, type LeftOut, makePlan, type TidePlan } from './plan.js';
export { type TideCurve, tideCurve } from './tide-curve.js';
