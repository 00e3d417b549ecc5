import {
  expectAngleWithin,
  expectWithin,
  loadVector,
  mergeDifferences,
  recordAccuracy,
} from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { lunisolarLongitudesTT } from '../src/index.js';
import { trueApsis } from '../src/sky/apsides.js';
import { elongation, moonAnomaly, sunAnomaly, sunLongitude, whenPassed } from '../src/sky/mean.js';
import { moonOfDate } from '../src/sky/moon.js';
import { meanObliquity, nutation } from '../src/sky/nutation.js';
import { ABERRATION, truePhase } from '../src/sky/phases.js';
import { centuriesAt, instantOf } from '../src/sky/series.js';
import { apparentLongitude, meanSiderealTime, sunOfDate } from '../src/sky/sun.js';
import { lunarApsides, moonPhases, moonPosition, seasons } from '../src/sky.js';

interface Examples {
  moonPosition: { julianDateTT: number; longitude: number; latitude: number; distance: number };
  sunPosition: {
    julianDateTT: number;
    trueLongitude: number;
    radius: number;
    meanAnomaly: number;
    apparentLongitudeDms: [number, number, number];
  };
  nutation: {
    julianDateTT: number;
    inLongitude: number;
    inObliquity: number;
    meanObliquityDms: [number, number, number];
  };
  siderealTime: { julianDateUT: number; hms: [number, number, number] }[];
  phases: {
    lunation: number;
    kind: string;
    meanJulianDateTT: number;
    julianDateTT: number;
  }[];
  apsis: {
    kind: string;
    meanJulianDateTT: number;
    julianDateTT: number;
    parallaxArcseconds: number;
  };
  perigees: { dateTT: string; hourTT: number }[];
  seasons: Record<string, string[]>;
  nodeZero: string[];
  nodeHalfTurn: string[];
}

const ID = 'meeus-examples';
const { cases } = loadVector<Examples>('meeus-examples');
const DAY = 86400000;

const centuries = (julianDate: number): number => (julianDate - 2451545) / 36525;
const julianDate = (t: number): number => 2451545 + 36525 * t;
const ofParts = ([whole, minutes, seconds]: [number, number, number]): number =>
  whole + minutes / 60 + seconds / 3600;
/** Julian date of a civil date and time. */
const civil = (text: string): number => Date.parse(text) / DAY + 2440587.5;
/** The seconds between an instant that the public functions give and a Julian date TT. */
const secondsOff = (instant: number, julianDateTT: number): number =>
  (julianDate(centuriesAt(instant)) - julianDateTT) * 86400;
/** A span of so many days on either side of a Julian date TT. */
const around = (julianDateTT: number, days: number): { from: number; to: number } => {
  const middle = instantOf(centuries(julianDateTT));
  return { from: middle - days * DAY, to: middle + days * DAY };
};

