/**
 * Mean longitudes of Moon and Sun as official tables of the Schureman tradition take them: no ΔT, civil time as argument.
 *
 * Source: P. Schureman (1940), Coast and Geodetic Survey Special Publication 98 (after Newcomb and Brown), from memory;
 * checked against ERFA 1850 to 2150 to the bounds of test-vectors/from-memory.
 * @module
 */

// Rows s, h, p, N, p_s: degrees, whole turns a century, arcseconds per century^k, k = 1 … 3; epoch 1899-12-31 12h.
const LONGITUDES: readonly (readonly number[])[] = /* @__PURE__ */ Object.freeze([
  [270 + 26 / 60 + 14.72 / 3600, 1336, 1108411.2, 9.09, 0.0068],
  [279 + 41 / 60 + 48.04 / 3600, 100, 2768.13, 1.089, 0],
  [334 + 19 / 60 + 40.87 / 3600, 11, 392515.94, -37.24, -0.045],
  [259 + 10 / 60 + 57.12 / 3600, -5, -482912.63, 7.58, 0.008],
  [281 + 13 / 60 + 15 / 3600, 0, 6189.03, 1.63, 0.012],
]);

/** N′ = −N. */
function negateNode(row: number[]): number[] {
  row[3] = -(row[3] as number);
  return row;
}

/**
 * @param t - Centuries of 36525 days from 1899-12-31 12h.
 * @returns s, h, p, N′, p_s in degrees, not wrapped.
 */
export function longitudesSchureman1940(t: number): number[] {
  return negateNode(
    LONGITUDES.map(([a, turns, b, c, d]) => {
      const arc = t * ((b as number) + t * ((c as number) + t * (d as number)));
      return (a as number) + (((turns as number) * t) % 1) * 360 + arc / 3600;
    }),
  );
}

/**
 * @param t - Centuries of 36525 days from 1899-12-31 12h.
 * @returns Rates of s, h, p, N′, p_s in degrees a century.
 */
export function ratesSchureman1940(t: number): number[] {
  return negateNode(
    LONGITUDES.map(([, turns, b, c, d]) => {
      const arc = (b as number) + t * (2 * (c as number) + t * 3 * (d as number));
      return (turns as number) * 360 + arc / 3600;
    }),
  );
}
