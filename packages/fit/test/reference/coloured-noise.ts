/**
 * Synthetic records: the tide of La Jolla and Gaussian noise of a given spectrum, periodic in fifteen years, so that a
 * year is cut out of it; gaps in runs of days to weeks.
 */
import { makeBasis, synthesizeInto } from '@staithe/basis';
import { HOUR, type UniformSeries, uniformSeries } from '@staithe/core';
import { decodeInt16, loadVector } from '@staithe/test-vectors';
import { nextShare, type RandomState } from '../../src/random.js';

const PERIOD = 131072; // hours: a power of 2 near fifteen years
const SHORTEST_GAP = 24; // hours
const LONGEST_GAP = 21 * 24;

/** Variance of white noise of the same density at one value an hour, m², at a speed in degrees per hour. */
export type Density = (speed: number) => number;

/** A tide by its constants. */
export interface Tide {
  readonly names: readonly string[];
  /** (H cos G, H sin G) of each, metres. */
  readonly pairs: readonly (readonly [number, number])[];
}

/** Spectrum and constants of the vector. */
export function laJolla(): { density: Density; tide: Tide } {
  const { cases } = loadVector<{
    readonly spacing: number;
    readonly density: readonly string[];
    readonly constants: Readonly<Record<string, readonly [number, number]>>;
  }>('la-jolla-residual-spectrum');
  const kept = Array.from(decodeInt16(cases.density), (value) => 10 ** (value / 1000));
  const density: Density = (speed) => {
    const at = Math.min(speed / cases.spacing, kept.length - 1);
    const i = Math.min(Math.floor(at), kept.length - 2);
    const [low, high] = [kept[i] as number, kept[i + 1] as number];
    return low + (at - i) * (high - low);
  };
  const pairs = Object.values(cases.constants).map(([amplitude, lag]): [number, number] => {
    const angle = (lag * Math.PI) / 180;
    return [amplitude * Math.cos(angle), amplitude * Math.sin(angle)];
  });
  return { density, tide: { names: Object.keys(cases.constants), pairs } };
}

/** Some constituents of a tide alone. */
export function only({ names, pairs }: Tide, wanted: readonly string[]): Tide {
  const kept = [...names.keys()].filter((i) => wanted.includes(names[i] as string));
  return {
    names: kept.map((i) => names[i] as string),
    pairs: kept.map((i) => pairs[i] as readonly [number, number]),
  };
}

/** Hourly heights of a tide from an instant, metres. */
export function heightsOf({ names, pairs }: Tide, start: number, count: number): Float64Array {
  const out = new Float64Array(count);
  const coefficients = Float64Array.from([0, ...pairs.flat()]);
  synthesizeInto(out, makeBasis({ constituents: names }), coefficients, {
    start,
    step: HOUR,
    count,
  });
  return out;
}

/** The transform Σ x·e^{+2πikn/N} in place, N a power of 2 (J. Cooley and J. Tukey 1965). */
function transform(re: Float64Array, im: Float64Array): void {
  const count = re.length;
  const swap = (values: Float64Array, i: number, j: number): void => {
    const kept = values[i] as number;
    values[i] = values[j] as number;
    values[j] = kept;
  };
  for (let i = 1, j = 0; i < count; i++) {
    let bit = count >> 1;
    for (; j & bit; bit >>= 1) j ^= bit;
    j ^= bit;
    if (i < j) {
      swap(re, i, j);
      swap(im, i, j);
    }
  }
  const half = count >> 1;
  const cosine = Float64Array.from({ length: half }, (_, k) => Math.cos((2 * Math.PI * k) / count));
  const sine = Float64Array.from({ length: half }, (_, k) => Math.sin((2 * Math.PI * k) / count));
  for (let size = 2; size <= count; size *= 2) {
    const stride = count / size;
    for (let from = 0; from < count; from += size) {
      for (let k = 0; k < size / 2; k++) {
        const [p, q] = [from + k, from + k + size / 2];
        const [c, s] = [cosine[k * stride] as number, sine[k * stride] as number];
        const a = (re[q] as number) * c - (im[q] as number) * s;
        const b = (re[q] as number) * s + (im[q] as number) * c;
        re[q] = (re[p] as number) - a;
        im[q] = (im[p] as number) - b;
        re[p] = (re[p] as number) + a;
        im[p] = (im[p] as number) + b;
      }
    }
  }
}

/** Noise without end: fifteen years, hourly, metres, each independent of the others. */
export function* noiseOf(
  density: Density,
  random: RandomState,
): Generator<Float64Array, never, void> {
  const sizes = Float64Array.from({ length: PERIOD / 2 + 1 }, (_, k) =>
    Math.sqrt(density((360 * k) / PERIOD) / PERIOD),
  );
  for (;;) {
    const re = new Float64Array(PERIOD);
    const im = new Float64Array(PERIOD);
    for (let k = 0; k < PERIOD; k++) {
      // G. Box and M. Muller (1958).
      const size =
        (sizes[Math.min(k, PERIOD - k)] as number) *
        Math.sqrt(-2 * Math.log(1 - nextShare(random)));
      const angle = 2 * Math.PI * nextShare(random);
      re[k] = size * Math.cos(angle);
      im[k] = size * Math.sin(angle);
    }
    transform(re, im);
    yield re;
    yield im;
  }
}

/** Marks 10 to 30 % as missing, in runs of 1 to 21 days; the ends stay. */
export function withGaps(values: Float64Array, random: RandomState): Float64Array {
  const out = Float64Array.from(values);
  const wanted = (0.1 + 0.2 * nextShare(random)) * values.length;
  for (let gone = 0; gone < wanted; ) {
    const length = Math.round(SHORTEST_GAP * (LONGEST_GAP / SHORTEST_GAP) ** nextShare(random));
    const from = 1 + Math.floor(nextShare(random) * (values.length - length - 2));
    for (let i = from; i < from + length; i++) {
      if (!Number.isNaN(out[i])) gone++;
      out[i] = Number.NaN;
    }
  }
  return out;
}

/** A record of tide and noise. */
export function recordOf(start: number, tide: Float64Array, noise: Float64Array): UniformSeries {
  return uniformSeries({ start, step: HOUR, values: tide.map((h, i) => h + (noise[i] as number)) });
}
