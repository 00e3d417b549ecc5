/**
 * How the sea answers one line of the potential: a smooth function of its speed within each species.
 *
 * height = sum of amplitude · SIGN · gain · (cos, or sin in the diurnal species)(theta - lag). SIGN stands for the sign of the latitude
 * factor, chosen so that with the trade's quarter turns (K1 +90°, O1 -90°, L2 180°, Mf none) the lag of a line is its G:
 * K1 (amplitude > 0): -sin(theta - lag) = cos(theta + 90° - lag). O1 (< 0): +sin(theta - lag) = cos(theta - 90° - lag).
 * @module
 */
import { combine, DOODSON_RATES } from './mean-longitudes.mjs';

const SIGN = [-1, -1, 1];
const REFERENCE = [
  [0, 2],
  [1, 1],
  [2, 0],
].map(([tau, moon]) => combine([tau, moon, 0, 0, 0, 0], DOODSON_RATES)); // Mf, K1, M2
export const RADIANS = Math.PI / 180;

/**
 * @param {{ responses: { gain: number, lag: number, gainSlope: number, delay: number }[] }} place
 * @param {readonly number[]} multipliers
 */
export function responseAt(place, multipliers) {
  const species = multipliers[0];
  const { gain, lag, gainSlope, delay } = place.responses[species];
  const away = combine(multipliers, DOODSON_RATES) - REFERENCE[species];
  return { gain: gain * (1 + gainSlope * away), lag: lag + delay * away };
}

/**
 * The complex amplitude c of a line, so that its height is the real part of c · exp(i theta).
 *
 * @returns {{ re: number, im: number }} Metres.
 */
export function lineAmplitude(place, { multipliers, amplitude }) {
  const species = multipliers[0];
  const { gain, lag } = responseAt(place, multipliers);
  const size = SIGN[species] * amplitude * gain;
  const turn = -(lag + (species === 1 ? 90 : 0)) * RADIANS; // sin x = cos(x - 90°)
  return { re: size * Math.cos(turn), im: size * Math.sin(turn) };
}
