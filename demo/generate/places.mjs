/**
 * Two invented places in the open ocean, where there is no coast, and what the sea does there.
 *
 * A response says, for one species, how the ocean answers the potential: `gain` (metres a metre of line) and `lag` (Greenwich
 * phase lag, degrees) at the species' reference speed, `gainSlope` (relative change of the gain a degree/hour) and
 * `delay` (hours: the change of the lag a degree/hour, which is the age of the tide).
 * @module
 */

const FROM = Date.UTC(2029, 10, 1);
const UNTIL = Date.UTC(2030, 11, 1);
const MINUTE = 60_000;

/** Thirteen months at six minutes: semidiurnal, about three metres, with shallow-water tides. */
export const HARBOUR = {
  id: 'quenby-haven',
  name: 'Quenby Haven',
  latitude: 44.62,
  longitude: -14.25,
  timeZone: 'Europe/Lisbon',
  from: FROM,
  until: UNTIL,
  step: 6 * MINUTE,
  meanLevel: 2.4,
  responses: [
    { gain: 0.25, lag: 12, gainSlope: 0, delay: 0 },
    { gain: 0.29, lag: 71, gainSlope: -0.05, delay: 30 },
    { gain: 2.2, lag: 93, gainSlope: -0.2, delay: 32.5 },
  ],
  // Quarter- and sixth-diurnal tides from the square and the cube of the semidiurnal one.
  shallow: { square: 0.031, squareLag: 47, cube: 0.0075, cubeLag: 205 },
  seasons: [
    { name: 'Sa', multiple: 1, amplitude: 0.06, phaseLag: 220 },
    { name: 'Ssa', multiple: 2, amplitude: 0.022, phaseLag: 60 },
  ],
  semidiurnalUnrest: 0.005,
  weather: { pressure: 8, wind: 0.045, harbour: 0.012, instrument: 0.003 },
};

/** Thirteen months, hourly: once a day, half a metre. */
export const LAGOON = {
  id: 'merrowby-lagoon',
  name: 'Merrowby Lagoon',
  latitude: 28.93,
  longitude: -61.68,
  timeZone: 'Atlantic/Bermuda',
  from: FROM,
  until: UNTIL,
  step: 60 * MINUTE,
  meanLevel: 0.65,
  responses: [
    { gain: 0.2, lag: 8, gainSlope: 0, delay: 0 },
    { gain: 0.42, lag: 28, gainSlope: -0.28, delay: 15 },
    { gain: 0.025, lag: 310, gainSlope: -0.1, delay: 20 },
  ],
  shallow: { square: 0, squareLag: 0, cube: 0, cubeLag: 0 },
  seasons: [
    { name: 'Sa', multiple: 1, amplitude: 0.09, phaseLag: 165 },
    { name: 'Ssa', multiple: 2, amplitude: 0.045, phaseLag: 40 },
  ],
  semidiurnalUnrest: 0.005,
  weather: { pressure: 5, wind: 0.03, harbour: 0.006, instrument: 0.003 },
};
