/**
 * The slow twin of the transform: Σ x·e^{−2πikt/n} term by term.
 */

/** Real and imaginary part at one k. */
export function plainTransformAt(re: Float64Array, im: Float64Array, k: number): [number, number] {
  const n = re.length;
  let a = 0;
  let b = 0;
  for (let t = 0; t < n; t++) {
    const angle = (2 * Math.PI * ((k * t) % n)) / n;
    const [c, s] = [Math.cos(angle), Math.sin(angle)];
    a += (re[t] as number) * c + (im[t] as number) * s;
    b += (im[t] as number) * c - (re[t] as number) * s;
  }
  return [a, b];
}
