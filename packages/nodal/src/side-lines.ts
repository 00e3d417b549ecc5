/**
 * The group of lines that a constituent stands for: those of the potential sharing n1, n2, n3 and p_s with it.
 *
 * f·e^{iu} = Σ (amplitude / main amplitude) · e^{i(Δp·p + ΔN′·N′ + turn)}, exact at each instant. Lines of degree 3 are
 * weighed by W₃/W₂ at the latitude and turned by the quarter turn between the sine and the cosine of the two degrees.
 * @module
 */
import { type Degrees, degreesToRadians, describe, InputError } from '@staithe/core';
import { cos, sin } from '@staithe/core/trig';
import { type Constituent, type PotentialLine, potentialLines } from '@staithe/constituents';

/** A line beside the main line of a constituent. @public */
export interface SideLine {
  readonly degree: 2 | 3;
  /** Δp, multiplier of p beyond the main line's. */
  readonly perigee: number;
  /** ΔN′, multiplier of N′ beyond the main line's. */
  readonly node: number;
  /** Amplitude over the main line's, sign kept, latitude included. */
  readonly ratio: number;
  /** Degrees, a multiple of 90. */
  readonly turn: Degrees;
}

const WEAKEST = 0.05;

/** W_2^m and W_3^m of colatitude with (−1)^m, and the largest |W_2^m|. */
function weights(order: number, latitude: Degrees): readonly [number, number, number] {
  const c = sin(degreesToRadians(latitude)); // cosine of the colatitude
  const s = cos(degreesToRadians(latitude));
  const root = (numerator: number, denominator: number): number =>
    Math.sqrt(numerator / (denominator * Math.PI));
  if (order === 0) {
    return [root(5, 4) * (1.5 * c * c - 0.5), root(7, 4) * (2.5 * c * c * c - 1.5 * c), root(5, 4)];
  }
  if (order === 1) {
    return [-3 * root(5, 24) * s * c, -1.5 * root(7, 48) * s * (5 * c * c - 1), 1.5 * root(5, 24)];
  }
  return [3 * root(5, 96) * s * s, 15 * root(7, 480) * s * s * c, 3 * root(5, 96)];
}

const shares = (line: PotentialLine, numbers: readonly number[]): boolean =>
  [0, 1, 2, 5].every((i) => line.doodsonNumbers[i] === numbers[i]);

/**
 * The lines of a constituent's group, the main line first.
 *
 * @param of - A constituent on a line of the potential (no compound).
 * @param options - `latitude`, degrees north: with it the lines of degree 3 enter, unless the weight of degree 2 is
 *   under 5 % of its maximum there (`leftOut` says so).
 * @param lines - The potential, where the caller has it at hand.
 * @returns The group, and whether degree 3 was asked for and left out. Empty where the potential has no such line.
 * @throws InputError `OUT_OF_RANGE`, path `latitude`.
 * @example
 * sideLines(constituent('M2')).lines[0]?.ratio; // 1
 * @public
 */
export function sideLines(
  of: Constituent,
  options: { readonly latitude?: Degrees | undefined } = {},
  lines: readonly PotentialLine[] = potentialLines(),
): { readonly lines: readonly SideLine[]; readonly leftOut: boolean } {
  const { latitude } = options;
  if (latitude !== undefined && !(Math.abs(latitude) <= 90)) {
    throw new InputError(
      'OUT_OF_RANGE',
      'latitude',
      `expected degrees from -90 to 90, got ${describe(latitude)}`,
    );
  }
  const numbers = of.doodsonNumbers;
  const mainOf = (degree: 2 | 3): PotentialLine | undefined =>
    lines.find(
      (line) => line.degree === degree && line.doodsonNumbers.every((n, i) => n === numbers[i]),
    );
  // M3 and M1C stand on lines of degree 3 alone.
  const main = mainOf(2) ?? mainOf(3);
  if (!main) return { lines: [], leftOut: false };
  const own = main.degree;
  const group = lines.filter((line) => line.degree === own && shares(line, numbers));
  const side = (line: PotentialLine, weight: number, turn: Degrees): SideLine => ({
    degree: line.degree,
    perigee: line.doodsonNumbers[3] - numbers[3],
    node: line.doodsonNumbers[4] - numbers[4],
    ratio: (line.amplitude / main.amplitude) * weight,
    turn,
  });
  const out = [
    side(main, 1, 0),
    ...group.filter((line) => line !== main).map((line) => side(line, 1, 0)),
  ];
  if (latitude === undefined || own === 3) return { lines: out, leftOut: false };
  const [w2, w3, largest] = weights(numbers[0], latitude);
  const degree3 = lines.filter((line) => line.degree === 3 && shares(line, numbers));
  if (Math.abs(w2) < WEAKEST * largest) return { lines: out, leftOut: degree3.length > 0 };
  // Degree 2 is a sine for the diurnal lines only, degree 3 a cosine for them only.
  const turn = numbers[0] === 1 ? 90 : -90;
  return { lines: [...out, ...degree3.map((line) => side(line, w3 / w2, turn))], leftOut: false };
}
