import { makeBasis, synthesizeInto } from '@staithe/basis';
import { constituent } from '@staithe/constituents';
import {
  DAY,
  type HarmonicConstant,
  type HarmonicConstants,
  HOUR,
  type NodalModel,
  uniformSeries,
} from '@staithe/core';
import {
  expectAngleWithin,
  expectWithin,
  publishedConstants,
  refusal,
} from '@staithe/test-vectors';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  compareConstants,
  type ComparedConstant,
  type ConstantsComparison,
} from '../src/compare.js';
import { chiSquared2 } from '../src/error-ellipse.js';
import { fitHarmonics } from '../src/index.js';

const ROUNDING = 1e-12; // m, degrees: a few operations on numbers up to 360
const FIT = 1e-9; // m: what a fit of a predicted record is held to (fit.prop.test.ts)
const PRINTED = 5e-4; // half a unit of the last digit of the printed tables of χ²
const START = Date.UTC(2031, 0, 1);
const NAMES = ['M2', 'S2', 'N2', 'K1', 'O1', 'Q1', 'M4', 'MS4', 'M6', 'MN4', 'M3', 'Mf'];

const documentOf = (
  constituents: readonly HarmonicConstant[],
  more: Partial<HarmonicConstants> = {},
): HarmonicConstants => ({
  format: 'staithe-constants',
  version: 1,
  unit: 'm',
  meanLevel: 0,
  argumentModel: 'iers2010',
  nodalModel: 'potential',
  constituents,
  ...more,
});

const single = (
  amplitude: number,
  phaseLag: number,
  more: Partial<HarmonicConstant> = {},
): HarmonicConstants => documentOf([{ name: 'M2', amplitude, phaseLag, ...more }]);

const only = (first: HarmonicConstants, second: HarmonicConstants, significance?: number) =>
  compareConstants(first, second, { significance }).rows[0] as ComparedConstant;

const turn = (degrees: number): [cos: number, sin: number] => [
  Math.cos((degrees * Math.PI) / 180),
  Math.sin((degrees * Math.PI) / 180),
];

/** M2 at (a, b) with variances and covariance, m². */
function point(a: number, b: number, [aa, ab, bb]: readonly [number, number, number]) {
  const phaseLag = (Math.atan2(b, a) * 180) / Math.PI;
  return documentOf([{ name: 'M2', amplitude: Math.hypot(a, b), phaseLag }], {
    // The mean level stands between the two, so that a wrong place in the triangle shows.
    uncertainty: { order: ['M2.cos', 'meanLevel', 'M2.sin'], covariance: [aa, 7, 8, ab, 9, bb] },
  });
}

/** Normal numbers: Park and Miller (1988), minimal standard generator; Box and Muller (1958). */
function normals(seed: number): () => number {
  let state = seed;
  const uniform = (): number => (state = (state * 48271) % 2147483647) / 2147483647;
  return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
}

/** Three standard deviations of a share of n by the binomial law, for p = 0.05. */
const threeSigma = (n: number): number => 3 * Math.sqrt((0.05 * 0.95) / n);

describe('the plane of (H cos G, H sin G), by hand', () => {
  it('quarter of a turn apart: √2', () => {
    const row = only(single(1, 0), single(1, 90));
    expectWithin(row.distance, Math.SQRT2, { abs: ROUNDING });
    expectWithin([row.amplitudeChange, row.phaseLagChange], [0, 90], { abs: ROUNDING });
    expect(row).not.toHaveProperty('sigma');
    expect(row).not.toHaveProperty('exceeds');
    expect(row.errorsFrom).toBe('neither');
  });

  it('across north the short way: 350° to 10° is 20° later, and 2·sin 10° apart', () => {
    const row = only(single(1, 350), single(1, 10));
    expectWithin([row.phaseLagChange, row.distance], [20, 2 * turn(10)[1]], { abs: ROUNDING });
    expectWithin(only(single(1, 10), single(1, -10)).phaseLagChange, -20, { abs: ROUNDING });
    expect(only(single(1, 0), single(1, 180)).phaseLagChange).toBe(180);
    expect(only(single(1, 180), single(1, 0)).phaseLagChange).toBe(180);
  });

  it('the law of cosines, and the change of sides', () => {
    const size = fc.double({ min: 0.001, max: 5, noNaN: true });
    const angle = fc.double({ min: -720, max: 720, noNaN: true });
    fc.assert(
      fc.property(size, angle, size, angle, (h1, g1, h2, g2) => {
        const there = only(single(h1, g1), single(h2, g2));
        const back = only(single(h2, g2), single(h1, g1));
        const square = h1 * h1 + h2 * h2 - 2 * h1 * h2 * turn(g2 - g1)[0];
        // 1e-12 m² of up to 100: rounding of the angle at 720° and of the differences.
        expectWithin(there.distance * there.distance, square, { abs: 1e-12 });
        expect(back.distance).toBe(there.distance);
        expect(back.amplitudeChange + there.amplitudeChange).toBe(0);
        expectAngleWithin(back.phaseLagChange, -there.phaseLagChange, { abs: ROUNDING });
      }),
    );
  });
});

