/**
 * Records with gross errors put in, and how far a fit of them comes to lie from another.
 */
import {
  angleDifference,
  DAY,
  type HarmonicConstant,
  type UniformSeries,
  uniformSeries,
} from '@staithe/core';
import type { HarmonicFit } from '../../src/index.js';

/** What is done to a record. */
export interface Spoiling {
  readonly seed: number;
  /** Of the samples that get a spike. Default 0.1. */
  readonly share?: number;
  /** Metres. Default 2. */
  readonly size?: number;
  /** Whether all spikes go up. Default up or down by chance. */
  readonly oneSided?: boolean;
  /** Whether the gauge sticks for a day. Default true. */
  readonly stuck?: boolean;
}

/** A spoilt record, and where the spikes are. */
export interface Spoilt {
  readonly series: UniformSeries;
  /** Indices of samples. */
  readonly spikes: readonly number[];
}

/** Numbers in (0, 1): the minimal standard generator of S. Park and K. Miller (1988), multiplier 48271. */
export function generator(seed: number): () => number {
  let state = seed;
  for (let i = 0; i < 10; i++) state = (state * 48271) % 2147483647; // small seeds start alike
  return () => (state = (state * 48271) % 2147483647) / 2147483647;
}

/** One calendar year of a record. */
export function yearOf(series: UniformSeries, year: number): UniformSeries {
  const [from, to] = [Date.UTC(year, 0, 1), Date.UTC(year + 1, 0, 1)];
  const at = (time: number): number => (time - series.start) / series.step;
  return uniformSeries({
    start: from,
    step: series.step,
    values: series.values.slice(at(from), at(to)),
  });
}

/** Puts spikes on samples taken by chance, and lets the gauge stick for a day taken by chance. */
export function spoil(series: UniformSeries, spoiling: Spoiling): Spoilt {
  const { seed, share = 0.1, size = 2, oneSided = false, stuck = true } = spoiling;
  const random = generator(seed);
  const values = Float64Array.from(series.values);
  const place = (): number => Math.floor(random() * values.length);
  if (stuck) {
    const length = DAY / series.step;
    const first = Math.min(place(), values.length - length);
    for (let i = 1; i < length; i++) values[first + i] = values[first] as number;
  }
  const spikes = new Set<number>();
  while (spikes.size < Math.round(share * values.length)) spikes.add(place());
  for (const i of spikes) {
    values[i] = (values[i] as number) + (oneSided || random() < 0.5 ? size : -size);
  }
  return { series: { ...series, values }, spikes: [...spikes] };
}

/** How far two fits lie apart in one constituent. */
export interface Apart {
  readonly name: string;
  /** Metres. */
  readonly amplitude: number;
  /** Degrees. */
  readonly phaseLag: number;
}

/** The distances of two fits, without sign. */
export function apart(one: HarmonicFit, other: HarmonicFit, names: readonly string[]): Apart[] {
  const read = ({ constants }: HarmonicFit, name: string): HarmonicConstant => {
    const found = constants.constituents.find((c) => c.name === name);
    if (found) return found;
    throw new Error(`expected ${name} among the constants`);
  };
  return names.map((name) => {
    const [a, b] = [read(one, name), read(other, name)];
    return {
      name,
      amplitude: Math.abs(a.amplitude - b.amplitude),
      phaseLag: Math.abs(angleDifference(a.phaseLag, b.phaseLag)),
    };
  });
}

/** The constituents that a spoilt record is judged by, and the models of the published sets. */
export const JUDGED = ['M2', 'S2', 'K1', 'O1'];
export const OLD = { argumentModel: 'schureman1940', nodalModel: 'schureman1940' } as const;

/** How near a resistant fit of La Jolla 2012 must come to the fit of the clean record. */
export const NEAR = { amplitude: 1e-3, phaseLag: 0.1 } as const; // m, degrees
/** What counts as spoilt: either of these and more. */
export const FAR = { amplitude: 2e-3, phaseLag: 0.3 } as const; // m, degrees

/** Whether all of them lie within a distance. */
export function within(
  list: readonly Apart[],
  limit: Readonly<Record<'amplitude' | 'phaseLag', number>>,
): boolean {
  return list.every(
    ({ amplitude, phaseLag }) => amplitude <= limit.amplitude && phaseLag <= limit.phaseLag,
  );
}
