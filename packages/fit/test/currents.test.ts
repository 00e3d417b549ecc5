import { type CurrentConstants, HOUR, parseConstants, uniformSeries } from '@staithe/core';
import { makeBasis, synthesizeInto } from '@staithe/basis';
import { expectAngleWithin, expectWithin, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { type CurrentEllipse, componentsOf, fitCurrents, fitCurrentsAsync } from '../src/index.js';

const START = Date.UTC(2031, 2, 1);
const COUNT = 60 * 24;
const SPEED = 1e-9; // m/s
const ANGLE = 1e-7; // degrees
const NAMES = ['M2', 'S2', 'K1', 'O1'];

type Shape = Pick<CurrentEllipse, 'major' | 'minor' | 'turning' | 'bearing' | 'phaseLag'>;

/** Both components of ellipses about a mean current. */
function current(shapes: readonly Shape[], mean = [0.1, -0.2]): [Float64Array, Float64Array] {
  const basis = makeBasis({ constituents: NAMES.slice(0, shapes.length) });
  const component = (side: 'east' | 'north', level: number): Float64Array => {
    const out = new Float64Array(COUNT);
    const coefficients = Float64Array.from([
      level,
      ...shapes.flatMap((shape) => {
        const { amplitude, phaseLag } = componentsOf(shape)[side];
        const angle = (phaseLag * Math.PI) / 180;
        return [amplitude * Math.cos(angle), amplitude * Math.sin(angle)];
      }),
    ]);
    synthesizeInto(out, basis, coefficients, { start: START, step: HOUR, count: COUNT });
    return out;
  };
  return [component('east', mean[0] as number), component('north', mean[1] as number)];
}

const record = ([east, north]: readonly [Float64Array, Float64Array]): Parameters<
  typeof fitCurrents
>[0] => ({
  east: uniformSeries({ start: START, step: HOUR, values: east }),
  north: uniformSeries({ start: START, step: HOUR, values: north }),
});

describe('ellipses of currents', () => {
  it.each([30, 120, 210, 300])(
    'of phase lag %i° come back, each turning and bearing',
    (phaseLag) => {
      for (const bearing of [20, 70, 110, 160]) {
        for (const turning of ['left', 'right'] as const) {
          const shapes: Shape[] = [
            { major: 1.2, minor: 0.3, turning, bearing, phaseLag },
            { major: 0.4, minor: 0.1, turning: 'left', bearing: 45, phaseLag: 10 },
          ];
          const fit = fitCurrents(record(current(shapes)), { constituents: ['M2', 'S2'] });
          shapes.forEach((shape, i) => {
            const got = fit.ellipses[i];
            expect(got?.turning).toBe(shape.turning);
            expectWithin(got?.major as number, shape.major, { abs: SPEED });
            expectWithin(got?.minor as number, shape.minor, { abs: SPEED });
            expectWithin(got?.bearing as number, shape.bearing, { abs: ANGLE });
            expectAngleWithin(got?.phaseLag as number, shape.phaseLag, { abs: ANGLE });
          });
          expectWithin([fit.constants.mean.east, fit.constants.mean.north], [0.1, -0.2], {
            abs: SPEED,
          });
        }
      }
    },
  );

  it('of a channel: a line north and south, nothing east', () => {
    const [, north] = current([{ major: 1, minor: 0, turning: 'left', bearing: 0, phaseLag: 77 }]);
    const fit = fitCurrents(record([new Float64Array(COUNT), north]), { constituents: ['M2'] });
    const [m2] = fit.ellipses;
    expectWithin(m2?.major as number, 1, { abs: SPEED });
    expectWithin(m2?.minor as number, 0, { abs: SPEED });
    expectWithin(fit.principalAxis.bearing, 0, { abs: ANGLE });
    expectWithin(fit.principalAxis.share, 1, { abs: 1e-12 });
  });

  it('take pairs, gaps in either component, and give the same in slices', async () => {
    const both = current([{ major: 1, minor: 0.2, turning: 'right', bearing: 60, phaseLag: 200 }]);
    const [east, north] = both;
    east[7] = Number.NaN;
    north[9] = Number.NaN;
    const pairs = Float64Array.from(
      { length: 2 * COUNT },
      (_, i) => (i % 2 ? north : east)[i >> 1] as number,
    );
    const options = { constituents: ['M2'], place: { name: 'Example Sound', latitude: 50 } };
    const fit = fitCurrents({ start: START, step: HOUR, pairs }, options);
    expect(fit.diagnostics).toMatchObject({ samples: COUNT - 2, missing: 2 });
    expect(fit).toEqual(fitCurrents(record(both), options));
    expect(await fitCurrentsAsync(record(both), options)).toEqual(fit);
    const parsed: CurrentConstants = parseConstants(
      JSON.parse(JSON.stringify(fit.constants)),
      'current',
    );
    expect(parsed.east[0]?.name).toBe('M2');
    expect(fit.residuals.east.values[7]).toBeNaN();
    expect(fit.residuals.east.values[9]).toBeNaN();
  });

  it('of borrowed constituents are their parents, made smaller and turned', () => {
    const parent: Shape = { major: 1, minor: 0.4, turning: 'left', bearing: 30, phaseLag: 100 };
    const child: Shape = { ...parent, major: 0.27, minor: 0.108, phaseLag: 112 };
    const basisOrder = current([parent, child]);
    const fit = fitCurrents(record(basisOrder), {
      constituents: ['M2'],
      borrow: [{ name: 'S2', from: 'M2', amplitudeRatio: 0.27, phaseLagDifference: 12 }],
    });
    const [m2, s2] = fit.ellipses;
    expect(s2).toMatchObject({
      name: 'S2',
      standing: 'borrowed',
      borrowedFrom: 'M2',
      turning: 'left',
    });
    expectWithin(s2?.major as number, 0.27, { abs: SPEED });
    expectAngleWithin(s2?.phaseLag as number, 112, { abs: ANGLE });
    expectWithin(
      (s2?.majorSigma as number) / (m2?.majorSigma as number),
      0.27,
      { abs: 1e-6 },
      'errors are the parent’s, made smaller',
    );
  });

  it('have errors of the right size where the noise of both components is one', () => {
    // The same noise in both: it lies along 45°, so across it nothing is doubtful.
    let seed = 3;
    const uniform = (): number => (seed = (seed * 48271) % 2147483647) / 2147483647;
    const normal = (): number => Array.from({ length: 12 }, uniform).reduce((a, b) => a + b, -6);
    const shape: Shape = { major: 1, minor: 0.2, turning: 'left', bearing: 45, phaseLag: 0 };
    const [east, north] = current([shape]);
    for (let i = 0; i < COUNT; i++) {
      const noise = 0.1 * normal();
      east[i] = (east[i] as number) + noise;
      north[i] = (north[i] as number) + noise;
    }
    for (const errorModel of ['independent', 'residual-spectrum'] as const) {
      const fit = fitCurrents(record([east, north]), { constituents: ['M2'], errorModel });
      const want = 0.1 * Math.sqrt(2) * Math.sqrt(2 / COUNT);
      const [m2] = fit.ellipses;
      // A variance from some 14 bins is within 27 % (one standard deviation); three of these.
      expectWithin(m2?.majorSigma as number, want, {
        rel: errorModel === 'independent' ? 0.05 : 0.4,
      });
      expectWithin(m2?.minorSigma as number, 0, { abs: 0.02 * want });
    }
  });
});

describe('bad currents', () => {
  const [east, north] = current([
    { major: 1, minor: 0.2, turning: 'left', bearing: 45, phaseLag: 0 },
  ]);
  const good = record([east, north]);
  const short = uniformSeries({ start: START, step: HOUR, values: north.slice(1) });
  const late = uniformSeries({ start: START + 1000, step: HOUR, values: north });
  const options = { constituents: ['M2'] };
  it.each<[string, () => unknown]>([
    [
      'LENGTH_MISMATCH north',
      () => fitCurrents({ ...(good as object), north: short } as never, options),
    ],
    [
      'CONFLICT north.times[0]',
      () => fitCurrents({ ...(good as object), north: late } as never, options),
    ],
    [
      'LENGTH_MISMATCH pairs',
      () => fitCurrents({ start: START, step: HOUR, pairs: [1, 2, 3] }, options),
    ],
    [
      'NO_TIDE',
      () => fitCurrents(record([new Float64Array(COUNT), new Float64Array(COUNT)]), options),
    ],
    [
      'CONFLICT options.steps',
      () => fitCurrents(good, { ...options, steps: [START + HOUR] } as never),
    ],
    [
      'NOT_FINITE north.values[3]',
      () =>
        fitCurrents(
          {
            ...(good as object),
            north: {
              start: START,
              step: HOUR,
              values: north.map((v, i) => (i === 3 ? Infinity : v)),
            },
          } as never,
          options,
        ),
    ],
  ])('are refused with %s', (expected, run) => {
    const error = refusal(run);
    expect(`${error.code} ${error.path}`.trim()).toBe(expected);
    expect(error.message).toMatch(/expected .*got/);
  });
});