describe('errors', () => {
  // Sum of the two: (5, 1, 4)·1e-4; the difference (0.03, 0.04).
  const first = point(0.3, 0.4, [4e-4, 1e-4, 2e-4]);
  const second = point(0.33, 0.44, [1e-4, 0, 2e-4]);

  it('of a pair with its covariance, by hand', () => {
    const row = only(first, second);
    expectWithin(row.distance, 0.05, { abs: ROUNDING });
    // uᵀCu = (9·5 + 2·12·1 + 16·4)/25 · 1e-4.
    expectWithin(row.sigma as number, Math.sqrt(5.32e-4), { abs: ROUNDING });
    // Larger axis (4.5 + √1.25)·1e-4; χ² as printed has four digits.
    const axis = (4.5 + Math.sqrt(1.25)) * 1e-4;
    expectWithin(row.radius95 as number, Math.sqrt(5.991 * axis), { rel: 5e-5 });
    expect(row.errorsFrom).toBe('both');
    // Squared Mahalanobis length 92/19 = 4.842: between χ² at 0.10 (4.605) and at 0.05 (5.991).
    expect(row.exceeds).toBe(false);
    expect(only(first, second, 0.1).exceeds).toBe(true);
  });

  it('turn at the printed quantiles of χ² with two degrees of freedom', () => {
    for (const [significance, printed] of [
      [0.5, 1.386],
      [0.1, 4.605],
      [0.05, 5.991],
      [0.01, 9.21],
      [0.001, 13.816],
    ] as const) {
      // Unit variances: the squared distance is the squared Mahalanobis length.
      const at = (square: number): boolean | undefined =>
        only(point(2, 0, [1, 0, 1]), single(2 + Math.sqrt(square), 0), significance).exceeds;
      expect([at(printed - PRINTED), at(printed + PRINTED)]).toEqual([false, true]);
    }
  });

  it('and χ² is −2 ln p to rounding', () => {
    for (const p of [0.5, 0.4999, 0.375, 0.374, 0.1, 0.05, 0.01, 0.001, 0.0001]) {
      // 1e-15: a few roundings on either side; the engine's logarithm is good to its last bit or two.
      expectWithin(chiSquared2(p), -2 * Math.log(p), { rel: 1e-15 }, `p = ${p}`);
    }
  });

  it('of H and G stand along and across', () => {
    const [c, s] = turn(30);
    const bare = single(2 + 0.1, 30);
    const stated = single(2, 30, { amplitudeSigma: 0.03, phaseLagSigma: 2 });
    const across = (2 * 2 * Math.PI) / 180;
    const row = only(stated, bare);
    expectWithin(row.sigma as number, 0.03, { abs: ROUNDING }, 'along');
    expect(row.errorsFrom).toBe('first');
    const aside = documentOf([
      {
        name: 'M2',
        amplitude: Math.hypot(2, 0.1),
        phaseLag: 30 + (Math.atan2(0.1, 2) * 180) / Math.PI,
      },
    ]);
    expectWithin(only(stated, aside).sigma as number, across, { abs: ROUNDING }, 'across');
    expect(only(aside, stated).errorsFrom).toBe('second');
    // The same as a covariance: R diag R^T.
    const [v, w] = [0.03 * 0.03, across * across];
    const covariance = [c * c * v + s * s * w, c * s * (v - w), s * s * v + c * c * w] as const;
    const other = single(2.05, 33);
    const [byPair, bySigmas] = [only(point(2 * c, 2 * s, covariance), other), only(stated, other)];
    expectWithin(
      [byPair.sigma as number, byPair.radius95 as number],
      [bySigmas.sigma as number, bySigmas.radius95 as number],
      { abs: ROUNDING },
    );
  });

  it('of one kind alone are round, and radius95 is the last resort', () => {
    const other = single(1.1, 0);
    expectWithin(only(single(1, 0, { amplitudeSigma: 0.03 }), other).sigma as number, 0.03, {
      abs: ROUNDING,
    });
    const byPhase = only(single(1, 0, { phaseLagSigma: 3, radius95: 9 }), other);
    expectWithin(byPhase.sigma as number, (3 * Math.PI) / 180, { abs: ROUNDING });
    const byDisc = only(single(1, 0, { radius95: 0.09 }), other);
    expectWithin(byDisc.radius95 as number, 0.09, { abs: ROUNDING });
    expect(byDisc.exceeds).toBe(true);
    expect(only(single(1, 0, { radius95: 0.11 }), other).exceeds).toBe(false);
  });

  it('add up, whichever side they are on', () => {
    const sigma = { amplitudeSigma: 0.03, phaseLagSigma: 0 };
    const both = only(single(1, 0, sigma), single(1.2, 0, { ...sigma, amplitudeSigma: 0.04 }));
    expectWithin(both.sigma as number, 0.05, { abs: ROUNDING });
  });

  it('of a whole correlation or of nothing leave an ellipse without width', () => {
    const flat = point(1, 1, [1e-4, 1e-4, 1e-4]);
    const moved = (a: number, b: number): boolean | undefined =>
      only(flat, documentOf(point(1 + a, 1 + b, [0, 0, 0]).constituents)).exceeds;
    expect([moved(0.01, 0.01), moved(0.05, 0.05), moved(0.01, -0.01)]).toEqual([false, true, true]);
    const exact = single(1, 0, { amplitudeSigma: 0, phaseLagSigma: 0 });
    expect([only(exact, exact).exceeds, only(exact, single(1.001, 0)).exceeds]).toEqual([
      false,
      true,
    ]);
    expectWithin(only(flat, flat).sigma as number, Math.sqrt(2e-4), { abs: ROUNDING }, 'no length');
  });
});

