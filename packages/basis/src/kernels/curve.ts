/**
 * A tide curve and its first two derivatives at one instant, and bounds of the derivatives over a stretch.
 *
 * The curve is Σ Re P_j(x)·e^{iσ_j·offset}, P the cubics of the basis times (H cos G − i·H sin G). With P′, P″ in time,
 * h′ = Σ Re (P′ + iσP)e^{…}, h″ = Σ Re (P″ + 2iσP′ − σ²P)e^{…}.
 * @module
 */
import { sinCosInto } from '@staithe/core/trig';

/**
 * Multiplies the cubics of a stretch by the coefficients of a curve.
 *
 * @param out - Written to: eight numbers a constituent.
 * @param cubics - Of a stretch.
 * @param coefficients - Level, then H cos G and H sin G of each constituent.
 * @example
 * const charged = new Float64Array(8);
 * chargeInto(charged, Float64Array.of(1, 0, 0, 0, 0, 0, 0, 0), Float64Array.of(0, 2, 3));
 * charged.slice(0, 2); // Float64Array.of(2, -3)
 * @public
 */
export function chargeInto(
  out: Float64Array,
  cubics: Float64Array,
  coefficients: Float64Array,
): void {
  for (let i = 0; i < cubics.length; i += 2) {
    const j = i >> 3;
    const a = coefficients[1 + 2 * j] as number;
    const b = coefficients[2 + 2 * j] as number;
    const qr = cubics[i] as number;
    const qi = cubics[i + 1] as number;
    out[i] = a * qr + b * qi;
    out[i + 1] = a * qi - b * qr;
  }
}

/**
 * The curve and its first two derivatives at one instant, without the mean level.
 *
 * @param out - Written to: h, h′ per ms, h″ per ms².
 * @param charged - Of {@link chargeInto}.
 * @param speeds - Radians per millisecond.
 * @param length - Milliseconds of the stretch.
 * @param offset - Milliseconds from its start.
 * @param pair - Scratch, length 2.
 * @example
 * const point = new Float64Array(3);
 * curveInto(point, Float64Array.of(2, 0, 0, 0, 0, 0, 0, 0), Float64Array.of(1), 10, 0, new Float64Array(2));
 * point; // Float64Array.of(2, 0, -2)
 * @public
 */
export function curveInto(
  out: Float64Array,
  charged: Float64Array,
  speeds: Float64Array,
  length: number,
  offset: number,
  pair: Float64Array,
): void {
  const x = offset / length;
  let h = 0;
  let h1 = 0;
  let h2 = 0;
  for (let j = 0; j < speeds.length; j++) {
    const at = 8 * j;
    const speed = speeds[j] as number;
    sinCosInto(speed * offset, pair);
    const s = pair[0] as number;
    const c = pair[1] as number;
    const a1 = charged[at + 2] as number;
    const b1 = charged[at + 3] as number;
    const a2 = charged[at + 4] as number;
    const b2 = charged[at + 5] as number;
    const a3 = charged[at + 6] as number;
    const b3 = charged[at + 7] as number;
    const pr = (charged[at] as number) + x * (a1 + x * (a2 + x * a3));
    const pi = (charged[at + 1] as number) + x * (b1 + x * (b2 + x * b3));
    const dr = (a1 + x * (2 * a2 + x * 3 * a3)) / length;
    const di = (b1 + x * (2 * b2 + x * 3 * b3)) / length;
    const er = (2 * a2 + 6 * x * a3) / (length * length);
    const ei = (2 * b2 + 6 * x * b3) / (length * length);
    h += pr * c - pi * s;
    const fr = dr - speed * pi;
    const fi = di + speed * pr;
    h1 += fr * c - fi * s;
    const gr = er - 2 * speed * di - speed * speed * pr;
    const gi = ei + 2 * speed * dr - speed * speed * pi;
    h2 += gr * c - gi * s;
  }
  out[0] = h;
  out[1] = h1;
  out[2] = h2;
}

/**
 * Bounds over a stretch, from the triangle inequality: |h″| and |h‴|.
 *
 * @param out - Written to: bounds of |h″| per ms² and |h‴| per ms³.
 * @param charged - Of {@link chargeInto}.
 * @param speeds - Radians per millisecond.
 * @param length - Milliseconds of the stretch.
 * @example
 * const bounds = new Float64Array(2);
 * boundsInto(bounds, Float64Array.of(2, 0, 0, 0, 0, 0, 0, 0), Float64Array.of(3), 10);
 * bounds; // Float64Array.of(18, 54)
 * @public
 */
export function boundsInto(
  out: Float64Array,
  charged: Float64Array,
  speeds: Float64Array,
  length: number,
): void {
  let second = 0;
  let third = 0;
  for (let j = 0; j < speeds.length; j++) {
    const speed = speeds[j] as number;
    const size = (k: number): number => {
      const re = charged[8 * j + 2 * k] as number;
      const im = charged[8 * j + 2 * k + 1] as number;
      return Math.sqrt(re * re + im * im);
    };
    const p = size(0) + size(1) + size(2) + size(3);
    const p1 = (size(1) + 2 * size(2) + 3 * size(3)) / length;
    const p2 = (2 * size(2) + 6 * size(3)) / (length * length);
    const p3 = (6 * size(3)) / (length * length * length);
    second += p2 + speed * (2 * p1 + speed * p);
    third += p3 + speed * (3 * p2 + speed * (3 * p1 + speed * p));
  }
  out[0] = second;
  out[1] = third;
}
