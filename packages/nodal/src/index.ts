/**
 * How the 18.6-year cycle changes each constituent: the factor f and the phase u, by the lines of the potential or after
 * Schureman.
 * @packageDocumentation
 */
export type { NodalModel } from '@staithe/core';
export { amplitudeBetweenModels, type NodalOptions, nodalCorrection } from './nodal-correction.js';
export { type NodalPlan, type NodalRule, nodalPhasorsInto, nodalPlan } from './nodal-plan.js';
export { type OrbitAngles, orbitAngles } from './schureman1940.js';
export { type SideLine, sideLines } from './side-lines.js';
export {
  type NodalPoint,
  type YearlySheetOptions,
  type YearlySheetRow,
  yearlySheet,
} from './yearly-sheet.js';
