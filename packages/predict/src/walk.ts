/**
 * Walks through a span in cells of smooth time and finds the roots of the curve's slope or of height minus a level.
 *
 * Cells lie on whole hours of absolute time, whatever the span, so adjacent spans find the same roots. The sign at a
 * smooth join is read in the stretch that begins there; at a jump each side keeps its own.
 * @module
 */
import { HOUR, type Instant } from '@staithe/core';
import { boundsOf, type Cursor, makeCursor, type Piece } from './cursor.js';
import type { TidePlan } from './plan.js';
import { certainSign, findRoots, type Ground } from './roots.js';

const CELL = HOUR;

/** What is sought: the zero of h′ (`slope`) or of h − level. */
export type Quest = { readonly slope: true } | { readonly slope: false; readonly level: number };

/** Instants at which the curve jumps, within [from, to): joins of calendar years and steps of the level. */
export function jumpsIn(plan: TidePlan, from: Instant, to: Instant): Instant[] {
  const { delay } = plan.basis;
  const jumps = plan.steps.map(({ at }) => at - delay);
  if (plan.basis.hold === 'calendar-year') {
    const last = new Date(to + delay).getUTCFullYear();
    for (let year = new Date(from + delay).getUTCFullYear(); year <= last; year++) {
      jumps.push(Date.UTC(year, 0, 1) - delay);
    }
  }
  return jumps.filter((at) => at >= from && at < to).sort((a, b) => a - b);
}

/** Sum of amplitudes (times speed): the scale that rounding is judged by. */
function scaleOf(piece: Piece, speeds: Float64Array, slope: boolean): number {
  let sum = 0;
  for (let j = 0; j < speeds.length; j++) {
    const [re, im] = [piece.charged[8 * j] as number, piece.charged[8 * j + 1] as number];
    sum += Math.sqrt(re * re + im * im) * (slope ? (speeds[j] as number) : 1);
  }
  return sum;
}

function groundOf(cursor: Cursor, piece: Piece, quest: Quest): Ground {
  const point = new Float64Array(3);
  const [second, third] = boundsOf(cursor, piece);
  const scale = scaleOf(piece, cursor.plan.basis.speeds, quest.slope);
  if (quest.slope) {
    return {
      read(out, t) {
        cursor.readInto(point, piece, t);
        out[0] = point[1] as number;
        out[1] = point[2] as number;
      },
      bound: third,
      tolerance: 1e-13 * scale,
    };
  }
  return {
    read(out, t) {
      cursor.readInto(point, piece, t);
      out[0] = (point[0] as number) - quest.level;
      out[1] = point[1] as number;
    },
    bound: second,
    tolerance: 1e-13 * (scale + Math.abs(quest.level)),
  };
}

/** Ends of the cells of a piece within [from, to]: whole hours, the ends of the piece, and steps. */
function edges(piece: Piece, plan: TidePlan, from: Instant, to: Instant): number[] {
  const start = Math.max(from, piece.stretch.from - plan.basis.delay);
  const end = Math.min(to, piece.stretch.to - plan.basis.delay);
  const out = [start];
  for (let t = (Math.floor(start / CELL) + 1) * CELL; t < end; t += CELL) out.push(t);
  for (const { at } of plan.steps) {
    const jump = at - plan.basis.delay;
    if (jump > start && jump < end) out.push(jump);
  }
  out.push(end);
  return out.sort((a, b) => a - b).filter((t, i, all) => i === 0 || t > (all[i - 1] as number));
}

/**
 * Calls `found` for each root whose rounded instant lies in [from, to), in order of time.
 *
 * @param plan - Of `makePlan`.
 * @param quest - What is sought.
 * @param from - Start, belongs.
 * @param to - End, does not belong.
 * @param found - Takes the rounded instant, the sign before the root and the height there.
 */
export function walk(
  plan: TidePlan,
  quest: Quest,
  from: Instant,
  to: Instant,
  found: (t: Instant, before: 1 | -1, height: number) => void,
): void {
  const cursor = makeCursor(plan);
  const steps = new Set(plan.steps.map(({ at }) => at - plan.basis.delay));
  const out = new Float64Array(3);
  const end = Math.ceil((to + 1) / CELL) * CELL;
  let piece = cursor.pieceAt(Math.floor((from - 1) / CELL) * CELL);
  let t = Math.floor((from - 1) / CELL) * CELL;
  let last: 1 | -1 | undefined;
  let jumped = false;
  while (t < end) {
    const here = piece;
    const ground = groundOf(cursor, here, quest);
    const cells = edges(here, plan, t, end);
    const close = cells[cells.length - 1] as number;
    const next = cursor.pieceAt(close);
    ground.read(out, cells[0] as number);
    let signA = certainSign(out[0] as number, ground.tolerance, jumped ? undefined : last);
    for (let i = 1; i < cells.length; i++) {
      const a = cells[i - 1] as number;
      const b = cells[i] as number;
      const jump = !quest.slope && steps.has(b);
      const joined = b === close && next !== here && !here.stretch.jumps;
      const reader = joined ? groundOf(cursor, next, quest) : ground;
      // Just before a step of the level the curve is still on the old one.
      reader.read(out, jump ? b - 2 ** -10 : b);
      const signB = certainSign(out[0] as number, ground.tolerance, signA);
      findRoots(ground, a, b, signA, signB, out, (root, before) => {
        const instant = Math.round(root);
        if (instant < from || instant >= to) return;
        cursor.readInto(out, here, root);
        found(instant, before, out[0] as number);
      });
      if (jump) {
        ground.read(out, b);
        signA = certainSign(out[0] as number, ground.tolerance, undefined);
      } else signA = signB;
    }
    last = signA;
    jumped = here.stretch.jumps;
    t = close;
    piece = next;
  }
}
