/**
 * The noise that each line of a fit feels, from its residual.
 *
 * With weights w the coefficients feel w·n: |Σ w·r·e^{−iωt}|²/Σw takes the place of the periodogram, and the covariance
 * is that density times (AᵀWA)⁻¹, whether the weights are inverse variances or what the residuals earned.
 * @module
 */
import { degreesToRadians, HOUR, type Progress } from '@staithe/core';
import type { Design } from './design.js';
import { type Coherence, coherenceFrom } from './coherence.js';
import { densityFrom, type LineNoise, type Residual, residualOf, sumsAt } from './noise.js';
import { binsBeside } from './noise-bins.js';
import type { Resistant } from './resistant.js';
import type { Rows } from './rows.js';

/**
 * Variance of white noise of weight 1, m²: what the textbook takes for every line.
 *
 * @param rows - With their final weights.
 * @param residual - Metres; NaN where no sample takes part.
 * @param unknowns - Of the fit.
 * @param resistant - Where the weights were earned: a sample then counts by what it was trusted.
 */
export function whiteOf(
  { weights }: Rows,
  residual: Float64Array,
  unknowns: number,
  resistant: Resistant | undefined,
): number {
  let sum = 0;
  let samples = 0;
  let trust = 0;
  for (let i = 0; i < residual.length; i++) {
    const r = residual[i] as number;
    if (Number.isNaN(r)) continue;
    const earned = resistant ? (resistant.trust[i] as number) : 1;
    sum += r * r * (weights?.[i] ?? 1) * earned;
    trust += earned;
    samples++;
  }
  const inflation = resistant?.inflation ?? 1;
  return (inflation * sum * samples) / (trust * (samples - unknowns));
}

/** The residual as the coefficients feel it. */
function felt({ weights }: Rows, residual: Float64Array): Float64Array {
  if (!weights) return residual;
  let total = 0;
  let samples = 0;
  for (let i = 0; i < residual.length; i++) {
    if (Number.isNaN(residual[i])) continue;
    total += weights[i] as number;
    samples++;
  }
  const scale = Math.sqrt(samples / total);
  return residual.map((r, i) => r * (weights[i] as number) * scale);
}

const AT_ONCE = 65536; // sample turns between two yields: about a millisecond

/** `sumsAt` in slices, so that no step takes long. */
function* sumsInSlices(
  residual: Residual,
  speeds: Float64Array,
): Generator<Progress, Float64Array, void> {
  const out = new Float64Array(2 * speeds.length);
  const slice = Math.max(1, Math.floor(AT_ONCE / residual.values.length));
  for (let from = 0; from < speeds.length; from += slice) {
    const to = Math.min(speeds.length, from + slice);
    out.set(sumsAt(residual, speeds.subarray(from, to)), 2 * from);
    yield { done: to, total: speeds.length, stage: 'noise beside each line' };
  }
  return out;
}

/** Speeds of the mean level, and of fitted and borrowed lines, degrees per hour. */
export function lineSpeeds({ basis }: Design): number[] {
  return [0, ...Array.from(basis.speeds, (speed) => (speed * HOUR) / degreesToRadians(1))];
}

/** Densities with what has to be said for all of them: weights that were earned, lines beside which nothing shows. */
export function lineNoiseFrom(
  found: readonly LineNoise[],
  white: number,
  resistant: Resistant | undefined,
): LineNoise[] {
  const inflation = resistant?.inflation ?? 1;
  return found.map((noise) => {
    if (noise.bins === 0) return { density: white, bins: 0 };
    return { ...noise, density: inflation * noise.density };
  });
}

/**
 * Noise of some lines.
 *
 * @param design - Of the fit.
 * @param rows - Of levels.
 * @param residual - Metres; NaN where no sample takes part.
 * @param white - Of {@link whiteOf}: taken where the residual shows nothing beside a line.
 * @param wanted - 0 for the mean level, 1 + j for constituent j.
 * @param resistant - Where the weights were earned.
 */
export function* lineNoiseOf(
  design: Design,
  rows: Rows,
  residual: Float64Array,
  white: number,
  wanted: readonly number[],
  resistant: Resistant | undefined,
): Generator<Progress, LineNoise[], void> {
  if (wanted.length === 0) return [];
  const heard = residualOf(rows.times, rows.step, felt(rows, residual));
  const lines = lineSpeeds(design);
  const asked = wanted.map((line) => lines[line] as number);
  const bins = binsBeside(heard.runs, asked, lines);
  const sums = yield* sumsInSlices(heard, bins.speeds);
  return lineNoiseFrom(densityFrom(bins, sums, heard.samples), white, resistant);
}

/** Noise of the mean level first, then of each fitted constituent. */
export function allLines({ fitted }: Design): number[] {
  return Array.from({ length: fitted + 1 }, (_, i) => i);
}

/**
 * Coherence of the noise of two components at the mean level and each fitted constituent: Σ R·conj R′ over its bins, by the
 * root of Σ|R|²·Σ|R′|², of size 0 to 1.
 */
export function* coherenceOf(
  design: Design,
  rows: Rows,
  residuals: readonly [Float64Array, Float64Array],
): Generator<Progress, Coherence[], void> {
  const [first, second] = residuals.map((residual) =>
    residualOf(rows.times, rows.step, felt(rows, residual)),
  ) as [Residual, Residual];
  const lines = lineSpeeds(design);
  const bins = binsBeside(first.runs, lines.slice(0, design.fitted + 1), lines);
  const one = yield* sumsInSlices(first, bins.speeds);
  const other = yield* sumsInSlices(second, bins.speeds);
  return bins.lines.map(({ groups }) =>
    coherenceFrom(
      groups.flatMap((group) => group.bins),
      bins.left,
      one,
      other,
    ),
  );
}