describe('sums', () => {
  const three = (sizes: readonly number[]): HarmonicConstants =>
    documentOf(
      ['M2', 'S2', 'K1'].map((name, i) => ({
        name,
        amplitude: sizes[i] as number,
        phaseLag: 40,
        amplitudeSigma: 0.01,
        phaseLagSigma: 1,
      })),
    );

  it('rows fall with the distance; √((9 + 16 + 144)/2)·1e-2 by hand', () => {
    const comparison = compareConstants(three([1, 1, 1]), three([1.03, 0.96, 1.12]));
    expect(comparison.rows.map(({ name }) => name)).toEqual(['K1', 'S2', 'M2']);
    expectWithin(comparison.rootSumSquare, 0.13 / Math.SQRT2, { abs: ROUNDING });
    expect(comparison.largest.name).toBe('K1');
    expectWithin(comparison.largest.distance, 0.12, { abs: ROUNDING });
    // One sigma is 0.01·√2, the limit 2.448 of these: 0.0346.
    expect([comparison.exceeding, comparison.judged]).toEqual([2, 3]);
    expectWithin(comparison.byChance, 0.15, { abs: ROUNDING });
    expect(structuredClone(comparison)).toEqual(comparison);
    expect(JSON.parse(JSON.stringify(comparison))).toEqual(comparison);
  });

  it('rootSumSquare is the root mean square of the difference of the two curves', () => {
    const names = NAMES.slice(0, 6);
    const coefficients = (seed: number): Float64Array => {
      const next = normals(seed);
      return Float64Array.from({ length: 1 + 2 * names.length }, (_, i) => (i > 0 ? next() : 0));
    };
    const setOf = (list: Float64Array): HarmonicConstants =>
      documentOf(
        names.map((name, i) => ({
          name,
          amplitude: Math.hypot(list[2 * i + 1] as number, list[2 * i + 2] as number),
          phaseLag:
            (Math.atan2(list[2 * i + 2] as number, list[2 * i + 1] as number) * 180) / Math.PI,
        })),
        { nodalModel: 'none' },
      );
    const [one, other] = [coefficients(3), coefficients(4)];
    const count = 19 * 365 * 24;
    const basis = makeBasis({ constituents: names, nodalModel: 'none' });
    const out = new Float64Array(count);
    const difference = one.map((value, i) => (other[i] as number) - value);
    synthesizeInto(out, basis, difference, { start: START, step: HOUR, count });
    const rms = Math.sqrt(out.reduce((sum, height) => sum + height * height, 0) / count);
    const comparison = compareConstants(setOf(one), setOf(other));
    // Nearest lines (M2, N2) beat in 27.6 d: what is left of a beat in 19 years is below 27.6/(π·6940) = 1.3e-3 of it.
    expectWithin(comparison.rootSumSquare, rms, { rel: 1.3e-3 });
  });

  it('names that only one has are listed and take no part', () => {
    const first = documentOf([
      ...single(1, 0).constituents,
      { name: 'S2', amplitude: 9, phaseLag: 0 },
    ]);
    const second = documentOf([
      { name: 'MM', amplitude: 9, phaseLag: 0 },
      ...single(1, 0).constituents,
    ]);
    expect(compareConstants(first, second)).toMatchObject({
      onlyFirst: ['S2'],
      onlySecond: ['Mm'],
      rootSumSquare: 0,
      judged: 0,
      byChance: 0,
    });
  });

  it('0 without an error is not resolved; 0 with one is a measurement', () => {
    const both = (more: Partial<HarmonicConstant>): ConstantsComparison =>
      compareConstants(
        documentOf([
          ...single(1, 0).constituents,
          { name: 'S2', amplitude: 0, phaseLag: 0, ...more },
        ]),
        documentOf([...single(1, 0).constituents, { name: 'S2', amplitude: 0.5, phaseLag: 90 }]),
      );
    const left = both({});
    expect([left.notResolved, left.rows.map(({ name }) => name)]).toEqual([['S2'], ['M2']]);
    const kept = both({ radius95: 0.1 });
    expect([kept.notResolved, kept.rows.map(({ name }) => name)]).toEqual([[], ['S2', 'M2']]);
    expect(kept.rows[0]).toMatchObject({ distance: 0.5, exceeds: true });
    // An error of the phase of nothing says nothing.
    expect(both({ phaseLagSigma: 5 }).notResolved).toEqual(['S2']);
  });
});

