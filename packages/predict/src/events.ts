/**
 * Turning points, crossings of a level, and windows.
 * @module
 */
import { describe, InputError, type Instant, refuse, type Span, toSpan } from '@staithe/core';
import { heightWithin } from './heights.js';
import type { TidePlan } from './plan.js';
import { jumpsIn, walk } from './walk.js';

/** A high or low water. @public */
export interface TurningPoint {
  readonly kind: 'high' | 'low';
  readonly time: Instant;
  /** Metres above the datum of the constants. */
  readonly height: number;
}

/** The curve passes a level. @public */
export interface Crossing {
  readonly direction: 'rising' | 'falling';
  readonly time: Instant;
}

/** A time during which a condition holds. @public */
export interface TideWindow {
  readonly from: Instant;
  readonly to: Instant;
  /** It holds already where the span begins. */
  readonly openStart: boolean;
  /** It still holds where the span ends. */
  readonly openEnd: boolean;
  /** It opens or closes in a jump of the curve (a join of calendar years, a step of the level). */
  readonly join?: boolean;
}

/**
 * Every high and low water of a span, once. Existence is proved by signs of the slope; times are right to 0.05 s where
 * |h″| > 0.01 m/h². Jumps at the joins of calendar years are no turning points.
 *
 * @param plan - Of `makePlan`.
 * @param span - Half-open.
 * @returns In order of time; empty for a flat curve.
 * @throws InputError of `toSpan`.
 * @example
 * findTurningPoints(makePlan(constants), { from: '2031-06-01T00:00Z', to: '2031-06-02T00:00Z' }).length; // 4
 * @public
 */
export function findTurningPoints(plan: TidePlan, span: Span): TurningPoint[] {
  const { from, to } = toSpan(span);
  const out: TurningPoint[] = [];
  walk(plan, { slope: true }, from, to, (time, before, height) => {
    out.push({ kind: before > 0 ? 'high' : 'low', time, height });
  });
  return out;
}

/**
 * Every crossing of a level, once. A touch without passing is none, and neither is a jump.
 *
 * @param plan - Of `makePlan`.
 * @param level - Metres above the datum of the constants.
 * @param span - Half-open.
 * @returns In order of time; right to 0.05 s where |h′| > 0.02 m/h.
 * @throws InputError of `toSpan`; `NOT_FINITE`, path `level`.
 * @example
 * findCrossings(makePlan(constants), 99, { from: 0, to: DAY }).length; // 0
 * @public
 */
export function findCrossings(plan: TidePlan, level: number, span: Span): Crossing[] {
  if (!Number.isFinite(level)) {
    throw new InputError('NOT_FINITE', 'level', `expected metres, got ${describe(level)}`);
  }
  const { from, to } = toSpan(span);
  const out: Crossing[] = [];
  walk(plan, { slope: false, level }, from, to, (time, before) => {
    out.push({ direction: before < 0 ? 'rising' : 'falling', time });
  });
  return out;
}

/**
 * The windows during which the height is above one level, below another, or between the two.
 *
 * @param plan - Of `makePlan`.
 * @param condition - `above` and `below` in metres above the datum of the constants, at least one of them.
 * @param span - Half-open; windows are cut at its ends and say so.
 * @returns In order of time, from less than to.
 * @throws InputError of `toSpan`; `MISSING`, path `condition`; `NOT_FINITE` or `CONFLICT`, path `condition.above`
 *   or `condition.below`.
 * @example
 * findWindows(makePlan(constants), { below: 99 }, { from: 0, to: DAY })[0]?.openEnd; // true
 * @public
 */
export function findWindows(
  plan: TidePlan,
  condition: { readonly above?: number | undefined; readonly below?: number | undefined },
  span: Span,
): TideWindow[] {
  const { above, below } = condition;
  if (above === undefined && below === undefined) {
    throw new InputError('MISSING', 'condition', 'expected above, below or both, got neither');
  }
  for (const [path, level] of [
    ['condition.above', above],
    ['condition.below', below],
  ] as const) {
    if (level !== undefined && !Number.isFinite(level)) refuse('NOT_FINITE', path, 'metres', level);
  }
  if ((above ?? -Infinity) > (below ?? Infinity)) {
    refuse('CONFLICT', 'condition.above', `metres up to condition.below ${below}`, above);
  }
  const { from, to } = toSpan(span);
  const jumps = new Set(jumpsIn(plan, from, to));
  const crossings = [above, below].flatMap((level) =>
    level === undefined ? [] : findCrossings(plan, level, span).map(({ time }) => time),
  );
  const edges = [...new Set([from, ...jumps, ...crossings, to])].sort((a, b) => a - b);
  const height = heightWithin(plan);
  const holds = (t: Instant): boolean => {
    const h = height(t);
    return (above === undefined || h >= above) && (below === undefined || h <= below);
  };
  const out: TideWindow[] = [];
  let opened: Instant | undefined;
  for (let i = 0; i < edges.length; i++) {
    const at = edges[i] as Instant;
    const next = edges[i + 1];
    // Between neighbouring edges the condition does not change: its middle speaks for the whole.
    const inside = next !== undefined && holds((at + next) / 2);
    if (inside && opened === undefined) opened = at;
    if (inside || opened === undefined) continue;
    const join = (jumps.has(opened) && opened !== from) || (jumps.has(at) && at !== to);
    out.push({
      from: opened,
      to: at,
      openStart: opened === from,
      openEnd: at === to,
      ...(join ? { join } : {}),
    });
    opened = undefined;
  }
  return out;
}
