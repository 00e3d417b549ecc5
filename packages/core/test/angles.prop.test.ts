import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { expectAngleWithin, expectWithin, loadVector, recordAccuracy } from '@staithe/test-vectors';
import {
  angleDifference,
  degreesToRadians,
  feetFromMetres,
  fromGreenwichPhaseLag,
  knotsFromMetresPerSecond,
  metresFromFeet,
  metresPerSecondFromKnots,
  radiansToDegrees,
  toGreenwichPhaseLag,
  wrapDegrees,
} from '../src/index.js';

const angle = fc.double({ min: -1e6, max: 1e6, noNaN: true });

describe('angles', () => {
  it('wraps into [0, 360)', () => {
    fc.assert(
      fc.property(angle, (a) => {
        const wrapped = wrapDegrees(a);
        expect(wrapped >= 0 && wrapped < 360).toBe(true);
        const turns = (a - wrapped) / 360;
        expect(Math.abs(turns - Math.round(turns))).toBeLessThan(1e-9);
      }),
    );
    expect(Object.is(wrapDegrees(-0), 0)).toBe(true);
    expect(wrapDegrees(-1e-20)).toBe(0);
    expect(wrapDegrees(360)).toBe(0);
  });

  it('differs the short way round, in (−180, 180]', () => {
    expect(angleDifference(10, 350)).toBe(-20);
    expect(angleDifference(0, 180)).toBe(180);
    expect(angleDifference(180, 0)).toBe(180);
    fc.assert(
      fc.property(angle, angle, (a, b) => {
        const d = angleDifference(a, b);
        expect(d > -180 && d <= 180).toBe(true);
        expectAngleWithin(a + d, b, { abs: 1e-8 });
      }),
    );
  });

  it('turns radians and back', () => {
    fc.assert(
      fc.property(
        angle,
        (a) =>
          void expectWithin(radiansToDegrees(degreesToRadians(a)), a, { rel: 4e-16, abs: 1e-300 }),
      ),
    );
  });
});

describe('units', () => {
  it('are exact by definition', () => {
    expect(metresFromFeet(1)).toBe(0.3048);
    expect(feetFromMetres(0.3048)).toBe(1);
    expectWithin(metresPerSecondFromKnots(3600), 1852, { rel: 2e-16 });
    expectWithin(knotsFromMetresPerSecond(1852), 3600, { rel: 2e-16 });
  });
});

interface Row {
  name: string;
  greenwichPhaseLag: number;
  zonePhaseLag: number;
  speed: number;
}

describe('phase lags', () => {
  it('convert as published for station 9414131', () => {
    const { cases, tolerance } = loadVector<Row[]>('phase-conversion');
    const abs = tolerance.abs as number;
    const got = cases.map(({ zonePhaseLag, speed }) =>
      toGreenwichPhaseLag(zonePhaseLag, { speed, zoneHours: -8 }),
    );
    const seen = expectAngleWithin(
      got,
      cases.map((c) => c.greenwichPhaseLag),
      { abs },
    );
    recordAccuracy('phase-conversion', {
      capability: 'zone phase lag to Greenwich',
      compared: 'six constituents',
      ...seen,
      tolerance: abs,
      unit: 'degrees',
      headline: true,
    });
  });

  it('go there and back, κ and zone time', () => {
    fc.assert(
      fc.property(
        angle,
        fc.integer({ min: 0, max: 8 }),
        fc.double({ min: -180, max: 180, noNaN: true }),
        (lag, n1, longitude) => {
          const local = { doodsonNumbers: [n1, 0, 0, 0, 0, 0], longitude };
          expectAngleWithin(fromGreenwichPhaseLag(toGreenwichPhaseLag(lag, local), local), lag, {
            abs: 1e-8,
          });
          const zone = { speed: 28.9841042, zoneHours: longitude / 15 };
          expectAngleWithin(toGreenwichPhaseLag(fromGreenwichPhaseLag(lag, zone), zone), lag, {
            abs: 1e-8,
          });
        },
      ),
    );
    // κ counts V at the place: east of Greenwich V is greater by n₁λ, so G = κ − n₁λ.
    expect(toGreenwichPhaseLag(100, { doodsonNumbers: [2, 0, 0, 0, 0, 0], longitude: 10 })).toBe(
      80,
    );
    expect(() => toGreenwichPhaseLag(1, { speed: 15, zoneHours: Number.NaN })).toThrow(
      /zoneHours: expected/,
    );
  });
});
