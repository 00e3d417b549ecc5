/**
 * The six arguments of the tide at an instant: τ, s, h, p, N′, p_s, and their rates.
 * @module
 */
import {
  type ArgumentModel,
  DAY,
  type Degrees,
  describe,
  HOUR,
  InputError,
  type InstantLike,
  toInstant,
  wrapDegrees,
} from '@staithe/core';
import { deltaTAt } from './delta-t.js';
import { longitudesIers2010, ratesIers2010 } from './longitudes-iers2010.js';
import { longitudesSchureman1940, ratesSchureman1940 } from './longitudes-schureman1940.js';

/** The six arguments, degrees in [0, 360), or their rates, degrees per mean solar hour. @public */
export interface LunisolarArguments {
  /** Mean lunar time: 15°·UT hours + h − s. */
  readonly tau: Degrees;
  /** Mean longitude of the Moon. */
  readonly s: Degrees;
  /** Mean longitude of the Sun. */
  readonly h: Degrees;
  /** Mean longitude of the lunar perigee. */
  readonly p: Degrees;
  /** Minus the mean longitude of the Moon's ascending node. */
  readonly nPrime: Degrees;
  /** Mean longitude of the solar perigee. */
  readonly ps: Degrees;
}

const J2000_MS = 946728000000; // 2000-01-01T12:00
const EPOCH_1900_MS = -2209032000000; // 1899-12-31T12:00
const CENTURY_MS = 36525 * DAY;
const YEARS_PER_CENTURY = 36525 / 365.2425;
const HOURS_PER_CENTURY = 36525 * 24;

function checkModel(model: ArgumentModel): void {
  if (model === 'iers2010' || model === 'schureman1940') return;
  throw new InputError(
    'UNKNOWN_CHOICE',
    'model',
    `expected iers2010 or schureman1940, got ${describe(model)}`,
  );
}

/**
 * Writes τ, s, h, p, N′, p_s to a buffer: the form that kernels take.
 *
 * @param instant - Milliseconds since 1970, UTC read as UT1.
 * @param model - Which longitudes.
 * @param out - Written to, length 6 or more: degrees, not wrapped.
 * @throws InputError `UNKNOWN_CHOICE`, path `model`.
 * @example
 * const six = new Float64Array(6);
 * lunisolarLongitudesInto(0, 'iers2010', six);
 * six.length; // 6
 * @public
 */
export function lunisolarLongitudesInto(
  instant: number,
  model: ArgumentModel,
  out: Float64Array,
): void {
  checkModel(model);
  const row =
    model === 'iers2010'
      ? longitudesIers2010((instant + deltaTAt(instant)[0] * 1000 - J2000_MS) / CENTURY_MS)
      : longitudesSchureman1940((instant - EPOCH_1900_MS) / CENTURY_MS);
  out.set(row, 1);
  const dayTime = instant - Math.floor(instant / DAY) * DAY;
  out[0] = (dayTime / HOUR) * 15 + (row[1] as number) - (row[0] as number);
}

function named(values: ArrayLike<number>): LunisolarArguments {
  const [tau, s, h, p, nPrime, ps] = Array.from(values) as [
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  return { tau, s, h, p, nPrime, ps };
}

/**
 * The six arguments of the tide.
 *
 * @param t - An instant from year 1700 to 2200; UTC is read as UT1.
 * @param model - `iers2010` (TT through ΔT; default) or `schureman1940` (no ΔT).
 * @returns Degrees in [0, 360). The longitudes of iers2010 agree with ERFA to 1e-8°.
 * @throws InputError of `toInstant`; `UNKNOWN_CHOICE`, path `model`.
 * @example
 * lunisolarLongitudes('2000-01-01T12:00Z', 'schureman1940').h > 280; // true
 * @public
 */
export function lunisolarLongitudes(
  t: InstantLike,
  model: ArgumentModel = 'iers2010',
): LunisolarArguments {
  const six = new Float64Array(6);
  lunisolarLongitudesInto(toInstant(t, 't'), model, six);
  return named(six.map(wrapDegrees));
}

/**
 * Rates of the six arguments, analytically.
 *
 * @param t - An instant from year 1700 to 2200.
 * @param model - `iers2010` (default) or `schureman1940`.
 * @returns Degrees per mean solar hour (of UT).
 * @throws InputError of `toInstant`; `UNKNOWN_CHOICE`, path `model`.
 * @example
 * lunisolarRates('2000-01-01T12:00Z').tau.toFixed(6); // '14.492052'
 * @public
 */
export function lunisolarRates(
  t: InstantLike,
  model: ArgumentModel = 'iers2010',
): LunisolarArguments {
  checkModel(model);
  const instant = toInstant(t, 't');
  const [seconds, slope] = model === 'iers2010' ? deltaTAt(instant) : [0, 0];
  const row =
    model === 'iers2010'
      ? ratesIers2010((instant + seconds * 1000 - J2000_MS) / CENTURY_MS)
      : ratesSchureman1940((instant - EPOCH_1900_MS) / CENTURY_MS);
  // TT runs faster than UT by dΔT/dt.
  const ttPerUt = 1 + (slope * YEARS_PER_CENTURY) / (HOURS_PER_CENTURY * 3600);
  const hourly = row.map((rate) => (rate * ttPerUt) / HOURS_PER_CENTURY);
  return named([15 + (hourly[1] as number) - (hourly[0] as number), ...hourly]);
}

/**
 * The longitudes on Terrestrial Time, without UT in them: for comparison with other astronomical software.
 *
 * @param julianDateTT - Julian date TT, in one number or in two parts that keep its precision.
 * @returns Degrees in [0, 360); within 1e-8° of ERFA 2.0.0, 1850 to 2150.
 * @throws InputError `NOT_FINITE` or `OUT_OF_RANGE` (beyond five centuries from 2000), path `julianDateTT`.
 * @example
 * lunisolarLongitudesTT({ day: 2451545, fraction: 0 }).h.toFixed(4); // '280.4665'
 * @public
 */
export function lunisolarLongitudesTT(
  julianDateTT: number | { readonly day: number; readonly fraction: number },
): Omit<LunisolarArguments, 'tau'> {
  const { day, fraction } =
    typeof julianDateTT === 'number' ? { day: julianDateTT, fraction: 0 } : julianDateTT;
  const t = (day - 2451545 + fraction) / 36525;
  if (!(Math.abs(t) <= 5)) {
    throw new InputError(
      Number.isNaN(t) ? 'NOT_FINITE' : 'OUT_OF_RANGE',
      'julianDateTT',
      `expected a Julian date from 2268920 to 2634170, got ${describe(day + fraction)}`,
    );
  }
  const [s, h, p, nPrime, ps] = longitudesIers2010(t).map(wrapDegrees) as [
    number,
    number,
    number,
    number,
    number,
  ];
  return { s, h, p, nPrime, ps };
}
