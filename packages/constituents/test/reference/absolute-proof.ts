/**
 * The absolute proof: the equilibrium tide of the ephemeris against the sum of lines, at places, over 1993 to 2011.
 */
import { potentialLines } from '../../src/index.js';
import { loadVector } from '@staithe/test-vectors';
import { TERMS, tideOfEphemeris, tideOfLines, tideOfWaves, weights } from './equilibrium-tide.js';

/** The vector `ephemeris-equilibrium-tide`. */
export interface Proof {
  readonly from: string;
  readonly to: string;
  readonly constants: Readonly<Record<string, number>>;
  readonly places: readonly ProofPlace[];
  /** rms of the difference over rms of the signal. */
  readonly limits: {
    readonly species: readonly [longPeriod: number, diurnal: number, semidiurnal: number];
    readonly waves: number;
  };
  /** Heights of degree 2 and of degree 3 at each place, metres. */
  readonly samples: readonly { readonly time: string; readonly heights: readonly number[] }[];
}

/** A place, degrees, with its limits: lines of degree 2 alone; lines of degrees 2 and 3. */
export interface ProofPlace {
  readonly name: string;
  readonly latitude: number;
  readonly longitude: number;
  readonly limit: number;
  readonly limitWithDegree3: number;
}

/** The terms of degree 2, one a species; those of degree 3; all. */
export const DEGREE_2 = [0, 1, 2];
export const DEGREE_3 = [3, 4, 5, 6];
export const ALL = [...DEGREE_2, ...DEGREE_3];

/** Heights in metres at a place from the numbers of some terms. */
export function heightsAt(
  numbers: Float64Array,
  { latitude, longitude }: Pick<ProofPlace, 'latitude' | 'longitude'>,
  terms: readonly number[],
): Float64Array {
  const width = 2 * TERMS.length;
  const sizes = weights(Math.sin((latitude * Math.PI) / 180));
  const out = new Float64Array(numbers.length / width);
  for (const term of terms) {
    const angle = ((TERMS[term]?.order ?? 0) * longitude * Math.PI) / 180;
    const re = (sizes[term] as number) * Math.cos(angle);
    const im = (sizes[term] as number) * Math.sin(angle);
    for (let i = 0; i < out.length; i++) {
      const at = i * width + 2 * term;
      out[i] = (out[i] as number) + re * (numbers[at] as number) - im * (numbers[at + 1] as number);
    }
  }
  return out;
}

/** Standard deviation: the root mean square once the mean is taken away. */
export function spread(values: Float64Array): number {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const squares = values.reduce((sum, value) => sum + (value - mean) * (value - mean), 0);
  return Math.sqrt(squares / values.length);
}

/** rms of the difference over rms of the signal, both without their means. */
export function relativeRms(
  signal: Float64Array,
  other: Float64Array,
  place: Pick<ProofPlace, 'latitude' | 'longitude'>,
  terms: readonly number[],
): number {
  const heights = heightsAt(signal, place, terms);
  const others = heightsAt(other, place, terms);
  return spread(heights.map((height, i) => height - (others[i] as number))) / spread(heights);
}

/** Instants of the proof. */
export function timesOf({ from, to }: Pick<Proof, 'from' | 'to'>, stepHours: number): Float64Array {
  const start = new Date(from).getTime();
  const step = stepHours * 3600000;
  const count = Math.ceil((new Date(to).getTime() - start) / step);
  return Float64Array.from({ length: count }, (_, i) => start + i * step);
}

/** One ratio of the proof, with the limit that it must meet. */
export interface Ratio {
  readonly what: string;
  readonly where: string;
  readonly ratio: number;
  readonly limit: number;
}

const SPECIES = ['long-period', 'diurnal', 'semidiurnal'];

/** Every ratio of the proof, from one sample each so many hours. */
export function runProof(proof: Proof, stepHours: number): { ratios: Ratio[]; samples: number } {
  const times = timesOf(proof, stepHours);
  const signal = tideOfEphemeris(times);
  const lines = tideOfLines(times, potentialLines());
  const waves = tideOfWaves(times, loadVector<number[][]>('hartmann-wenzel-1995').cases);
  const ratios = proof.places.flatMap((place) => {
    const row = (what: string, other: Float64Array, terms: number[], limit: number): Ratio => ({
      what,
      where: place.name,
      ratio: relativeRms(signal, other, place, terms),
      limit,
    });
    // At the equator W_2^1 = 0: there is no diurnal tide of degree 2.
    const species = DEGREE_2.filter((order) => order !== 1 || place.latitude !== 0);
    return [
      row('degree 2, 342 lines', lines, DEGREE_2, place.limit),
      ...species.map((order) =>
        row(SPECIES[order] as string, lines, [order], proof.limits.species[order] as number),
      ),
      row('degree 2, 517 waves', waves, DEGREE_2, proof.limits.waves),
      row('degrees 2 and 3, 417 lines', lines, ALL, place.limitWithDegree3),
    ];
  });
  return { ratios, samples: times.length };
}
