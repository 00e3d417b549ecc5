import { DAY, InputError } from '@staithe/core';
import { readFileSync } from 'node:fs';
import { expectWithin, loadVector, publishedConstants } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import {
  constituent,
  constituentsNear,
  formatCompound,
  groupsResolvableIn,
  listConstituents,
  parseCompound,
  separationTime,
} from '../src/index.js';

function code(run: () => unknown): string {
  try {
    run();
  } catch (error) {
    if (error instanceof InputError) return `${error.code} ${error.path}`;
    throw error;
  }
  return 'accepted';
}

describe('the list', () => {
  it('holds more than 200 constituents, each with what it stands for', () => {
    const all = listConstituents();
    expect(all.length).toBeGreaterThan(200);
    for (const { name, doodsonNumbers, group, species, speed, source } of all) {
      expect(constituent(name).doodsonNumbers, name).toEqual(doodsonNumbers);
      expect(group).toEqual([0, 1, 2, 5].map((i) => doodsonNumbers[i]));
      expect(speed / 15 - species, name).toBeLessThan(0.6);
      expect(source.length).toBeGreaterThan(10);
    }
    expect(Math.max(...all.map(({ species }) => species))).toBe(12);
    expect(constituent('RHO1').aliases).toEqual(['RHO', 'ρ1']);
  });

  it('finds by Doodson numbers', () => {
    const found = listConstituents({ doodsonNumbers: [1, 0, 0, 1, 0, 0] }).map(({ name }) => name);
    expect(found).toEqual(['M1', 'NO1']);
  });
});

describe('names for completion in editors', () => {
  it('are those of the table, each known', () => {
    const text = readFileSync(new URL('../src/known.ts', import.meta.url), 'utf8');
    const names = [...text.matchAll(/\| '([^']+)'/g)].map(([, name]) => name as string);
    for (const name of names) expect(constituent(name).name).toBe(name);
    for (const { name, kind } of listConstituents())
      if (kind !== 'compound') expect(names).toContain(name);
    for (const { name } of publishedConstants('9410230').rows) expect(names).toContain(name);
    expect(new Set(names).size).toBe(names.length);
  });
});

describe('compound names', () => {
  it('round-trip for every listed compound: name, composition, name', () => {
    for (const { name, composition } of listConstituents({ kind: 'compound' })) {
      expect(formatCompound(composition ?? []), name).toBe(name);
    }
  });

  it('round-trip where they are not listed', () => {
    for (const name of ['5MN8', '3M2SN12', '4M2SK10', '2MNUS4', 'M14', '3SK5', '2MLAM6']) {
      expect(formatCompound(parseCompound(name) ?? []), name).toBe(name);
    }
  });

  it('read a leading count for all members where nothing else makes the species', () => {
    for (const [short, whole] of [
      ['2MS8', '2(MS)8'],
      ['2MN8', '2(MN)8'],
    ] as const) {
      expect(parseCompound(short)).toEqual(parseCompound(whole));
    }
  });

  it('are refused where no name says the members', () => {
    expect(code(() => formatCompound([]))).toBe('UNKNOWN_CONSTITUENT composition');
    expect(code(() => formatCompound([{ name: 'K2', multiplicity: 2 }]))).toBe(
      'AMBIGUOUS_CONSTITUENT constituent',
    );
  });
});

describe('constituentsNear', () => {
  it('settles labels that lists use differently: those of Anchorage by their speeds', () => {
    const { cases } = loadVector<{ constants: Record<string, Record<string, number[]>> }>(
      'noaa-constants-anchorage',
    );
    const speedOf = (label: string): number => cases.constants['9455920']?.[label]?.[2] as number;
    expect(constituentsNear(speedOf('M2KS2'))[0]?.name).toBe('M2(KS)2');
    expect(constituentsNear(speedOf('2MS8'))[0]?.name).toBe('2(MS)8');
    expect(constituentsNear(speedOf('OO2')).map(({ name }) => name)).toContain('OQ2');
    expect(constituentsNear(speedOf('N4'))[0]?.name).toBe('N4');
    expect(constituentsNear(0.0001)).toEqual([]);
    expect(code(() => constituentsNear(-1))).toBe('OUT_OF_RANGE speed');
    expect(code(() => constituentsNear(Number.NaN))).toBe('NOT_FINITE speed');
  });
});

describe('separation', () => {
  it('is one turn (common practice: 14.77, 27.55, 182.62, 365.26 days)', () => {
    expectWithin(separationTime('S2', 'M2') / DAY, 14.77, { abs: 0.005 });
    expectWithin(separationTime('N2', 'M2') / DAY, 27.55, { abs: 0.005 });
    expectWithin(separationTime('K2', 'S2') / DAY, 182.62, { abs: 0.005 });
    expectWithin(separationTime('T2', 'S2') / DAY, 365.26, { abs: 0.005 });
    expect(separationTime('NO1', 'M1')).toBe(Infinity);
  });

  it('groups what a record cannot tell apart', () => {
    const names = (days: number): string[] =>
      groupsResolvableIn(days * DAY).map((group) => group.map(({ name }) => name).join(' '));
    expect(names(60)).toContain('T2 S2 R2 K2');
    expect(names(60)).toContain('PI1 P1 S1 K1 PSI1 PHI1');
    expect(names(400)).toContain('S2');
    expect(code(() => groupsResolvableIn(0))).toBe('OUT_OF_RANGE duration');
    expect(code(() => groupsResolvableIn(Infinity))).toBe('NOT_FINITE duration');
  });
});
