/**
 * Normal equations that can be solved: the caller's list or a refusal, our own choice thinned until it is sound.
 *
 * Two things make columns worthless: a pair that stands still at these samples (a solar tide sampled each six hours, a
 * tide shorter than the mean over a sample), seen by the smaller eigenvalue of its own 2 × 2 products against the number
 * of samples; and columns that cannot be told apart, seen by the smallest eigenvalue of all products with unit columns.
 * @module
 */
import type { Constituent } from '@staithe/constituents';
import { ComputationError, type Progress } from '@staithe/core';
import { type Design, headCount } from './design.js';
import { normalEquations, type Products } from './normal.js';
import { triangularFactor } from './orthogonal.js';
import type { Borrowed } from './read-options.js';
import type { RecordSummary } from './record.js';
import type { Rows } from './rows.js';
import { checkParted, type Selection } from './select.js';
import { cholesky, type Scaled, scaleGram, weakestOf } from './solve.js';
import type { Candidate } from './types.js';

// Smallest over largest eigenvalue of the products with unit columns, the squared inverse of the condition.
const SQUARED = 1e-10; // below, the factor is made of the columns themselves
const REFUSED = 1e-15; // below, the columns cannot be told apart
const DROPPED = 1e-4; // where the choice is ours, a poorer one is not made
// Smaller eigenvalue of a pair's own products, a sample: 0.5 for a whole oscillation of size 1.
const STILL_REFUSED = 1e-8;
const STILL_DROPPED = 1e-3;

/** A design with its products: what choosing works on. */
export interface Posed {
  readonly design: Design;
  readonly selection: Selection;
  readonly products: Products;
}

/** What is solved. */
export interface Solvable extends Posed {
  readonly scaled: Scaled;
  /** Lower triangular, of `scaled`. */
  readonly factor: Float64Array;
  readonly solver: 'cholesky' | 'orthogonal';
  /** AᵀWy of each right-hand side. */
  readonly sides: readonly Float64Array[];
  /** Of the design with unit columns. */
  readonly condition: number;
}

/** What a choice is made with. */
export interface Choosing {
  readonly record: RecordSummary;
  /** Never dropped. */
  readonly parents: ReadonlySet<string>;
  /** Whether the choice is ours and may be thinned. */
  readonly ours: boolean;
  /** Makes the design of a list. */
  readonly designFor: (taken: readonly Constituent[]) => Design;
}

/** The constituent or the other unknown that a column belongs to. */
function ownerOf(column: string): string {
  return column.replace(/\.(cos|sin)$/, '');
}

/** Products of some columns; those of the right-hand sides are always kept. */
function keep({ matrix, size }: Products, columns: readonly number[], count: number): Products {
  const kept = [...columns];
  for (let side = count; side < size; side++) kept.push(side);
  const out = new Float64Array(kept.length * kept.length);
  kept.forEach((from, i) => {
    for (let j = 0; j <= i; j++) {
      out[i * kept.length + j] = matrix[from * size + (kept[j] as number)] as number;
    }
  });
  return { matrix: out, size: kept.length };
}

/** Smaller eigenvalue of the 2 × 2 products of a pair of columns. */
function smaller({ matrix, size }: Products, at: number): number {
  const a = matrix[at * size + at] as number;
  const b = matrix[(at + 1) * size + at + 1] as number;
  const d = matrix[(at + 1) * size + at] as number;
  const half = (a - b) / 2;
  return (a + b) / 2 - Math.sqrt(half * half + d * d);
}

/** The two names that weigh most in the weakest direction of the design. */
function weakestPair(order: readonly string[], weakest: Float64Array): string[] {
  const weights = new Map<string, number>();
  order.forEach((column, i) => {
    const name = ownerOf(column);
    weights.set(name, (weights.get(name) ?? 0) + (weakest[i] as number) * (weakest[i] as number));
  });
  return [...weights]
    .sort((a, b) => b[1] - a[1])
    .slice(0, 2)
    .map(([name]) => name);
}

/** Refuses fewer samples than unknowns, and our own choice where it came out empty. */
export function checkEnough(
  { record, ours }: Choosing,
  { selection: { taken }, design }: Posed,
): void {
  const count = design.order.length;
  const empty = ours && taken.length === 0;
  if (record.samples > count && !empty) return;
  const wanted = empty
    ? 'a record that holds one turn of a constituent'
    : `more than ${count} samples for ${count} unknowns`;
  throw new ComputationError(
    'TOO_FEW_SAMPLES',
    `expected ${wanted}, got ${record.samples} samples over ${record.days.toFixed(3)} days`,
    { samples: record.samples, unknowns: count, days: record.days },
  );
}

