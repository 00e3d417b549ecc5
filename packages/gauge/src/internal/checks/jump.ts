/**
 * Spike: a sample against what its neighbours say.
 *
 * The standard's test takes the mean of the two neighbours and blames all three samples. With a reach of 2 or 3 a
 * polynomial through the neighbours follows the tide's curve, and beside a gap a sample is allowed what the nodes left
 * to it err more; `spare` takes the worst sample of a cluster out first and judges the others without it; `rough`
 * allows more where the water is rougher than usual.
 * @module
 */
import type { JumpLimits } from '../../limits.js';
import { medianOf, sampleOf } from '../robust.js';
import { neighboursOf } from './neighbours.js';
import type { CheckSignal, Note } from './signal.js';

const LARGEST_CLUSTER = 500; // candidates in a row; beyond that the record is noise and nobody is spared
const AROUND = 60; // samples on each side that say how rough the water is

/** A sample with its distance from what the neighbours say, and what these may err; metres. */
interface Suspect {
  readonly index: number;
  readonly size: number;
  readonly errs: number;
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
  const isPlain = reach === 1 && !spare; // the standard's own test
  const neighbours = neighboursOf(signal, heights, bad, reach);
  const apart = (i: number): number =>
    isPlain
      ? Math.abs((heights[i] as number) - meanOfTwo(signal, heights, bad, i))
      : neighbours.apart(i);
  /** Judges a sample; what its nodes may err is asked only where that matters. */
  const suspectAt = (i: number): Suspect => {
    const size = apart(i);
    const errs = !isPlain && size > limits.doubt ? neighbours.mayErr(i) : 0;
    return { index: i, size, errs };
  };
  const isSuspect = ({ size, errs }: Suspect): boolean => size - errs > limits.doubt;
  const usual = rough ? medianOf(sampleOf(heights.length, apart)) : 0;
  const roughness = (i: number): number => {
    if (!(usual > 0)) return 1;
    const from = Math.max(0, i - AROUND);
    const here = sampleOf(Math.min(heights.length, i + AROUND + 1) - from, (k) => apart(from + k));
    return Math.max(1, medianOf(here) / usual);
  };
  const tell = ({ index, size, errs }: Suspect): void => {
    const factor = roughness(index);
    const doubt = (limits.doubt + errs) * factor;
    const reject = (limits.reject + errs) * factor;
    if (size > reject) note(index, 4, size, reject, size);
    else if (size > doubt) note(index, 3, size, doubt, size);
  };

  let cluster: Suspect[] = [];
  const settle = (): void => {
    const open = new Map(cluster.map((suspect) => [suspect.index, suspect]));
    const found: Suspect[] = [];
    while (spare && open.size > 0 && cluster.length <= LARGEST_CLUSTER) {
      // By its bare size: no node weighs as much as the sample, so the spike itself stands out the most.
      const worst = [...open.values()].reduce((a, b) => (b.size > a.size ? b : a));
      found.push(worst);
      open.delete(worst.index);
      bad[worst.index] = 1;
      for (const i of open.keys()) {
        if (Math.abs(i - worst.index) > 2 * reach) continue;
        const again = suspectAt(i);
        if (isSuspect(again)) open.set(i, again);
        else open.delete(i);
      }
    }
    const settled = spare && cluster.length <= LARGEST_CLUSTER ? found : cluster;
    for (const suspect of settled.sort((a, b) => a.index - b.index)) tell(suspect);
    cluster = [];
  };
  for (let i = 0; i < heights.length; i++) {
    const last = cluster[cluster.length - 1];
    if (last && i - last.index > 2 * reach) settle();
    const suspect = bad[i] ? undefined : suspectAt(i);
    if (!suspect || Number.isNaN(suspect.size) || suspect.errs === Infinity) skip(i);
    else if (isSuspect(suspect)) cluster.push(suspect);
  }
  settle();
}
