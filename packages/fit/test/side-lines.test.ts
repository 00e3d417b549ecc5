import { HOUR, uniformSeries, YEAR } from '@staithe/core';
import { makeBasis, synthesizeInto } from '@staithe/basis';
import { expectWithin, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import { fitHarmonics } from '../src/index.js';

const START = Date.UTC(2000, 0, 1);
const NAMES = ['M2', 'K1', 'O1', 'M4'];
const RATIO = 1e-6; // of the main line: the noise-free record leaves rounding and the cubic between nodes

/** Twenty years each three hours by the potential's own nodal factors. */
function record(years: number): ReturnType<typeof uniformSeries> {
  const count = Math.round((years * YEAR) / (3 * HOUR));
  const values = new Float64Array(count);
  const basis = makeBasis({ constituents: NAMES });
  const coefficients = Float64Array.of(1, 0.8, 0.3, 0.2, -0.4, -0.3, 0.1, 0.05, 0.02);
  synthesizeInto(values, basis, coefficients, { start: START, step: 3 * HOUR, count });
  return uniformSeries({ start: START, step: 3 * HOUR, values });
}

describe('side-lines of the node left free', () => {
  it('are found where the potential has them', () => {
    const fit = fitHarmonics(record(20), { constituents: NAMES, sideLines: ['M2', 'K1', 'O1'] });
    const found = fit.sideLines ?? [];
    expect(found.map(({ name }) => name)).toEqual(['M2', 'K1', 'O1']);
    for (const { lines, swing, swingTheory } of found) {
      expectWithin(swing, swingTheory, { abs: RATIO });
      for (const { ratio, ratioTheory, quadrature } of lines) {
        expectWithin(ratio, ratioTheory, { abs: RATIO });
        expectWithin(quadrature, 0, { abs: RATIO });
      }
    }
    // D. Cartwright and R. Tayler (1971): the node's line of M2 has 0.0373 of it, of O1 0.1886 (from memory).
    expectWithin(found[0]?.swing as number, 0.0373, { abs: 1e-4 });
    expectWithin(found[2]?.swing as number, 0.1886, { abs: 2e-4 });
    expect(fit.constants.constituents.map(({ name }) => name)).toEqual(NAMES);
    expectWithin(fit.diagnostics.residual.rms, 0, { abs: 1e-6 });
  });

  it('are refused where the record or the model cannot show them', () => {
    const short = record(2);
    const long = record(19);
    const error = (run: () => unknown): string => {
      const { code, path } = refusal(run);
      return `${code} ${path}`;
    };
    expect(error(() => fitHarmonics(short, { constituents: NAMES, sideLines: ['M2'] }))).toBe(
      'OUT_OF_RANGE options.sideLines',
    );
    expect(error(() => fitHarmonics(long, { constituents: ['M2'], sideLines: ['K1'] }))).toBe(
      'MISSING options.sideLines',
    );
    expect(error(() => fitHarmonics(long, { constituents: ['M2', 'S1'], sideLines: ['S1'] }))).toBe(
      'MISSING options.sideLines[0]',
    );
    expect(
      error(() =>
        fitHarmonics(long, {
          constituents: ['M2'],
          sideLines: ['M2'],
          nodalModel: 'schureman1940',
        }),
      ),
    ).toBe('CONFLICT options.sideLines');
    expect(
      error(() =>
        fitHarmonics(long, { constituents: ['M2'], sideLines: ['M2'], nodalHold: 'calendar-year' }),
      ),
    ).toBe('CONFLICT options.sideLines');
  });
});
