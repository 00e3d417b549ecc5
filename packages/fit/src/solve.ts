/**
 * Least squares on the normal equations with columns of unit length: Cholesky, and refinement against the data.
 *
 * The Gram matrix of scaled columns has the squared condition of the design; each refinement step multiplies the error
 * by about ε·κ², so two steps leave rounding for κ up to 1e5, beyond which the factor comes from an orthogonal
 * reduction of the columns themselves (orthogonal.ts).
 * @module
 */

/** A symmetric matrix with unit diagonal, and the lengths that were divided out. */
export interface Scaled {
  readonly matrix: Float64Array;
  readonly lengths: Float64Array;
  readonly count: number;
}

/** Divides rows and columns of a Gram matrix (lower triangle, stride `stride`) by the lengths of the columns. */
export function scaleGram(gram: Float64Array, count: number, stride: number): Scaled {
  const lengths = Float64Array.from({ length: count }, (_, i) =>
    Math.sqrt(gram[i * stride + i] as number),
  );
  const matrix = new Float64Array(count * count);
  for (let i = 0; i < count; i++) {
    for (let j = 0; j <= i; j++) {
      const product = (lengths[i] as number) * (lengths[j] as number);
      const value = product > 0 ? (gram[i * stride + j] as number) / product : 0;
      matrix[i * count + j] = value;
      matrix[j * count + i] = value;
    }
  }
  return { matrix, lengths, count };
}

const TURNS = 200; // of the power iterations: the ratio of eigenvalues is then right to 1e-3 or better
const SHIFT = 1e-13; // keeps the factor of a singular matrix alive, for its weakest direction

/** A start that no eigenvector is likely to be orthogonal to, the same each time. */
function startVector(count: number): Float64Array {
  const x = Float64Array.from({ length: count }, (_, i) => 1 + ((i * 7919) % 101) / 101);
  normalise(x);
  return x;
}

/** Divides by the length, and gives it. */
function normalise(x: Float64Array): number {
  let sum = 0;
  for (const value of x) sum += value * value;
  const length = Math.sqrt(sum);
  for (let i = 0; i < x.length; i++) x[i] = (x[i] as number) / length;
  return length;
}

function largestEigenvalue({ matrix, count }: Scaled): number {
  let x = startVector(count);
  let largest = 1;
  for (let turn = 0; turn < TURNS; turn++) {
    const next = new Float64Array(count);
    for (let i = 0; i < count; i++) {
      let sum = 0;
      for (let j = 0; j < count; j++) sum += (matrix[i * count + j] as number) * (x[j] as number);
      next[i] = sum;
    }
    largest = normalise(next);
    x = next;
  }
  return largest;
}

/**
 * Smallest eigenvalue over largest of a scaled Gram matrix, and the direction of the smallest, by power iterations.
 *
 * @param scaled - With unit diagonal.
 * @param known - Its lower triangular factor; undefined: there is none, the ratio is 0.
 */
export function weakestOf(
  scaled: Scaled,
  known: Float64Array | undefined,
): { ratio: number; weakest: Float64Array } {
  const { count } = scaled;
  let factor = known;
  for (let shift = SHIFT; !factor && shift < 1; shift *= 100) factor = cholesky(scaled, shift);
  if (!factor) return { ratio: 0, weakest: new Float64Array(count).fill(1) };
  const weakest = startVector(count);
  let inverse = 1;
  for (let turn = 0; turn < TURNS; turn++) {
    solveInPlace(factor, count, weakest);
    inverse = normalise(weakest);
  }
  return { ratio: known ? 1 / inverse / largestEigenvalue(scaled) : 0, weakest };
}

/** Lower Cholesky factor of a positive definite matrix, `shift` added to its diagonal; undefined where it is not. */
export function cholesky({ matrix, count }: Scaled, shift = 0): Float64Array | undefined {
  const factor = Float64Array.from(matrix);
  for (let i = 0; i < count; i++)
    factor[i * (count + 1)] = (factor[i * (count + 1)] as number) + shift;
  for (let j = 0; j < count; j++) {
    for (let i = j; i < count; i++) {
      let sum = factor[i * count + j] as number;
      for (let k = 0; k < j; k++) {
        sum -= (factor[i * count + k] as number) * (factor[j * count + k] as number);
      }
      if (i === j) {
        if (!(sum > 0)) return undefined;
        factor[i * count + j] = Math.sqrt(sum);
      } else factor[i * count + j] = sum / (factor[j * count + j] as number);
    }
  }
  return factor;
}

/** Solves L·Lᵀ·x = b in place. */
function solveInPlace(factor: Float64Array, count: number, b: Float64Array): void {
  for (let i = 0; i < count; i++) {
    let sum = b[i] as number;
    for (let k = 0; k < i; k++) sum -= (factor[i * count + k] as number) * (b[k] as number);
    b[i] = sum / (factor[i * count + i] as number);
  }
  for (let i = count - 1; i >= 0; i--) {
    let sum = b[i] as number;
    for (let k = i + 1; k < count; k++) sum -= (factor[k * count + i] as number) * (b[k] as number);
    b[i] = sum / (factor[i * count + i] as number);
  }
}

/** Solves for unscaled coefficients: the right-hand side is Aᵀr. */
export function solveScaled(
  factor: Float64Array,
  { lengths, count }: Scaled,
  rhs: Float64Array,
): Float64Array {
  const x = rhs.map((value, i) => value / (lengths[i] as number));
  solveInPlace(factor, count, x);
  return x.map((value, i) => value / (lengths[i] as number));
}

/** The inverse of the unscaled Gram matrix, row-major. */
export function inverseGram(factor: Float64Array, { lengths, count }: Scaled): Float64Array {
  const out = new Float64Array(count * count);
  const unit = new Float64Array(count);
  for (let j = 0; j < count; j++) {
    unit.fill(0);
    unit[j] = 1;
    solveInPlace(factor, count, unit);
    for (let i = 0; i < count; i++) {
      out[i * count + j] = (unit[i] as number) / ((lengths[i] as number) * (lengths[j] as number));
    }
  }
  return out;
}