describe('mean level', () => {
  const level = (meanLevel: number, more: Partial<HarmonicConstants> = {}): HarmonicConstants =>
    documentOf(single(1, 0).constituents, { meanLevel, ...more });
  const sure = { uncertainty: { order: ['M2.cos', 'meanLevel'], covariance: [1, 5, 9e-4] } };

  it('is compared from one datum, with the errors there are', () => {
    const datum = 'chart datum';
    const comparison = compareConstants(level(2, { datum, ...sure }), level(2.25, { datum }));
    expect(comparison.meanLevelChange).toBe(0.25);
    expectWithin(comparison.meanLevelSigma as number, 0.03, { abs: ROUNDING });
    expect(comparison).not.toHaveProperty('meanLevelReason');
    const both = compareConstants(level(2, { datum, ...sure }), level(2, { datum, ...sure }));
    expectWithin(both.meanLevelSigma as number, 0.03 * Math.SQRT2, { abs: ROUNDING });
  });

  it.each([
    [undefined, undefined, 'neither set names a datum'],
    ['a', undefined, 'the second set names no datum'],
    [undefined, 'b', 'the first set names no datum'],
    ['a', 'b', 'counted from a and from b'],
  ])('%s and %s: %s', (one, other, reason) => {
    const comparison = compareConstants(level(2, { datum: one }), level(3, { datum: other }));
    expect(comparison.meanLevelReason).toBe(reason);
    expect(comparison).not.toHaveProperty('meanLevelChange');
  });
});

