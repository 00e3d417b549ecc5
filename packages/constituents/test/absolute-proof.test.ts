import { expectWithin, loadVector, recordAccuracy } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import {
  ALL,
  DEGREE_2,
  DEGREE_3,
  heightsAt,
  type Proof,
  relativeRms,
  runProof,
  spread,
  timesOf,
} from './reference/absolute-proof.js';
import {
  CONSTANTS,
  tideOfEphemeris,
  tideOfLines,
  tideOfWaves,
} from './reference/equilibrium-tide.js';
import { potentialLines } from '../src/index.js';

const vector = loadVector<Proof>('ephemeris-equilibrium-tide');
const proof = vector.cases;
const STEP = 37; // hours: meets every hour of the day; tools/slow/absolute-proof.mjs takes every hour

describe('the ephemeris', () => {
  it('gives the heights on record, with the constants on record', () => {
    expect(proof.constants).toEqual(CONSTANTS);
    const times = Float64Array.from(proof.samples, ({ time }) => new Date(time).getTime());
    const numbers = tideOfEphemeris(times);
    const columns = proof.places.flatMap((place) =>
      [DEGREE_2, DEGREE_3].map((terms) => heightsAt(numbers, place, terms)),
    );
    const got = proof.samples.flatMap((_, i) => columns.map((column) => column[i] as number));
    const want = proof.samples.flatMap(({ heights }) => heights);
    expect(want.length).toBe(19 * 10);
    expectWithin(got, want, { abs: vector.tolerance.abs as number });
  });
});

describe('the sum of the lines of the potential', () => {
  it('is the equilibrium tide of the ephemeris', () => {
    const { ratios, samples } = runProof(proof, STEP);
    for (const what of new Set(ratios.map((ratio) => ratio.what))) {
      const rows = ratios.filter((row) => row.what === what);
      for (const limit of new Set(rows.map((row) => row.limit))) {
        const own = rows.filter((row) => row.limit === limit);
        const worst = Math.max(...own.map(({ ratio }) => ratio));
        recordAccuracy('ephemeris-equilibrium-tide', {
          capability: `equilibrium tide, ${what}: rms of the difference over rms of the signal`,
          compared: `${own.map(({ where }) => where).join(', ')}; every ${STEP} h; typical is the least of the places`,
          cases: samples,
          worst,
          typical: Math.min(...own.map(({ ratio }) => ratio)),
          tolerance: limit,
          unit: '1',
          ...(what === 'degree 2, 342 lines' && limit === 7e-4 ? { headline: true } : {}),
        });
      }
    }
    // 5 places; no diurnal tide of degree 2 at the two on the equator.
    expect(ratios.length).toBe(5 * 6 - 2);
  });

  it('is on the scale and at the time of the ephemeris', () => {
    const times = timesOf(proof, STEP);
    const place = { latitude: 45, longitude: 0 };
    const signal = heightsAt(tideOfEphemeris(times), place, ALL);
    const lines = heightsAt(tideOfLines(times, potentialLines()), place, ALL);
    expectWithin(spread(lines), spread(signal), { rel: 2e-4 });
    // A minute late, and the ratio is six times its limit: M2 turns by half a degree.
    const late = tideOfLines(
      times.map((time) => time + 60000),
      potentialLines(),
    );
    expect(relativeRms(tideOfEphemeris(times), late, place, DEGREE_2)).toBeGreaterThan(4e-3);
  });

  it('comes the nearer the more lines are summed', () => {
    const times = timesOf(proof, STEP);
    const signal = tideOfEphemeris(times);
    const place = { latitude: 45, longitude: 0 };
    const waves = loadVector<number[][]>('hartmann-wenzel-1995')
      .cases.filter(([, degree]) => degree === 2)
      .sort((a, b) => (b[5] as number) - (a[5] as number));
    expect(waves.length).toBe(517);
    const ratios = [32, 128, 342, 517].map((count) =>
      relativeRms(signal, tideOfWaves(times, waves.slice(0, count)), place, DEGREE_2),
    );
    expect(ratios).toEqual([...ratios].sort((a, b) => b - a));
    // What the smaller waves add is most of what the 342 lines leave: the remainder is lines left out.
    const lines = relativeRms(signal, tideOfLines(times, potentialLines()), place, DEGREE_2);
    const all = relativeRms(signal, tideOfWaves(times, waves), place, DEGREE_2);
    expect(all / lines).toBeLessThan(0.6);
  });
});
