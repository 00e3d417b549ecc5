/**
 * f and u after P. Schureman (1940), Coast and Geodetic Survey Special Publication 98, from memory; eight of the
 * formulas were checked against the potential lines (test-vectors/from-memory/schureman-derived-factors), M1, L2 and M3
 * by the official predictions of La Jolla. Unlike the potential, they know the node alone (M1 and L2 the perigee too).
 * @module
 */
import { type Degrees, degreesToRadians, radiansToDegrees, wrapDegrees } from '@staithe/core';
import { atan2, cos, sin } from '@staithe/core/trig';

/** The angles of the Moon's orbit on the equator, all in degrees. @public */
export interface OrbitAngles {
  /** I, inclination of the orbit to the equator, 18.3 to 28.6. */
  readonly inclination: Degrees;
  /** ν, right ascension of the intersection. */
  readonly nu: Degrees;
  /** ξ, longitude of the intersection in the orbit. */
  readonly xi: Degrees;
  /** ν′, of K1. */
  readonly nuPrime: Degrees;
  /** 2ν″, of K2. */
  readonly twoNuDoublePrime: Degrees;
}

interface Orbit {
  /** cos I, sin² I, cos²(I/2), sin²(I/2). */
  cosine: number;
  sine2: number;
  halfCosine2: number;
  halfSine2: number;
  nu: number;
  xi: number;
}

/** The orbit from N in degrees; angles in radians. */
function orbit(node: Degrees): Orbit {
  const wrapped = wrapDegrees(node);
  const n = degreesToRadians(wrapped > 180 ? wrapped - 360 : wrapped);
  const cosine = 0.9137 - 0.03569 * cos(n);
  const half = n / 2;
  // tan ½(N − ξ + ν) = 1.01883 tan ½N and tan ½(N − ξ − ν) = 0.64412 tan ½N.
  const a = atan2(1.01883 * sin(half), cos(half));
  const b = atan2(0.64412 * sin(half), cos(half));
  return {
    cosine,
    sine2: 1 - cosine * cosine,
    halfCosine2: (1 + cosine) / 2,
    halfSine2: (1 - cosine) / 2,
    nu: a - b,
    xi: n - a - b,
  };
}

/** sin 2I sin ν and sin 2I cos ν + 0.3347: the two sides of ν′. */
function primeSides({ cosine, sine2, nu }: Orbit): readonly [number, number] {
  const sin2I = 2 * Math.sqrt(sine2) * cosine;
  return [sin2I * sin(nu), sin2I * cos(nu) + 0.3347];
}

/** sin² I sin 2ν and sin² I cos 2ν + 0.0727: the two sides of 2ν″. */
function doublePrimeSides({ sine2, nu }: Orbit): readonly [number, number] {
  return [sine2 * sin(2 * nu), sine2 * cos(2 * nu) + 0.0727];
}

/**
 * The angles of the Moon's orbit on the equator.
 *
 * @param node - N, longitude of the ascending node, degrees.
 * @returns I, ν, ξ, ν′ and 2ν″ in degrees.
 * @example
 * orbitAngles(0).nu; // 0
 * @public
 */
export function orbitAngles(node: Degrees): OrbitAngles {
  const now = orbit(node);
  const degrees = ([y, x]: readonly [number, number]): Degrees => radiansToDegrees(atan2(y, x));
  return {
    inclination: degrees([Math.sqrt(now.sine2), now.cosine]),
    nu: radiansToDegrees(now.nu),
    xi: radiansToDegrees(now.xi),
    nuPrime: degrees(primeSides(now)),
    twoNuDoublePrime: degrees(doublePrimeSides(now)),
  };
}

/** f, and u in radians. */
type Pair = readonly [f: number, u: number];
type Formula = (now: Orbit, perigee: number) => Pair;

const m2: Formula = ({ halfCosine2, xi, nu }) => [
  (halfCosine2 * halfCosine2) / 0.9154,
  2 * xi - 2 * nu,
];
const o1: Formula = ({ sine2, halfCosine2, xi, nu }) => [
  (Math.sqrt(sine2) * halfCosine2) / 0.38,
  2 * xi - nu,
];