describe('models and warnings', () => {
  const m1 = (amplitude: number, nodalModel: NodalModel, radius95 = 0.01): HarmonicConstants =>
    documentOf(
      [
        { name: 'M1', amplitude, phaseLag: 70, radius95 },
        { name: 'M2', amplitude: 1, phaseLag: 70, radius95 },
      ],
      { nodalModel },
    );
  const codes = (first: HarmonicConstants, second: HarmonicConstants): string[] =>
    compareConstants(first, second).warnings.map(({ code }) => code);

  it('M1 alone is carried over, by 1.42 (docs/nodal.md), its error with it', () => {
    const comparison = compareConstants(m1(0.142, 'potential', 0), m1(0.1, 'schureman1940'));
    const row = comparison.rows.find(({ name }) => name === 'M1') as ComparedConstant;
    expectWithin([row.distance, row.second.amplitude], [0, 0.142], { abs: ROUNDING });
    expectWithin(row.radius95 as number, 0.0142, { abs: ROUNDING });
    expect(comparison.rows.find(({ name }) => name === 'M2')?.radius95).toBe(0.01);
    expect(comparison.warnings.map(({ code }) => code)).toEqual([
      'M1_CARRIED_OVER',
      'NODAL_MODELS_DIFFER',
    ]);
    const back = compareConstants(m1(0.1, 'schureman1940'), m1(0.142, 'potential'));
    expectWithin(back.rows[0]?.distance as number, 0, { abs: ROUNDING });
    expect(codes(m1(1, 'potential'), m1(1, 'potential'))).toEqual([]);
  });

  it('errors of M1 grow with it: as if it had been stated on the other scale', () => {
    const stated = (scale: number, nodalModel: NodalModel): HarmonicConstants =>
      documentOf(
        [
          {
            name: 'M1',
            amplitude: 0.1 * scale,
            phaseLag: 70,
            amplitudeSigma: 0.01 * scale,
            phaseLagSigma: 2,
          },
        ],
        { nodalModel },
      );
    const other = documentOf([{ name: 'M1', amplitude: 0.2, phaseLag: 40 }]);
    const carried = only(other, stated(1, 'schureman1940'));
    const already = only(other, stated(1.42, 'potential'));
    expectWithin(
      [carried.distance, carried.sigma as number, carried.radius95 as number],
      [already.distance, already.sigma as number, already.radius95 as number],
      { abs: ROUNDING },
    );
  });

  it('a set without a nodal model is compared, with a warning', () => {
    expect(codes(m1(1, 'none'), m1(1, 'potential'))).toEqual(['NO_NODAL_MODEL']);
    expect(codes(m1(1, 'none'), m1(1, 'none'))).toEqual(['NO_NODAL_MODEL']);
    const old = compareConstants(m1(0.1, 'schureman1940'), m1(0.142, 'none'));
    expect(old.warnings.map(({ code }) => code)).toEqual(['M1_CARRIED_OVER', 'NO_NODAL_MODEL']);
    expect(old.warnings[1]?.message).toMatch(/^the second set has no nodal model/);
    expectWithin(
      old.rows.map(({ distance }) => distance),
      [0, 0],
      { abs: ROUNDING },
    );
  });

  it('what bears on the judgement is said', () => {
    const K2 = { name: 'K2', amplitude: 1, phaseLag: 0, amplitudeSigma: 0.1 };
    const borrowed = { ...K2, standing: 'borrowed', borrowedFrom: 'S2' } as const;
    const bare = { name: 'K2', amplitude: 1, phaseLag: 0 };
    const sure = { name: 'M2', amplitude: 1, phaseLag: 0, amplitudeSigma: 0.1 };
    expect(codes(documentOf([sure, borrowed]), documentOf([sure, K2]))).toEqual(['BORROWED']);
    const partly = compareConstants(documentOf([sure, K2]), documentOf([sure, bare]));
    expect(partly.warnings).toEqual([
      {
        code: 'TAKEN_AS_EXACT',
        message: 'the second set states no errors for K2 and is taken as exact there',
      },
    ]);
    const record = { from: '2031-01-01T00:00Z', to: '2031-03-01T00:00Z', samples: 1 };
    const later = { from: '2031-02-01T00:00Z', to: '2031-04-01T00:00Z', samples: 1 };
    const next = { from: '2031-03-01T00:00Z', to: '2031-04-01T00:00Z', samples: 1 };
    const over = (span: typeof record): HarmonicConstants => documentOf([sure], { record: span });
    expect(compareConstants(over(record), over(later)).warnings[0]).toMatchObject({
      code: 'RECORDS_OVERLAP',
      message: expect.stringContaining('28.0 days'),
    });
    expect(codes(over(record), over(next))).toEqual([]);
    const at = (name: string, more: Partial<HarmonicConstants> = {}): HarmonicConstants =>
      documentOf([sure], { place: { name }, datum: 'chart datum', ...more });
    expect(codes(at('A'), at('B'))).toEqual(['DATUM_OF_TWO_PLACES']);
    const secularRate = { metresPerYear: 0.003, at: '2031-01-01T00:00Z' };
    expect(codes(at('A', { secularRate }), at('A'))).toEqual(['LEVEL_MOVES']);
    expect(codes(at('A'), at('A'))).toEqual([]);
  });
});

