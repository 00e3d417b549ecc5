import { angleDifference, degreesToRadians, radiansToDegrees, wrapDegrees } from '@staithe/core';
import { expectAngleWithin, expectWithin } from '@staithe/test-vectors';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  componentsOf,
  type CurrentComponents,
  type CurrentEllipse,
  ellipseFromRotary,
  ellipseOf,
  type Oscillation,
  rotaryOf,
} from '../src/ellipse.js';

const SPEED = { abs: 1e-12 }; // m/s: a few roundings of currents up to 3 m/s
const ANGLE = 1e-13; // m/s: an angle of an axis is uncertain by this over the length that defines it

/** Numbers spread evenly; fc.double spreads their exponents, so that most are all but 0. */
function evenly(low: number, high: number): fc.Arbitrary<number> {
  const parts = 2 ** 30;
  return fc.integer({ min: 0, max: parts }).map((k) => low + ((high - low) * k) / parts);
}

const oscillation: fc.Arbitrary<Oscillation> = fc.record({
  amplitude: fc.oneof(evenly(1e-6, 3), fc.constantFrom(0, 0.5, 1, 1 + 1e-12)),
  phaseLag: fc.oneof(evenly(0, 359.999), fc.constantFrom(0, 1e-9, 45, 90, 180, 270, 359)),
});
const components: fc.Arbitrary<CurrentComponents> = fc.record({
  east: oscillation,
  north: oscillation,
});

/** Source: the sum of cosines of the convention, Math.cos. */
function currentAt({ east, north }: CurrentComponents, theta: number): [number, number] {
  return [
    east.amplitude * Math.cos(degreesToRadians(theta - east.phaseLag)),
    north.amplitude * Math.cos(degreesToRadians(theta - north.phaseLag)),
  ];
}

function coefficientsOf({ east, north }: CurrentComponents): number[] {
  return [east, north].flatMap(({ amplitude, phaseLag }) => [
    amplitude * Math.cos(degreesToRadians(phaseLag)),
    amplitude * Math.sin(degreesToRadians(phaseLag)),
  ]);
}

function fromCoefficients([a, b, c, d]: readonly number[]): CurrentComponents {
  const one = (x = 0, y = 0): Oscillation => ({
    amplitude: Math.sqrt(x * x + y * y),
    phaseLag: wrapDegrees(radiansToDegrees(Math.atan2(y, x))),
  });
  return { east: one(a, b), north: one(c, d) };
}

