/**
 * Clock faults: stretches in which the record runs ahead of or behind the expected curve.
 *
 * Method: in stretches of two days the residual is fitted by the curve's own rate of change, which gives the shift of
 * the clock; stretches whose shift stands out from the record's median, two or more in a row, are a fault. The shift
 * is then refined on the shifted curve.
 * @module
 */
import { HOUR, MINUTE } from '@staithe/core';
import type { ClockOff } from '../../findings.js';
import { medianOf, spreadOf } from '../robust.js';

type Curve = (times: Float64Array) => Float64Array;

const STRETCH = 48 * HOUR;
const MOST_OFF = 6 * HOUR;
const SIGNIFICANT = 8; // robust sigmas
const LEAST = 3 * MINUTE;
const SHARE = 0.5; // of the residual's variance that the shift must explain
const BESIDE = MINUTE; // the rate of the curve is taken over two of these

/** Shift in ms and the share of variance that it explains, after a first shift. */
function shiftOf(
  times: Float64Array,
  heights: Float64Array,
  curve: Curve,
  shift: number,
): { shift: number; share: number } {
  const at = (offset: number): Float64Array => curve(times.map((t) => t - shift + offset));
  const here = at(0);
  const later = at(BESIDE);
  const earlier = at(-BESIDE);
  const count = times.length;
  const residual = heights.map((height, i) => height - (here[i] as number));
  const rate = later.map((value, i) => (value - (earlier[i] as number)) / (2 * BESIDE));
  const mean = residual.reduce((a, b) => a + b, 0) / count;
  const meanRate = rate.reduce((a, b) => a + b, 0) / count;
  let cross = 0;
  let rates = 0;
  let residuals = 0;
  for (let i = 0; i < count; i++) {
    const r = (residual[i] as number) - mean;
    const v = (rate[i] as number) - meanRate;
    cross += r * v;
    rates += v * v;
    residuals += r * r;
  }
  if (!(rates > 0) || !(residuals > 0)) return { shift, share: 0 };
  return { shift: shift - cross / rates, share: (cross * cross) / (rates * residuals) };
}

/** Finds stretches in which the clock was off. Times and heights are those of the samples kept. */
export function findClockFaults(
  times: Float64Array,
  heights: Float64Array,
  step: number,
  curve: Curve,
): readonly ClockOff[] {
  const stretches: { first: number; end: number; shift: number; share: number }[] = [];
  for (let first = 0; first < times.length; ) {
    const until = (times[first] as number) + STRETCH;
    let end = first;
    while (end < times.length && (times[end] as number) < until) end++;
    if (end - first >= Math.max(12, (0.5 * STRETCH) / step)) {
      const part = times.subarray(first, end);
      stretches.push({ first, end, ...shiftOf(part, heights.subarray(first, end), curve, 0) });
    }
    first = end;
  }
  if (stretches.length < 5) return [];
  const shifts = Float64Array.from(stretches, (s) => s.shift);
  const usual = medianOf(shifts);
  const spread = spreadOf(shifts);
  const limit = Math.max(SIGNIFICANT * spread, LEAST);
  const found: ClockOff[] = [];
  for (let i = 0; i < stretches.length; i++) {
    const away = (k: number): number => {
      const s = stretches[k];
      return s && s.share > SHARE ? s.shift - usual : 0;
    };
    if (Math.abs(away(i)) <= limit) continue;
    const begin = i;
    while (away(i + 1) * away(begin) > 0 && Math.abs(away(i + 1)) > limit) i++;
    if (i === begin) continue;
    const refined = stretches.slice(begin, i + 1).map((s) => {
      const part = times.subarray(s.first, s.end);
      const own = heights.subarray(s.first, s.end);
      let { shift } = s;
      for (let round = 0; round < 3 && Math.abs(shift) < MOST_OFF; round++) {
        shift = shiftOf(part, own, curve, shift).shift;
      }
      return shift - usual;
    });
    found.push({
      kind: 'clock-off',
      from: times[(stretches[begin] as { first: number }).first] as number,
      to: times[(stretches[i] as { end: number }).end - 1] as number,
      minutes: medianOf(Float64Array.from(refined)) / MINUTE,
      sigma: spread / Math.sqrt(refined.length) / MINUTE,
    });
  }
  return found;
}
