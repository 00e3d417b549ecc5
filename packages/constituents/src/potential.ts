/**
 * The lines of the tide-generating potential.
 *
 * height = Σ amplitude · W_n^m(latitude) · {cos, n + m even; sin, n + m odd}(θ), θ = multipliers · (τ + λ, s, h, p, N′, p_s),
 * W_n^m the fully normalised associated Legendre functions of colatitude with (−1)^m (docs/potential.md).
 * Source: degree 2, the 342 lines of Cartwright and Tayler (1971), Cartwright and Edden (1973); degree 3, the waves of
 * Hartmann and Wenzel (1995) from 5e-5 m, divided by g.
 * @module
 */
import { type DoodsonNumbers, parseXdo } from './doodson.js';
import { DEGREE_2, DEGREE_3 } from './generated/potential-lines.js';

/** One line of the potential. @public */
export interface PotentialLine {
  readonly degree: 2 | 3;
  /** m, the multiplier of τ. */
  readonly order: number;
  readonly doodsonNumbers: DoodsonNumbers;
  /** Metres, sign kept. */
  readonly amplitude: number;
}

function unpack(text: string, degree: 2 | 3): PotentialLine[] {
  return text.split(' ').map((row) => {
    const { doodsonNumbers } = parseXdo(row.slice(0, 6));
    return {
      degree,
      order: doodsonNumbers[0],
      doodsonNumbers,
      amplitude: Number(row.slice(6)) / 1e6,
    };
  });
}

/**
 * The lines of the potential, unpacked on call.
 *
 * @param filter - Keep this degree or order.
 * @returns A new list, largest first within an order; 342 lines of degree 2, 75 of degree 3.
 * @example
 * potentialLines({ degree: 2 }).length; // 342
 * @public
 */
export function potentialLines(
  filter: { readonly degree?: 2 | 3 | undefined; readonly order?: number | undefined } = {},
): readonly PotentialLine[] {
  const lines = [
    ...(filter.degree === 3 ? [] : unpack(DEGREE_2, 2)),
    ...(filter.degree === 2 ? [] : unpack(DEGREE_3, 3)),
  ];
  return lines.filter(({ order }) => order === (filter.order ?? order));
}
