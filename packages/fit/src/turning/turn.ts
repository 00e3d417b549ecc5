/**
 * One turn: solves on a footing, then finds the footing that the solution shows.
 *
 * The two sigmas are variance components, each from the residuals of its own rows over what the fit left of them
 * (F. R. Helmert 1907; H. D. Patterson and R. Thompson 1971).
 * @module
 */
import { HOUR, type Progress } from '@staithe/core';
import type { Design } from '../design.js';
import { addProducts, normalEquations, type Products, residualsOf } from '../normal.js';
import type { Rows } from '../rows.js';
import { type Choosing, factored, type Posed, type Solvable } from '../solvable.js';
import { inverseGram, solveScaled } from '../solve.js';
import { bendAt } from './curvature.js';
import {
  type Footing,
  furthestOf,
  LEAST_HEIGHT,
  LEAST_TIME,
  rowsOn,
  type Sigmas,
  type StatedSigmas,
} from './footing.js';
import type { ReadPoints } from './read.js';

/** The points with all that stays the same from turn to turn. */
export interface Book {
  readonly points: ReadPoints;
  /** Covariates. */
  readonly given: readonly Float64Array[];
  readonly stated: StatedSigmas;
}

/** What each kind of row put into a fit. */
export interface Shares {
  /** (AᵀWA)⁻¹, row-major. */
  readonly inverse: Float64Array;
  /** AᵀWA of the heights alone, row-major. */
  readonly heights: Float64Array;
  /** How many of the unknowns the heights answer for, and the slopes. */
  readonly parameters: readonly [number, number];
}

const SETTLED = 0.01; // of the sigmas
const LEAST_LEFT = 1e-6; // of the rows of a kind, that the fit left
// Steps to the turning point of a curve (Newton's), and what the last of them may be, as a share of the furthest.
const STEPS = 5;
const STILL = 1e-3;

/** Variance of a row of weight 1. */
export function varianceOf(
  weights: Float64Array | undefined,
  residual: Float64Array,
  parameters: number,
): number {
  let sum = 0;
  let rows = 0;
  residual.forEach((r, i) => {
    const weight = weights?.[i] ?? 1;
    if (Number.isNaN(r) || weight === 0) return;
    sum += r * r * weight;
    rows++;
  });
  return sum / Math.max(rows - parameters, LEAST_LEFT * Math.max(1, rows));
}

/** The symmetric matrix of a lower triangle. */
function whole({ matrix, size }: Products, count: number): Float64Array {
  const out = new Float64Array(count * count);
  for (let i = 0; i < count; i++) {
    for (let j = 0; j <= i; j++) {
      const value = matrix[i * size + j] as number;
      out[i * count + j] = value;
      out[j * count + i] = value;
    }
  }
  return out;
}

/**
 * @param solved - The fit of both kinds of rows.
 * @param products - Of the heights alone.
 */
export function sharesOf({ factor, scaled, design }: Solvable, products: Products): Shares {
  const inverse = inverseGram(factor, scaled);
  const count = design.order.length;
  const heights = whole(products, count);
  const taken = heights.reduce((sum, value, at) => sum + value * (inverse[at] as number), 0);
  return { inverse, heights, parameters: [taken, count - taken] };
}

/**
 * The turning points of a curve beside the points, and how it bends there. Rows at them ask nothing of the curve's size,
 * which the heights alone know: a slope of 0 stays 0 as a curve shrinks.
 */
function* followed(
  { points }: Book,
  design: Design,
  slopes: Rows,
  solution: Float64Array,
  from: Float64Array,
): Generator<Progress, Omit<Footing, 'sigmas'>, void> {
  const { times } = points.record;
  const furthest = furthestOf(points);
  let late = from;
  for (let k = 1; ; k++) {
    const at = times.map((t, i) => t - (late[i] as number));
    const { slope, curvature } = yield* bendAt(design, slopes, at, solution);
    const step = slope.map((s, i) => (s / (curvature[i] as number)) * HOUR);
    const there = step.map((value) => (Math.abs(value) <= STILL * furthest ? 1 : 0));
    const moved = late.map((x, i) => x + (step[i] as number));
    if (k < STEPS && there.some((one) => one === 0)) {
      // No further than the neighbours: from there the way back is open.
      late = moved.map((x) => Math.max(-2 * furthest, Math.min(2 * furthest, x)));
      continue;
    }
    const astray = moved.map((x, i) => (there[i] && Math.abs(x) <= furthest ? 0 : 1));
    return { curvature, late: moved.map((x, i) => (astray[i] ? 0 : x)), astray };
  }
}

/**
 * The sigmas that the residuals show, where none are stated. That of the times counts milliseconds, not slopes: a curve that
 * shrinks has smaller slopes everywhere, and the same times.
 */
function sigmasOf(
  { points: { record }, stated }: Book,
  { parameters }: Shares,
  residual: Float64Array,
  { late, astray }: Omit<Footing, 'sigmas'>,
): Sigmas {
  const { weights } = record;
  const kept = astray.map((one, i) => (one ? 0 : (weights?.[i] ?? 1)));
  const height = Math.sqrt(varianceOf(weights, residual, parameters[0]));
  const time = Math.sqrt(varianceOf(kept, late, parameters[1]));
  return {
    height: stated.height ?? Math.max(LEAST_HEIGHT, height),
    time: stated.time ?? Math.max(LEAST_TIME, time),
  };
}

/** A solution, and the footing that it shows. */
export interface Turn {
  readonly solved: Solvable;
  readonly shares: Shares;
  readonly next: Footing;
  /** Whether the footing moved by no more than a hundredth of the sigmas. */
  readonly settled: boolean;
}

/** Solves for the constituents of a problem on a footing. */
export function* turn(
  book: Book,
  { design, selection }: Pick<Posed, 'design' | 'selection'>,
  choosing: Choosing,
  footing: Footing,
): Generator<Progress, Turn, void> {
  const blocks = rowsOn(book.points, book.given, footing);
  const [heights, slopes] = blocks;
  const own = yield* normalEquations(design, [heights]);
  const products = { ...own, matrix: Float64Array.from(own.matrix) };
  yield* addProducts(design, slopes, products);
  // The choice stands while it turns.
  const still = { ...choosing, ours: false };
  const solved = yield* factored({ design, selection, products }, blocks, still);
  const x = solveScaled(solved.factor, solved.scaled, solved.sides[0] as Float64Array);
  const residual = (yield* residualsOf(design, heights, [x])).residuals[0] as Float64Array;
  const shares = sharesOf(solved, own);
  const next = yield* followed(book, design, slopes, x, footing.late);
  const sigmas = sigmasOf(book, shares, residual, next);
  const near = (a: number, b: number): boolean => Math.abs(a - b) <= SETTLED * b;
  const moved = next.late.map((value, i) => value - (footing.late[i] as number));
  const settled =
    near(sigmas.height, footing.sigmas.height) &&
    near(sigmas.time, footing.sigmas.time) &&
    Math.sqrt(varianceOf(undefined, moved, 0)) <= SETTLED * sigmas.time;
  return { solved, shares, next: { ...next, sigmas }, settled };
}
