/**
 * The slow, obvious twin: turning points and crossings by a scan each five seconds, polished by bisection.
 */
import type { TideCurve } from '../../src/index.js';

const STEP = 5000;

/** Times at which a function changes sign, with the sign before. */
export function signChanges(
  f: (t: number) => number,
  from: number,
  to: number,
): { time: number; before: number }[] {
  const out: { time: number; before: number }[] = [];
  let last = f(from) >= 0 ? 1 : -1;
  for (let t = from + STEP; t <= to; t += STEP) {
    const sign = f(t) >= 0 ? 1 : -1;
    if (sign !== last) {
      let [low, high] = [t - STEP, t];
      while (high - low > 1e-3) {
        const middle = (low + high) / 2;
        if ((f(middle) >= 0 ? 1 : -1) === last) low = middle;
        else high = middle;
      }
      out.push({ time: (low + high) / 2, before: last });
      last = sign;
    }
  }
  return out;
}

export function scanTurningPoints(
  curve: TideCurve,
  from: number,
  to: number,
): { time: number; before: number }[] {
  return signChanges((t) => curve.rate(t), from, to);
}
