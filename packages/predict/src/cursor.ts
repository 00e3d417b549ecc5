/**
 * A cursor over the curve of a plan: height and derivatives at an instant, piece by piece of smooth time.
 * @module
 */
import {
  boundsInto,
  chargeInto,
  curveInto,
  makeStretcher,
  type Stretch,
} from '@staithe/basis/kernels';
import type { Instant } from '@staithe/core';
import type { TidePlan } from './plan.js';

/** A stretch of smooth time with the cubics multiplied by the coefficients. */
export interface Piece {
  readonly stretch: Stretch;
  readonly charged: Float64Array;
}

/** Height in metres, rate per ms, second derivative per ms². */
export type Point = Float64Array;

/** What looks at the curve of a plan. It remembers the last piece only. */
export interface Cursor {
  readonly plan: TidePlan;
  pieceAt(t: Instant): Piece;
  /** Writes height, rate and second derivative of the piece, which may reach to its very end. */
  readInto(out: Point, piece: Piece, t: Instant): void;
}

/** The level without the tide at an instant: mean level, secular rate, steps passed. */
export function levelAt(plan: TidePlan, t: Instant): number {
  let level = (plan.coefficients[0] as number) + plan.ratePerMs * (t - plan.rateFrom);
  for (const { at, change } of plan.steps) if (t >= at) level += change;
  return level;
}

export function makeCursor(plan: TidePlan): Cursor {
  const { basis, coefficients } = plan;
  const stretcher = makeStretcher(basis);
  const pair = new Float64Array(2);
  let last: Piece | undefined;
  return {
    plan,
    pieceAt(t) {
      const stretch = stretcher(t + basis.delay);
      if (last?.stretch !== stretch) {
        const charged = new Float64Array(stretch.cubics.length);
        chargeInto(charged, stretch.cubics, coefficients);
        last = { stretch, charged };
      }
      return last;
    },
    readInto(out, { stretch, charged }, t) {
      const length = stretch.to - stretch.from;
      curveInto(out, charged, basis.speeds, length, t + basis.delay - stretch.from, pair);
      out[0] = (out[0] as number) + levelAt(plan, t + basis.delay);
      out[1] = (out[1] as number) + plan.ratePerMs;
    },
  };
}

/** Bounds of |h″| per ms² and |h‴| per ms³ over a piece. */
export function boundsOf(cursor: Cursor, { stretch, charged }: Piece): readonly [number, number] {
  const out = new Float64Array(2);
  boundsInto(out, charged, cursor.plan.basis.speeds, stretch.to - stretch.from);
  return [out[0] as number, out[1] as number];
}
