/**
 * Makes the vectors of the two proofs from an ephemeris: npx tsx --tsconfig tsconfig.test.json tools/vectors/ephemeris.mjs.
 * Run by hand when the ephemeris changes; what it writes is committed.
 */
import {
  ALL,
  DEGREE_2,
  heightsAt,
} from '../../packages/constituents/test/reference/absolute-proof.ts';
import {
  CONSTANTS,
  tideOfEphemeris,
} from '../../packages/constituents/test/reference/equilibrium-tide.ts';
import { groupsOf } from '../test/reference/yearly-fits.ts';
import { writeVector } from './write.mjs';

const LIBRARY = 'astronomy-engine 2.1.19 (D. Cross, MIT)';
const HOUR = 3600000;

const places = [
  { name: '45 N 0 E', latitude: 45, longitude: 0, limit: 7e-4, limitWithDegree3: 1e-3 },
  { name: '45 N 120 E', latitude: 45, longitude: 120, limit: 7e-4, limitWithDegree3: 1e-3 },
  { name: 'equator 0 E', latitude: 0, longitude: 0, limit: 7e-4, limitWithDegree3: 1e-3 },
  { name: 'equator 120 E', latitude: 0, longitude: 120, limit: 7e-4, limitWithDegree3: 1e-3 },
  { name: '60 S 150 E', latitude: -60, longitude: 150, limit: 8.5e-4, limitWithDegree3: 1e-3 },
];
// One instant a year, at another hour each, so that every phase of the day and of the year is met.
const times = Float64Array.from(
  { length: 19 },
  (_, i) => Date.UTC(1993 + i, 0, 1) + i * 467 * HOUR,
);
const numbers = tideOfEphemeris(times);
const columns = places.flatMap((place) =>
  [DEGREE_2, ALL.filter((term) => !DEGREE_2.includes(term))].map((terms) =>
    heightsAt(numbers, place, terms),
  ),
);

writeVector({
  id: 'ephemeris-equilibrium-tide',
  title: 'Equilibrium tide of degrees 2 and 3 from positions of Moon and Sun, 1993 to 2011',
  source: `Geometric positions of Moon and Sun on the true equator and equinox of date, and apparent sidereal time, computed with ${LIBRARY}; the constants are among the cases`,
  kind: 'reference-library',
  unit: 'm; limits: rms of the difference over rms of the signal, means removed',
  licence: 'MIT (the library); the numbers were computed with it',
  tolerance: { abs: 1e-9, why: 'heights repeat to rounding with the same version of the library' },
  notes: [
    'The constants are those of the IERS Conventions (2010), table 1.1, from memory; heights are on the scale of the lines within 7e-5.',
    'Height = sum over Moon and Sun of mu a (a/d)^(n+1) P_n(cos z): mu the mass over that of the Earth, a the radius, d the distance, z the zenith distance; g = GM/a^2 cancels.',
    'heights of a sample: degree 2 and degree 3 at the first place, then at the second, and so on. UT is read as UT1, Delta T is that of the library.',
    'The limits are those that the project sets itself; the ones with degree 3 too.',
  ],
  cases: {
    from: '1993-01-01T00:00Z',
    to: '2012-01-01T00:00Z',
    constants: CONSTANTS,
    places,
    limits: { species: [2.7e-3, 7e-4, 4.8e-4], waves: 4.5e-4 },
    samples: Array.from(times, (time, i) => ({
      time: `${new Date(time).toISOString().slice(0, 16)}Z`,
      heights: columns.map((column) => Number(column[i].toFixed(10))),
    })),
  },
});

const HOURS = 8766;
const LEAST_TURNS = 0.9;
const COUNT = 49;
// Groups without a name of their own go under compounds with the same multipliers.
const BY_COMPOUND = { '1,-4,2,1,0,0': 'MUQM1', '2,-3,0,3,0,0': '3N2M2', '2,4,0,0,0,0': '2KM2' };
writeVector({
  id: 'ephemeris-yearly-fits',
  title:
    'The 49 groups of lines of degree 2 that are largest and separable in a year, for yearly fits of the tide of an ephemeris',
  source: `Groups (same multipliers of tau, s, h and p_s) ranked by the root sum square of their lines in D. E. Cartwright and A. C. Edden (1973); the tide of 1993 to 2011 computed with ${LIBRARY} as in ephemeris-equilibrium-tide`,
  kind: 'reference-library',
  unit: 'share of the mean amplitude; degrees',
  licence: 'MIT (the library)',
  tolerance: { rel: 0.002, why: 'what the project asks of the larger constituents: see limits' },
  notes: [
    `A group is taken where it stands ${LEAST_TURNS} turns or more in ${HOURS} h from all larger ones and from the mean level.`,
    'name is what the fit is asked for; MUQM1, 3N2M2 and 2KM2 are compounds with the multipliers of a group that has no name of its own, their f and u are those of their members.',
    'size: root sum square of the lines of the group, metres.',
  ],
  cases: {
    from: '1993-01-01T00:00Z',
    years: 19,
    hoursAYear: HOURS,
    latitude: 45,
    longitude: 0,
    leastTurns: LEAST_TURNS,
    limits: {
      strong: {
        names: ['M2', 'S2', 'N2', 'K2', 'O1', 'K1', 'P1'],
        amplitude: 0.002,
        phaseLag: 0.15,
      },
      Q1: { names: ['Q1'], amplitude: 0.003, phaseLag: 0.2 },
    },
    groups: groupsOf(HOURS, LEAST_TURNS, COUNT).map(({ doodsonNumbers, size, name }) => ({
      name: name ?? BY_COMPOUND[doodsonNumbers.join()],
      doodsonNumbers,
      size: Number(size.toFixed(6)),
    })),
  },
});
