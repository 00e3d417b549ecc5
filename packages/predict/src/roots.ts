/**
 * Every root of a function on an interval, once, proved by signs.
 *
 * On a cell with middle m and half width r, Taylor's theorem with |f″| <= B gives two certain cases: no root where
 * |f(m)| > |f′(m)|·r + B·r²/2; at most one where |f′(m)| > B·r, found by the signs at the ends. Any other cell is
 * halved. It ends where the cell is flat to rounding (then the signs at its ends decide) or shorter than half a
 * millisecond (docs/turning-points.md).
 * @module
 */

/** A function with its first derivative, read at an instant into `out[0]`, `out[1]`. */
export type Reader = (out: Float64Array, t: number) => void;

/** What the search knows about the function on the interval. */
export interface Ground {
  readonly read: Reader;
  /** Bound of |f″|. */
  readonly bound: number;
  /** |f| at or below this is rounding. */
  readonly tolerance: number;
}

const SHORTEST = 0.25; // ms, half width
const POLISHED = 0.005; // ms

/** Zero counts as positive, everywhere. */
const signOf = (value: number): 1 | -1 => (value >= 0 ? 1 : -1);

/** The sign of a value; within rounding of zero the sign before it, so that noise makes no roots. */
export function certainSign(value: number, tolerance: number, before: 1 | -1 | undefined): 1 | -1 {
  return before !== undefined && Math.abs(value) <= tolerance ? before : signOf(value);
}

/** Newton within a bracket whose ends differ in sign. */
function polish({ read }: Ground, a: number, b: number, signA: 1 | -1, out: Float64Array): number {
  let low = a;
  let high = b;
  let t = (a + b) / 2;
  for (let i = 0; i < 80 && high - low > POLISHED; i++) {
    read(out, t);
    const f = out[0] as number;
    if (signOf(f) === signA) low = t;
    else high = t;
    const next = t - f / (out[1] as number);
    const inside = next > low && next < high;
    if (inside && Math.abs(next - t) < POLISHED / 2) return next;
    t = inside ? next : (low + high) / 2;
  }
  return t;
}

/**
 * Calls `found` for each root between a and b in order of time.
 *
 * @param ground - The function and its bounds.
 * @param a - Start of the cell.
 * @param b - End of the cell.
 * @param signA - Sign at its start.
 * @param signB - Sign at its end.
 * @param found - Takes the time of the root and the sign before it.
 */
export function findRoots(
  ground: Ground,
  a: number,
  b: number,
  signA: 1 | -1,
  signB: 1 | -1,
  out: Float64Array,
  found: (t: number, before: 1 | -1) => void,
): void {
  const m = (a + b) / 2;
  const r = (b - a) / 2;
  ground.read(out, m);
  const f = Math.abs(out[0] as number);
  const slope = Math.abs(out[1] as number);
  const signM = certainSign(out[0] as number, ground.tolerance, signA);
  const curl = (ground.bound * r * r) / 2;
  if (f > slope * r + curl && signA === signB) return;
  const monotone = slope > ground.bound * r;
  const flat = f + slope * r + curl <= ground.tolerance;
  if (monotone || flat || r < SHORTEST) {
    if (signA !== signB) found(flat ? m : polish(ground, a, b, signA, out), signA);
    return;
  }
  findRoots(ground, a, m, signA, signM, out, found);
  findRoots(ground, m, b, signM, signB, out, found);
}
