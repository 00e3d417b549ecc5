import { degreesToRadians } from '@staithe/core';
import { expectAngleWithin, expectWithin, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import {
  componentsOf,
  type CurrentComponents,
  type CurrentEllipse,
  ellipseFromRotary,
  ellipseOf,
  rotaryOf,
} from '../src/ellipse.js';
import { principalAxis } from '../src/principal-axis.js';

const EXACT = { abs: 1e-9 }; // m/s and degrees: what rounding may leave of currents of metres per second, with room
const ULPS = { rel: 1e-14 }; // some fifty roundings at double precision

/** Source: the sum of cosines that the convention of heights states, Math.cos; nothing of the ellipse. */
function currentAt({ east, north }: CurrentComponents, theta: number): [number, number] {
  return [
    east.amplitude * Math.cos(degreesToRadians(theta - east.phaseLag)),
    north.amplitude * Math.cos(degreesToRadians(theta - north.phaseLag)),
  ];
}

function pair(
  eastAmplitude: number,
  eastLag: number,
  northAmplitude: number,
  northLag: number,
): CurrentComponents {
  return {
    east: { amplitude: eastAmplitude, phaseLag: eastLag },
    north: { amplitude: northAmplitude, phaseLag: northLag },
  };
}

const grid: CurrentEllipse[] = [5, 45, 60, 90, 100, 135, 170].flatMap((bearing) =>
  [0.5, 80, 91, 170, 200, 269, 300, 359].flatMap((phaseLag) =>
    (['left', 'right'] as const).map((turning) => ({
      major: 1.2,
      minor: 0.3,
      turning,
      bearing,
      phaseLag,
    })),
  ),
);

describe('ellipseOf', () => {
  it('runs along its bearing at its phase lag, and across it a quarter period later', () => {
    for (const ellipse of grid) {
      const components = componentsOf(ellipse);
      const found = ellipseOf(components);
      expectWithin(found.major, ellipse.major, EXACT, 'major');
      expectWithin(found.minor, ellipse.minor, EXACT, 'minor');
      expectWithin(found.bearing, ellipse.bearing, EXACT, 'bearing');
      expectAngleWithin(found.phaseLag, ellipse.phaseLag, EXACT, 'phase lag');
      expect(found.turning).toBe(ellipse.turning);
      const toAxis = degreesToRadians(ellipse.bearing);
      const [s, c] = [Math.sin(toAxis), Math.cos(toAxis)];
      expectWithin(currentAt(components, ellipse.phaseLag), [1.2 * s, 1.2 * c], EXACT);
      // To the left of (s, c), as (east, north), is (−c, s).
      const side = ellipse.turning === 'left' ? 0.3 : -0.3;
      expectWithin(currentAt(components, ellipse.phaseLag + 90), [-side * c, side * s], EXACT);
    }
    expect(grid.length).toBe(112);
  });

  it('reads currents along north and east without a trace of the other component', () => {
    expect(ellipseOf(pair(0, 12, 2, 200))).toEqual({
      major: 2,
      minor: 0,
      turning: 'left',
      bearing: 0,
      phaseLag: 200,
    });
    expect(ellipseOf(pair(0, 200, 2, 12))).toMatchObject({ bearing: 0, phaseLag: 12 });
    expect(ellipseOf(pair(2, 350, 0, 12))).toEqual({
      major: 2,
      minor: 0,
      turning: 'left',
      bearing: 90,
      phaseLag: 350,
    });
  });

  it('calls a line left, whether its components agree or oppose', () => {
    const agree = ellipseOf(pair(3, 70, 4, 70));
    expect([agree.minor, agree.turning]).toEqual([0, 'left']);
    expectWithin(agree.major, 5, ULPS);
    expectWithin(agree.bearing, (Math.atan2(3, 4) * 180) / Math.PI, ULPS);
    expectWithin(agree.phaseLag, 70, ULPS);
    const oppose = ellipseOf(pair(3, 70, 4, 250));
    expect([oppose.minor, oppose.turning]).toEqual([0, 'left']);
    expectWithin(oppose.bearing, 180 - (Math.atan2(3, 4) * 180) / Math.PI, ULPS);
    expectWithin(oppose.phaseLag, 70, ULPS);
  });

  it('gives a circle bearing 0 and the phase lag of north', () => {
    expect(ellipseOf(pair(1, 10, 1, 100))).toEqual({
      major: 1,
      minor: 1,
      turning: 'left',
      bearing: 0,
      phaseLag: 100,
    });
    expect(ellipseOf(pair(1, 10, 1, 280))).toEqual({
      major: 1,
      minor: 1,
      turning: 'right',
      bearing: 0,
      phaseLag: 280,
    });
  });

  it('is nothing where nothing flows', () => {
    const nothing = { major: 0, minor: 0, turning: 'left', bearing: 0, phaseLag: 0 };
    expect(ellipseOf(pair(0, 50, 0, 90))).toEqual(nothing);
    expect(ellipseFromRotary(rotaryOf(pair(0, 50, 0, 90)))).toEqual(nothing);
  });

  it('keeps all digits of a thin ellipse: minor·major = H_e·H_n·sin(G_n − G_e)', () => {
    // Powers of two, so that the phase lags differ by what is written.
    for (const tiny of [2 ** -20, 2 ** -40]) {
      const want = degreesToRadians(tiny) / Math.sqrt(2);
      const ahead = ellipseOf(pair(1, 1, 1, 1 + tiny));
      expect(ahead.turning).toBe('left');
      expectWithin(ahead.minor, want, { rel: 1e-12 }, 'minor'); // sin x = x − x³/6, x below 2e-8
      const behind = ellipseOf(pair(1, 1 + tiny, 1, 1));
      expect(behind.turning).toBe('right');
      expectWithin(behind.minor, want, { rel: 1e-12 }, 'minor');
      // Beside half a turn the line leans the other way.
      const opposed = ellipseOf(pair(1, 1, 1, 181 - tiny));
      expect(opposed.turning).toBe('left');
      expectWithin(opposed.minor, want, { rel: 1e-12 }, 'minor');
      expectWithin(opposed.bearing, 135, { abs: 1e-9 });
    }
  });

  it('keeps all digits of what makes a circle an ellipse', () => {
    const excess = 2 ** -40;
    const wide = rotaryOf(pair(1 + excess, 10, 1, 100));
    expect(wide.right.amplitude).toBe(excess / 2);
    expect(ellipseOf(pair(1 + excess, 10, 1, 100))).toMatchObject({ bearing: 90, phaseLag: 10 });
    const high = ellipseOf(pair(1, 10, 1 + excess, 100));
    expect(high).toMatchObject({ bearing: 0, phaseLag: 100, turning: 'left' });
    // Equal components 90° − ε apart: R = sin(ε/2), at 45°, midway between the two lags.
    const skew = rotaryOf(pair(1, 10, 1, 100 - 2 ** -30));
    expectWithin(skew.right.amplitude, degreesToRadians(2 ** -31), { rel: 1e-12 });
    const leaning = ellipseOf(pair(1, 10, 1, 100 - 2 ** -30));
    expectWithin(leaning.bearing, 45, { abs: 1e-9 });
    expectWithin(leaning.phaseLag, 55, { abs: 1e-9 });
  });

  it('takes phase lags of any turn', () => {
    const there = ellipseOf(pair(1, -330, 0.5, 720 + 75));
    const here = ellipseOf(pair(1, 30, 0.5, 75));
    expectWithin(there.phaseLag, here.phaseLag, EXACT);
    expectWithin(there.bearing, here.bearing, EXACT);
    expectWithin(ellipseOf(pair(1, 3.6e14 + 30, 0.5, 75)).phaseLag, here.phaseLag, { abs: 0.1 });
  });

  it('refuses what is no current', () => {
    const refused = (components: CurrentComponents): [string, string] => {
      const { code, path } = refusal(() => ellipseOf(components));
      return [code, path];
    };
    expect(refused(pair(Number.NaN, 0, 1, 0))).toEqual(['NOT_FINITE', 'east.amplitude']);
    expect(refused(pair(1, 0, -1, 0))).toEqual(['OUT_OF_RANGE', 'north.amplitude']);
    expect(refused(pair(1, 0, 1e7, 0))).toEqual(['OUT_OF_RANGE', 'north.amplitude']);
    expect(refused(pair(1, 0, 1, Infinity))).toEqual(['NOT_FINITE', 'north.phaseLag']);
    const known = pair(1, 0, 1, 0);
    const covariance = new Float64Array(16);
    expect(refused({ ...known, covariance: [1] })).toEqual(['LENGTH_MISMATCH', 'covariance']);
    covariance[5] = -1;
    expect(refused({ ...known, covariance })).toEqual(['OUT_OF_RANGE', 'covariance[5]']);
    covariance[5] = Number.NaN;
    expect(refused({ ...known, covariance })).toEqual(['NOT_FINITE', 'covariance[5]']);
    const [ellipse] = grid as [CurrentEllipse];
    const other = { ...ellipse, turning: 'up' as 'left' };
    expect(refusal(() => componentsOf(other))).toMatchObject({
      code: 'UNKNOWN_CHOICE',
      path: 'turning',
    });
    expect(refusal(() => componentsOf({ ...ellipse, minor: -1 })).path).toBe('minor');
    expect(refusal(() => componentsOf({ ...ellipse, bearing: Number.NaN })).path).toBe('bearing');
    const rotary = rotaryOf(known);
    const long = { ...rotary, right: { amplitude: -1, phaseLag: 0 } };
    expect(refusal(() => ellipseFromRotary(long)).path).toBe('right.amplitude');
  });
});

describe('the rotating vectors', () => {
  it('point east at their phase lags, and turn left and right', () => {
    const { left, right } = rotaryOf(componentsOf({ ...(grid[37] as CurrentEllipse) }));
    for (const theta of [0, 40, 133, 290]) {
      const [l, r] = [
        degreesToRadians(theta - left.phaseLag),
        degreesToRadians(right.phaseLag - theta),
      ];
      const sum = [
        left.amplitude * Math.cos(l) + right.amplitude * Math.cos(r),
        left.amplitude * Math.sin(l) + right.amplitude * Math.sin(r),
      ];
      expectWithin(currentAt(componentsOf(grid[37] as CurrentEllipse), theta), sum, EXACT);
    }
  });

  it('of a circle are one', () => {
    expect(rotaryOf(pair(1, 10, 1, 100))).toEqual({
      left: { amplitude: 1, phaseLag: 10 },
      right: { amplitude: 0, phaseLag: 0 },
    });
    expect(rotaryOf(pair(1, 10, 1, 280))).toEqual({
      left: { amplitude: 0, phaseLag: 0 },
      right: { amplitude: 1, phaseLag: 10 },
    });
    for (const components of [pair(1, 10, 1, 100), pair(1, 10, 1, 280)])
      expect(ellipseFromRotary(rotaryOf(components))).toEqual(ellipseOf(components));
  });
});

describe('principalAxis', () => {
  const count = 1000;
  const made = (bearing: number, along: number, across: number): [Float64Array, Float64Array] => {
    const [s, c] = [Math.sin(degreesToRadians(bearing)), Math.cos(degreesToRadians(bearing))];
    const at = (i: number): [number, number] => {
      const angle = (2 * Math.PI * i) / count;
      return [along * Math.cos(angle), across * Math.sin(angle)];
    };
    const east = Float64Array.from({ length: count }, (_, i) => {
      const [a, b] = at(i);
      return 0.3 + a * s + b * c;
    });
    const north = Float64Array.from({ length: count }, (_, i) => {
      const [a, b] = at(i);
      return -0.1 + a * c - b * s;
    });
    return [east, north];
  };

  it('finds the axis of whole turns of an ellipse: sigmas are half axes over √2', () => {
    for (const bearing of [3, 45, 90, 120, 179]) {
      const axis = principalAxis(...made(bearing, 1, 0.4));
      expectWithin(axis.bearing, bearing, EXACT);
      expectWithin(axis.alongSigma, 1 / Math.sqrt(2), EXACT);
      expectWithin(axis.acrossSigma, 0.4 / Math.sqrt(2), EXACT);
      expectWithin(axis.share, 1 / 1.16, EXACT);
    }
  });

  it('skips a pair where either is a gap', () => {
    const [east, north] = made(70, 1, 0.2);
    const whole = principalAxis(east, north);
    const longer = (values: Float64Array, ...more: number[]): Float64Array =>
      Float64Array.from([...values, ...more]);
    const gappy = principalAxis(
      longer(east, Number.NaN, 50, Number.NaN),
      longer(north, 50, Number.NaN, Number.NaN),
    );
    expect(gappy).toEqual(whole);
  });

  it('keeps the little that a straight current has across', () => {
    const axis = principalAxis(...made(30, 1, 1e-9));
    // The values themselves are rounded to 1e-16.
    expectWithin(axis.acrossSigma, 1e-9 / Math.sqrt(2), { rel: 1e-6 });
    expect(axis.share).toBe(1);
  });

  it('has bearing 0 where no direction stands out, and north is 0, not 180', () => {
    const square = principalAxis(Float64Array.of(1, -1, 0, 0), Float64Array.of(0, 0, 1, -1));
    expect(square).toMatchObject({ bearing: 0, share: 0.5 });
    expect(principalAxis(Float64Array.of(0, 0), Float64Array.of(-1, 1)).bearing).toBe(0);
    expect(principalAxis(Float64Array.of(0, -0), Float64Array.of(1, -1)).bearing).toBe(0);
  });

  it('refuses what has no axis', () => {
    const two = Float64Array.of(1, 2);
    const refused = (east: Float64Array, north: Float64Array): [string, string] => {
      const { code, path } = refusal(() => principalAxis(east, north));
      return [code, path];
    };
    expect(refused(two, Float64Array.of(1))).toEqual(['LENGTH_MISMATCH', 'north']);
    expect(refused(two, Float64Array.of(0, Infinity))).toEqual(['OUT_OF_RANGE', 'north[1]']);
    expect(refused(Float64Array.of(-1e7, 0), two)).toEqual(['OUT_OF_RANGE', 'east[0]']);
    expect(refused(two, Float64Array.of(1, Number.NaN))).toEqual(['TOO_FEW_SAMPLES', '']);
    expect(refused(Float64Array.of(0.1, 0.1, 0.1), Float64Array.of(3, 3, 3))).toEqual([
      'NO_TIDE',
      '',
    ]);
  });
});
