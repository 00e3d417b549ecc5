/**
 * The arithmetic of least squares: doubled precision, triangular systems, refinement that knows when to stop.
 *
 * Doubled precision keeps a number as the unevaluated sum hi + lo of two doubles, some 32 digits.
 * Sources: O. Møller (1965) and D. E. Knuth (1969) for the sum, T. J. Dekker (1971), Numer. Math. 18, 224, with
 * G. W. Veltkamp's splitting for the product, since JavaScript has no fused multiply-add; T. Ogita, S. M. Rump and
 * S. Oishi (2005), SIAM J. Sci. Comput. 26, 1955, for the inner product. Magnitudes must stay below 1e290.
 * @module
 */

const SETTLED = 1 / 0x100_0000_0000_0000; // 2^-56: a correction that changes no digit
const SPLITTER = 134217729; // 2^27 + 1: halves of 26 bits, whose products are exact

/** Numbers of doubled precision. */
export interface Pairs {
  readonly hi: Float64Array;
  readonly lo: Float64Array;
}

/** Zeros. */
export function zeroPairs(count: number): Pairs {
  return { hi: new Float64Array(count), lo: new Float64Array(count) };
}

/** Adds doubles to pairs, in place; a row that has only an upper part loses nothing. */
export function addInto({ hi, lo }: Pairs, change: Float64Array): void {
  for (let i = 0; i < hi.length; i++) {
    const a = hi[i] as number;
    const b = change[i] as number;
    const sum = a + b;
    const part = sum - a;
    const rest = a - (sum - part) + (b - part) + (lo[i] as number);
    const total = sum + rest;
    hi[i] = total;
    lo[i] = rest - (total - sum);
  }
}

/** Products of doubles with pairs. */
export function timesPairs(factors: Float64Array, { hi, lo }: Pairs): Pairs {
  const out = zeroPairs(hi.length);
  for (let i = 0; i < hi.length; i++) {
    const a = factors[i] as number;
    const b = hi[i] as number;
    const product = a * b;
    const ga = SPLITTER * a;
    const ah = ga - (ga - a);
    const al = a - ah;
    const gb = SPLITTER * b;
    const bh = gb - (gb - b);
    const bl = b - bh;
    out.hi[i] = product;
    out.lo[i] = al * bl - (product - ah * bh - al * bh - ah * bl) + a * (lo[i] as number);
  }
  return out;
}

/** Inner product of doubles with pairs: the sum and what it leaves over. */
export function dotPairs(a: Float64Array, { hi, lo }: Pairs): readonly [number, number] {
  let sum = 0;
  let rest = 0;
  for (let i = 0; i < a.length; i++) {
    const x = a[i] as number;
    const y = hi[i] as number;
    const product = x * y;
    const gx = SPLITTER * x;
    const xh = gx - (gx - x);
    const xl = x - xh;
    const gy = SPLITTER * y;
    const yh = gy - (gy - y);
    const yl = y - yh;
    const next = sum + product;
    const part = next - sum;
    rest += sum - (next - part) + (product - part);
    rest += xl * yl - (product - xh * yh - xl * yh - xh * yl) + x * (lo[i] as number);
    sum = next;
  }
  const total = sum + rest;
  return [total, rest - (total - sum)];
}

/** y − r − Σ x_j·column_j, formed in doubled precision and then rounded. */
export function defectOf(
  y: Float64Array,
  columns: readonly Float64Array[],
  x: Pairs,
  r: Pairs,
): Float64Array {
  const n = y.length;
  const sums = new Float64Array(n);
  const rests = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const a = y[i] as number;
    const b = -(r.hi[i] as number);
    const sum = a + b;
    const part = sum - a;
    sums[i] = sum;
    rests[i] = a - (sum - part) + (b - part) - (r.lo[i] as number);
  }
  columns.forEach((column, j) => {
    const b = -(x.hi[j] as number);
    const low = x.lo[j] as number;
    const gb = SPLITTER * b;
    const bh = gb - (gb - b);
    const bl = b - bh;
    for (let i = 0; i < n; i++) {
      const a = column[i] as number;
      const product = a * b;
      const ga = SPLITTER * a;
      const ah = ga - (ga - a);
      const al = a - ah;
      const sum = sums[i] as number;
      const next = sum + product;
      const part = next - sum;
      const lost = sum - (next - part) + (product - part);
      const error = al * bl - (product - ah * bh - al * bh - ah * bl);
      rests[i] = (rests[i] as number) + lost + error - a * low;
      sums[i] = next;
    }
  });
  for (let i = 0; i < n; i++) sums[i] = (sums[i] as number) + (rests[i] as number);
  return sums;
}

/** Inner product in plain doubles. */
export function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += (a[i] as number) * (b[i] as number);
  return sum;
}

/** Takes a multiple of a column from another, in place. */
export function subtractInto(out: Float64Array, factor: number, column: Float64Array): void {
  for (let i = 0; i < out.length; i++) out[i] = (out[i] as number) - factor * (column[i] as number);
}

