/**
 * What a column's header says: the quantity, the unit, the zone, the datum.
 * @module
 */
import type { GaugeUnit } from '../record.js';
import { readZone, type Zone } from './zone.js';

export interface HeaderWords {
  /** What is left of the name in lower-case words. */
  readonly base: string;
  readonly unit?: GaugeUnit | undefined;
  readonly zone?: Zone | undefined;
  readonly datum?: string | undefined;
  /** What stood in brackets and was none of these. */
  readonly unread?: string | undefined;
}

const UNIT_WORDS: Readonly<Record<string, GaugeUnit>> = {
  m: 'm',
  metre: 'm',
  metres: 'm',
  meter: 'm',
  meters: 'm',
  cm: 'cm',
  centimetres: 'cm',
  centimeters: 'cm',
  mm: 'mm',
  millimetres: 'mm',
  millimeters: 'mm',
  ft: 'ft',
  foot: 'ft',
  feet: 'ft',
};
const DATUM = /^(?:MHHW|MHW|MTL|DTL|MSL|MLW|MLLW|LAT|HAT|NAVD88|NAVD|NGVD29|STND|CD|ODN|TAW|NAP)$/i;
const ZONE_IN_NAME = /\b(?:UTC|GMT)(?:\s*[+-]\d{1,2}(?::?\d\d)?)?|[A-Z][A-Za-z]+\/[A-Za-z_/]+/i;

/** Reads one header cell: `Verified (m)`, `time_gmt`, `height_m`, `Time (Europe/Madrid)`. */
export function readHeader(name: string): HeaderWords {
  let unit: GaugeUnit | undefined;
  let zone: Zone | undefined;
  let datum: string | undefined;
  let unread: string | undefined;
  const note = (word: string): boolean => {
    const asUnit = Object.hasOwn(UNIT_WORDS, word.toLowerCase())
      ? UNIT_WORDS[word.toLowerCase()]
      : undefined;
    if (asUnit) {
      unit ??= asUnit;
      return true;
    }
    if (DATUM.test(word)) {
      datum ??= word.toUpperCase();
      return true;
    }
    return false;
  };
  let rest = name.replace(/[([]([^)\]]*)[)\]]/g, (_all, inner: string) => {
    const asZone = readZone(inner);
    if (asZone) zone ??= asZone;
    else {
      const left = inner.split(/[\s,;]+/).filter((word) => word && !note(word));
      if (left.length > 0) unread ??= inner.trim();
    }
    return ' ';
  });
  const spaced = rest.includes('/') ? rest : rest.replace(/_/g, ' ');
  const found = ZONE_IN_NAME.exec(spaced);
  const asZone = found ? readZone(found[0]) : undefined;
  rest = asZone ? spaced.replace(found?.[0] as string, ' ') : spaced;
  if (asZone) zone ??= asZone;
  const words = rest.split(/[\s_,;:.]+/).filter((word) => word && !note(word));
  return { base: words.join(' ').toLowerCase(), unit, zone, datum, unread };
}

/** Names that a column of dates, of times or of both goes by. */
export const TIME_NAMES: readonly string[] = [
  'time',
  'date time',
  'datetime',
  'date/time',
  'date and time',
  'timestamp',
  'instant',
  '', // a zone alone, as in `UTC`
];
/** Names that a column of heights goes by. */
export const VALUE_NAMES: readonly string[] = [
  'verified',
  'water level',
  'waterlevel',
  'sea level',
  'sealevel',
  'level',
  'height',
  'observed',
  'observation',
  'value',
  'wl',
  'stage',
  'elevation',
  'water height',
  'gauge height',
  'tide height',
  'sea surface height',
];
