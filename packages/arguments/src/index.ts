/**
 * The astronomical arguments of the tide: mean longitudes of Moon and Sun, their rates, and ΔT.
 * @packageDocumentation
 */
export type { ArgumentModel } from '@staithe/core';
export { deltaT } from './delta-t.js';
export {
  type LunisolarArguments,
  lunisolarLongitudes,
  lunisolarLongitudesInto,
  lunisolarLongitudesTT,
  lunisolarRates,
} from './lunisolar.js';