describe('fits and published sets', () => {
  const truth = (names: readonly string[]): HarmonicConstants =>
    documentOf(names.map((name, i) => ({ name, amplitude: 1 / (i + 1), phaseLag: 25 * i })));

  function heightsOf({ constituents }: HarmonicConstants, count: number): Float64Array {
    const out = new Float64Array(count);
    const basis = makeBasis({ constituents: constituents.map(({ name }) => name) });
    const coefficients = constituents.flatMap(({ amplitude, phaseLag }) =>
      turn(phaseLag).map((part) => amplitude * part),
    );
    synthesizeInto(out, basis, Float64Array.of(0, ...coefficients), {
      start: START,
      step: HOUR,
      count,
    });
    return out;
  }

  it('a fit of a predicted record is its truth', () => {
    const set = truth(NAMES);
    const values = heightsOf(set, (60 * DAY) / HOUR);
    const fit = fitHarmonics(uniformSeries({ start: START, step: HOUR, values }), {
      constituents: NAMES,
    });
    const comparison = compareConstants(fit.constants, set);
    expect(comparison.rows).toHaveLength(NAMES.length);
    expectWithin(comparison.largest.distance, 0, { abs: FIT });
    expect(comparison.rows.every(({ errorsFrom }) => errorsFrom === 'first')).toBe(true);
  });

  it('fits of noisy records lie beyond their ellipse in 5 %, and beyond it without fail when the truth is elsewhere', () => {
    const names = NAMES.slice(0, 8);
    const set = truth(names);
    const tide = heightsOf(set, (40 * DAY) / HOUR);
    let exceeding = 0;
    let judged = 0;
    for (let seed = 1; seed <= 40; seed++) {
      const next = normals(1000 * seed);
      const values = tide.map((height) => height + 0.1 * next());
      const { constants } = fitHarmonics(uniformSeries({ start: START, step: HOUR, values }), {
        constituents: names,
        errorModel: 'independent',
      });
      const comparison = compareConstants(constants, set);
      exceeding += comparison.exceeding;
      judged += comparison.judged;
      // σ of a coefficient is 0.1·√(2/960) = 4.6 mm: 50 mm are eleven of these.
      const M2 = { name: 'M2', amplitude: 1.05, phaseLag: 0 };
      expect(only(constants, documentOf([M2])).exceeds).toBe(true);
    }
    expect(judged).toBe(320);
    expectWithin(exceeding / judged, 0.05, { abs: threeSigma(judged) });
  });

  it.each(['9410230', '9455920'])('the published set of %s against itself gives 0', (station) => {
    const { rows, leftOut } = publishedConstants(station);
    const set = documentOf(
      [
        ...rows.map(({ name, amplitude, phaseLag }) => ({ name, amplitude, phaseLag })),
        ...leftOut.map((name) => ({ name, amplitude: 0, phaseLag: 0 })),
      ],
      { argumentModel: 'schureman1940', nodalModel: 'schureman1940', datum: 'MSL' },
    );
    const comparison = compareConstants(set, set);
    expect(comparison.rows).toHaveLength(rows.length);
    for (const row of comparison.rows) {
      expect([row.distance, row.amplitudeChange, row.phaseLagChange]).toEqual([0, 0, 0]);
    }
    expect(comparison).toMatchObject({
      rootSumSquare: 0,
      largest: { distance: 0 },
      meanLevelChange: 0,
      exceeding: 0,
      judged: 0,
      onlyFirst: [],
      onlySecond: [],
      notResolved: leftOut.map((name) => constituent(name).name),
      warnings: [],
    });
  });
});

