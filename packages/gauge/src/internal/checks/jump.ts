/**
 * Spike: a sample against what its neighbours say.
 *
 * The standard's test takes the mean of the two neighbours and blames all three samples. With a reach of 2 or 3 a
 * polynomial through the neighbours follows the tide's curve; `spare` takes the worst sample of a cluster out first
 * and judges the others without it; `rough` allows more where the water is rougher than usual.
 * @module
 */
import type { JumpLimits } from '../../limits.js';
import { medianOf, sampleOf } from '../robust.js';
import type { CheckSignal, Note } from './signal.js';

const LARGEST_CLUSTER = 500; // candidates in a row; beyond that the record is noise and nobody is spared
const AROUND = 60; // samples on each side that say how rough the water is
const WILDEST = 3; // a polynomial whose weights add up to more than this is replaced by a straight line

/** What neighbours say about sample i, NaN where there is none on a side. */
function reference(
  signal: CheckSignal,
  heights: Float64Array,
  bad: Uint8Array,
  i: number,
  reach: number,
): number {
  const { times, step } = signal;
  const here = times[i] as number;
  const farthest = reach * 2 * step + step / 2;
  const side = (direction: 1 | -1): number[] => {
    const found: number[] = [];
    for (
      let j = i + direction;
      j >= 0 && j < heights.length && found.length < reach;
      j += direction
    ) {
      if (Math.abs((times[j] as number) - here) > farthest) break;
      if (bad[j] === 0) found.push(j);
    }
    return found;
  };
  const left = side(-1);
  const right = side(1);
  const each = Math.min(left.length, right.length);
  const through = (count: number): { value: number; size: number } => {
    const nodes = [...left.slice(0, count), ...right.slice(0, count)];
    let value = 0;
    let size = 0;
    for (const j of nodes) {
      let weight = 1;
      for (const k of nodes) {
        if (k === j) continue;
        weight *= (here - (times[k] as number)) / ((times[j] as number) - (times[k] as number));
      }
      value += weight * (heights[j] as number);
      size += Math.abs(weight);
    }
    return { value, size };
  };
  if (each === 0) return Number.NaN;
  const full = through(each);
  return full.size <= WILDEST ? full.value : through(1).value;
}

/** The standard's mean of the two samples beside it; NaN unless both are there. */
function meanOfTwo(signal: CheckSignal, heights: Float64Array, bad: Uint8Array, i: number): number {
  const { places } = signal;
  if (i === 0 || i === heights.length - 1 || bad[i - 1] || bad[i + 1]) return Number.NaN;
  if ((places[i + 1] as number) - (places[i - 1] as number) !== 2) return Number.NaN;
  return ((heights[i - 1] as number) + (heights[i + 1] as number)) / 2;
}

/** Spike. `rejected` holds what earlier tests threw out; `skip` is told which samples could not be judged. */
export function checkJump(
  signal: CheckSignal,
  limits: JumpLimits,
  rejected: Uint8Array,
  note: Note,
  skip: (index: number) => void,
): void {
  const heights = limits.of === 'residual' && signal.residual ? signal.residual : signal.heights;
  const { reach = 1, spare = false, rough = false } = limits;
  const bad = rejected.slice();
  const apart = (i: number): number => {
    const said =
      reach === 1 && !spare
        ? meanOfTwo(signal, heights, bad, i)
        : reference(signal, heights, bad, i, reach);
    return Math.abs((heights[i] as number) - said);
  };
  const usual = rough ? medianOf(sampleOf(heights.length, apart)) : 0;
  const roughness = (i: number): number => {
    if (!(usual > 0)) return 1;
    const from = Math.max(0, i - AROUND);
    const here = sampleOf(Math.min(heights.length, i + AROUND + 1) - from, (k) => apart(from + k));
    return Math.max(1, medianOf(here) / usual);
  };
  const tell = (i: number, size: number): void => {
    const factor = roughness(i);
    const doubt = limits.doubt * factor;
    const reject = limits.reject * factor;
    if (size > reject) note(i, 4, size, reject, size);
    else if (size > doubt) note(i, 3, size, doubt, size);
  };

  let cluster: [index: number, size: number][] = [];
  const settle = (): void => {
    const open = new Map(cluster);
    const found: [number, number][] = [];
    while (spare && open.size > 0 && cluster.length <= LARGEST_CLUSTER) {
      const [worst, size] = [...open].reduce((a, b) => (b[1] > a[1] ? b : a));
      if (!(size > limits.doubt)) break;
      found.push([worst, size]);
      open.delete(worst);
      bad[worst] = 1;
      for (const i of open.keys()) {
        if (Math.abs(i - worst) <= 2 * reach) open.set(i, apart(i));
      }
    }
    const settled = spare && cluster.length <= LARGEST_CLUSTER ? found : cluster;
    for (const [i, size] of settled.sort((a, b) => a[0] - b[0])) tell(i, size);
    cluster = [];
  };
  for (let i = 0; i < heights.length; i++) {
    const size = bad[i] ? Number.NaN : apart(i);
    if (Number.isNaN(size)) skip(i);
    const last = cluster[cluster.length - 1];
    if (last && i - last[0] > 2 * reach) settle();
    if (size > limits.doubt) cluster.push([i, size]);
  }
  settle();
}
