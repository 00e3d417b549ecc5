/**
 * How a result names its place, datum and span.
 * @module
 */
import { formatInstant, type HarmonicConstants } from '@staithe/core';
import { momentText } from './local-time.js';
import type { ReadSpan } from './options.js';

/** The place, or words where the document names none. */
export function placeName({ place }: HarmonicConstants): string {
  return place?.name ?? 'a place without name';
}

/** The datum, or words where nobody named it. */
export function datumName(datum: string | undefined): string {
  return datum ?? 'the zero of the record';
}

/** `Quenby Haven, m above chart datum, 2031-06-01 00:00Z to …`. */
export function sayOf(constants: HarmonicConstants, { from, to, zone }: ReadSpan): string {
  const span = `${momentText(from, zone)} to ${momentText(to, zone)}`;
  return `${placeName(constants)}, m above ${datumName(constants.datum)}, ${span} (${zone.name})`;
}

/** The head of every JSON result of a span. */
export function placeJson(constants: HarmonicConstants, { from, to, zone }: ReadSpan): object {
  return {
    place: constants.place ?? null,
    datum: constants.datum ?? null,
    unit: 'm',
    from: formatInstant(from),
    until: formatInstant(to),
    zone: zone.name,
  };
}