describe('calibration: 200 seeded pairs of twelve constants with a known covariance', () => {
  /** A document around the truth, drawn with a covariance of its own: long, narrow and aslant. */
  function drawn(next: () => number, shift = 0): HarmonicConstants {
    const order: string[] = [];
    const packed: number[] = [];
    const constituents = NAMES.map((name, i) => {
      const [long, narrow] = [0.02 * (1 + i), 0.004];
      const [c, s] = turn(37 * i + 11);
      const [u, v] = [long * next(), narrow * next()];
      const a = 1 + shift + c * u - s * v;
      const b = 0.5 + s * u + c * v;
      const at = order.push(`${name}.cos`, `${name}.sin`) - 2;
      const zeros = new Array<number>(at).fill(0);
      const [p, q] = [long * long, narrow * narrow];
      packed.push(...zeros, c * c * p + s * s * q);
      packed.push(...zeros, c * s * (p - q), s * s * p + c * c * q);
      return { name, amplitude: Math.hypot(a, b), phaseLag: (Math.atan2(b, a) * 180) / Math.PI };
    });
    return documentOf(constituents, { uncertainty: { order, covariance: packed } });
  }

  it.each([0.05, 0.01])('differ beyond their ellipse in a share of %d', (significance) => {
    const next = normals(20310101);
    const PAIRS = 200;
    let exceeding = 0;
    for (let pair = 0; pair < PAIRS; pair++) {
      const options = { significance };
      exceeding += compareConstants(drawn(next), drawn(next), options).exceeding;
    }
    const judged = PAIRS * NAMES.length;
    const allowed = 3 * Math.sqrt((significance * (1 - significance)) / judged);
    expectWithin(exceeding / judged, significance, { abs: allowed });
  });

  it('and one whose truth has moved by ten of its longest sigmas without fail', () => {
    const next = normals(7);
    const longest = 0.02 * NAMES.length * Math.SQRT2;
    const { exceeding, judged } = compareConstants(drawn(next), drawn(next, 10 * longest));
    expect([exceeding, judged]).toEqual([12, 12]);
  });
});

describe('bad input', () => {
  const good = single(1, 0);
  const with_ = (more: object): HarmonicConstants => ({ ...good, ...more });
  const M2 = { name: 'M2', amplitude: 1, phaseLag: 0 };
  const holds = (...constituents: object[]): HarmonicConstants => with_({ constituents });
  const uncertain = (covariance: number[]): HarmonicConstants =>
    with_({ uncertainty: { order: ['M2.cos', 'M2.sin'], covariance } });
  it.each<[string, HarmonicConstants, HarmonicConstants]>([
    ['MISSING second.constituents', good, holds({ ...M2, name: 'S2' })],
    ['MISSING second.constituents', good, holds()],
    ['MISSING second.constituents', good, holds({ ...M2, amplitude: 0 })],
    ['WRONG_TYPE first', 5 as never, good],
    ['WRONG_TYPE second', good, null as never],
    ['UNKNOWN_CHOICE first.quantity', with_({ quantity: 'current', unit: 'm/s' }), good],
    ['UNKNOWN_CHOICE second.quantity', good, with_({ quantity: 'current' })],
    ['UNKNOWN_UNIT first.unit', with_({ unit: 'ft' }), good],
    ['NOT_FINITE first.meanLevel', with_({ meanLevel: Number.NaN }), good],
    ['UNKNOWN_CHOICE first.nodalModel', with_({ nodalModel: 'x' }), good],
    ['WRONG_TYPE first.constituents', with_({ constituents: 'M2' }), good],
    ['NOT_FINITE first.constituents[0].amplitude', holds({ ...M2, amplitude: NaN }), good],
    ['OUT_OF_RANGE second.constituents[0].amplitude', good, holds({ ...M2, amplitude: -1 })],
    ['NOT_FINITE first.constituents[0].phaseLag', holds({ ...M2, phaseLag: Infinity }), good],
    ['OUT_OF_RANGE first.constituents[0].radius95', holds({ ...M2, radius95: -1 }), good],
    ['UNKNOWN_CONSTITUENT first.constituents[0].name', holds({ ...M2, name: 'M2x' }), good],
    ['DUPLICATE first.constituents[1].name', holds(M2, M2), good],
    ['LENGTH_MISMATCH first.uncertainty.covariance', uncertain([1, 0]), good],
    ['OUT_OF_RANGE first.uncertainty.covariance[2]', uncertain([1, 0, -1]), good],
    ['NOT_FINITE first.uncertainty.covariance[1]', uncertain([1, NaN, 1]), good],
    ['OUT_OF_RANGE second.uncertainty.covariance', good, uncertain([1, 1.1, 1])],
  ])('is refused with %s', (expected, first, second) => {
    const error = refusal(() => compareConstants(first, second));
    expect(`${error.code} ${error.path}`).toBe(expected);
    expect(error.message).toMatch(/expected .*got/);
  });

  it.each([0, 0.6, -1, Number.NaN])('a significance of %d is refused', (significance) => {
    const error = refusal(() => compareConstants(good, good, { significance }));
    expect(`${error.code} ${error.path}`).toBe('OUT_OF_RANGE options.significance');
  });
});