describe('an ellipse', () => {
  it('holds its components: fastest along the bearing, slowest across, turning as it says', () => {
    fc.assert(
      fc.property(components, (given) => {
        const { major, minor, turning, bearing, phaseLag } = ellipseOf(given);
        expect(bearing >= 0 && bearing < 180 && phaseLag >= 0 && phaseLag < 360).toBe(true);
        expect(minor >= 0 && minor <= major).toBe(true);
        const [s, c] = [Math.sin(degreesToRadians(bearing)), Math.cos(degreesToRadians(bearing))];
        expectWithin(currentAt(given, phaseLag), [major * s, major * c], SPEED, 'along');
        const side = turning === 'left' ? minor : -minor;
        expectWithin(currentAt(given, phaseLag + 90), [-side * c, side * s], SPEED, 'across');
      }),
      { numRuns: 2000 },
    );
  });

  it('is the fastest and the slowest of all moments', () => {
    fc.assert(
      fc.property(components, (given) => {
        const { major, minor } = ellipseOf(given);
        for (let theta = 0; theta < 180; theta += 7) {
          const [u, v] = currentAt(given, theta);
          const speed = Math.sqrt(u * u + v * v);
          expect(speed).toBeLessThan(major + SPEED.abs);
          expect(speed).toBeGreaterThan(minor - SPEED.abs);
        }
      }),
      { numRuns: 300 },
    );
  });

  it('leads back to its components', () => {
    fc.assert(
      fc.property(components, (given) => {
        const back = componentsOf(ellipseOf(given));
        expectWithin(coefficientsOf(back), coefficientsOf(given), SPEED);
      }),
      { numRuns: 2000 },
    );
  });

  it('has the rotating vectors as half sum and half difference, and leads to them and back', () => {
    fc.assert(
      fc.property(components, (given) => {
        const ellipse = ellipseOf(given);
        const { left, right } = rotaryOf(given);
        expectWithin(ellipse.major, left.amplitude + right.amplitude, SPEED);
        expectWithin(ellipse.minor, Math.abs(left.amplitude - right.amplitude), SPEED);
        if (ellipse.minor > SPEED.abs) {
          expect(ellipse.turning).toBe(left.amplitude > right.amplitude ? 'left' : 'right');
        }
        const shorter = Math.min(left.amplitude, right.amplitude);
        if (shorter > 1e-6) {
          // Modulo half a turn each, and both together.
          const abs = radiansToDegrees(ANGLE / shorter);
          const half = angleDifference(left.phaseLag, right.phaseLag) / 2;
          expectAngleWithin(2 * ellipse.bearing, 180 - 2 * half, { abs: 2 * abs }, 'bearing');
          expectAngleWithin(2 * ellipse.phaseLag, 2 * (left.phaseLag + half), { abs: 2 * abs });
        }
        const again = ellipseFromRotary({ left, right });
        expectWithin(
          coefficientsOf(componentsOf(again)),
          coefficientsOf(componentsOf(ellipse)),
          SPEED,
        );
      }),
      { numRuns: 2000 },
    );
  });

  it('turns with the compass, and its phase lag with time', () => {
    fc.assert(
      fc.property(
        fc.record({
          major: evenly(1, 3),
          minor: evenly(0.01, 0.9),
          turning: fc.constantFrom('left' as const, 'right' as const),
          bearing: evenly(0.01, 89.9),
          phaseLag: evenly(0.01, 359.9),
        }),
        evenly(0, 90),
        (ellipse, by) => {
          const turned = ellipseOf(componentsOf({ ...ellipse, bearing: ellipse.bearing + by }));
          expectWithin(turned.bearing, ellipse.bearing + by, { abs: 1e-10 });
          const { east, north } = componentsOf(ellipse);
          const later = (o: Oscillation): Oscillation => ({ ...o, phaseLag: o.phaseLag + by });
          const delayed = ellipseOf({ east: later(east), north: later(north) });
          expectAngleWithin(delayed.phaseLag, ellipse.phaseLag + by, { abs: 1e-10 });
          // A mirror, here of east and west, turns left into right.
          const mirrored = ellipseOf({
            east: { ...east, phaseLag: east.phaseLag + 180 },
            north,
          });
          expect(mirrored.turning).toBe(ellipse.turning === 'left' ? 'right' : 'left');
          expectAngleWithin(2 * mirrored.bearing, -2 * ellipse.bearing, { abs: 1e-10 });
        },
      ),
      { numRuns: 500 },
    );
  });
});

// Park and Miller (1988), minimal standard generator; G. Box and M. Muller (1958) for normal numbers.
function normals(seed: number): () => number {
  let state = seed;
  const uniform = (): number => (state = (state * 48271) % 2147483647) / 2147483647;
  return () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform());
}

type Factor = readonly (readonly number[])[];

/** F·Fᵀ, 4 × 4, and draws of it. */
function covarianceOf(factor: Factor): Float64Array {
  return Float64Array.from({ length: 16 }, (_, at) => {
    const [a, b] = [factor[at >> 2], factor[at & 3]] as [number[], number[]];
    return a.reduce((sum, value, k) => sum + value * (b[k] as number), 0);
  });
}

const factors: fc.Arbitrary<Factor> = fc.array(
  fc.array(evenly(-0.01, 0.01), { minLength: 4, maxLength: 4 }),
  { minLength: 4, maxLength: 4 },
);

const UNIFORM_AXIS = 180 / Math.sqrt(12); // degrees: any axis
const UNIFORM_PHASE = 360 / Math.sqrt(12); // degrees: any phase

/** Signed and unwrapped: differences of what is left of a reference. */
function apart(found: CurrentEllipse, from: CurrentEllipse): [number, number, number, number] {
  // The axis may come out the other way round; then so does the phase.
  const way = angleDifference(from.bearing, found.bearing);
  const over = way > 90 ? 180 : way <= -90 ? -180 : 0;
  const sign = (ellipse: CurrentEllipse): number => (ellipse.turning === 'left' ? 1 : -1);
  return [
    found.major - from.major,
    (sign(found) * found.minor - sign(from) * from.minor) * sign(from),
    way - over,
    angleDifference(from.phaseLag + over, found.phaseLag),
  ];
}

