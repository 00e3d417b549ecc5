/**
 * Moon and Sun against an independent ephemeris: astronomy-engine 2.1.19 (D. Cross; VSOP87 and the lunar theory of
 * E. W. Brown in the form of Montenbruck and Pfleger), given the same ΔT, at random dates 1900 to 2100.
 */
import { angleDifference } from '@staithe/core';
import { expectAngleWithin, expectWithin } from '@staithe/test-vectors';
import {
  Body,
  Equator,
  EquatorFromVector,
  GeoMoon,
  GeoVector,
  Horizon,
  KM_PER_AU,
  MakeTime,
  NextLunarApsis,
  NextMoonQuarter,
  Observer,
  RotateVector,
  Rotation_EQJ_ECT,
  Rotation_EQJ_EQD,
  SearchLunarApsis,
  SearchMoonQuarter,
  Seasons,
  SetDeltaTFunction,
  SphereFromVector,
} from 'astronomy-engine';
import { beforeAll, describe, expect, it } from 'vitest';
import { deltaT } from '../src/index.js';
import {
  lunarApsides,
  moonPhases,
  moonPosition,
  seasons,
  sunAltitude,
  sunPosition,
} from '../src/sky.js';

const J2000_MS = 946728000000;
const FROM = Date.UTC(1900, 0, 1);
const TO = Date.UTC(2101, 0, 1);
const MINUTE = 60000;

/** A seeded stream of numbers from 0 to 1 (D. H. Lehmer's generator with the multiplier 48271). */
function stream(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 48271) % 2147483647;
    return state / 2147483647;
  };
}

const draw = stream(20260101);
const DATES = Array.from({ length: 1500 }, () => Math.round(FROM + draw() * (TO - FROM)));
const zeros = (values: readonly unknown[]): number[] => values.map(() => 0);

beforeAll(() => {
  SetDeltaTFunction((days) => deltaT(days * 86400000 + J2000_MS).seconds);
});

describe.each([
  ['Moon', moonPosition, Body.Moon, 0.005, 0.002, 25],
  ['Sun', sunPosition, Body.Sun, 0.0015, 0.0005, 15000],
] as const)('the %s, 1500 random dates', (_, position, body, along, across, kilometres) => {
  const places = DATES.map((date) => position(date));
  const vectors = () =>
    DATES.map((date) => {
      const time = MakeTime(new Date(date));
      return { time, vector: body === Body.Moon ? GeoMoon(time) : GeoVector(body, time, true) };
    });

  it('has its ecliptic place and distance', () => {
    const spheres = vectors().map(({ time, vector }) =>
      SphereFromVector(RotateVector(Rotation_EQJ_ECT(time), vector)),
    );
    const longitudes = spheres.map(({ lon }) => lon);
    expectAngleWithin(
      places.map(({ longitude }) => longitude),
      longitudes,
      { abs: along },
      'longitude',
    );
    expectWithin(
      places.map(({ latitude }) => latitude),
      spheres.map(({ lat }) => lat),
      { abs: across },
      'latitude',
    );
    expectWithin(
      places.map(({ distance }) => distance),
      spheres.map(({ dist }) => dist * KM_PER_AU),
      { abs: kilometres },
      'distance',
    );
  });

  it('has its right ascension and declination', () => {
    const equators = vectors().map(({ time, vector }) =>
      EquatorFromVector(RotateVector(Rotation_EQJ_EQD(time), vector)),
    );
    expectAngleWithin(
      places.map(({ rightAscension }) => rightAscension),
      equators.map(({ ra }) => ra * 15),
      { abs: along },
      'right ascension',
    );
    expectWithin(
      places.map(({ declination }) => declination),
      equators.map(({ dec }) => dec),
      { abs: Math.max(across, along / 2) },
      'declination',
    );
  });
});

