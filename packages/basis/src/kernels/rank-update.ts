/**
 * Adds the products of all pairs of columns of a tile to a Gram matrix: n·C²/2 multiply-adds, four columns at a time
 * so that a loaded value serves four products.
 * @module
 */

/**
 * Adds the products of all pairs of columns to a Gram matrix.
 *
 * @param gram - Added to: row-major, count × count, lower triangle.
 * @param columns - One row a column, `stride` apart.
 * @param count - Columns.
 * @param stride - Samples from one column to the next.
 * @param n - Samples.
 * @example
 * const sums = new Float64Array(4);
 * rankUpdate(sums, Float64Array.of(1, 2, 3, 4), 2, 2, 2);
 * sums; // Float64Array.of(5, 0, 11, 25)
 * @public
 */
export function rankUpdate(
  gram: Float64Array,
  columns: Float64Array,
  count: number,
  stride: number,
  n: number,
): void {
  for (let row = 0; row < count; row++) {
    const a = row * stride;
    let column = 0;
    for (; column + 3 <= row; column += 4) {
      const b = column * stride;
      let s0 = 0;
      let s1 = 0;
      let s2 = 0;
      let s3 = 0;
      for (let i = 0; i < n; i++) {
        const x = columns[a + i] as number;
        s0 += x * (columns[b + i] as number);
        s1 += x * (columns[b + stride + i] as number);
        s2 += x * (columns[b + 2 * stride + i] as number);
        s3 += x * (columns[b + 3 * stride + i] as number);
      }
      const at = row * count + column;
      gram[at] = (gram[at] as number) + s0;
      gram[at + 1] = (gram[at + 1] as number) + s1;
      gram[at + 2] = (gram[at + 2] as number) + s2;
      gram[at + 3] = (gram[at + 3] as number) + s3;
    }
    for (; column <= row; column++) {
      const b = column * stride;
      let sum = 0;
      for (let i = 0; i < n; i++) sum += (columns[a + i] as number) * (columns[b + i] as number);
      gram[row * count + column] = (gram[row * count + column] as number) + sum;
    }
  }
}
