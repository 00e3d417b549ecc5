import { expectAngleWithin, refusal } from '@staithe/test-vectors';

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  constituent,
  equilibriumArgument,
  formatDoodsonNumber,
  formatXdo,
  listConstituents,
  parseCompound,
  parseDoodsonNumber,
  parseXdo,
} from '../src/index.js';

const words = (name: string): string[] =>
  (constituent(name).composition ?? []).map((m) => `${m.multiplicity} ${m.name}`);

describe('constituent', () => {
  it('knows the aliases of the trade', () => {
    for (const [alias, name] of [
      ['MM', 'Mm'],
      ['SSA', 'Ssa'],
      ['RHO', 'RHO1'],
      ['ν2', 'NU2'],
      ['λ2', 'LAM2'],
      ['SIGMA1', 'SIG1'],
    ]) {
      expect(constituent(alias as string).name).toBe(name);
    }
  });

  it('has unique names, also after folding case, and unique frequencies among the lines', () => {
    const all = listConstituents();
    expect(new Set(all.map(({ name }) => name.toUpperCase())).size).toBe(all.length);
    const lines = all.filter(({ kind }) => kind !== 'compound');
    expect(new Set(lines.map(({ doodsonNumbers }) => doodsonNumbers.join())).size).toBe(
      lines.length,
    );
  });

  it.each([
    ['M4', ['2 M2']],
    ['2MS6', ['2 M2', '1 S2']],
    ['2SM2', ['2 S2', '-1 M2']],
    ['MNS2', ['1 M2', '1 N2', '-1 S2']],
    ['2MK3', ['2 M2', '-1 K1']],
    ['MK3', ['1 M2', '1 K1']],
    ['MK4', ['1 M2', '1 K2']],
    ['3M2S10', ['3 M2', '2 S2']],
    ['2(MS)8', ['2 M2', '2 S2']],
    ['NO1', ['1 N2', '-1 O1']],
    ['M12', ['6 M2']],
    ['SM0', ['1 S2', '-1 M2']],
    ['2MNU6', ['2 M2', '1 NU2']],
  ])('reads %s', (name, members) => {
    expect(words(name)).toEqual(members);
    expect(constituent(name).kind).toBe('compound');
  });

  it('adds quarter turns with their signs: 2MK3 has −90°, NO1 +90°', () => {
    expect(constituent('2MK3').quarterTurns).toBe(-1);
    expect(constituent('NO1').quarterTurns).toBe(1);
    expect(constituent('2SM2').quarterTurns).toBe(0);
  });

  it('refuses an unknown name with near ones', () => {
    const error = refusal(() => constituent('MZ2'));
    expect([error.code, error.path]).toEqual(['UNKNOWN_CONSTITUENT', 'constituent']);
    expect(error.details?.['near']).toContain('M2');
    expect(refusal(() => constituent('')).code).toBe('UNKNOWN_CONSTITUENT');
    expect(refusal(() => constituent(7 as unknown as string)).code).toBe('UNKNOWN_CONSTITUENT');
    expect(refusal(() => constituent('m2')).message).toContain('M2');
    expect(refusal(() => constituent('x'.repeat(1e5))).message.length).toBeLessThan(200);
    expect(refusal(() => constituent('__proto__')).code).toBe('UNKNOWN_CONSTITUENT');
  });

  it('refuses a compound with two readings and offers both', () => {
    const error = refusal(() => constituent('K4'));
    expect(error.code).toBe('AMBIGUOUS_CONSTITUENT');
    expect(error.message).toMatch(/4·K1 or 2·K2/);
    expect(parseCompound('M')).toBeUndefined();
    expect(parseCompound('0M2')).toBeUndefined();
  });
});

describe('written forms', () => {
  it('round-trip for every listed constituent', () => {
    for (const c of listConstituents()) {
      const { doodsonNumbers, quarterTurns } = c;
      expect(parseXdo(formatXdo(c))).toEqual({ doodsonNumbers, quarterTurns });
      expect(parseDoodsonNumber(formatDoodsonNumber(c))).toEqual(doodsonNumbers);
    }
  });

  it('round-trip for any numbers, with letters beyond 9', () => {
    const other = fc.integer({ min: -13, max: 12 });
    fc.assert(
      fc.property(
        fc.tuple(fc.integer({ min: 0, max: 25 }), other, other, other, other, other),
        (numbers) => {
          expect(parseDoodsonNumber(formatDoodsonNumber(numbers))).toEqual(numbers);
          expect(
            parseXdo(formatXdo({ doodsonNumbers: numbers, quarterTurns: 0 })).doodsonNumbers,
          ).toEqual(numbers);
        },
      ),
    );
  });

  it('are refused where they are malformed', () => {
    expect(refusal(() => parseDoodsonNumber('255.55')).code).toBe('BAD_NUMBER');
    expect(refusal(() => parseXdo('BZ')).path).toBe('xdo');
    expect(refusal(() => formatDoodsonNumber([2, -16, 0, 0, 0, 0])).path).toBe('doodsonNumbers[1]');
    expect(
      refusal(() => formatXdo({ doodsonNumbers: [2, 0.5, 0, 0, 0, 0], quarterTurns: 0 })).code,
    ).toBe('OUT_OF_RANGE');
  });
});

describe('equilibriumArgument', () => {
  it('of the solar tides follows the clock', () => {
    expectAngleWithin(equilibriumArgument('S2', '2031-06-01T04:30Z'), 135, { abs: 1e-9 });
    expectAngleWithin(equilibriumArgument('S1', '2031-06-01T04:30Z'), 67.5 + 180, { abs: 1e-9 });
  });

  it('of a compound is the sum of its members', () => {
    const t = '2031-06-01T04:30Z';
    const v = (name: string): number => equilibriumArgument(name, t);
    expectAngleWithin(v('2MK3'), 2 * v('M2') - v('K1'), { abs: 1e-8 });
    expectAngleWithin(v('MNS2'), v('M2') + v('N2') - v('S2'), { abs: 1e-8 });
  });
});
