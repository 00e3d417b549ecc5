/**
 * The slope of one constituent over the samples of a tile: z′ = (Q′(x)/length + iσQ(x))·e^{iσ·offset}, at any times.
 * Cost: a sine-cosine pair a sample.
 * @module
 */
import { sinCosInto } from '@staithe/core/trig';

/**
 * @param re - Written to: Re z′ per millisecond, length n or more.
 * @param im - Written to: Im z′ per millisecond, length n or more.
 * @param cubics - Eight numbers a constituent (Re and Im, ascending).
 * @param at - Eight times the index of the constituent.
 * @param speed - Radians per millisecond.
 * @param length - Milliseconds of the stretch.
 * @param offsets - Milliseconds from the start of the stretch, length n or more.
 * @param n - Samples.
 * @param pair - Scratch, length 2.
 */
export function phasorSlopeInto(
  re: Float64Array,
  im: Float64Array,
  cubics: Float64Array,
  at: number,
  speed: number,
  length: number,
  offsets: Float64Array,
  n: number,
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
  for (let i = 0; i < n; i++) {
    const offset = offsets[i] as number;
    sinCosInto(speed * offset, pair);
    const s = pair[0] as number;
    const c = pair[1] as number;
    const x = offset / length;
    const qr = a0 + x * (a1 + x * (a2 + x * a3));
    const qi = b0 + x * (b1 + x * (b2 + x * b3));
    const dr = (a1 + x * (2 * a2 + x * 3 * a3)) / length - speed * qi;
    const di = (b1 + x * (2 * b2 + x * 3 * b3)) / length + speed * qr;
    re[i] = dr * c - di * s;
    im[i] = dr * s + di * c;
  }
}
