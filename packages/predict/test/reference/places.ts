/** Constants documents of real stations and of random places, for tests. */
import type { HarmonicConstants } from '@staithe/core';
import { publishedConstants } from '@staithe/test-vectors';

/** Published constants with the models of official tables. */
export function officialConstants(station: string): HarmonicConstants {
  return {
    format: 'staithe-constants',
    version: 1,
    unit: 'm',
    meanLevel: 0,
    argumentModel: 'schureman1940',
    nodalModel: 'schureman1940',
    nodalHold: 'calendar-year',
    constituents: publishedConstants(station).rows.map(({ name, amplitude, phaseLag }) => ({
      name,
      amplitude,
      phaseLag,
    })),
  };
}

/** A document with the default models. */
export function place(
  constituents: HarmonicConstants['constituents'],
  more: Partial<HarmonicConstants> = {},
): HarmonicConstants {
  return {
    format: 'staithe-constants',
    version: 1,
    unit: 'm',
    meanLevel: 0,
    argumentModel: 'iers2010',
    nodalModel: 'potential',
    constituents,
    ...more,
  };
}