describe('worked examples of Meeus (1998)', () => {
  it('47.a: the Moon, to the printed digits', () => {
    const { julianDateTT, longitude, latitude, distance } = cases.moonPosition;
    const got = moonOfDate(centuries(julianDateTT));
    const seen = mergeDifferences([
      expectAngleWithin(got[0], longitude, { abs: 5e-7 }),
      expectWithin(got[1], latitude, { abs: 5e-7 }),
    ]);
    expectWithin(got[2], distance, { abs: 0.05 });
    recordAccuracy(ID, {
      capability: "the Moon's longitude and latitude of date",
      compared: 'example 47.a, to the printed digits',
      ...seen,
      tolerance: 5e-7,
      unit: 'degrees',
    });
    // The public function adds nutation alone.
    const place = moonPosition(instantOf(centuries(julianDateTT)));
    const [inLongitude] = nutation(centuries(julianDateTT));
    expectAngleWithin(place.longitude, longitude + inLongitude / 3600, { abs: 1e-6 });
  });

  it('25.a: the Sun of the lower accuracy, to the printed digits', () => {
    const example = cases.sunPosition;
    const t = centuries(example.julianDateTT);
    const [longitude, radius] = sunOfDate(t);
    expectAngleWithin(longitude, example.trueLongitude, { abs: 5e-6 });
    expectWithin(radius, example.radius, { abs: 5e-6 });
    expectAngleWithin(sunAnomaly(t), example.meanAnomaly, { abs: 5e-6 });
    // Aberration and the one term of nutation that the book adds there; its Ω, from memory, is 264.65°.
    const node = ((125.04 - 1934.136 * t) * Math.PI) / 180;
    const printed = ofParts(example.apparentLongitudeDms);
    const apparent = longitude - 0.00569 - 0.00478 * Math.sin(node);
    expectAngleWithin(apparent, printed, { abs: 0.5 / 3600 });
    // Moon and planets pull it off that by no more than the book says of the method.
    expectAngleWithin(apparentLongitude(t), printed, { abs: 0.01 });
  });

  it('22.a: nutation by the short series, obliquity to the printed digits', () => {
    const example = cases.nutation;
    const t = centuries(example.julianDateTT);
    const [inLongitude, inObliquity] = nutation(t);
    expectWithin(inLongitude, example.inLongitude, { abs: 0.5 });
    expectWithin(inObliquity, example.inObliquity, { abs: 0.1 });
    expectWithin(meanObliquity(t), ofParts(example.meanObliquityDms) * 3600, { abs: 0.0005 });
  });

  it('12.a, 12.b: sidereal time, to the printed digits', () => {
    const got = cases.siderealTime.map((row) => meanSiderealTime(row.julianDateUT - 2451545));
    const want = cases.siderealTime.map((row) => ofParts(row.hms) * 15);
    expectAngleWithin(got, want, { abs: (0.00005 * 15) / 3600 });
  });

  it('49.a, 49.b: phases, to the printed digits', () => {
    const quarters = cases.phases.map((row) => (row.lunation + 1) * 4);
    expectWithin(
      quarters.map((n) => julianDate(whenPassed(elongation, n * 90 - ABERRATION))),
      cases.phases.map((row) => row.meanJulianDateTT),
      { abs: 5e-6 },
    );
    const got = quarters.map((n) => julianDate(truePhase(n)));
    const want = cases.phases.map((row) => row.julianDateTT);
    const seen = expectWithin(got, want, { abs: 5e-6 });
    recordAccuracy(ID, {
      capability: 'phases of the Moon',
      compared: 'examples 49.a and 49.b, to the printed digits',
      ...seen,
      tolerance: 5e-6,
      unit: 'days',
    });
    for (const { julianDateTT, kind } of cases.phases) {
      const found = moonPhases(around(julianDateTT, 2));
      expect(found.map((phase) => phase.kind)).toEqual([kind]);
      expectWithin(secondsOff(found[0]?.time as number, julianDateTT), 0, { abs: 0.5 });
    }
  });

  it('50.a: apogee, to the printed digits', () => {
    const example = cases.apsis;
    // The mean apsis is found from the anomaly; the book's epoch of it is cut to four decimals.
    const mean = julianDate(whenPassed(moonAnomaly, -297 * 180));
    expectWithin(mean, example.meanJulianDateTT, { abs: 1e-4 });
    const seen = expectWithin(julianDate(trueApsis(-297)), example.julianDateTT, { abs: 5e-5 });
    recordAccuracy(ID, {
      capability: 'perigee and apogee of the Moon',
      compared: 'example 50.a, to the printed digits',
      ...seen,
      tolerance: 5e-5,
      unit: 'days',
    });
    const [apogee] = lunarApsides(around(example.julianDateTT, 3));
    expect(apogee?.kind).toBe(example.kind);
    // Distance from chapter 47, parallax there from a series of chapter 50: 0.05″ are 6 km.
    const parallax = Math.asin(6378.14 / (apogee?.distance as number));
    expectWithin((parallax * 648000) / Math.PI, example.parallaxArcseconds, { abs: 0.05 });
  });

  it('perigees of the table on page 361, which the book computes exactly', () => {
    const off = cases.perigees.map(({ dateTT, hourTT }) => {
      const exact = civil(`${dateTT}T00:00Z`) + hourTT / 24;
      const found = lunarApsides(around(exact, 3));
      expect(found.map(({ kind }) => kind)).toEqual(['perigee']);
      return secondsOff(found[0]?.time as number, exact) / 60;
    });
    // The book allows the method 31 minutes at perigee.
    expectWithin(
      off,
      off.map(() => 0),
      { abs: 31 },
    );
  });

  it('equinoxes and solstices of the table on page 182, which the book computes exactly', () => {
    const found = seasons({ from: '1996-01-01T00:00Z', to: '2006-01-01T00:00Z' });
    expect(found.length).toBe(40);
    const off = Object.entries(cases.seasons).flatMap(([kind, dates]) => {
      const ours = found.filter((season) => season.kind === kind);
      expect(ours.length).toBe(dates.length);
      return ours.map(({ time }, i) => secondsOff(time, civil(`${dates[i]}Z`)));
    });
    // The book allows its method 51 s from 1951 to 2050.
    const seen = expectWithin(
      off,
      off.map(() => 0),
      { abs: 51 },
    );
    recordAccuracy(ID, {
      capability: 'equinoxes and solstices',
      compared: 'table on page 182, exact, 1996 to 2005',
      ...seen,
      tolerance: 51,
      unit: 's',
    });
  });

  it('the node at 0° and 180° on the dates of page 344', () => {
    const nodeAt = (date: string): number => -lunisolarLongitudesTT(civil(`${date}T00:00Z`)).nPrime;
    // Dates without an hour: the node moves 0.053° in a day.
    expectAngleWithin(
      cases.nodeZero.map(nodeAt),
      cases.nodeZero.map(() => 0),
      { abs: 0.053 },
    );
    expectAngleWithin(
      cases.nodeHalfTurn.map(nodeAt),
      cases.nodeHalfTurn.map(() => 180),
      { abs: 0.053 },
    );
    expect(cases.nodeZero.length + cases.nodeHalfTurn.length).toBe(22);
  });
});

describe('mean angles', () => {
  it('agree with those of the IERS Conventions (2010) that the tide is counted by', () => {
    // Both within a century of 2000: the Moon's tidal acceleration in the two differs by 0.4″ a century².
    for (const t of [-1, -0.5, 0, 0.5, 1]) {
      const { s, h, p, ps } = lunisolarLongitudesTT(julianDate(t));
      expectAngleWithin(
        [elongation(t), sunAnomaly(t), moonAnomaly(t), sunLongitude(t)],
        [s - h, h - ps, s - p, h],
        { abs: 3e-4 },
      );
    }
  });
});