const FORMULAS: Readonly<Record<string, Formula>> = /* @__PURE__ */ Object.freeze({
  Mm: ({ sine2 }) => [(2 / 3 - sine2) / 0.5021, 0],
  Mf: ({ sine2, xi }) => [sine2 / 0.1578, -2 * xi],
  // Shares f and u with the difference S2 − M2 that it mostly is.
  MSf: (now, perigee) => {
    const [f, u] = m2(now, perigee);
    return [f, -u];
  },
  O1: o1,
  J1: ({ sine2, cosine, nu }) => [(2 * Math.sqrt(sine2) * cosine) / 0.7214, -nu],
  OO1: ({ sine2, halfSine2, xi, nu }) => [(Math.sqrt(sine2) * halfSine2) / 0.0164, -2 * xi - nu],
  K1: (now) => {
    const { cosine, sine2, nu } = now;
    const sin2I = 2 * Math.sqrt(sine2) * cosine;
    const [y, x] = primeSides(now);
    return [Math.sqrt(0.8965 * sin2I * sin2I + 0.6001 * sin2I * cos(nu) + 0.1006), -atan2(y, x)];
  },
  M1: (now, perigee) => {
    const { cosine, halfCosine2, xi, nu } = now;
    const fromNode = perigee - xi;
    const q = atan2(0.483 * sin(fromNode), cos(fromNode));
    const ratio = cosine / halfCosine2;
    const f2 = 0.25 + 1.5 * ratio * cos(2 * fromNode) + 2.25 * ratio * ratio;
    return [o1(now, perigee)[0] * Math.sqrt(f2), xi - nu + q - perigee];
  },
  M2: m2,
  K2: (now) => {
    const { sine2, nu } = now;
    const [y, x] = doublePrimeSides(now);
    const f2 = 19.0444 * sine2 * sine2 + 2.7702 * sine2 * cos(2 * nu) + 0.0981;
    return [Math.sqrt(f2), -atan2(y, x)];
  },
  L2: (now, perigee) => {
    const { halfCosine2, halfSine2, xi } = now;
    const [f, u] = m2(now, perigee);
    const twice = 2 * (perigee - xi);
    const tan2 = halfSine2 / halfCosine2;
    const r = atan2(sin(twice), 1 / (6 * tan2) - cos(twice));
    return [f * Math.sqrt(1 - 12 * tan2 * cos(twice) + 36 * tan2 * tan2), u - r];
  },
  M3: ({ halfCosine2, xi, nu }) => [
    (halfCosine2 * halfCosine2 * halfCosine2) / 0.8758,
    3 * xi - 3 * nu,
  ],
});

// Which formula a constituent takes where it has none of its own; '1' is f = 1, u = 0.
const SHARED =
  'SAA=1 MSm=Mm MStm=Mf Mtm=Mf MSqm=Mf Mqm=Mf Q1=O1 2Q1=O1 SIG1=O1 RHO1=O1 CHI1=J1 THE1=J1 UPS1=OO1 N2=M2 2N2=M2 MU2=M2 NU2=M2 EPS2=M2 ' +
  'H1=M2 H2=M2 LAM2=M2 P1=1 PI1=1 PSI1=1 PHI1=1 S2=1 T2=1 R2=1';

/**
 * The name of the formula that a constituent takes.
 *
 * @param name - A listed constituent that is no compound.
 * @returns A key for {@link schuremanPair}, `1` for f = 1, or undefined where SP 98 gives none.
 */
export function schuremanFormula(name: string): string | undefined {
  if (Object.hasOwn(FORMULAS, name)) return name;
  return ` ${SHARED} `.split(` ${name}=`)[1]?.split(' ')[0];
}

/**
 * f and u by one formula.
 *
 * @param formula - What {@link schuremanFormula} gave, not `1`.
 * @param perigee - p, degrees.
 * @param node - N, degrees.
 * @returns f, and u in radians.
 */
export function schuremanPair(formula: string, perigee: Degrees, node: Degrees): Pair {
  return (FORMULAS[formula] as Formula)(orbit(node), degreesToRadians(wrapDegrees(perigee)));
}
