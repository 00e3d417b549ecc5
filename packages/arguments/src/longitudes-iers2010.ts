/**
 * Mean longitudes of Moon and Sun from the Delaunay arguments of the IERS Conventions (2010).
 *
 * Source: G. Petit and B. Luzum (eds.), IERS Technical Note 36 (2010), eq. 5.43 (after J. L. Simon et al. 1994).
 * s = F + Ω, h = s − D, p = s − l, N′ = −Ω, p_s = h − l′. Checked against ERFA 2.0.0, 1850 to 2150, to 1e-8°.
 * @module
 */

import { wrapDegrees } from '@staithe/core';

// One row an argument (l, l′, F, D, Ω): degrees at J2000, then arcseconds per century^k, k = 1 … 4.
const DELAUNAY: readonly (readonly number[])[] = /* @__PURE__ */ Object.freeze([
  [134.96340251, 1717915923.2178, 31.8792, 0.051635, -0.0002447],
  [357.52910918, 129596581.0481, -0.5532, 0.000136, -0.00001149],
  [93.27209062, 1739527262.8478, -12.7512, -0.001037, 0.00000417],
  [297.85019547, 1602961601.209, -6.3706, 0.006593, -0.00003169],
  [125.04455501, -6962890.5431, 7.4722, 0.007702, -0.00005939],
]);
const ARCSECONDS = 3600;

/** The five longitudes s, h, p, N′, p_s from sums of the five Delaunay arguments. */
function combine(l: number, lPrime: number, f: number, d: number, node: number): number[] {
  const s = f + node;
  return [s, s - d, s - l, -node, s - d - lPrime];
}

/**
 * @param t - Julian centuries TT from J2000.0.
 * @returns s, h, p, N′, p_s in degrees, not wrapped.
 */
export function longitudesIers2010(t: number): number[] {
  const [l, lPrime, f, d, node] = DELAUNAY.map(([a, b, c, e, g]) => {
    const ratio =
      (t * ((b as number) + t * ((c as number) + t * ((e as number) + t * (g as number))))) /
      ARCSECONDS;
    return wrapDegrees((a as number) + wrapDegrees(ratio));
  }) as [number, number, number, number, number];
  return combine(l, lPrime, f, d, node);
}

/**
 * @param t - Julian centuries TT from J2000.0.
 * @returns Rates of s, h, p, N′, p_s in degrees a century.
 */
export function ratesIers2010(t: number): number[] {
  const [l, lPrime, f, d, node] = DELAUNAY.map(
    ([, b, c, e, g]) =>
      ((b as number) + t * (2 * (c as number) + t * (3 * (e as number) + t * 4 * (g as number)))) /
      ARCSECONDS,
  ) as [number, number, number, number, number];
  return combine(l, lPrime, f, d, node);
}
