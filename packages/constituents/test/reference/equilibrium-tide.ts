/**
 * The equilibrium tide of degrees 2 and 3, twice: from an ephemeris, and as the sum of the lines of the potential.
 *
 * Both are written as height = Σ W_n^m(latitude) · Re(z_nm · e^{i m λ}), so that one set of numbers z_nm serves every place.
 * From the ephemeris, z_nm = Σ over Moon and Sun of μ·a·(a/d)^{n+1} · 4π/(2n+1) · (2 − δ_0m) · W_n^m(declination) ·
 * e^{i m (apparent sidereal time − right ascension)}, μ the mass over that of the Earth (addition theorem).
 */
import { deltaT, lunisolarLongitudesInto } from '@staithe/arguments';
import type { PotentialLine } from '../../src/index.js';
import {
  Body,
  e_tilt,
  GeoMoon,
  HelioVector,
  KM_PER_AU,
  MakeTime,
  RotateVector,
  Rotation_EQJ_EQD,
  SiderealTime,
  Vector,
} from 'astronomy-engine';

/** Earth, Moon and Sun: IERS Conventions (2010), table 1.1, from memory. With g = GM/a² no other constant enters. */
export const CONSTANTS = {
  earthRadius: 6378136.6, // m, equatorial
  moonOverEarth: 0.0123000371, // masses
  sunOverEarth: 332946.0487, // GM 1.32712442099e20 over 3.986004418e14 m³/s²
} as const;

/** The terms, in the order of their numbers: two a term, real and imaginary part. */
export const TERMS = [
  { degree: 2, order: 0 },
  { degree: 2, order: 1 },
  { degree: 2, order: 2 },
  { degree: 3, order: 0 },
  { degree: 3, order: 1 },
  { degree: 3, order: 2 },
  { degree: 3, order: 3 },
] as const;

/** g of the heights of waves, m/s²: GM/a² of the Earth. */
const GRAVITY = 9.7982869;
const J2000_MS = 946728000000;
const NUMBERS = 2 * TERMS.length;
const DEGREE = Math.PI / 180;

/** W_n^m of the seven terms at a latitude, from its sine: fully normalised, with (−1)^m (docs/potential.md). */
export function weights(sine: number): number[] {
  const cosine = Math.sqrt(1 - sine * sine);
  const root = (numerator: number, denominator: number): number =>
    Math.sqrt(numerator / (denominator * Math.PI));
  return [
    root(5, 4) * (1.5 * sine * sine - 0.5),
    -root(5, 24) * 3 * sine * cosine,
    root(5, 96) * 3 * cosine * cosine,
    root(7, 4) * (2.5 * sine * sine - 1.5) * sine,
    -root(7, 48) * 1.5 * cosine * (5 * sine * sine - 1),
    root(7, 480) * 15 * sine * cosine * cosine,
    -root(7, 2880) * 15 * cosine * cosine * cosine,
  ];
}

type Wave = readonly [number, number, number, number, number, number];

function addBody(
  out: Float64Array,
  at: number,
  place: Vector,
  massRatio: number,
  siderealDegrees: number,
): void {
  const distance = Math.sqrt(place.x * place.x + place.y * place.y + place.z * place.z);
  const parallax = CONSTANTS.earthRadius / (distance * KM_PER_AU * 1000);
  const hourAngle = siderealDegrees * DEGREE - Math.atan2(place.y, place.x);
  const declinationWeights = weights(place.z / distance);
  TERMS.forEach(({ degree, order }, k) => {
    const size =
      massRatio *
      CONSTANTS.earthRadius *
      parallax ** (degree + 1) *
      ((4 * Math.PI) / (2 * degree + 1)) *
      (order === 0 ? 1 : 2) *
      (declinationWeights[k] as number);
    out[at + 2 * k] = (out[at + 2 * k] as number) + size * Math.cos(order * hourAngle);
    out[at + 2 * k + 1] = (out[at + 2 * k + 1] as number) + size * Math.sin(order * hourAngle);
  });
}

/** A position on the true equator, and the nutation taken out of it: on the mean equator and equinox of date. */
function withoutNutation(place: Vector, { dpsi, tobl, mobl }: ReturnType<typeof e_tilt>): Vector {
  const [ct, st] = [Math.cos(tobl * DEGREE), Math.sin(tobl * DEGREE)];
  const [cm, sm] = [Math.cos(mobl * DEGREE), Math.sin(mobl * DEGREE)];
  const [cp, sp] = [Math.cos((dpsi / 3600) * DEGREE), Math.sin((dpsi / 3600) * DEGREE)];
  const y = place.y * ct + place.z * st;
  const z = place.z * ct - place.y * st;
  const x = place.x * cp + y * sp;
  const turned = y * cp - place.x * sp;
  return new Vector(x, turned * cm - z * sm, turned * sm + z * cm, place.t);
}