function sigmas(ellipse: CurrentEllipse): number[] {
  const { majorSigma, minorSigma, bearingSigma, phaseLagSigma } = ellipse;
  return [majorSigma, minorSigma, bearingSigma, phaseLagSigma] as number[];
}

const shapes = fc.record({
  major: evenly(0.5, 3),
  minor: evenly(0, 0.4),
  turning: fc.constantFrom('left' as const, 'right' as const),
  bearing: evenly(0, 179.9),
  phaseLag: evenly(0, 359.9),
});

describe('the sigmas of an ellipse', () => {
  it('are those of finite differences', () => {
    fc.assert(
      fc.property(shapes, factors, (shape, factor) => {
        const given = componentsOf(shape);
        const covariance = covarianceOf(factor);
        const ellipse = ellipseOf({ ...given, covariance });
        const at = coefficientsOf(given);
        const step = 1e-5; // m/s: the third derivative leaves 1e-10/0.1², rounding 1e-16/1e-5
        const gradients = at.map((_, k) => {
          const moved = (by: number): CurrentEllipse =>
            ellipseOf(fromCoefficients(at.map((value, i) => (i === k ? value + by : value))));
          const [ahead, behind] = [apart(moved(step), ellipse), apart(moved(-step), ellipse)];
          return ahead.map((value, q) => (value - (behind[q] as number)) / (2 * step));
        });
        const want = [0, 1, 2, 3].map((q) => {
          let sum = 0;
          for (let i = 0; i < 4; i++)
            for (let j = 0; j < 4; j++)
              sum +=
                (gradients[i]?.[q] as number) *
                (covariance[4 * i + j] as number) *
                (gradients[j]?.[q] as number);
          return Math.sqrt(Math.max(0, sum));
        });
        expectWithin(sigmas(ellipse), want, { rel: 1e-5, abs: 1e-8 });
      }),
      { numRuns: 500 },
    );
  });

  it('are those of many draws', () => {
    const normal = normals(20311);
    const draws = 20000;
    const factor = [
      [0.01, 0, 0, 0],
      [0.004, 0.012, 0, 0],
      [-0.006, 0.002, 0.008, 0],
      [0.003, -0.005, 0.001, 0.011],
    ];
    for (const shape of [
      { major: 1, minor: 0.4, turning: 'left', bearing: 30, phaseLag: 200 },
      { major: 1.3, minor: 0.3, turning: 'right', bearing: 140, phaseLag: 20 },
      { major: 0.8, minor: 0, turning: 'left', bearing: 91, phaseLag: 359.5 },
    ] as const) {
      const given = componentsOf(shape);
      const ellipse = ellipseOf({ ...given, covariance: covarianceOf(factor) });
      const at = coefficientsOf(given);
      const squares = [0, 0, 0, 0];
      for (let i = 0; i < draws; i++) {
        const noise = [normal(), normal(), normal(), normal()];
        const drawn = at.map(
          (value, k) =>
            value +
            (factor[k] as number[]).reduce((sum, f, j) => sum + f * (noise[j] as number), 0),
        );
        apart(ellipseOf(fromCoefficients(drawn)), ellipse).forEach(
          (value, q) => (squares[q] = (squares[q] as number) + value * value),
        );
      }
      const seen = squares.map((sum) => Math.sqrt(sum / draws));
      // Four standard errors of a standard deviation, 4/√(2n) = 2 %; the second order of 1 % noise is far below.
      expectWithin(sigmas(ellipse), seen, { rel: 0.02 });
    }
  });

  it('stop where nothing is known: any axis, any phase', () => {
    const loud = covarianceOf([0, 1, 2, 3].map((k) => [0, 1, 2, 3].map((j) => (j === k ? 1 : 0))));
    const given = componentsOf({
      major: 0.01,
      minor: 0.004,
      turning: 'left',
      bearing: 70,
      phaseLag: 10,
    });
    const ellipse = ellipseOf({ ...given, covariance: loud });
    expectWithin(sigmas(ellipse).slice(2), [UNIFORM_AXIS, UNIFORM_PHASE], { rel: 1e-12 });
    const normal = normals(4711);
    const draws = 20000;
    const at = coefficientsOf(given);
    const squares = [0, 0];
    let beyond = 0;
    for (let i = 0; i < draws; i++) {
      const drawn = at.map((value) => value + normal());
      const found = ellipseOf(fromCoefficients(drawn));
      const { bearing, phaseLag } = ellipse;
      const axis = angleDifference(2 * bearing, 2 * found.bearing) / 2;
      const phase = angleDifference(phaseLag, found.phaseLag);
      squares[0] = (squares[0] as number) + axis * axis;
      squares[1] = (squares[1] as number) + phase * phase;
      const { major, minor } = found;
      if (Math.sqrt(major * major + minor * minor) > (ellipse.radius95 as number)) beyond++;
    }
    // Four standard errors of the root mean square of a uniform number: 4·0.45/√n = 1.3 %.
    expectWithin(
      squares.map((sum) => Math.sqrt(sum / draws)),
      [UNIFORM_AXIS, UNIFORM_PHASE],
      { rel: 0.013 },
    );
    // Four standard errors of a share of 5 %: 4·√(0.05·0.95/n).
    expectWithin(beyond / draws, 0.05, { abs: 0.0062 });
  });

  it('of a circle and of nothing leave axis and phase open', () => {
    const covariance = Float64Array.from({ length: 16 }, (_, at) => (at % 5 === 0 ? 4e-4 : 0));
    const circle = ellipseOf({
      east: { amplitude: 1, phaseLag: 0 },
      north: { amplitude: 1, phaseLag: 90 },
      covariance,
    });
    // Each rotating vector is half a sum of two independent coefficients: variance ½; both lengths add.
    expectWithin(sigmas(circle), [0.02, 0.02, UNIFORM_AXIS, UNIFORM_PHASE], { rel: 1e-12 });
    const still = ellipseOf({
      east: { amplitude: 0, phaseLag: 0 },
      north: { amplitude: 0, phaseLag: 0 },
      covariance,
    });
    expectWithin(sigmas(still), [0.02, 0.02, UNIFORM_AXIS, UNIFORM_PHASE], { rel: 1e-12 });
    expectWithin(still.radius95 as number, 0.02 * Math.sqrt(9.487729036781154), { rel: 1e-12 });
    expect(structuredClone(still)).toEqual(still);
    const exact = ellipseOf({
      ...componentsOf({ ...circle, minor: 0.5 }),
      covariance: new Float64Array(16),
    });
    expect([...sigmas(exact), exact.radius95]).toEqual([0, 0, 0, 0, 0]);
  });

  it('have a ball of the longest axis of the 95 % region, √(χ²·variance)', () => {
    // χ² of four degrees of freedom: e^{−x/2}(1 + x/2) is what lies beyond x.
    const chi = 9.487729036781154;
    expectWithin(Math.exp(-chi / 2) * (1 + chi / 2), 0.05, { rel: 1e-12 });
    // Reflections leave the eigenvalues: H = I − 2vvᵀ with |v| = 1.
    fc.assert(
      fc.property(
        fc.array(evenly(0, 1), { minLength: 4, maxLength: 4 }),
        fc.array(evenly(0.1, 1), { minLength: 4, maxLength: 4 }),
        (values, direction) => {
          const length = Math.sqrt(direction.reduce((sum, v) => sum + v * v, 0));
          const v = direction.map((value) => value / length);
          const factor = v.map((a, i) =>
            v.map((b, j) => ((i === j ? 1 : 0) - 2 * a * b) * Math.sqrt(values[j] as number)),
          );
          const { radius95 } = ellipseOf({
            east: { amplitude: 1, phaseLag: 0 },
            north: { amplitude: 0, phaseLag: 0 },
            covariance: covarianceOf(factor),
          });
          const want = Math.sqrt(chi * Math.max(...values));
          expectWithin(radius95 as number, want, { rel: 1e-9, abs: 1e-12 });
        },
      ),
      { numRuns: 300 },
    );
  });
});
