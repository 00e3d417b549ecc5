/**
 * The caution that stands wherever heights, times or levels are printed.
 * @module
 */
import { describe, InputError } from '@staithe/core';

/** What is printed: predicted heights and times, access windows, levels, or currents. @public */
export type CautionKind = 'heights' | 'windows' | 'levels' | 'currents';

const TEXTS: Readonly<Record<CautionKind, string>> = {
  heights:
    'Predictions leave out weather and are not for navigation by themselves. Official tables, notices and the local authority come first.',
  windows:
    'A predicted window leaves out weather, waves, squat and silting and is not for navigation by itself. Official tables, notices and the local authority come first.',
  levels:
    'These levels follow from the data named here. Datums for charting, boundaries or construction are the call of a licensed surveyor or hydrographer.',
  currents:
    'A stream is that of this place and depth alone, without wind, waves and river water, and is not for navigation by itself. Official charts, tables, notices and the local authority come first.',
};

/**
 * The caution in one or two sentences.
 *
 * @param kind - What is printed beside it.
 * @returns Plain text.
 * @throws InputError `UNKNOWN_CHOICE`, path `kind`.
 * @example
 * caution('heights').includes('not for navigation'); // true
 * @public
 */
export function caution(kind: CautionKind): string {
  if (!Object.hasOwn(TEXTS, kind)) {
    throw new InputError(
      'UNKNOWN_CHOICE',
      'kind',
      `expected heights, windows, levels or currents, got ${describe(kind)}`,
    );
  }
  return TEXTS[kind];
}
