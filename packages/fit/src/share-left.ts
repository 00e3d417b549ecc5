/**
 * The share of white noise at a speed that a least-squares fit of lines leaves in the residual.
 *
 * With e(ω) the complex oscillation at the samples and A the columns, it is 1 − eᴴA(AᵀA)⁻¹Aᵀe/n. Columns and products
 * are values of the spectral window, so the samples are not needed, and only the lines within some turns matter. A fitted
 * pair spans its speed with both signs: lines near 0 have their mirror images for neighbours.
 * @module
 */
import { type SpectralWindow, windowInto } from './window.js';

const SAME = 1e-10; // of the diagonal: a line that the record cannot tell from others takes nothing more

interface Factor {
  readonly re: Float64Array;
  readonly im: Float64Array;
  readonly diagonal: Float64Array;
}

/** Cholesky factor of the products of the lines from one place in the list to another. */
function factorOf(window: SpectralWindow, lines: readonly number[]): Factor {
  const count = lines.length;
  const re = new Float64Array(count * count);
  const im = new Float64Array(count * count);
  const diagonal = new Float64Array(count);
  const pair = new Float64Array(2);
  for (let i = 0; i < count; i++) {
    for (let j = 0; j <= i; j++) {
      windowInto(window, (lines[i] as number) - (lines[j] as number), pair);
      let a = pair[0] as number;
      let b = pair[1] as number;
      for (let k = 0; k < j; k++) {
        const [p, q] = [re[i * count + k] as number, im[i * count + k] as number];
        const [r, s] = [re[j * count + k] as number, im[j * count + k] as number];
        a -= p * r + q * s;
        b -= q * r - p * s;
      }
      if (i === j) diagonal[i] = a > SAME ? Math.sqrt(a) : 0;
      else if ((diagonal[j] as number) > 0) {
        re[i * count + j] = a / (diagonal[j] as number);
        im[i * count + j] = b / (diagonal[j] as number);
      }
    }
  }
  return { re, im, diagonal };
}

/**
 * @param window - Of the samples; lines beyond its reach are not counted.
 * @param speeds - Of the lines, degrees per hour, 0 among them where a mean level is fitted.
 * @returns Gives the share left at a speed, from 0 to 1.
 */
export function shareLeftBy(
  window: SpectralWindow,
  speeds: readonly number[],
): (speed: number) => number {
  const { reach } = window;
  const lines = [...new Set([...speeds, ...speeds.map((speed) => -speed + 0)])].sort(
    (a, b) => a - b,
  );
  const factors = new Map<string, Factor>();
  const pair = new Float64Array(2);
  return (speed) => {
    const from = lines.findIndex((line) => line >= speed - reach);
    const near: number[] = [];
    for (let i = from; i >= 0 && i < lines.length; i++) {
      if ((lines[i] as number) > speed + reach) break;
      near.push(lines[i] as number);
    }
    const count = near.length;
    const key = `${from} ${count}`;
    const factor = factors.get(key) ?? factorOf(window, near);
    factors.set(key, factor);
    const re = new Float64Array(count);
    const im = new Float64Array(count);
    let taken = 0;
    for (let i = 0; i < count; i++) {
      const length = factor.diagonal[i] as number;
      if (length === 0) continue;
      windowInto(window, (near[i] as number) - speed, pair);
      let a = pair[0] as number;
      let b = pair[1] as number;
      for (let k = 0; k < i; k++) {
        const [p, q] = [factor.re[i * count + k] as number, factor.im[i * count + k] as number];
        const [r, s] = [re[k] as number, im[k] as number];
        a -= p * r - q * s;
        b -= p * s + q * r;
      }
      re[i] = a / length;
      im[i] = b / length;
      taken += (re[i] as number) * (re[i] as number) + (im[i] as number) * (im[i] as number);
    }
    return Math.min(1, Math.max(0, 1 - taken));
  };
}