/**
 * From the ephemeris: geometric positions on the true equator and equinox of date, apparent sidereal time.
 *
 * @param times - Milliseconds since 1970, UTC read as UT1.
 * @param nutation - False: the mean equator and equinox, mean sidereal time.
 * @returns Metres, row-major, times.length × 14.
 */
export function tideOfEphemeris(times: Float64Array, nutation = true): Float64Array {
  const out = new Float64Array(times.length * NUMBERS);
  times.forEach((ms, i) => {
    const time = MakeTime(new Date(ms));
    const rotation = Rotation_EQJ_EQD(time);
    const earth = HelioVector(Body.Earth, time);
    const tilt = e_tilt(time);
    const [moon, sun] = [GeoMoon(time), new Vector(-earth.x, -earth.y, -earth.z, time)].map(
      (place) => {
        const turned = RotateVector(rotation, place);
        return nutation ? turned : withoutNutation(turned, tilt);
      },
    ) as [Vector, Vector];
    const sidereal = 15 * SiderealTime(time) - (nutation ? 0 : tilt.ee / 240);
    addBody(out, i * NUMBERS, moon, CONSTANTS.moonOverEarth, sidereal);
    addBody(out, i * NUMBERS, sun, CONSTANTS.sunOverEarth, sidereal);
  });
  return out;
}

/**
 * As the sum of lines, with `lunisolarLongitudesInto` of iers2010.
 *
 * @param times - Milliseconds since 1970, UTC read as UT1.
 * @param lines - Of `potentialLines`.
 * @returns Metres, row-major, times.length × 14.
 */
export function tideOfLines(times: Float64Array, lines: readonly PotentialLine[]): Float64Array {
  const out = new Float64Array(times.length * NUMBERS);
  const six = new Float64Array(6);
  const columns = lines.map(({ degree, order }) =>
    TERMS.findIndex((term) => term.degree === degree && term.order === order),
  );
  times.forEach((ms, i) => {
    lunisolarLongitudesInto(ms, 'iers2010', six);
    lines.forEach(({ degree, order, doodsonNumbers, amplitude }, j) => {
      let angle = 0;
      for (let k = 0; k < 6; k++) angle += (six[k] as number) * (doodsonNumbers[k] as number);
      // A sine is the real part of −i·e^{iθ}.
      const theta = angle * DEGREE - ((degree + order) % 2 === 0 ? 0 : Math.PI / 2);
      const at = i * NUMBERS + 2 * (columns[j] as number);
      out[at] = (out[at] as number) + amplitude * Math.cos(theta);
      out[at + 1] = (out[at + 1] as number) + amplitude * Math.sin(theta);
    });
  });
  return out;
}

/**
 * As the sum of waves given by phase, frequency and amplitude, all cosines without (−1)^m. Their phase counts UT equal to
 * TT, so ΔT holds the turning of the Earth back: θ = phase + frequency·TT − order·15°/h·ΔT.
 *
 * @param times - Milliseconds since 1970, UTC read as UT1.
 * @param waves - Rows of number, degree, order, phase at J2000 (radians), frequency (radians a second), amplitude (m²/s²).
 * @returns Metres, row-major, times.length × 14.
 */
export function tideOfWaves(
  times: Float64Array,
  waves: readonly (readonly number[])[],
): Float64Array {
  const out = new Float64Array(times.length * NUMBERS);
  const rows = (waves as readonly Wave[]).map(([, degree, order, phase, frequency, size]) => ({
    at: 2 * TERMS.findIndex((term) => term.degree === degree && term.order === order),
    order,
    phase,
    frequency,
    amplitude: (size / GRAVITY) * (order % 2 === 0 ? 1 : -1),
  }));
  times.forEach((ms, i) => {
    const { seconds } = deltaT(ms);
    const sinceJ2000 = (ms - J2000_MS) / 1000 + seconds;
    const turnedBack = seconds * (15 / 3600) * DEGREE;
    for (const { at, order, phase, frequency, amplitude } of rows) {
      const theta = phase + frequency * sinceJ2000 - order * turnedBack;
      const to = i * NUMBERS + at;
      out[to] = (out[to] as number) + amplitude * Math.cos(theta);
      out[to + 1] = (out[to + 1] as number) + amplitude * Math.sin(theta);
    }
  });
  return out;
}
