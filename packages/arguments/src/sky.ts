/**
 * True positions of Moon and Sun, phases, perigee and apogee, equinoxes and solstices: for tables and reports.
 * @packageDocumentation
 */
export { type LunarApsis, lunarApsides } from './sky/apsides.js';
export { moonPosition } from './sky/moon.js';
export { type MoonPhase, moonPhases } from './sky/phases.js';
export type { SkyPosition } from './sky/position.js';
export { type Season, seasons } from './sky/seasons.js';
export { sunAltitude, sunPosition } from './sky/sun.js';
