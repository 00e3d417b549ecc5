/**
 * Constituents grouped by species, largest first.
 * @module
 */
import { type Constituent, constituent } from '@staithe/constituents';
import { type HarmonicConstant, type HarmonicConstants, parseConstants } from '@staithe/core';
import { group } from 'd3-array';

export interface Line<T = HarmonicConstant> {
  readonly own: T;
  readonly known: Constituent;
  /** Hours. */
  readonly period: number;
}

export interface SpeciesGroup<T = HarmonicConstant> {
  readonly species: number;
  /** `twice a day`. */
  readonly words: string;
  readonly lines: readonly Line<T>[];
}

const TIMES = [
  '',
  'once',
  'twice',
  'three times',
  'four times',
  'five times',
  'six times',
  'seven times',
  'eight times',
];

function speciesWords(species: number): string {
  if (species === 0) return 'slower than a day';
  return `${TIMES[species] ?? `${species} times`} a day`;
}

/** Groups whatever carries the name of a constituent; the group with the largest of all comes first. */
export function groupLines<T extends { readonly name: string }>(
  members: readonly T[],
  sizeOf: (own: T) => number,
): SpeciesGroup<T>[] {
  const lines = members.map((own): Line<T> => {
    const known = constituent(own.name);
    return { own, known, period: 360 / known.speed };
  });
  lines.sort((a, b) => sizeOf(b.own) - sizeOf(a.own));
  return [...group(lines, ({ known }) => known.species)].map(([species, own]) => ({
    species,
    words: speciesWords(species),
    lines: own,
  }));
}

/** Checks the document, and groups its constituents; the group with the largest amplitude comes first. */
export function groupBySpecies(constants: HarmonicConstants): SpeciesGroup[] {
  return groupLines(parseConstants(constants).constituents, ({ amplitude }) => amplitude);
}

/** `firm`, `borrowed from S2`, or nothing known. */
export function groundsOf({
  standing,
  borrowedFrom,
}: Pick<HarmonicConstant, 'standing' | 'borrowedFrom'>): string {
  if (standing === undefined) return 'not stated';
  return standing === 'borrowed' && borrowedFrom !== undefined
    ? `borrowed from ${borrowedFrom}`
    : standing;
}