/** Lower triangle of BᵀB to its Cholesky factor R. */
export function choleskyUpper(gram: Float64Array, count: number): Float64Array {
  const upper = new Float64Array(count * count);
  for (let i = 0; i < count; i++) {
    for (let j = i; j < count; j++) {
      let sum = gram[j * count + i] as number;
      for (let k = 0; k < i; k++) {
        sum -= (upper[k * count + i] as number) * (upper[k * count + j] as number);
      }
      upper[i * count + j] = i === j ? Math.sqrt(sum) : sum / (upper[i * count + i] as number);
    }
  }
  return upper;
}

/**
 * Makes columns orthonormal by Gram and Schmidt, each twice: what rounding left over goes the second time (W. Hoffmann
 * 1989, Computing 41, 335). Measured at 87 600 samples against the Householder factor of ml-matrix: 6 times nearer to
 * orthonormal; 4 refinements where that took 11 (condition 6e11).
 *
 * @param columns - B; becomes Q with B = Q·R. What is left of a column may be zero or rounding: look at R.
 * @returns R, upper, row-major.
 */
export function orthonormalise(columns: readonly Float64Array[]): Float64Array {
  const count = columns.length;
  const upper = new Float64Array(count * count);
  columns.forEach((column, j) => {
    for (let i = 0; i < 2 * j; i++) {
      const row = i < j ? i : i - j;
      const other = columns[row] as Float64Array;
      const share = dot(other, column);
      upper[row * count + j] = (upper[row * count + j] as number) + share;
      subtractInto(column, share, other);
    }
    const length = Math.sqrt(dot(column, column));
    upper[j * count + j] = length;
    for (let i = 0; length > 0 && i < column.length; i++) {
      column[i] = (column[i] as number) / length;
    }
  });
  return upper;
}

/** Solves Rᵀ·x = b in place. */
export function solveTransposed(upper: Float64Array, b: Float64Array): void {
  const count = b.length;
  for (let i = 0; i < count; i++) {
    let sum = b[i] as number;
    for (let k = 0; k < i; k++) sum -= (upper[k * count + i] as number) * (b[k] as number);
    b[i] = sum / (upper[i * count + i] as number);
  }
}

/** Solves R·x = b in place. */
export function solveUpper(upper: Float64Array, b: Float64Array): void {
  const count = b.length;
  for (let i = count - 1; i >= 0; i--) {
    let sum = b[i] as number;
    for (let k = i + 1; k < count; k++) sum -= (upper[i * count + k] as number) * (b[k] as number);
    b[i] = sum / (upper[i * count + i] as number);
  }
}

/**
 * Makes corrections while each is less than half the last; ends before that with one that changes no digit.
 *
 * @param correct - Computes a correction without making it.
 * @returns Corrections made.
 */
export function settle(
  correct: () => { size: number; settled: boolean; make: () => void },
): number {
  let size = Infinity;
  for (let made = 0; ; made++) {
    const next = correct();
    if (!(next.size < size / 2)) return made;
    next.make();
    if (next.settled) return made + 1;
    size = next.size;
  }
}

/** Whether a change of each number leaves its digits as they are. */
export function changesNothing(change: Float64Array, of: Float64Array): boolean {
  return change.every((value, j) => Math.abs(value) <= SETTLED * Math.abs(of[j] as number));
}

/** A symmetric matrix of doubled precision, in rows. */
export interface DoubledMatrix {
  readonly high: readonly Float64Array[];
  readonly low: readonly Float64Array[];
}

/** The products Σ w·a·b of all pairs of columns. */
export function doubledGram(
  columns: readonly Float64Array[],
  weights: Float64Array,
): DoubledMatrix {
  const high = columns.map(() => new Float64Array(columns.length));
  const low = columns.map(() => new Float64Array(columns.length));
  columns.forEach((column, j) => {
    const pull = timesPairs(weights, { hi: column, lo: new Float64Array(column.length) });
    for (let i = 0; i <= j; i++) {
      const [hi, lo] = dotPairs(columns[i] as Float64Array, pull);
      (high[i] as Float64Array)[j] = (high[j] as Float64Array)[i] = hi;
      (low[i] as Float64Array)[j] = (low[j] as Float64Array)[i] = lo;
    }
  });
  return { high, low };
}

/**
 * Inverse of a symmetric matrix D·RᵀR·D, row-major.
 *
 * @param upper - R, row-major: as good as a factor in doubles is.
 * @param lengths - The diagonal matrix D.
 * @param matrix - The matrix itself, against which the inverse is refined.
 */
export function inverseBy(
  upper: Float64Array,
  lengths: Float64Array,
  { high, low }: DoubledMatrix,
): Float64Array {
  const count = lengths.length;
  const inverse = new Float64Array(count * count);
  const none = zeroPairs(count);
  for (let j = 0; j < count; j++) {
    const unit = new Float64Array(count);
    unit[j] = 1;
    const x = zeroPairs(count);
    settle(() => {
      const g = defectOf(unit, high, x, none).map((value, i) => {
        return (value - dot(low[i] as Float64Array, x.hi)) / (lengths[i] as number);
      });
      solveTransposed(upper, g);
      solveUpper(upper, g);
      const change = g.map((value, i) => value / (lengths[i] as number));
      return {
        size: Math.sqrt(dot(g, g)),
        settled: changesNothing(change, x.hi),
        make: () => addInto(x, change),
      };
    });
    inverse.set(x.hi, j * count);
  }
  return inverse;
}
