/**
 * The constituents of our own choice that are smaller than their noise, by what the potential lets one expect.
 * @module
 */
import type { Progress } from '@staithe/core';
import { headCount } from './design.js';
import { disc95, pairErrors } from './errors-of.js';
import type { Estimate } from './estimate.js';
import { type Found, tooSmall } from './expectations.js';
import { lineNoiseOf, whiteOf } from './noise-of.js';
import type { Problem } from './problem.js';
import type { Rows } from './rows.js';
import { inverseGram } from './solve.js';
import type { Candidate } from './types.js';

const BEYOND_DOUBT = 30; // 95 % discs of white noise: no spectrum is needed to see these

const join = (x: number, y: number): number => Math.sqrt(x * x + y * y);

/** What one component shows of each constituent whose size the potential tells. */
function* foundIn(
  { solved, solutions, residuals, blocks, resistant }: Estimate,
  told: ReadonlySet<string>,
  inverse: Float64Array,
  side: number,
): Generator<Progress, Found[], void> {
  const { design, selection } = solved;
  const count = design.order.length;
  const head = headCount(design);
  const rows = blocks[0] as Rows;
  const solution = solutions[side] as Float64Array;
  const residual = (residuals[0] as readonly Float64Array[])[side] as Float64Array;
  const white = whiteOf(rows, residual, count, resistant);
  const at = (j: number, row: number, column: number): number =>
    inverse[(head + 2 * j + row) * count + head + 2 * j + column] as number;
  const judge = (j: number, name: string, density: number, bins: number): Found => {
    const [a, b] = [solution[head + 2 * j] as number, solution[head + 2 * j + 1] as number];
    const [aa, ab, bb] = [at(j, 0, 0), at(j, 0, 1), at(j, 1, 1)].map((v) => v * density) as [
      number,
      number,
      number,
    ];
    return { name, amplitude: join(a, b), ...pairErrors(a, b, aa, ab, bb, disc95(bins)) };
  };
  const found = selection.taken.map(({ name }, j) => judge(j, name, white, 0));
  const doubtful = found.flatMap(({ name, amplitude, radius95 }, j) =>
    told.has(name) && amplitude < BEYOND_DOUBT * radius95 ? [j] : [],
  );
  const wanted = doubtful.map((j) => 1 + j);
  const noise = yield* lineNoiseOf(design, rows, residual, white, wanted, resistant);
  doubtful.forEach((j, i) => {
    const { density, bins } = noise[i] as (typeof noise)[number];
    found[j] = judge(j, (found[j] as Found).name, density, bins);
  });
  return found;
}

/** The small ones, each with its reason; amplitudes and errors of several components are joined. */
export function* smallOnes(
  { selection: { expected }, choosing }: Problem,
  estimate: Estimate,
): Generator<Progress, Candidate[], void> {
  const told = new Set(expected.flatMap((one) => (one.fromPotential ? [one.of.name] : [])));
  const inverse = inverseGram(estimate.solved.factor, estimate.solved.scaled);
  let all: Found[] = [];
  for (const side of estimate.solutions.keys()) {
    const found = yield* foundIn(estimate, told, inverse, side);
    all = found.map((one, j) => {
      const before = all[j];
      if (!before) return one;
      return {
        name: one.name,
        amplitude: join(before.amplitude, one.amplitude),
        amplitudeSigma: join(before.amplitudeSigma, one.amplitudeSigma),
        radius95: join(before.radius95, one.radius95),
      };
    });
  }
  return tooSmall(expected, all, choosing.parents);
}
