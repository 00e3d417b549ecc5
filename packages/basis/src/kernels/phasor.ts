/**
 * One constituent over the samples of a tile: z = Q(x)·e^{iσ·offset}. Cost: a sine-cosine pair a sample at irregular
 * times, a complex product a sample on a uniform grid, restarted each 128 samples so that rounding does not add up.
 * @module
 */
import { sinCosInto } from '@staithe/core/trig';

const RESTART = 128;

/**
 * @param re - Written to: Re z, length n or more.
 * @param im - Written to: Im z, length n or more.
 * @param cubics - Eight numbers a constituent (Re and Im, ascending).
 * @param at - Eight times the index of the constituent.
 * @param speed - Radians per millisecond.
 * @param length - Milliseconds of the stretch.
 * @param offsets - Milliseconds from the start of the stretch, length n or more.
 * @param n - Samples.
 * @param step - Milliseconds between samples where they are uniform, else 0.
 * @param pair - Scratch, length 2.
 */
export function phasorInto(
  re: Float64Array,
  im: Float64Array,
  cubics: Float64Array,
  at: number,
  speed: number,
  length: number,
  offsets: Float64Array,
  n: number,
  step: number,
  pair: Float64Array,
): void {
  const a0 = cubics[at] as number;
  const b0 = cubics[at + 1] as number;
  const a1 = cubics[at + 2] as number;
  const b1 = cubics[at + 3] as number;
  const a2 = cubics[at + 4] as number;
  const b2 = cubics[at + 5] as number;
  const a3 = cubics[at + 6] as number;
  const b3 = cubics[at + 7] as number;
  let turnCos = 1;
  let turnSin = 0;
  if (step > 0 && n > 1) {
    sinCosInto(speed * step, pair);
    turnSin = pair[0] as number;
    turnCos = pair[1] as number;
  }
  let s = 0;
  let c = 1;
  for (let i = 0; i < n; i++) {
    const offset = offsets[i] as number;
    if (step === 0 || i % RESTART === 0) {
      sinCosInto(speed * offset, pair);
      s = pair[0] as number;
      c = pair[1] as number;
    } else {
      const turned = c * turnCos - s * turnSin;
      s = c * turnSin + s * turnCos;
      c = turned;
    }
    const x = offset / length;
    const qr = a0 + x * (a1 + x * (a2 + x * a3));
    const qi = b0 + x * (b1 + x * (b2 + x * b3));
    re[i] = qr * c - qi * s;
    im[i] = qr * s + qi * c;
  }
}
