import { DAY, EARLIEST, HOUR, LATEST, MINUTE, type NodalHold, SECOND } from '@staithe/core';
import { expectWithin } from '@staithe/test-vectors';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  columnCount,
  gram,
  makeBasis,
  projectInto,
  synthesizeInto,
  type TimeGrid,
} from '../src/index.js';
import { directHeight, directPhasors } from './reference/direct-sum.js';

const NAMES =
  'M2 S2 N2 K2 K1 O1 P1 Q1 J1 M1 OO1 L2 NU2 T2 Mf Mm Sa Ssa M3 M4 MS4 2MK3 2SM2 M6 M8'.split(' ');
const DIRECT = 1e-8; // m, against the direct sum for metre amplitudes
const ADJOINT = 1e-12; // of the product of the norms

const model = fc.record({
  argumentModel: fc.constantFrom('iers2010' as const, 'schureman1940' as const),
  nodalModel: fc.constantFrom('potential' as const, 'schureman1940' as const, 'none' as const),
  nodalHold: fc.constantFrom<NodalHold>('continuous', 'calendar-year', {
    heldAt: '1999-05-05T12:00Z',
  }),
});
const names = fc.uniqueArray(fc.constantFrom(...NAMES), { minLength: 1, maxLength: NAMES.length });
const grid = fc.record({
  start: fc.integer({ min: EARLIEST + DAY, max: LATEST - 4e10 }),
  step: fc.integer({ min: SECOND, max: 10 * DAY }),
  count: fc.integer({ min: 1, max: 40 }),
});
const amplitude = fc.double({ min: -1, max: 1, noNaN: true });

function times(of: TimeGrid): number[] {
  if (of.times) return Array.from(of.times);
  return Array.from({ length: of.count }, (_, i) => of.start + i * of.step);
}

describe('synthesize', () => {
  it('agrees with the direct sum, every model and hold, steps of 1 s to 10 d, 1700 to 2200', () => {
    fc.assert(
      fc.property(
        model,
        names,
        grid,
        fc.array(amplitude, { minLength: 51, maxLength: 51 }),
        (m, list, g, c) => {
          const basis = makeBasis({ constituents: list, ...m });
          const coefficients = Float64Array.from(c.slice(0, columnCount(basis)));
          const out = new Float64Array(g.count);
          synthesizeInto(out, basis, coefficients, g);
          const direct = directHeight(list, coefficients, m);
          expectWithin(out, times(g).map(direct), { abs: DIRECT });
          const listed = new Float64Array(g.count);
          synthesizeInto(listed, basis, coefficients, { times: Float64Array.from(times(g)) });
          expectWithin(listed, out, { abs: 1e-11 });
        },
      ),
      { numRuns: 60 },
    );
  });

  it('stays within 1e-8 m of the direct sum through 19 years, degree 3 included', () => {
    const m = {
      argumentModel: 'iers2010',
      nodalModel: 'potential',
      nodalHold: 'continuous',
      latitude: 50,
    } as const;
    const basis = makeBasis({ constituents: NAMES, ...m, nodalLatitude: 50 });
    const coefficients = Float64Array.from({ length: columnCount(basis) }, (_, i) => (i % 3) - 1);
    const g = { start: Date.UTC(2001, 0, 1), step: 97 * HOUR + 7 * MINUTE, count: 1700 };
    const out = new Float64Array(g.count);
    synthesizeInto(out, basis, coefficients, g);
    const seen = expectWithin(out, times(g).map(directHeight(NAMES, coefficients, m)), {
      abs: DIRECT,
    });
    expect(seen.cases).toBe(1700);
  });

  it('is linear in the coefficients', () => {
    const basis = makeBasis({ constituents: NAMES });
    const g = { start: 0, step: HOUR, count: 100 };
    const [a, b, both] = [new Float64Array(100), new Float64Array(100), new Float64Array(100)];
    const [c, d] = [0.3, -1.7].map((x) =>
      Float64Array.from({ length: columnCount(basis) }, (_, i) => x / (1 + i)),
    );
    synthesizeInto(a, basis, c as Float64Array, g);
    synthesizeInto(b, basis, d as Float64Array, g);
    synthesizeInto(
      both,
      basis,
      (c as Float64Array).map((x, i) => x + ((d as Float64Array)[i] as number)),
      g,
    );
    expectWithin(
      both,
      a.map((x, i) => x + (b[i] as number)),
      { abs: 1e-13 },
    );
  });
});

describe('project', () => {
  it('is the adjoint of synthesize to rounding, gaps and irregular times included', () => {
    fc.assert(
      fc.property(
        model,
        names,
        grid,
        fc.boolean(),
        fc.array(amplitude, { minLength: 91, maxLength: 91 }),
        (m, list, g, irregular, c) => {
          const basis = makeBasis({ constituents: list, ...m });
          const count = columnCount(basis);
          const where: TimeGrid = irregular
            ? { times: Float64Array.from(times(g), (t, i) => t + (i % 3) * 250) }
            : g;
          const coefficients = Float64Array.from(c.slice(0, count));
          // Every fifth value is a gap.
          const x = Float64Array.from({ length: g.count }, (_, i) =>
            i % 5 === 2 ? Number.NaN : (c[90 - i] as number),
          );
          const heights = new Float64Array(g.count);
          synthesizeInto(heights, basis, coefficients, where);
          const sums = new Float64Array(count);
          projectInto(sums, basis, x, where);
          const left = heights.reduce(
            (sum, h, i) => sum + (Number.isNaN(x[i] as number) ? 0 : h * (x[i] as number)),
            0,
          );
          const right = coefficients.reduce((sum, v, i) => sum + v * (sums[i] as number), 0);
          const norm = (v: Float64Array): number =>
            Math.sqrt(v.reduce((sum, a) => sum + (Number.isNaN(a) ? 0 : a * a), 0));
          const scale = norm(heights) * norm(x) + norm(coefficients) * norm(sums) + 1;
          expectWithin(left, right, { abs: ADJOINT * scale });
        },
      ),
      { numRuns: 100 },
    );
  });
});

describe('gram', () => {
  it('holds the products of the columns over the times that take part', () => {
    const m = {
      argumentModel: 'iers2010',
      nodalModel: 'potential',
      nodalHold: 'continuous',
    } as const;
    const list = ['M2', 'K1', 'M4', 'Mf'];
    const basis = makeBasis({ constituents: list, ...m });
    const g = { start: Date.UTC(2020, 2, 1), step: 3 * HOUR, count: 700 };
    const mask = Uint8Array.from({ length: g.count }, (_, i) => (i % 7 === 3 ? 0 : 1));
    const phasors = directPhasors(list, m);
    const columns = times(g).map((t) => [1, ...phasors(t).flat()]);
    const count = columnCount(basis);
    const want = new Float64Array(count * count);
    columns.forEach((row, i) => {
      if (!mask[i]) return;
      row.forEach((a, k) =>
        row.forEach((b, l) => void (want[k * count + l] = (want[k * count + l] as number) + a * b)),
      );
    });
    expectWithin(gram(basis, g, mask), want, { abs: 1e-6 });
    expectWithin(gram(basis, { times: Float64Array.from(times(g)) }, mask), want, { abs: 1e-6 });
  });
});
