/**
 * What the neighbours of a sample say about it, and how well such neighbours can know.
 *
 * A polynomial through up to three samples on each side follows the tide's curve. Beside a gap or a spike the nodes
 * are fewer or farther, and the tide itself bends away from the polynomial: of 1.4 m of M2 at hourly samples by 0.2 m
 * where there is one node on each side, by 1 mm where there are three. So every pattern of nodes is measured on the
 * record itself, and a sample is allowed what its own pattern errs more than the whole one.
 * @module
 */
import { sampleOf, spreadOf } from '../robust.js';
import type { CheckSignal } from './signal.js';

const HEAVIEST = 0.9; // of a node: a spike there must show less at its neighbours than at itself
const LOOKS = 2000; // positions at which a pattern is measured
const FEWEST_LOOKS = 24; // a pattern seen less often is not known
const ERRS = 4; // robust sigmas: four equal lines at their springs reach 2.8

/** What neighbours say about a sample. */
export interface Neighbours {
  /** Metres from what the neighbours say, NaN where there is none on a side. */
  readonly apart: (index: number) => number;
  /** Metres by which the nodes of this sample may err more than a whole set of them; Infinity where that is unknown. */
  readonly mayErr: (index: number) => number;
}

/** The value of the polynomial through the nodes, and the largest weight without its sign. */
function through(
  signal: CheckSignal,
  heights: Float64Array,
  here: number,
  nodes: readonly number[],
): { value: number; heaviest: number } {
  const { times } = signal;
  let value = 0;
  let heaviest = 0;
  for (const j of nodes) {
    let weight = 1;
    for (const k of nodes) {
      if (k === j) continue;
      weight *= (here - (times[k] as number)) / ((times[j] as number) - (times[k] as number));
    }
    value += weight * (heights[j] as number);
    heaviest = Math.max(heaviest, Math.abs(weight));
  }
  return { value, heaviest };
}

/** Samples that are not bad, at most `reach` on each side of each sample. `bad` may change between calls. */
export function neighboursOf(
  signal: CheckSignal,
  heights: Float64Array,
  bad: Uint8Array,
  reach: number,
): Neighbours {
  const { times, step } = signal;
  const farthest = reach * 2 * step + step / 2;
  const timeOf = (i: number): number => times[i] as number;

  const side = (i: number, direction: 1 | -1): number[] => {
    const found: number[] = [];
    for (let j = i + direction; j >= 0 && j < heights.length; j += direction) {
      if (found.length === reach || Math.abs(timeOf(j) - timeOf(i)) > farthest) break;
      if (bad[j] === 0) found.push(j);
    }
    return found;
  };
  const nodesOf = (i: number): { nodes: readonly number[]; value: number } | undefined => {
    const left = side(i, -1);
    const right = side(i, 1);
    for (let each = Math.min(left.length, right.length); each > 0; each--) {
      const nodes = [...left.slice(0, each), ...right.slice(0, each)];
      const { value, heaviest } = through(signal, heights, timeOf(i), nodes);
      if (each === 1 || heaviest <= HEAVIEST) return { nodes, value };
    }
    return undefined;
  };

  /** The good sample nearest to a time, looked for from sample i on; -1 where none is within half a step. */
  const sampleAt = (i: number, time: number): number => {
    const direction = time > timeOf(i) ? 1 : -1;
    let j = i;
    while ((time - timeOf(j)) * direction > step / 2) {
      j += direction;
      if (j < 0 || j >= heights.length) return -1;
    }
    return Math.abs(timeOf(j) - time) <= step / 2 && j !== i && bad[j] === 0 ? j : -1;
  };
  /** Spread of what nodes so many steps away say. */
  const measure = (offsets: readonly number[]): number => {
    const stride = Math.max(1, Math.floor(heights.length / LOOKS));
    const seen = sampleOf(Math.ceil(heights.length / stride), (k) => {
      const i = k * stride;
      if (bad[i]) return Number.NaN;
      const nodes: number[] = [];
      for (const offset of offsets) {
        const node = sampleAt(i, timeOf(i) + offset * step);
        if (node < 0 || nodes.includes(node)) return Number.NaN;
        nodes.push(node);
      }
      return (heights[i] as number) - through(signal, heights, timeOf(i), nodes).value;
    });
    return seen.length >= FEWEST_LOOKS ? spreadOf(seen) : Infinity;
  };
  const whole = Array.from({ length: reach }, (_, k) => [-1 - k, k + 1]).flat();
  const known = new Map<string, number>();
  const spreadFor = (offsets: readonly number[]): number => {
    const key = [...offsets].sort((a, b) => a - b).join(' ');
    const spread = known.get(key) ?? measure(offsets);
    known.set(key, spread);
    return spread;
  };

  return {
    apart(i) {
      const said = nodesOf(i);
      return said ? Math.abs((heights[i] as number) - said.value) : Number.NaN;
    },
    mayErr(i) {
      const { nodes = [] } = nodesOf(i) ?? {};
      const offsets = nodes.map((j) => Math.round((timeOf(j) - timeOf(i)) / step));
      const spread = spreadFor(offsets);
      const usual = spreadFor(whole);
      // A record too short to measure anything is left to the limits as they are.
      if (usual === Infinity) return spread === Infinity ? 0 : ERRS * spread;
      return ERRS * Math.max(0, spread - usual);
    },
  };
}
