/**
 * The joint covariance of the two components: what the noise of one tells of the other.
 *
 * The coefficients are a − ib = (2/n)·Σ r·e^{−iωt}, so with the coherence γ of the noise of both beside a line the pairs
 * have E[a·a′] = E[b·b′] = Re γ and E[a·b′] = −E[b·a′] = Im γ, times the roots of both densities and the inverse products.
 * @module
 */
import { type Design, headCount } from '../design.js';
import type { LineNoise } from '../noise.js';
import type { Coherence } from '../coherence.js';

/** Order of the joint covariance. */
export function jointOrder({ order }: Design): string[] {
  return ['east', 'north'].flatMap((side) =>
    order.map((column) => (column === 'meanLevel' ? `mean.${side}` : `${side}.${column}`)),
  );
}

/**
 * @param design - Of both components.
 * @param inverse - Of the Gram matrix.
 * @param own - Covariances of east and north alone.
 * @param noise - Densities of east and north at the lines.
 * @param coherence - Of the noise of both at the lines.
 * @returns Row-major, (2 × columns)².
 */
export function jointCovariance(
  design: Design,
  inverse: Float64Array,
  own: readonly [Float64Array, Float64Array],
  noise: readonly [readonly LineNoise[], readonly LineNoise[]],
  coherence: readonly Coherence[],
): Float64Array {
  const count = design.order.length;
  const head = headCount(design);
  const size = 2 * count;
  const lineOf = (column: number): number => (column < head ? 0 : 1 + ((column - head) >> 1));
  const density = (side: 0 | 1, line: number): number => (noise[side][line] as LineNoise).density;
  const out = new Float64Array(size * size);
  for (let i = 0; i < count; i++) {
    for (let j = 0; j < count; j++) {
      out[i * size + j] = own[0][i * count + j] as number;
      out[(count + i) * size + count + j] = own[1][i * count + j] as number;
      const [p, q] = [lineOf(i), lineOf(j)];
      const [at, to] = [coherence[p], coherence[q]] as [Coherence, Coherence];
      const scale = Math.sqrt(density(0, p) * density(1, q));
      let value = ((at.re + to.re) / 2) * scale * (inverse[i * count + j] as number);
      if (p === q && p > 0 && i !== j) {
        // The other column of the same constituent: cosine of east with sine of north, and the reverse.
        const first = Math.min(i, j);
        const mean =
          ((inverse[first * (count + 1)] as number) +
            (inverse[(first + 1) * (count + 1)] as number)) /
          2;
        value += (i < j ? at.im : -at.im) * scale * mean;
      }
      out[i * size + count + j] = value;
      out[(count + j) * size + i] = value;
    }
  }
  return out;
}
