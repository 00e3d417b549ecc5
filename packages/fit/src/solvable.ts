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
import { normalEquations } from './normal.js';
import type { Borrowed } from './read-options.js';
import type { FitRecord } from './record.js';
import type { Selection } from './select.js';
import { type Scaled, scaleGram, spectrumOf } from './solve.js';
import type { Candidate } from './types.js';

// Smallest over largest eigenvalue of the products with unit columns: below, the columns cannot be told apart.
const REFUSED = 1e-10;
const DROPPED = 1e-4; // where the choice is ours, a poorer one is not made
// Smaller eigenvalue of a pair's own products, a sample: 0.5 for a whole oscillation of size 1.
const STILL_REFUSED = 1e-8;
const STILL_DROPPED = 1e-3;

/** What is solved. */
export interface Solvable {
  readonly design: Design;
  readonly selection: Selection;
  readonly scaled: Scaled;
  /** Aᵀy. */
  readonly rhs: Float64Array;
  /** Of the design with unit columns. */
  readonly condition: number;
}

type Products = { readonly matrix: Float64Array; readonly size: number };

/** Products of the columns that are kept; the last, the record itself, always is. */
function keep({ matrix, size }: Products, columns: readonly number[]): Products {
  const kept = [...columns, size - 1];
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
function weakestPair(order: readonly string[], weakest: readonly number[]): string[] {
  const weights = new Map<string, number>();
  order.forEach((column, i) => {
    const name = column.replace(/\.(cos|sin)$/, '');
    weights.set(name, (weights.get(name) ?? 0) + (weakest[i] as number) * (weakest[i] as number));
  });
  return [...weights]
    .sort((a, b) => b[1] - a[1])
    .slice(0, 2)
    .map(([name]) => name);
}

function without(selection: Selection, left: readonly Candidate[]): Selection {
  const names = new Set(left.map(({ name }) => name));
  return {
    taken: selection.taken.filter(({ name }) => !names.has(name)),
    candidates: [...selection.candidates.filter(({ name }) => !names.has(name)), ...left],
  };
}

function checkEnough(
  record: FitRecord,
  taken: readonly Constituent[],
  count: number,
  ours: boolean,
): void {
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

/**
 * @param record - Of the fit.
 * @param selected - What the options and the length of the record ask for.
 * @param borrowed - Their parents are never dropped.
 * @param ours - Whether the choice is ours and may be thinned.
 * @param designFor - Makes the design of a list.
 * @throws ComputationError `TOO_FEW_SAMPLES`; `RANK_DEFICIENT` with the constituents that cannot be told apart.
 */
export function* solvable(
  record: FitRecord,
  selected: Selection,
  borrowed: readonly Borrowed[],
  ours: boolean,
  designFor: (taken: readonly Constituent[]) => Design,
): Generator<Progress, Solvable, void> {
  const parents = new Set(borrowed.map(({ parent }) => parent.name));
  let selection = selected;
  let design = designFor(selection.taken);
  checkEnough(record, selection.taken, design.order.length, ours);
  let products: Products = {
    matrix: yield* normalEquations(design, record),
    size: design.order.length + 1,
  };
  const drop = (left: readonly Candidate[]): void => {
    const names = new Set(left.map(({ name }) => name));
    const columns = [...design.order.keys()].filter((k) => {
      return !names.has((design.order[k] as string).replace(/\.(cos|sin)$/, ''));
    });
    products = keep(products, columns);
    selection = without(selection, left);
    design = designFor(selection.taken);
    checkEnough(record, selection.taken, design.order.length, ours);
  };
  const head = headCount(design);
  const stillness = selection.taken.map(({ name }, j) => ({
    name,
    share: smaller(products, head + 2 * j) / record.samples,
  }));
  const still = stillness.filter(({ name, share }) => share < STILL_DROPPED && !parents.has(name));
  if (ours && still.length > 0) {
    drop(
      still.map(({ name }) => ({
        name,
        decision: 'left',
        reason: 'stands still at these samples: they cannot show both of its phases',
      })),
    );
  }
  const unseen = stillness.find(({ name, share }) => {
    return share < STILL_REFUSED && selection.taken.some((of) => of.name === name);
  });
  if (unseen) {
    throw new ComputationError(
      'RANK_DEFICIENT',
      `expected constituents that move between these samples, got ${unseen.name}, which stands still`,
      { pair: ['meanLevel', unseen.name], unknowns: design.order.length },
    );
  }
  for (;;) {
    const count = design.order.length;
    const scaled = scaleGram(products.matrix, count, count + 1);
    const { values, weakest } = spectrumOf(scaled);
    const ratio = (values[0] as number) / (values[count - 1] as number);
    const pair = weakestPair(design.order, weakest);
    // The list is in order of expected size: the smaller of the two goes, but never a parent.
    const name = selection.taken
      .filter((of) => pair.includes(of.name) && !parents.has(of.name))
      .pop()?.name;
    if (ours && ratio < DROPPED && name !== undefined) {
      const beside = pair.find((one) => one !== name) as string;
      const reason = `cannot be told from ${beside} with these gaps and this sampling`;
      drop([{ name, decision: 'left', reason, beside }]);
      continue;
    }
    if (!(ratio >= REFUSED) || (ours && ratio < DROPPED)) {
      throw new ComputationError(
        'RANK_DEFICIENT',
        `expected columns that can be told apart, got ${pair.join(' and ')} alike in this record`,
        { pair, ratio, unknowns: count },
      );
    }
    const rhs = products.matrix.slice(count * (count + 1), count * (count + 1) + count);
    return { design, selection, scaled, rhs, condition: Math.sqrt(1 / ratio) };
  }
}