/** The same problem without some constituents, each with the reason why it was left. */
export function leaveOut(posed: Posed, left: readonly Candidate[], choosing: Choosing): Posed {
  const names = new Set(left.map(({ name }) => name));
  const { order } = posed.design;
  const columns = [...order.keys()].filter((k) => !names.has(ownerOf(order[k] as string)));
  const { taken, candidates } = posed.selection;
  const selection = {
    ...posed.selection,
    taken: taken.filter(({ name }) => !names.has(name)),
    candidates: [...candidates.filter(({ name }) => !names.has(name)), ...left],
  };
  const products = keep(posed.products, columns, order.length);
  const without = { design: choosing.designFor(selection.taken), selection, products };
  checkEnough(choosing, without);
  return without;
}

/** Leaves out, or refuses, what stands still at these samples. */
export function leaveStill(posed: Posed, choosing: Choosing): Posed {
  const { design, selection, products } = posed;
  const head = headCount(design);
  const shares = selection.taken.map(({ name }, j) => ({
    name,
    share: smaller(products, head + 2 * j) / choosing.record.samples,
  }));
  const { ours, parents } = choosing;
  const dropped = shares.filter(
    ({ name, share }) => ours && share < STILL_DROPPED && !parents.has(name),
  );
  const unseen = shares.find((one) => one.share < STILL_REFUSED && !dropped.includes(one));
  if (unseen) {
    throw new ComputationError(
      'RANK_DEFICIENT',
      `expected constituents that move between these samples, got ${unseen.name}, which stands still`,
      { pair: ['meanLevel', unseen.name], unknowns: design.order.length },
    );
  }
  if (dropped.length === 0) return posed;
  const reason = 'stands still at these samples: they cannot show both of its phases';
  const left = dropped.map(({ name }): Candidate => ({ name, decision: 'left', reason }));
  return leaveOut(posed, left, choosing);
}

function refuse(pair: readonly string[], ratio: number, unknowns: number): never {
  throw new ComputationError(
    'RANK_DEFICIENT',
    `expected columns that can be told apart, got ${pair.join(' and ')} alike in this record`,
    { pair, ratio, unknowns },
  );
}

/** Factors the products, thinning our own choice until it is sound. */
export function* factored(
  posed: Posed,
  blocks: readonly Rows[],
  choosing: Choosing,
): Generator<Progress, Solvable, void> {
  const { ours, parents } = choosing;
  let now = posed;
  for (;;) {
    const { design, selection, products } = now;
    const { size, matrix } = products;
    const count = design.order.length;
    const scaled = scaleGram(matrix, count, size);
    let factor = cholesky(scaled);
    const weakest = weakestOf(scaled, factor);
    let { ratio } = weakest;
    const pair = weakestPair(design.order, weakest.weakest);
    yield { done: 0, total: 1, stage: 'condition' };
    if (ours && ratio < DROPPED) {
      // The list is in order of expected size: the smaller of the two goes, but never a parent.
      const name = selection.taken
        .filter((of) => pair.includes(of.name) && !parents.has(of.name))
        .pop()?.name;
      if (name === undefined) return refuse(pair, ratio, count);
      const beside = pair.find((one) => one !== name) as string;
      const reason = `cannot be told from ${beside} with these gaps and this sampling`;
      now = leaveOut(now, [{ name, decision: 'left', reason, beside }], choosing);
      continue;
    }
    const squared = ratio >= SQUARED;
    if (!squared) {
      factor = yield* triangularFactor(design, blocks, scaled.lengths);
      ({ ratio } = weakestOf(scaled, factor));
    }
    if (!factor || !(ratio >= REFUSED)) return refuse(pair, ratio, count);
    const sides: Float64Array[] = [];
    for (let k = count; k < size; k++) sides.push(matrix.slice(k * size, k * size + count));
    const condition = Math.sqrt(1 / ratio);
    const solver = squared ? 'cholesky' : 'orthogonal';
    return { ...now, scaled, factor, solver, sides, condition };
  }
}

/**
 * @param selected - What the options and the length of the record ask for.
 * @param blocks - Rows of the record.
 * @param choosing - What the choice is made with.
 * @throws ComputationError `TOO_FEW_SAMPLES`; `RANK_DEFICIENT` with the constituents that cannot be told apart.
 */
export function* solvable(
  selected: Selection,
  blocks: readonly Rows[],
  choosing: Choosing,
): Generator<Progress, Solvable, void> {
  const design = choosing.designFor(selected.taken);
  const empty = { matrix: new Float64Array(0), size: 0 };
  checkEnough(choosing, { design, selection: selected, products: empty });
  if (!choosing.ours) checkParted(selected.taken, choosing.record);
  const products = yield* normalEquations(design, blocks);
  const posed = leaveStill({ design, selection: selected, products }, choosing);
  return yield* factored(posed, blocks, choosing);
}

/** The names of the parents of borrowed constituents. */
export function parentsOf(borrowed: readonly Borrowed[]): ReadonlySet<string> {
  return new Set(borrowed.map(({ parent }) => parent.name));
}
