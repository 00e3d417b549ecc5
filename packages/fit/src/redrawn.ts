/**
 * Errors from noise drawn anew: the covariance of the coefficients that the fit finds in noise like its residual.
 *
 * The fit is linear, so that the fit of (fitted + noise) less what was fitted is (AᵀWA)⁻¹AᵀW·noise: a projection and two
 * triangular systems a draw.
 * @module
 */
import type { Progress } from '@staithe/core';
import { blocksOf, drawBlocks, type Shown, shownBy } from './blocks.js';
import { headCount } from './design.js';
import type { Estimate } from './estimate.js';
import type { LineNoise } from './noise.js';
import { projectionsOf } from './project.js';
import { type RandomState, seeded } from './random.js';
import type { Rows } from './rows.js';
import { inverseGram, solveScaled } from './solve.js';
import { spectrumOf } from './spectrum.js';
import { studentFactor } from './student.js';
import { drawPhases } from './surrogates.js';
import { type Whitened, whitenedOf } from './whitened.js';

/** How residuals are redrawn. */
export interface Redraw {
  readonly by: 'blocks' | 'phases';
  readonly seed: number;
  readonly draws: number;
}

const MOST_AT_ONCE = 32; // draws that share a pass over the design
const MOST_VALUES = 4194304; // that they may hold, 32 MB

const STAGE = 'redrawn residuals';

/** Writes noise into two series. */
type Draw = (first: Float64Array, second: Float64Array) => Generator<Progress, void, void>;

/** Adds x·xᵀ, lower triangle. */
function addSquare(sum: Float64Array, x: Float64Array): void {
  const count = x.length;
  for (let i = 0; i < count; i++) {
    const a = x[i] as number;
    for (let j = 0; j <= i; j++) {
      sum[i * count + j] = (sum[i * count + j] as number) + a * (x[j] as number);
    }
  }
}

/** Mean square of the coefficients of draws, both triangles. */
function* covarianceOfDraws(
  { solved, blocks }: Estimate,
  draw: Draw,
  draws: number,
): Generator<Progress, Float64Array, void> {
  const { design, scaled, factor } = solved;
  const [rows] = blocks as readonly [Rows];
  const count = design.order.length;
  const sum = new Float64Array(count * count);
  const length = rows.times.length;
  const fours = Math.max(1, Math.floor(MOST_VALUES / (4 * length)));
  const sides: Float64Array[] = [];
  while (sides.length < Math.min(MOST_AT_ONCE, 4 * fours)) {
    sides.push(new Float64Array(length));
    yield { done: 0, total: draws, stage: STAGE };
  }
  for (let done = 0; done < draws; done += sides.length) {
    const wanted = Math.min(sides.length, draws - done);
    for (let k = 0; k < wanted; k += 2) {
      yield* draw(sides[k] as Float64Array, sides[k + 1] as Float64Array);
    }
    const batch = sides.slice(0, 4 * Math.ceil(wanted / 4));
    const projections = yield* projectionsOf(design, rows, batch);
    for (const projection of projections.slice(0, wanted)) {
      addSquare(sum, solveScaled(factor, scaled, projection));
      yield { done, total: draws, stage: STAGE };
    }
  }
  for (let i = 0; i < count; i++) {
    for (let j = 0; j <= i; j++) {
      const value = (sum[i * count + j] as number) / draws;
      sum[i * count + j] = value;
      sum[j * count + i] = value;
    }
  }
  return sum;
}

function* byPhases(
  found: Estimate,
  whitened: Whitened,
  noise: readonly LineNoise[],
  random: RandomState,
  draws: number,
): Generator<Progress, Float64Array, void> {
  const [{ step }] = found.blocks as readonly [Rows];
  const spectrum = yield* spectrumOf(found.solved.design, step, whitened, noise);
  const draw: Draw = (first, second) => drawPhases(spectrum, random, first, second);
  return yield* covarianceOfDraws(found, draw, draws);
}

/**
 * What the blocks' coefficients are multiplied by: 1/√left, and where a line is too slow for blocks, what gives it the
 * noise found beside it.
 */
function scalesOf(
  { solved: { design, factor, scaled } }: Estimate,
  noise: readonly LineNoise[],
  covariance: Float64Array,
  shown: readonly Shown[],
): Float64Array {
  const count = design.order.length;
  const head = headCount(design);
  const inverse = inverseGram(factor, scaled);
  return Float64Array.from({ length: count }, (_, column) => {
    const line = column < head ? 0 : 1 + ((column - head) >> 1);
    if (column < head && column >= head - design.given) return 1;
    const { left, slow } = shown[line] as Shown;
    const { density, bins } = noise[line] as LineNoise;
    if (!slow) return Math.sqrt(studentFactor(bins) / left);
    const at = column * (count + 1);
    const drawn = covariance[at] as number;
    const wanted = density * (inverse[at] as number);
    return drawn > 0 ? Math.sqrt(wanted / drawn) : 1;
  });
}

function* byBlocks(
  found: Estimate,
  whitened: Whitened,
  noise: readonly LineNoise[],
  random: RandomState,
  draws: number,
): Generator<Progress, Float64Array, void> {
  const { design } = found.solved;
  const [{ step, times }] = found.blocks as readonly [Rows];
  const { kept } = whitened;
  const blocks = blocksOf(times, step, whitened, noise);
  yield { done: 0, total: draws, stage: STAGE };
  const draw: Draw = function* (first, second) {
    yield* drawBlocks(blocks, kept, random, first);
    yield* drawBlocks(blocks, kept, random, second);
  };
  const covariance = yield* covarianceOfDraws(found, draw, draws);
  const scale = scalesOf(found, noise, covariance, shownBy(design, blocks));
  const count = scale.length;
  return covariance.map(
    (value, at) =>
      value * (scale[Math.floor(at / count)] as number) * (scale[at % count] as number),
  );
}

/**
 * @param found - Of a fit of levels.
 * @param redraw - How often, and from which seed.
 * @param noise - Of the mean level, then of each fitted constituent.
 * @returns Row-major, of the coefficients in the order of the design, m².
 */
export function* redrawnCovariance(
  found: Estimate,
  { by, seed, draws }: Redraw,
  noise: readonly LineNoise[],
): Generator<Progress, Float64Array, void> {
  const whitened = whitenedOf(found);
  yield { done: 0, total: draws, stage: STAGE };
  const random = seeded(seed);
  const redrawn = by === 'phases' ? byPhases : byBlocks;
  return yield* redrawn(found, whitened, noise, random, draws);
}
