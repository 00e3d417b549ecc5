/**
 * The lines that stand out of a residual: found, taken off, sought again, until nothing stands out any more.
 *
 * A strong line shows beside itself too, at a distance of d bins by 1/(πd) of its amplitude; what might be that waits for
 * the next round. After a round each line is measured again with all others taken off.
 * @module
 */
import type { Progress } from '@staithe/core';
import { disc95 } from '../errors-of.js';
import { type Periodogram, periodogramOf } from './periodogram.js';
import type { ResidualSamples } from './residual-samples.js';
import {
  noiseBeside,
  type Peak,
  type Search,
  searchOf,
  sharesLeft,
  standingOut,
} from './stand-out.js';
import { addWave, waveSumInto } from './wave-sums.js';

/** A line of a residual. */
export interface FoundLine {
  /** Degrees per hour. */
  readonly speed: number;
  /** Metres. */
  readonly amplitude: number;
  /** Metres. */
  readonly radius95: number;
}

/** A wave a·cos ωt + b·sin ωt, t from the middle of the record. */
interface Wave {
  readonly speed: number;
  readonly a: number;
  readonly b: number;
}

const CLEAR = 4; // times what may leak from stronger lines
const TRACE = 0.01; // of what leaks from a line that may be left once it is taken off
const NEAR = 1.5; // bins within which two lines are not told apart
const SMALLEST = 1e-7; // m: below is rounding
const NARROWINGS = 4;
const SWEEPS = 4;
const SETTLED = 1e-3; // of a line's amplitude
const STAGE = 'lines left over';

/** Of the peaks of a round, those that are no part or trace of a stronger line. */
function clearOnes(
  peaks: readonly Peak[],
  found: readonly Peak[],
  width: number,
  most: number,
): Peak[] {
  const out: Peak[] = [];
  for (const peak of peaks) {
    if (out.length === most) break;
    let leak = 0;
    let near = false;
    for (const [i, { speed, power }] of [...found, ...out].entries()) {
      const bins = Math.abs(speed - peak.speed) / width;
      near ||= bins < NEAR;
      leak += ((i < found.length ? TRACE : 1) * Math.sqrt(power)) / (Math.PI * bins);
    }
    if (!near && Math.sqrt(peak.power) > CLEAR * leak) out.push(peak);
  }
  return out;
}

/** a and b of the wave that lies in values. */
function waveIn(samples: ResidualSamples, speed: number, total: number): Wave {
  const sum = new Float64Array(2);
  waveSumInto(sum, samples.values, samples, speed);
  const scale = (speed === 0 ? 1 : 2) / total;
  return { speed, a: scale * (sum[0] as number), b: scale * (sum[1] as number) };
}

function takeOff(samples: ResidualSamples, { speed, a, b }: Wave): void {
  addWave(samples.values, samples.weights, samples, speed, -a, -b);
}

/** The wave near a speed that lies in values: its top by parabolas, closer and closer. */
function* measured(
  samples: ResidualSamples,
  near: number,
  reach: number,
  total: number,
): Generator<Progress, Wave, void> {
  const powerAt = (speed: number): number => {
    const { a, b } = waveIn(samples, speed, total);
    return a * a + b * b;
  };
  let speed = near;
  let beside = reach;
  for (let i = 0; i < NARROWINGS; i++) {
    const [low, middle, high] = [powerAt(speed - beside), powerAt(speed), powerAt(speed + beside)];
    const bend = low - 2 * middle + high;
    const shift = bend < 0 ? (low - high) / (2 * bend) : 0;
    speed += beside * Math.max(-1, Math.min(1, shift));
    beside /= 4;
    yield { done: i, total: NARROWINGS, stage: STAGE };
  }
  return waveIn(samples, speed, total);
}

/**
 * Waves found in a residual, which is written to: they are taken off. What the fit had given to its own lines in their
 * place is taken off as well.
 */
function* takenOff(
  samples: ResidualSamples,
  search: Omit<Search, 'lines'>,
  fitted: readonly number[],
  most: number,
  first: Periodogram,
): Generator<Progress, { waves: Wave[]; cleaned: Periodogram }, void> {
  const waves: Wave[] = [];
  const total = samples.samples;
  const again = function* (): Generator<Progress, boolean, void> {
    let settled = true;
    for (const [i, { speed, a, b }] of waves.entries()) {
      takeOff(samples, { speed, a: -a, b: -b });
      const wave = yield* measured(samples, speed, search.width / 16, total);
      takeOff(samples, wave);
      waves[i] = wave;
      const moved = (wave.a - a) ** 2 + (wave.b - b) ** 2;
      settled &&= moved <= SETTLED * SETTLED * (a * a + b * b);
      yield { done: i, total: waves.length, stage: STAGE };
    }
    for (const speed of fitted) {
      takeOff(samples, waveIn(samples, speed, total));
      yield { done: waves.length, total: waves.length, stage: STAGE };
    }
    return settled;
  };
  let spectrum = first;
  while (waves.length < most) {
    const lines = [...fitted, ...waves.map(({ speed }) => speed)];
    const peaks = yield* standingOut({ ...search, lines }, spectrum);
    const before = waves.length;
    const found = waves.map(({ speed, a, b }) => ({
      speed,
      power: ((a * a + b * b) * total) / 4,
    }));
    for (const { speed } of clearOnes(peaks, found, search.width, most - before)) {
      const wave = yield* measured(samples, speed, spectrum.spacing / 2, total);
      if (wave.a * wave.a + wave.b * wave.b < SMALLEST * SMALLEST) continue;
      takeOff(samples, wave);
      waves.push(wave);
      yield { done: waves.length, total: most, stage: STAGE };
    }
    if (waves.length === before) break;
    for (let sweep = 0; sweep < SWEEPS && !(yield* again()); sweep++);
    spectrum = yield* periodogramOf(samples);
  }
  return { waves, cleaned: spectrum };
}

/**
 * Lines that stand out of a residual, the largest first.
 *
 * @param samples - Of the residual; not written to.
 * @param fitted - Degrees per hour: speeds of the fit, 0 among them.
 * @param most - Lines, at most.
 * @param spectrum - Of the samples.
 */
export function* linesLeftOver(
  samples: ResidualSamples,
  fitted: readonly number[],
  most: number,
  spectrum: Periodogram,
): Generator<Progress, FoundLine[], void> {
  const copy = { ...samples, values: Float64Array.from(samples.values) };
  const plain = yield* searchOf(samples);
  const { waves, cleaned } = yield* takenOff(copy, plain, fitted, most, spectrum);
  const search = { ...plain, lines: [...fitted, ...waves.map(({ speed }) => speed)] };
  const left = sharesLeft(search, cleaned);
  return waves
    .map(({ speed, a, b }) => {
      const beside = noiseBeside(plain, cleaned, left, speed);
      const variance = (2 * (beside?.level ?? 0)) / samples.samples;
      return {
        speed,
        amplitude: Math.sqrt(a * a + b * b),
        radius95: Math.sqrt(disc95(beside?.bins ?? 0) * variance),
      };
    })
    .sort((one, other) => other.amplitude - one.amplitude);
}