describe('the altitude of the Sun', () => {
  it('agrees at random places but for parallax, 0.0024°', () => {
    const pairs = DATES.map((date) => {
      const place = { latitude: draw() * 180 - 90, longitude: draw() * 360 - 180 };
      const observer = new Observer(place.latitude, place.longitude, 0);
      const { ra, dec } = Equator(Body.Sun, new Date(date), observer, true, true);
      const { altitude } = Horizon(new Date(date), observer, ra, dec);
      return [sunAltitude(date, place), altitude] as const;
    });
    expectWithin(
      pairs.map(([ours]) => ours),
      pairs.map(([, theirs]) => theirs),
      { abs: 0.004 },
    );
  });
});

describe('events, all of 1900 to 2100', () => {
  it('finds each phase of the Moon within 2 minutes', () => {
    const ours = moonPhases({ from: FROM, to: TO });
    let next = SearchMoonQuarter(new Date(FROM));
    const theirs = ours.map(() => {
      const { quarter, time } = next;
      next = NextMoonQuarter(next);
      return { quarter, time: time.date.getTime() };
    });
    const kinds = ['new', 'first-quarter', 'full', 'last-quarter'];
    expect(ours.map(({ kind }) => kind)).toEqual(theirs.map(({ quarter }) => kinds[quarter]));
    expect(next.time.date.getTime()).toBeGreaterThanOrEqual(TO - 2 * MINUTE);
    const off = ours.map(({ time }, i) => (time - (theirs[i]?.time as number)) / MINUTE);
    expectWithin(off, zeros(off), { abs: 2 });
  });

  it('finds each perigee within 40 minutes, each apogee within 5, their distances within 25 km', () => {
    const ours = lunarApsides({ from: FROM, to: TO });
    let next = SearchLunarApsis(new Date(FROM));
    const theirs = ours.map(() => {
      const { kind, time, dist_km } = next;
      next = NextLunarApsis(next);
      return { kind, time: time.date.getTime(), distance: dist_km };
    });
    const kinds = ['perigee', 'apogee'];
    expect(ours.map(({ kind }) => kind)).toEqual(theirs.map(({ kind }) => kinds[kind]));
    expect(next.time.date.getTime()).toBeGreaterThanOrEqual(TO - 60 * MINUTE);
    for (const [kind, minutes] of [
      ['perigee', 40],
      ['apogee', 5],
    ] as const) {
      const off = ours
        .map((apsis, i) => ({ ...apsis, off: (apsis.time - (theirs[i]?.time as number)) / MINUTE }))
        .filter((apsis) => apsis.kind === kind)
        .map((apsis) => apsis.off);
      expectWithin(off, zeros(off), { abs: minutes }, kind);
    }
    expectWithin(
      ours.map(({ distance }) => distance),
      theirs.map(({ distance }) => distance),
      { abs: 25 },
    );
  });

  it('finds each equinox and solstice within 2 minutes', () => {
    const ours = seasons({ from: FROM, to: TO });
    const theirs = Array.from({ length: 201 }, (_, i) => Seasons(1900 + i)).flatMap((year) =>
      [year.mar_equinox, year.jun_solstice, year.sep_equinox, year.dec_solstice].map((time) =>
        time.date.getTime(),
      ),
    );
    expect(ours.length).toBe(theirs.length);
    const off = ours.map(({ time }, i) => (time - (theirs[i] as number)) / MINUTE);
    expectWithin(off, zeros(off), { abs: 2 });
  });
});

describe('the whole range', () => {
  it('keeps to 0.02° for the Moon and 0.01° for the Sun from 1700 to 2200', () => {
    for (let year = 1700; year < 2201; year += 1) {
      const date = Date.UTC(year, year % 12, 1 + (year % 28), year % 24);
      const time = MakeTime(new Date(date));
      const moon = SphereFromVector(RotateVector(Rotation_EQJ_ECT(time), GeoMoon(time)));
      const sun = SphereFromVector(
        RotateVector(Rotation_EQJ_ECT(time), GeoVector(Body.Sun, time, true)),
      );
      expect(Math.abs(angleDifference(moonPosition(date).longitude, moon.lon))).toBeLessThan(0.02);
      expect(Math.abs(angleDifference(sunPosition(date).longitude, sun.lon))).toBeLessThan(0.01);
    }
  });
});
