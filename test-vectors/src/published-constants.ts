/**
 * Published harmonic constants and datums of stations, in metres and under the names that Staithe uses.
 * @module
 */
import { InputError, metresFromFeet } from '@staithe/core';
import { loadVector } from './vector.js';

type Row = readonly [amplitudeFeet: number, phaseLag: number, speed: number];

interface DatumRow {
  readonly name: string;
  readonly latitude: number;
  readonly longitude: number;
  readonly HAT: number;
  readonly MHHW: number;
  readonly MSL: number;
  readonly MLLW: number;
}

interface ConstantsCases {
  readonly constants: Readonly<Record<string, Readonly<Record<string, Row>>>>;
  readonly datums?: Readonly<Record<string, DatumRow>>;
}

/** A published constant. @public */
export interface PublishedConstant {
  readonly name: string;
  /** Metres. */
  readonly amplitude: number;
  /** Greenwich phase lag, degrees. */
  readonly phaseLag: number;
  /** As published, degrees per hour. */
  readonly speed: number;
}

/** The published constants of a station. @public */
export interface PublishedConstants {
  readonly rows: readonly PublishedConstant[];
  /** Names printed with amplitude 0: not resolved, which is not the same as no tide. */
  readonly leftOut: readonly string[];
}

/** The published datums of a station: metres above a zero of the station's own, so only differences count. @public */
export interface StationDatums extends DatumRow {
  readonly station: string;
}

const ANCHORAGE = '9455920';

// TK1, RP1 and KP1 stand for pi1, psi1 and phi1 in the published lists, as their speeds say.
const CANONICAL: Readonly<Record<string, string>> = {
  MM: 'Mm',
  SSA: 'Ssa',
  SA: 'Sa',
  MSF: 'MSf',
  MF: 'Mf',
  RHO: 'RHO1',
  TK1: 'PI1',
  RP1: 'PSI1',
  KP1: 'PHI1',
};

/**
 * The name that Staithe uses for a constituent of the published lists.
 *
 * @param printed - As printed there: `SSA`, `RHO`.
 * @returns `Ssa`, `RHO1`; other names as they are.
 * @public
 */
export function canonicalName(printed: string): string {
  return CANONICAL[printed] ?? printed;
}

function ofStation<T>(table: Readonly<Record<string, T>>, station: string): T {
  const found = table[station];
  if (found) return found;
  const known = Object.keys(table).join(', ');
  throw new InputError('UNKNOWN_CHOICE', 'station', `expected one of ${known}, got ${station}`);
}

/**
 * The published constants of a station: 37 names (noaa-constants-37), for Anchorage 124 (noaa-constants-anchorage).
 *
 * @param station - Its number, such as `9410230`.
 * @returns Rows in the published order.
 * @throws InputError `UNKNOWN_CHOICE`.
 * @public
 */
export function publishedConstants(station: string): PublishedConstants {
  const id = station === ANCHORAGE ? 'noaa-constants-anchorage' : 'noaa-constants-37';
  const table = ofStation(loadVector<ConstantsCases>(id).cases.constants, station);
  const rows: PublishedConstant[] = [];
  const leftOut: string[] = [];
  for (const [printed, [feet, phaseLag, speed]] of Object.entries(table)) {
    const name = canonicalName(printed);
    if (feet === 0) leftOut.push(name);
    else rows.push({ name, amplitude: metresFromFeet(feet), phaseLag, speed });
  }
  return { rows, leftOut };
}

/**
 * The published datums of a station, epoch 1983-2001 (a few: a modified epoch of 5 years).
 *
 * @param station - Its number, such as `9410230`.
 * @returns Metres.
 * @throws InputError `UNKNOWN_CHOICE`.
 * @public
 */
export function stationDatums(station: string): StationDatums {
  const { datums = {} } = loadVector<ConstantsCases>('noaa-constants-37').cases;
  const row = ofStation(datums, station);
  return {
    ...row,
    station,
    HAT: metresFromFeet(row.HAT),
    MHHW: metresFromFeet(row.MHHW),
    MSL: metresFromFeet(row.MSL),
    MLLW: metresFromFeet(row.MLLW),
  };
}
