/**
 * Constituents grouped by species, largest first.
 * @module
 */
import { type Constituent, constituent } from '@staithe/constituents';
import { type HarmonicConstant, type HarmonicConstants, parseConstants } from '@staithe/core';
import { group } from 'd3-array';

export interface Line {
  readonly own: HarmonicConstant;
  readonly known: Constituent;
  /** Hours. */
  readonly period: number;
}

export interface SpeciesGroup {
  readonly species: number;
  /** `twice a day`. */
  readonly words: string;
  readonly lines: readonly Line[];
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

/** Checks the document, and groups its constituents; the group with the largest amplitude comes first. */
export function groupBySpecies(constants: HarmonicConstants): SpeciesGroup[] {
  const lines = parseConstants(constants).constituents.map((own): Line => {
    const known = constituent(own.name);
    return { own, known, period: 360 / known.speed };
  });
  lines.sort((a, b) => b.own.amplitude - a.own.amplitude);
  return [...group(lines, ({ known }) => known.species)].map(([species, members]) => ({
    species,
    words: speciesWords(species),
    lines: members,
  }));
}

/** `firm`, `borrowed from S2`, or nothing known. */
export function groundsOf({ standing, borrowedFrom }: HarmonicConstant): string {
  if (standing === undefined) return 'not stated';
  return standing === 'borrowed' && borrowedFrom !== undefined
    ? `borrowed from ${borrowedFrom}`
    : standing;
}
